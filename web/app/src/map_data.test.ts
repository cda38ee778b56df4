import { expect, test } from 'vitest';
import type { Links, Plan } from './api';
import { joined } from './joined';
import { boundsOf, figureFeatures, linkFeatures, moveBy } from './map_data';

const site = (name: string, lon: number, lat: number, stations: string[]) => ({
  name,
  place: { lon, lat },
  stations: stations.map((n) => ({ name: n })),
});
const plan = {
  sites: [site('A', -20, 47, ['A']), site('B', -19, 48, ['B/one', 'B/two'])],
  links: [
    { from: 'A', to: 'B/two', channel: 'c', one_way: false },
    { from: 'A', to: 'gone', channel: 'c', one_way: false },
  ],
} as unknown as Plan;
const links = { links: [{ from: 'A', to: 'B/two', verdict: 'thin', margin_db: 2.46 }] } as unknown as Links;

test('a link runs between its sites, with its verdict once there is one', () => {
  const drawn = linkFeatures(plan, undefined, new Map());
  expect(drawn.features).toHaveLength(1);
  expect(drawn.features[0]!.geometry.coordinates).toEqual([
    [-20, 47],
    [-19, 48],
  ]);
  expect(figureFeatures(drawn).features).toHaveLength(0);
  const told = figureFeatures(linkFeatures(plan, links, new Map())).features[0]!;
  expect(told.properties).toMatchObject({ id: 'A..B/two', verdict: 'thin', label: '+2.4 dB' });
  expect(told.geometry.coordinates).toEqual([-19.5, 47.5]);
});

test('a site that is being dragged takes its links along', () => {
  const moved = new Map<string, [number, number]>([['B', [-19.5, 48]]]);
  expect(linkFeatures(plan, links, moved).features[0]!.geometry.coordinates[1]).toEqual([-19.5, 48]);
});

test('the bounds hold all sites', () => {
  expect(boundsOf(plan)).toEqual([-20, 47, -19, 48]);
  expect(boundsOf({ sites: [] } as unknown as Plan)).toBeUndefined();
});

test('a step by keys is as long as it says', () => {
  // One degree of latitude is 111.195 km on a sphere of 6371 km; along a parallel it shrinks by the cosine.
  const [lon, lat] = moveBy([10, 60], 111_195 / 2, 111_195);
  expect(lat).toBeCloseTo(61, 9);
  expect(lon).toBeCloseTo(11, 9);
});

test('links worked out anew replace the former ones, the rest stays', () => {
  const link = (from: string, margin_db: number) => ({ from, to: 'Z', margin_db });
  const all = { title: '', links: [link('A', 1), link('B', 2)] } as unknown as Links;
  const some = { title: '', links: [link('B', 9)] } as unknown as Links;
  expect(joined(all, some).links.map((l) => l.margin_db)).toEqual([1, 9]);
  expect(joined(undefined, some)).toBe(some);
});

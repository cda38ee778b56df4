import { expect, test } from 'vitest';
import type { Plan, Site, Station } from './api';
import { addLink, addSite, changeAntenna, moveSite, raiseAntenna } from './edits';

const station = (more: Partial<Station> = {}): Station => ({
  name: 'Gauge 3',
  path: ['sites', 'Gauge 3'],
  radio: 'logger',
  antenna: 'rod',
  above_ground_m: 4,
  facing_deg: 0,
  tilt_deg: 0,
  slant_deg: 0,
  standoff_m: 0,
  feeder_length_m: 6,
  ...more,
});
const site = (more: Partial<Site> = {}): Site => ({
  name: 'Gauge 3',
  at: '',
  place: { lon: -20, lat: 47.5, decimal: '', dms: '', utm: '' },
  ground_m: 7,
  surveyed: false,
  mast: { kind: 'pole', height_m: 4, width_m: 0.04 },
  stations: [station()],
  ...more,
});
const set = (path: string, value: unknown) => ({ do: 'set', path: path.split('/'), value });

test('an antenna on top takes mast and feeder along', () => {
  expect(raiseAntenna(site(), station(), 6.5)).toEqual([
    set('sites/Gauge 3/antenna/above_ground', '6.5 m'),
    set('sites/Gauge 3/mast/height', '6.5 m'),
    set('sites/Gauge 3/feeder/length', '8.5 m'),
  ]);
});

test('lowering never leaves a feeder or a mast of nothing', () => {
  const edits = raiseAntenna(site(), station({ feeder_length_m: 1 }), 0.5);
  expect(edits.map((e) => e.value)).toEqual(['0.5 m', '0.5 m', '0.1 m']);
});

test('beside a mast that others share, the mast grows only when it must', () => {
  const coast = station({
    path: ['sites', 'Ormvik', 'stations', 'coast'],
    standoff_m: 0.5,
    above_ground_m: 16,
    feeder_length_m: 0,
  });
  const ormvik = site({
    name: 'Ormvik',
    mast: { kind: 'pole', height_m: 18, width_m: 0.1 },
    stations: [coast, station()],
  });
  expect(raiseAntenna(ormvik, coast, 17)).toEqual([set('sites/Ormvik/stations/coast/antenna/above_ground', '17 m')]);
  expect(raiseAntenna(ormvik, coast, 20)).toHaveLength(2);
});

test('the same height is no change', () => {
  expect(raiseAntenna(site(), station(), 4)).toEqual([]);
});

test('an antenna with a beam that faces nowhere is turned to the other end', () => {
  const plan = {
    antennas: [
      { name: 'beam', kind: 'yagi' },
      { name: 'pair', kind: 'stack' },
    ],
  } as Plan;
  expect(changeAntenna(plan, station(), 'beam', 'Base')).toEqual([
    set('sites/Gauge 3/antenna/use', 'beam'),
    set('sites/Gauge 3/antenna/facing', 'toward Base'),
  ]);
  expect(changeAntenna(plan, station({ facing_deg: 90 }), 'beam', 'Base')).toHaveLength(1);
  expect(changeAntenna(plan, station(), 'pair', 'Base')).toHaveLength(1);
});

test('places and heights are written as plans take them', () => {
  expect(moveSite(site(), -0.5, 10)).toEqual([set('sites/Gauge 3/at', '0.50000 S, 10.00000 E')]);
  expect(addSite({ name: 'New', at: '1 N, 2 E', radio: 'r', antenna: 'a', heightM: 4, toward: '' })[0]).toEqual({
    do: 'add',
    path: ['sites'],
    value: { name: 'New', at: '1 N, 2 E', radio: 'r', antenna: { use: 'a', above_ground: '4 m' } },
  });
  expect(addLink('A', 'B', 'c')[0]!.value).toEqual({ from: 'A', to: 'B', channel: 'c' });
});

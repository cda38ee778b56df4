import { expect, test } from 'vitest';
import { ownLayer } from './own_layer';

const file = (text: string, size = text.length) => ({ name: 'roads.geojson', size, text: async () => text });

test('GeoJSON is taken as it is', async () => {
  const layer = await ownLayer(file('{"type": "FeatureCollection", "features": []}'));
  expect(layer).toEqual({ name: 'roads.geojson', data: { type: 'FeatureCollection', features: [] } });
});

test.each(['', 'null', '[]', '{"type": "Topology"}', '{"type": 3}', 'format: 1'])('%j is refused', async (text) => {
  await expect(ownLayer(file(text))).rejects.toThrow('roads.geojson');
});

test('a file that is too large is not read', async () => {
  await expect(ownLayer(file('{"type": "Point", "coordinates": [0, 0]}', 1e9))).rejects.toThrow('50 MB');
});

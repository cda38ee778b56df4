import { expect, test } from 'vitest';
import { readHash, writeHash } from './hash';

test('a view comes back from its hash', () => {
  for (const view of [
    {},
    { at: { lat: 47.5, lon: -20.125, zoom: 9.25 } },
    { link: 'Þórð & Łódź..Base/uhf #2' },
    { at: { lat: -33, lon: 179.99999, zoom: 0 }, link: 'A..B', cover: 'Base' },
  ]) {
    expect(readHash(writeHash(view))).toEqual(view);
  }
});

test('what cannot be read is left out, the rest is kept', () => {
  for (const at of ['', '1,2', '91,0,3', '1,2,3,4', 'x,y,z', '1,,3', '1,2,25', 'NaN,1,1']) {
    expect(readHash(`#at=${at}&link=A..B`), at).toEqual({ link: 'A..B' });
  }
});

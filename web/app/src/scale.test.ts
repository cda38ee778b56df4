import { expect, test } from 'vitest';
import { scale, stepFor, ticks } from './scale';

test('a scale maps both ends, and back', () => {
  const s = scale(10, 20, 300, 100);
  expect([s(10), s(20), s(15)]).toEqual([300, 100, 200]);
  expect(s.invert(s(13.7))).toBeCloseTo(13.7, 12);
});

test.each([
  [10, 5, 2],
  [10, 10, 1],
  [600, 4, 200],
  [29.6, 6, 5],
  [0.3, 3, 0.1],
])('a span of %d in %d parts goes in steps of %d', (span, parts, want) => {
  expect(stepFor(span, parts)).toBeCloseTo(want, 12);
});

test('ticks are multiples of the step, ends included', () => {
  expect(ticks(0, 1, 0.25)).toEqual([0, 0.25, 0.5, 0.75, 1]);
  expect(ticks(-3, 29, 10)).toEqual([0, 10, 20]);
  expect(ticks(0.05, 0.09, 0.1)).toEqual([]);
});

import { readFileSync } from 'node:fs';
import { interpolateCividis } from 'd3-scale-chromatic';
import { expect, test } from 'vitest';

const css = readFileSync(new URL('./tables.css', import.meta.url), 'utf8');
const shades = [...css.matchAll(/\.s(\d) \{\s*background: (#[0-9a-f]{6});/g)].map((m) => m[2]!);

// Source: d3-scale-chromatic's cividis, after Nunez, Anderton and Renslow 2018, at nine even steps; a level of 1 in 255
// is rounding.
test('the shades are nine even steps of cividis', () => {
  expect(shades).toHaveLength(9);
  shades.forEach((hex, i) => {
    const want = interpolateCividis(i / 8)
      .match(/\d+/g)!
      .map(Number);
    const got = [1, 3, 5].map((at) => Number.parseInt(hex.slice(at, at + 2), 16));
    got.forEach((level, n) => {
      expect(Math.abs(level - want[n]!), `${hex} against ${want}`).toBeLessThanOrEqual(1);
    });
  });
});

const luminance = (hex: string): number =>
  [1, 3, 5]
    .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4))
    .reduce((sum, c, i) => sum + c * [0.2126, 0.7152, 0.0722][i]!, 0);

// Source: WCAG 2.2, contrast ratio at least 4.5 for text of this size.
test('the figures on the shades can be read', () => {
  shades.forEach((hex, i) => {
    const l = luminance(hex);
    expect(i < 4 ? 1.05 / (l + 0.05) : (l + 0.05) / 0.05, hex).toBeGreaterThanOrEqual(4.5);
  });
});

/** A Scale maps a quantity to pixels, linearly. */
export interface Scale {
  (x: number): number;
  invert(px: number): number;
}

export function scale(from: number, to: number, pxFrom: number, pxTo: number): Scale {
  const perUnit = (pxTo - pxFrom) / (to - from || 1);
  return Object.assign((x: number) => pxFrom + (x - from) * perUnit, {
    invert: (px: number) => from + (px - pxFrom) / perUnit,
  });
}

/** stepFor is the step of 1, 2 or 5 times a power of ten that cuts a span into at most so many parts. */
export function stepFor(span: number, parts: number): number {
  const rough = span / parts;
  const power = 10 ** Math.floor(Math.log10(rough));
  return power * ([1, 2, 5, 10].find((f) => f * power >= rough * (1 - 1e-9)) ?? 10);
}

/** ticks lists the multiples of a step within a range. */
export function ticks(least: number, most: number, step: number): number[] {
  const first = Math.ceil(least / step - 1e-9);
  const last = Math.floor(most / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => Number(((first + i) * step).toPrecision(12)));
}

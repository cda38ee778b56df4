/** Figures as the trade writes them: a true minus sign, one decimal for decibels, units beside them by words.ts. */

const minus = '\u2212';

/** fixed writes a number with a fixed count of decimals, never a minus before zero. */
export function fixed(x: number, decimals: number): string {
  const text = Math.abs(x).toFixed(decimals);
  return x < 0 && /[1-9]/.test(text) ? minus + text : text;
}

/** signed writes a level or a margin with its sign; zero has none. */
export function signed(x: number, decimals = 1): string {
  const text = fixed(x, decimals);
  return text.startsWith(minus) || !/[1-9]/.test(text) ? text : `+${text}`;
}

// Rounding down may not turn 8.2, held as 8.199999999, into 8.1.
const slack = 1e-9;

/** margin writes a margin rounded down to a tenth, so that none is overstated. */
export function margin(db: number): string {
  return signed(Math.floor(db * 10 + slack) / 10);
}

/** percent writes a part of 1 with as many digits as it deserves near its ends. */
export function percent(part: number): string {
  const pct = part * 100;
  if (pct > 99.9) return '> 99.9 %';
  if (pct < 0.1) return '< 0.1 %';
  return `${pct > 99 || pct < 1 ? pct.toFixed(1) : pct.toFixed(0)} %`;
}

/** metres writes a height that people set: as many decimals as it has, at most two. */
export function metres(m: number): string {
  return fixed(m, 2).replace(/\.?0+$/, '');
}

/** bearing writes an azimuth from true north, 0 to 359.9. */
export function bearing(deg: number): string {
  const tenths = Math.round((((deg % 360) + 360) % 360) * 10) % 3600;
  return (tenths / 10).toFixed(1);
}

/** megahertz writes a frequency in MHz with as many decimals as it has, at most four. */
export function megahertz(hz: number): string {
  return (hz / 1e6).toFixed(4).replace(/\.?0+$/, '');
}

/** decimalPlace writes a place as plans take it, to about a metre. */
export function decimalPlace(lat: number, lon: number): string {
  const wrapped = ((((lon + 180) % 360) + 360) % 360) - 180;
  return `${Math.abs(lat).toFixed(5)} ${lat < 0 ? 'S' : 'N'}, ${Math.abs(wrapped).toFixed(5)} ${wrapped < 0 ? 'W' : 'E'}`;
}

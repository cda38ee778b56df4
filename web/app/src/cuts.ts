import type { Antenna } from './api';

/** A Cut is gain along a circle: degrees from 0 below 360 and dBi, both polarizations together. */
export type Cut = { deg: number; dbi: number }[];

type Sample = Antenna['pattern'][number];

/** total adds the two polarizations' powers. */
export const total = (p: Sample): number => 10 * Math.log10(10 ** (p.gain_v_dbi / 10) + 10 ** (p.gain_h_dbi / 10));

const turned = (deg: number): number => ((deg % 360) + 360) % 360;

/** apart is the angle between two bearings, 0 to 180 degrees. */
export const apart = (a: number, b: number): number => Math.abs(turned(a - b + 180) - 180);

function closest(values: Iterable<number>, distance: (x: number) => number): number {
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  for (const x of values) {
    if (distance(x) < least) {
      best = x;
      least = distance(x);
    }
  }
  return best;
}

/** azimuthCut is the pattern at the sampled elevation nearest to the one asked, clockwise from north. */
export function azimuthCut(pattern: readonly Sample[], elevationDeg: number): { at: number; cut: Cut } {
  const at = closest(new Set(pattern.map((p) => p.elevation_deg)), (e) => Math.abs(e - elevationDeg));
  const cut = pattern.filter((p) => p.elevation_deg === at).map((p) => ({ deg: p.azimuth_deg, dbi: total(p) }));
  return { at, cut: cut.sort((a, b) => a.deg - b.deg) };
}

/**
 * elevationCut is the pattern through the sampled azimuth nearest to the one asked: 0 degrees ahead on the horizon, 90
 * overhead, 180 behind.
 */
export function elevationCut(pattern: readonly Sample[], azimuthDeg: number): { at: number; cut: Cut } {
  const azimuths = new Set(pattern.map((p) => p.azimuth_deg));
  const ahead = closest(azimuths, (a) => apart(a, azimuthDeg));
  const behind = closest(azimuths, (a) => apart(a, ahead + 180));
  const cut: Cut = [];
  for (const p of pattern) {
    if (p.azimuth_deg === ahead) cut.push({ deg: turned(p.elevation_deg), dbi: total(p) });
    else if (p.azimuth_deg === behind && Math.abs(p.elevation_deg) < 90) {
      cut.push({ deg: turned(180 - p.elevation_deg), dbi: total(p) });
    }
  }
  return { at: ahead, cut: cut.sort((a, b) => a.deg - b.deg) };
}

/** peakOf is the greatest gain of a cut. */
export const peakOf = (cut: Cut) => cut.reduce((best, p) => (p.dbi > best.dbi ? p : best));

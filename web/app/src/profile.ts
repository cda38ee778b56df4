import type { Section } from './api';

export type Point = Section['points'][number];

/** The heights of the section's picture: what stands in it is above sea level plus the Earth's bulge. */
export const groundLine = (p: Point): number => p.ground_m + p.bulge_m;
export const coverLine = (p: Point): number => groundLine(p) + p.cover_m;

/** nearest returns the index of the point nearest to a distance along a path of equal steps. */
export function nearest(points: readonly Point[], km: number): number {
  const last = points.length - 1;
  const length = points[last]!.d_km;
  return Math.min(last, Math.max(0, Math.round((km / (length || 1)) * last)));
}

/** nearestTo returns the point of a path nearest to a place, on a map. */
export function nearestTo(points: readonly Point[], lon: number, lat: number): Point {
  const shrink = Math.cos((lat * Math.PI) / 180);
  const distance = (p: Point) => Math.hypot((p.lon - lon) * shrink, p.lat - lat);
  return points.reduce((best, p) => (distance(p) < distance(best) ? p : best));
}

/** reach is what the picture must hold from top to bottom, in metres above sea level. */
export function reach(points: readonly Point[]): { least: number; most: number } {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (const p of points) {
    least = Math.min(least, p.ground_m, p.ray_m);
    most = Math.max(most, coverLine(p), p.ray_m + p.fresnel1_m);
  }
  return { least: Math.min(least, Math.max(0, least - (most - least) * 0.05)), most };
}

/** ratioAt is the clearance over the first Fresnel radius at a point between the ends, negative when blocked. */
export function ratioAt(p: Point): number | undefined {
  return p.fresnel1_m > 0 ? (p.ray_m - coverLine(p)) / p.fresnel1_m : undefined;
}

/** enteredKm is the length of path over which a part of the first Fresnel zone is entered. */
export function enteredKm(points: readonly Point[], part: number): number {
  let count = 0;
  for (const p of points) {
    const ratio = ratioAt(p);
    if (ratio !== undefined && ratio < part) count++;
  }
  return points.length < 2 ? 0 : count * (points[1]!.d_km - points[0]!.d_km);
}

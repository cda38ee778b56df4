import { expect, test } from 'vitest';
import { enteredKm, nearest, nearestTo, type Point, ratioAt, reach } from './profile';

const point = (d_km: number, ground_m: number, more: Partial<Point> = {}): Point => ({
  d_km,
  ground_m,
  lon: 0,
  lat: 0,
  cover_m: 0,
  zone: 4,
  ray_m: 100,
  bulge_m: 0,
  fresnel1_m: d_km === 0 || d_km === 4 ? 0 : 20,
  ...more,
});
const points = [point(0, 10), point(1, 50), point(2, 85, { bulge_m: 5, cover_m: 4 }), point(3, 120), point(4, 60)];

test('the nearest point is found, also from beyond the ends', () => {
  expect([-1, 0, 1.4, 1.6, 4, 9].map((km) => nearest(points, km))).toEqual([0, 0, 1, 2, 4, 4]);
});

test('clearance counts bulge and cover, in first Fresnel radii', () => {
  expect(ratioAt(points[2]!)).toBeCloseTo((100 - 94) / 20, 12);
  expect(ratioAt(points[3]!)).toBeCloseTo(-1, 12);
  expect(ratioAt(points[0]!)).toBeUndefined();
});

test('the length over which 0.6 of the zone is entered', () => {
  expect(enteredKm(points, 0.6)).toBe(2);
  expect(enteredKm(points, -2)).toBe(0);
});

test('the picture holds ground, cover and the whole zone', () => {
  expect(reach(points)).toEqual({ least: expect.any(Number), most: 120 });
  expect(reach(points).least).toBeLessThanOrEqual(10);
});

test('the point nearest to a place, degrees of longitude being short up north', () => {
  const path = [
    point(0, 0, { lon: 10, lat: 60 }),
    point(1, 0, { lon: 10.02, lat: 60 }),
    point(2, 0, { lon: 10.02, lat: 60.02 }),
  ];
  expect(nearestTo(path, 10.012, 60).d_km).toBe(1);
  // 0.02 degrees of longitude at 60 N are as long as 0.01 of latitude.
  expect(nearestTo([path[0]!, path[2]!], 10.015, 60.006).d_km).toBe(0);
});

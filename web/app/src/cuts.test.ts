import { expect, test } from 'vitest';
import { apart, azimuthCut, elevationCut, peakOf, total } from './cuts';

// A made-up antenna: gain falls with the angle from azimuth 90 and from the horizon.
const pattern: { azimuth_deg: number; elevation_deg: number; gain_v_dbi: number; gain_h_dbi: number }[] = [];
for (let elevation_deg = -90; elevation_deg <= 90; elevation_deg += 30) {
  for (let azimuth_deg = 0; azimuth_deg < 360; azimuth_deg += 30) {
    const gain = 8 - apart(azimuth_deg, 90) / 10 - Math.abs(elevation_deg) / 10;
    pattern.push({ azimuth_deg, elevation_deg, gain_v_dbi: gain, gain_h_dbi: -100 });
  }
}

test('two equal powers make 3.01 dB more', () => {
  expect(total({ azimuth_deg: 0, elevation_deg: 0, gain_v_dbi: 2, gain_h_dbi: 2 })).toBeCloseTo(
    2 + 10 * Math.log10(2),
    9,
  );
});

test('the azimuth cut goes round once at the nearest elevation', () => {
  const { at, cut } = azimuthCut(pattern, 4);
  expect(at).toBe(0);
  expect(cut).toHaveLength(12);
  expect(peakOf(cut)).toEqual({ deg: 90, dbi: expect.closeTo(8, 6) });
});

test('the elevation cut goes over the top and behind, each direction once', () => {
  const { at, cut } = elevationCut(pattern, 80);
  expect(at).toBe(90);
  expect(cut.map((p) => p.deg)).toEqual([0, 30, 60, 90, 120, 150, 180, 210, 240, 270, 300, 330]);
  expect(cut.find((p) => p.deg === 180)!.dbi).toBeCloseTo(8 - 18, 6);
  expect(cut.find((p) => p.deg === 60)!.dbi).toBeCloseTo(2, 6);
});

test('bearings are apart by at most half a turn', () => {
  expect([apart(350, 10), apart(0, 180), apart(90, 89)]).toEqual([20, 180, 1]);
});

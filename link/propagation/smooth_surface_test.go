package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// A straight slope is its own fit, whatever the spacing of the points.
func TestFitOfAStraightSlope(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		for i, d := range p.DistKm {
			p.AslM[i] = 100 + 2.5*d
		}
		got := fitSurface(p.DistKm, p.AslM)
		if math.Abs(got.tx-100) > 1e-6 || math.Abs(got.rx-(100+2.5*p.LengthKm())) > 1e-6 {
			t.Errorf("got %+v", got)
		}
	})
}

// The least-squares lines by calculus, over 10 km: a tent of height 1 is level at its mean 1/2. A
// ramp to 1 half-way and level from there has the mean 3/4 and rises by 12 (1/8 - 1/24) = 1.
func TestFitByCalculus(t *testing.T) {
	for _, tc := range []struct {
		heights []float64
		want    surfaceLine
	}{
		{[]float64{0, 1, 0}, surfaceLine{0.5, 0.5}},
		{[]float64{0, 1, 1}, surfaceLine{0.25, 1.25}},
	} {
		got := fitSurface([]float64{0, 5, 10}, tc.heights)
		if math.Abs(got.tx-tc.want.tx) > 1e-12 || math.Abs(got.rx-tc.want.rx) > 1e-12 {
			t.Errorf("heights %v: got %+v, want %+v", tc.heights, got, tc.want)
		}
	}
}

// One obstruction in the middle, 30 m over the ray, is as steep from both ends: the surface sinks by
// 15 m at each. At a quarter of the path it is three times as steep from the near end, which
// takes three quarters of the 30 m.
func TestLoweredSurface(t *testing.T) {
	for _, tc := range []struct {
		at, height float64
		want       surfaceLine
	}{
		{5, 50, surfaceLine{-15, -15}},
		{2.5, 50, surfaceLine{-22.5, -7.5}},
		{5, 20, surfaceLine{}}, // grazes
		{5, 10, surfaceLine{}}, // under the ray
	} {
		r := ridge{distKm: []float64{0, tc.at, 10}, aslM: []float64{0, tc.height, 0}, hts: 20, hrs: 20}
		got := surfaceLine{}.lowered(findObstructions(&r))
		if math.Abs(got.tx-tc.want.tx) > 1e-12 || math.Abs(got.rx-tc.want.rx) > 1e-12 {
			t.Errorf("%g m at %g km: got %+v, want %+v", tc.height, tc.at, got, tc.want)
		}
	}
}

// Antennas never stand lower over the smooth surface than over the ground.
func TestSmoothSurfaceStaysUnderTheAntennas(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		m := newDiffraction(&p, 0)
		if m.level.hts < p.TxAglM-1e-9 || m.level.hrs < p.RxAglM-1e-9 {
			t.Errorf("effective heights %g and %g m, antennas at %g and %g m", m.level.hts, m.level.hrs, p.TxAglM, p.RxAglM)
		}
	})
}

package wire

import (
	"math"
	"math/cmplx"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

// sampledStructures are antennas from the smallest to one of kr = 23.
func sampledStructures() map[string]Structure {
	yagi := Structure{Feeds: []Feed{{2, 0.5}}}
	for i, lengthM := range []float64{0.482, 0.47, 0.432, 0.415, 0.407, 0.398, 0.39, 0.39, 0.39, 0.39, 0.398, 0.407} {
		yagi.Wires = append(yagi.Wires, upright(lengthM, 0.004).moved(vec{0.2*float64(i) - 0.2, 0, 0}))
	}
	slanted := besideMast(0.5, 0.06, 0, 5).turned(vec{0.6, 0, 0.8}, 1, vec{5, 5, 5})
	long := Structure{Wires: []Wire{upright(7.3, 0.001)}, Feeds: []Feed{{1, 0.5}}}
	return map[string]Structure{
		"dipole":           {Wires: []Wire{upright(0.47, 0.003)}, Feeds: []Feed{{1, 0.5}}},
		"short dipole":     {Wires: []Wire{upright(0.02, 0.0001)}, Feeds: []Feed{{1, 0.5}}},
		"twelve elements":  yagi,
		"lying elements":   yagi.turned(vec{1, 0, 0}, math.Pi/2, vec{}),
		"tilted elements":  yagi.turned(vec{0.6, 0.8, 0}, 0.7, vec{1, 2, 3}),
		"beside a mast":    besideMast(0.5, 0.06, 0, 5),
		"slanted dipole":   slanted,
		"rod of 7 waves":   long,
		"crossing the sky": long.turned(vec{1, 0, 0}, 1.2, vec{}),
	}
}

// Source: the far field itself, towards directions between the samples, the poles and the seam among
// them. Tolerance: 0.01 dB down to 25 dB under the peak, where nulls are filled anyway, and the
// phase between the components.
func TestPatternInterpolates(t *testing.T) {
	for name, s := range sampledStructures() {
		_, r := excited(t, s)
		p := r.Pattern()
		worst, peak := 0.0, 0.0
		check := func(d antenna.Direction) {
			got, want := p.Field(d), r.Field(d)
			peak = max(peak, want.Power())
			if want.GainDBi() > p.PeakDBi-antenna.NullFloorDB {
				worst = max(worst, abs(got.GainDBi()-want.GainDBi()))
				if d := cmplx.Abs(got.Theta-want.Theta) + cmplx.Abs(got.Phi-want.Phi); d > 2e-3*math.Sqrt(want.Power()) {
					t.Errorf("%s: field %v towards %v, want %v", name, got, d, want)
				}
			}
		}
		for az := -359.3; az < 720; az += 27.7 {
			for _, el := range []float64{-90, -89.99, -88.7, -61.3, -45, -12.2, -0.3, 0, 7.77, 33, 58.1, 84.4, 89.2, 89.999, 90} {
				check(antenna.Direction{AzDeg: az, ElDeg: el})
			}
		}
		for _, az := range []float64{-1e-20, 0, 1e-20, 180, 359.9999999, 360, -360} {
			check(antenna.Direction{AzDeg: az, ElDeg: 20})
		}
		t.Logf("%s: %d by %d samples, worst error %.5f dB", name, r.radiator.sample(1).elevations, r.radiator.sample(1).azimuths, worst)
		if worst > 0.01 {
			t.Errorf("%s: interpolation errs by %.4f dB", name, worst)
		}
		if 10*math.Log10(peak) > p.PeakDBi+0.002 {
			t.Errorf("%s: %.4f dBi somewhere, peak %.4f", name, 10*math.Log10(peak), p.PeakDBi)
		}
	}
}

// Source: the poles are one direction each, from whatever azimuth: the field is one vector there.
func TestPatternAtThePoles(t *testing.T) {
	_, r := excited(t, besideMast(0.5, 0.02, 0, 2).turned(vec{0.6, 0.8, 0}, 1, vec{}))
	p := r.Pattern()
	vector := func(d antenna.Direction) [3]complex128 {
		f := p.Field(d)
		_, theta, phi := axes(d)
		var v [3]complex128
		for i := range v {
			v[i] = f.Theta*complex(theta[i], 0) + f.Phi*complex(phi[i], 0)
		}
		return v
	}
	for _, el := range []float64{-90, 90} {
		want := vector(antenna.Direction{ElDeg: el})
		for az := 10.0; az < 360; az += 33 {
			got := vector(antenna.Direction{AzDeg: az, ElDeg: el})
			for i := range got {
				if cmplx.Abs(got[i]-want[i]) > 1e-4 {
					t.Errorf("field %v at elevation %g azimuth %g, want %v", got, el, az, want)
				}
			}
		}
	}
}

// Source: Lagrange's polynomials add to 1 and give polynomials up to the fifth degree exactly.
func TestTapWeights(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(-3, 50).Draw(t, "x")
		first, w := tapWeights(x)
		for degree := range taps {
			sum := 0.0
			for i, v := range w {
				sum += v * math.Pow(float64(first+i)-x, float64(degree))
			}
			want := 0.0
			if degree == 0 {
				want = 1
			}
			if abs(sum-want) > 1e-9 {
				t.Errorf("x = %g, degree %d: %g, want %g", x, degree, sum, want)
			}
		}
	})
}

// Source: the pattern of a dipole along z is the same all around and has no phi component.
func TestPatternOfADipole(t *testing.T) {
	_, r := solvedRod(t, 0.47, 0.003, 0.5)
	p := r.Pattern()
	if !p.Phased || p.GainOnly {
		t.Errorf("phased %v, gain only %v", p.Phased, p.GainOnly)
	}
	for az := 0.0; az < 360; az += 17 {
		f := p.Field(antenna.Direction{AzDeg: az, ElDeg: 12})
		if cmplx.Abs(f.Phi) > 1e-12 || abs(f.GainDBi()-p.Field(antenna.Direction{ElDeg: 12}).GainDBi()) > 1e-6 {
			t.Errorf("field %v at azimuth %g", f, az)
		}
	}
}

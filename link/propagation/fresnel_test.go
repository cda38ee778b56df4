package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Source: US Army Signal Center, correspondence course SS0121A: a point 16 km from one end and
// 24 km from the other at 4 GHz has a first Fresnel radius of about 27 m (it computes with the
// rounded constant 17.5, which gives 27.1; the usual 17.3 gives 26.8).
func TestFresnelRadiusHandbook(t *testing.T) {
	got := FresnelRadiusM(1, WavelengthM(4e9), 16, 24)
	if math.Abs(got-27) > 0.5 {
		t.Errorf("radius %.2f m, want about 27", got)
	}
}

// On the edge of the n-th zone the way over it is n half wavelengths longer than the straight one.
func TestFresnelRadiusDefinition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 5).Draw(t, "n")
		lambda := rapid.Float64Range(0.05, 10).Draw(t, "lambda")
		d1, d2 := rapid.Float64Range(1, 50).Draw(t, "d1"), rapid.Float64Range(1, 50).Draw(t, "d2")
		f := FresnelRadiusM(n, lambda, d1, d2)
		detour := f*f/(math.Hypot(f, 1000*d1)+1000*d1) + f*f/(math.Hypot(f, 1000*d2)+1000*d2)
		if want := float64(n) * lambda / 2; math.Abs(detour/want-1) > 0.02 { // the radius is the far-field form
			t.Errorf("zone %d: detour %g m, want %g", n, detour, want)
		}
	})
}

// Handbook figure: the bulge in the middle of 50 km on 4/3 of the Earth is d1 d2/17 = 36.8 m.
func TestBulge(t *testing.T) {
	if got := BulgeM(25, 25, 6371*4./3); math.Abs(got-25*25/17.) > 0.1 {
		t.Errorf("bulge %.3f m, want 36.8", got)
	}
}

func TestEffectiveEarthRadius(t *testing.T) {
	// Source: k = 4/3 at 39.25 N-units/km by definition; the second is ae of the published P.1812 cases.
	for _, tc := range []struct{ deltaN, want float64 }{{39.25, 6371 * 4. / 3}, {45, 8930.776786}} {
		if got := EffectiveEarthRadiusKm(tc.deltaN); math.Abs(got-tc.want) > 1e-6 {
			t.Errorf("EffectiveEarthRadiusKm(%g) = %.6f, want %.6f", tc.deltaN, got, tc.want)
		}
	}
}

// Worked by hand: 10 km, antennas 10 m over level ground at sea level, 300 MHz (0.99931 m), k = 4/3.
// In the middle the bulge is 1.4716 m, the radius sqrt(999.31 * 2.5) = 49.983 m.
func TestClearanceByHand(t *testing.T) {
	p := level(5, 10)
	p.FreqHz, p.DeltaN = 300e6, 39.25
	for _, tc := range []struct {
		name          string
		ground, cover float64
		want          float64
	}{
		{"level", 0, 0, (10 - 1.4716) / 49.983},
		{"wood", 0, 15, (-5 - 1.4716) / 49.983},
		{"hill with wood", 20, 15, (-25 - 1.4716) / 49.983},
	} {
		p.AslM[2], p.CoverM[2] = tc.ground, tc.cover
		got, err := Clearance(p)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(got.WorstRatio-tc.want) > 1e-4 || got.Index != 2 || got.AtKm != 5 || got.NeededRatio != 0.6 {
			t.Errorf("%s: got %+v, want a ratio of %.4f at point 2", tc.name, got, tc.want)
		}
	}
}

// Two points are judged in their middle.
func TestClearanceOfTwoPoints(t *testing.T) {
	p := level(2, 0.02)
	p.AslM[1] = 4
	got, err := Clearance(p)
	if err != nil {
		t.Fatal(err)
	}
	want := (10 - 500*0.01*0.01/EffectiveEarthRadiusKm(45)) / math.Sqrt(WavelengthM(150e6)*5)
	if got.Index != -1 || got.AtKm != 0.01 || math.Abs(got.WorstRatio-want) > 1e-12 {
		t.Errorf("got %+v, want a ratio of %g at 0.01 km", got, want)
	}
}

// The ratio and the diffraction parameter are the same thing: nu = -sqrt(2) ratio at the worst
// point (Rec. ITU-R P.526-15, section 4.1), but for the two speeds of light.
func TestClearanceAgreesWithNu(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		if len(p.DistKm) == 2 {
			t.Skip("no point between the ends")
		}
		got, err := Clearance(p)
		if err != nil {
			t.Fatal(err)
		}
		r := ridge{p.DistKm, p.AslM, p.CoverM, p.txAslM(), p.rxAslM()}
		s := r.slopes(EffectiveEarthRadiusKm(p.DeltaN))
		if s.Blocked() {
			if got.WorstRatio > 1e-9 {
				t.Errorf("blocked, ratio %g", got.WorstRatio)
			}
			return
		}
		want := -s.Nu(p.LengthKm(), WavelengthM(p.FreqHz)) / math.Sqrt2
		if math.Abs(got.WorstRatio-want) > 1e-9*(1+math.Abs(want)) {
			t.Errorf("ratio %g, from nu %g", got.WorstRatio, want)
		}
	})
}

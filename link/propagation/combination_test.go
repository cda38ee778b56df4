package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// The blends against the forms that the Recommendation prints, where those do not overflow.
func TestBlendsAgainstTheWrittenForms(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b := rapid.Float64Range(30, 400).Draw(t, "a"), rapid.Float64Range(30, 400).Draw(t, "b")
		if got, want := minimumWithDuctingDB(a, b), 2.5*math.Log(math.Exp(a/2.5)+math.Exp(b/2.5)); math.Abs(got-want) > 1e-9 {
			t.Errorf("(60) of %g and %g: %.9f, as written %.9f", a, b, got, want)
		}
		if got, want := combineDB(a, b), -5*math.Log10(math.Pow(10, -0.2*a)+math.Pow(10, -0.2*b)); math.Abs(got-want) > 1e-9 {
			t.Errorf("(63) of %g and %g: %.9f, as written %.9f", a, b, got, want)
		}
	})
}

// Losses of any size blend: the written forms overflow beyond 1,700 dB.
func TestBlendsOfHugeLosses(t *testing.T) {
	if got := minimumWithDuctingDB(1e5, 90); got != 1e5 {
		t.Errorf("(60): %g", got)
	}
	if got := combineDB(1e5, 1e5); math.Abs(got-(1e5-5*math.Log10(2))) > 1e-9 {
		t.Errorf("(63): %g", got)
	}
	if got := combineDB(150, math.MaxFloat64); got != 150 {
		t.Errorf("(63): %g", got)
	}
}

// (59) by hand, with a quarter of the path over sea: no published case shows the sea share in Lb.
func TestMinimum(t *testing.T) {
	terms := Terms{Omega: 0.25, Beta0: 5, Fi: 0.5, Lb0p: 120, Lb0beta: 118, Ldp: 20, Lbd50: 146}
	for _, tc := range []struct{ p, want float64 }{
		{4.9, 120 + 0.75*20},
		{5, 146 + (118+0.75*20-146)*0.5},
		{10, 146 + (118+0.75*20-146)*0.5},
	} {
		if got := terms.minimumDB(tc.p); math.Abs(got-tc.want) > 1e-12 {
			t.Errorf("Lminb0p(%g %%) = %g, want %g", tc.p, got, tc.want)
		}
	}
}

// The weights by their definition: one half at 0.3 mrad and at 20 km, with tanh 2.4 and tanh 1.5 either
// side.
func TestWeights(t *testing.T) {
	for _, tc := range []struct {
		name      string
		got, want float64
	}{
		{"Fj(0.3)", angleWeight(0.3), 0.5},
		{"Fj(0)", angleWeight(0), 0.5 + 0.5*math.Tanh(2.4)},
		{"Fj(10)", angleWeight(10), 0},
		{"Fj(-5)", angleWeight(-5), 1},
		{"Fk(20)", distanceWeight(20), 0.5},
		{"Fk(40)", distanceWeight(40), 0.5 - 0.5*math.Tanh(1.5)},
		{"Fk(0)", distanceWeight(0), 0.5 + 0.5*math.Tanh(1.5)},
	} {
		if math.Abs(tc.got-tc.want) > 1e-12 {
			t.Errorf("%s = %g, want %g", tc.name, tc.got, tc.want)
		}
	}
}

// Ducting counts where it loses less than diffraction, at 20 km half-way.
func TestWithDucting(t *testing.T) {
	if got := withDuctingDB(140, 150, 20); got != 140 {
		t.Errorf("ducting worse: %g dB, want diffraction's 140", got)
	}
	if got := withDuctingDB(140, 130, 20); got != 135 {
		t.Errorf("ducting better by 10 dB at 20 km: %g dB, want 135", got)
	}
	if got := withDuctingDB(140, 140, 20); got != 140 {
		t.Errorf("at the border: %g dB, want 140", got)
	}
}

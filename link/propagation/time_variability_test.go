package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// exactNormal is the exact quantile, by the inverse complementary error function of the standard
// library.
func exactNormal(x float64) float64 { return math.Sqrt2 * math.Erfcinv(2*x) }

// The approximation stays within 4.5e-4 of the exact quantile, the figure that handbooks of
// mathematical functions give for its form (with a little more for the constants of this one), and is
// odd about one half.
func TestInverseNormal(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(1e-6, 0.999999).Draw(t, "x")
		got := inverseNormal(x)
		if exact := exactNormal(x); math.Abs(got-exact) > 5e-4 {
			t.Errorf("I(%g) = %g, exact %g", x, got, exact)
		}
		if mirrored := inverseNormal(1 - x); math.Abs(got+mirrored) > 1e-5 { // 1 - x loses digits near 1
			t.Errorf("I(%g) = %g, I(1-x) = %g", x, got, mirrored)
		}
	})
	if got := inverseNormal(1e-9); got != inverseNormal(1e-6) {
		t.Errorf("I(1e-9) = %g, want that of 1e-6", got)
	}
}

// Source: Fi of the published cases b2iseac_1 and _2 (see [oneKm]); the rest are its borders.
func TestInterpolationFactor(t *testing.T) {
	const beta0 = 4.26330636
	for _, tc := range []struct{ p, want float64 }{
		{1, 1}, {beta0, 1}, {10, 0.744629294}, {50, 0},
	} {
		if got := interpolationFactor(tc.p, beta0); math.Abs(got-tc.want) > 1e-9 {
			t.Errorf("Fi(%g %%) = %.10f, want %.10f", tc.p, got, tc.want)
		}
	}
	if got := interpolationFactor(math.Nextafter(beta0, 5), beta0); math.Abs(got-1) > 1e-12 {
		t.Errorf("Fi just above beta0 = %g, want 1", got)
	}
	if got := interpolationFactor(math.Nextafter(50, 0), beta0); math.Abs(got) > 1e-8 {
		t.Errorf("Fi just below 50 %% = %g, want 0", got)
	}
}

package propagation

import (
	"math"
	"testing"
)

// P.1812's constant is 0.048 dB less than the exact one.
func TestLineOfSightAgainstFreeSpace(t *testing.T) {
	for _, f := range []float64{0.03, 0.45, 6} {
		got, exact := lineOfSightDB(f, 12.5), FreeSpaceDB(f*1e9, 12500)
		if d := exact - got; d < 0.047 || d > 0.049 {
			t.Errorf("at %g GHz %g dB, exact %g", f, got, exact)
		}
	}
}

// Source: Lb0p - Lbfs and Lb0beta - Lbfs of the published case b2iseac_1 (see [oneKm]), whose horizons
// lie at 121.1 and 46 km.
func TestFocusing(t *testing.T) {
	for _, tc := range []struct{ p, want float64 }{
		{1, 114.9896269 - 119.4069487},
		{4.26330636, 116.6269678 - 119.4069487},
	} {
		if got := focusingDB(121.1, 46, tc.p); math.Abs(got-tc.want) > 2e-7 {
			t.Errorf("Esp(%g %%) = %.7f, want %.7f", tc.p, got, tc.want)
		}
	}
	if got := focusingDB(121.1, 46, 50); got != 0 {
		t.Errorf("Esp(50 %%) = %g, want exactly 0", got)
	}
}

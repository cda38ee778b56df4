package propagation

import (
	"math"
	"testing"
)

// Source: published cases b2iseac_1, _2 and _3 and b2iseac_rural_land_10km_2 (see [oneKm]); the last
// two by hand: at 2 GHz Lf is 25 log 2 = 7.5257 dB, so that 190.1 + 7.5257 + 40 + 11.46 - 48.75
// remain at 50 %.
func TestTroposcatter(t *testing.T) {
	for _, tc := range []struct{ f, d, theta, n0, p, want float64 }{
		{0.0953, 235.1, 7.673515171, 326.079979, 1, 148.4453017},
		{0.0953, 235.1, 7.673515171, 326.079979, 10, 155.2386935},
		{0.0953, 235.1, 7.673515171, 326.079979, 50, 163.1185082},
		{0.0953, 10, 46.09666966, 326.079979, 10, 149.8301084},
		{2, 100, 20, 325, 50, 200.3357499},
		{2, 100, 20, 325, 5, 200.3357499 - 10.125}, // log(50/5) = 1
	} {
		if got := troposcatterDB(tc.f, tc.d, tc.theta, tc.n0, tc.p); math.Abs(got-tc.want) > 2e-7 {
			t.Errorf("%+v: got %.7f", tc, got)
		}
	}
}

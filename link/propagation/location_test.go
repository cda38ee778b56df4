package propagation

import (
	"math"
	"testing"
)

// Source: the first two computed apart from this program from the same constants; the rest by the
// definition of the height factor, 1 up to the cover, 0 from 10 m over it.
func TestLocationSpread(t *testing.T) {
	const full = 1.901163834
	for _, tc := range []struct{ freqGHz, width, rx, cover, want float64 }{
		{0.151, 100, 1.5, 10, full},
		{2.4, 100, 2, 10, 2.097138844},
		{0.151, 100, 10, 10, full},
		{0.151, 100, 15, 10, full / 2},
		{0.151, 100, 20, 10, 0},
		{0.151, 100, 60, 10, 0},
		{0.151, 100, 1.5, 0, 0.85 * full},
	} {
		got := LocationSpreadDB(tc.freqGHz*1e9, tc.width, tc.rx, tc.cover)
		if math.Abs(got-tc.want) > 1e-8 {
			t.Errorf("%+v: got %.9f dB", tc, got)
		}
	}
}

// Source: exact normal quantiles (1.2816 at 90 %); the Recommendation's approximation is within
// 4.5e-4 of them.
func TestLocationDB(t *testing.T) {
	for _, pl := range []float64{1, 10, 49, 51, 75, 90, 99} {
		got, want := LocationDB(pl, 8), -8*exactNormal(pl/100)
		if math.Abs(got-want) > 8*4.5e-4 {
			t.Errorf("Lloc(%g %%) = %.4f dB, want %.4f", pl, got, want)
		}
	}
	if got := LocationDB(50, 8); got != 0 {
		t.Errorf("Lloc(50 %%) = %g, want exactly 0", got)
	}
}

// More locations never lose less, and the loss never falls below the line of sight.
func TestLocationsInTheLoss(t *testing.T) {
	p := tenKm()
	p.LocationSpreadDB = 8
	last := math.Inf(-1)
	for _, pl := range []float64{1, 5, 20, 50, 80, 95, 99} {
		p.LocationPct = pl
		l, err := P1812.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		if l.DB < last || l.DB < l.Terms.Lb0p {
			t.Errorf("at %g %% of the locations %g dB after %g dB, Lb0p = %g", pl, l.DB, last, l.Terms.Lb0p)
		}
		if want := max(l.Terms.Lb0p, l.Terms.Lbc+l.Terms.Lloc); l.DB != want {
			t.Errorf("at %g %%: %g dB, want %g", pl, l.DB, want)
		}
		last = l.DB
	}
	p.LocationPct, p.LocationSpreadDB = 1, 50 // would be 96 dB below
	if l, _ := P1812.Loss(p); l.DB != l.Terms.Lb0p {
		t.Errorf("loss %g dB, want the line of sight's %g", l.DB, l.Terms.Lb0p)
	}
}

package propagation

import (
	"math"
	"testing"
)

// Source: 20 log(4 pi d / lambda) with c = 299 792 458 m/s, computed apart from this program from
// Rec. ITU-R P.525; 1e-6 are the digits typed. The rounded form 32.4 + 20 log f(MHz) + 20 log d(km)
// of the Recommendation lies within 0.05 dB.
func TestFreeSpaceDB(t *testing.T) {
	for _, tc := range []struct{ freqMHz, distKm, want float64 }{
		{30, 0.1, 41.990208},
		{68, 1, 69.097961},
		{151.5, 17.3, 100.816958},
		{446, 1, 85.434480},
		{868, 100, 131.218178},
		{2400, 17.3, 124.812930},
		{5800, 100, 147.716343},
	} {
		got := FreeSpaceDB(tc.freqMHz*1e6, tc.distKm*1e3)
		if math.Abs(got-tc.want) > 1e-6 {
			t.Errorf("FreeSpaceDB(%g MHz, %g km) = %.6f, want %.6f", tc.freqMHz, tc.distKm, got, tc.want)
		}
		rounded := 32.4 + 20*math.Log10(tc.freqMHz) + 20*math.Log10(tc.distKm)
		if math.Abs(got-rounded) > 0.05 {
			t.Errorf("FreeSpaceDB(%g MHz, %g km) = %.6f, over 0.05 dB from the rounded form %.6f", tc.freqMHz, tc.distKm, got, rounded)
		}
	}
}

func TestFreeSpaceTable(t *testing.T) {
	seen := deviation{}
	for _, r := range readTable(t, "tables", "p525_free_space.csv") {
		got := FreeSpaceDB(r.num("f_MHz")*1e6, r.num("d_km")*1e3)
		seen.check(t, r.text("f_MHz")+" MHz "+r.text("d_km")+" km", "Lbf", got, r.num("Lbf_exact_dB"), 1e-6)
	}
	seen.log(t)
}

// The method takes the slant distance and ignores what stands in between: a 300 m tower over
// 400 m of ground makes 500 m.
func TestFreeSpaceMethod(t *testing.T) {
	p := level(3, 0.4)
	p.TxAglM, p.RxAglM, p.AslM[1] = 310, 10, 900
	got, err := FreeSpace.Loss(p)
	if err != nil {
		t.Fatal(err)
	}
	if want := FreeSpaceDB(p.FreqHz, 500); math.Abs(got.DB-want) > 1e-12 {
		t.Errorf("loss over a slant distance of 500 m = %.9f, want %.9f", got.DB, want)
	}
	if !got.TransHorizon || got.TxElDeg < 60 {
		t.Errorf("a 900 m needle half-way: trans-horizon %v, elevation %g", got.TransHorizon, got.TxElDeg)
	}
}

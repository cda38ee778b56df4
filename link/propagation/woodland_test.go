package propagation

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// Source: Aev = Am [1 - exp(-d gamma/Am)] worked from the five published pairs of P.833-9; four
// decimals, hence the tolerance.
func TestWoodlandCore(t *testing.T) {
	for _, tc := range []struct{ mhz, depthM, want float64 }{
		{105.9, 10, 0.3916},
		{105.9, 50, 1.8016},
		{105.9, 1000, 9.2666},
		{466.475, 10, 1.1609},
		{466.475, 50, 5.1024},
		{466.475, 200, 13.2553},
		{949, 10, 1.6466},
		{949, 50, 7.2716},
		{949, 1000, 26.4566},
		{1852.2, 1e6, 29},
		{2117.5, 1e6, 34.1}, // deep in the wood Am itself
		{1852.2, 1e-3, 0.3e-3},
		{2117.5, 1e-3, 0.34e-3}, // at its edge gamma
		{949, 0, 0},
		{949, -5, 0},
	} {
		got, note := WoodlandLossDB(tc.mhz*1e6, tc.depthM)
		if math.Abs(got-tc.want) > 1e-4 || note != "" {
			t.Errorf("%g MHz, %g m: %.5f dB, want %.4f; note %q", tc.mhz, tc.depthM, got, tc.want, note)
		}
	}
}

func TestWoodlandReference(t *testing.T) {
	dev := deviation{}
	for _, r := range readTable(t, "tables", "p833_woodland_check.csv") {
		got, _ := WoodlandLossDB(r.num("f_MHz")*1e6, r.num("d_m"))
		dev.check(t, r.text("f_MHz")+" MHz, "+r.text("d_m")+" m", "Aev_dB", got, r.num("Aev_dB"), 0.001)
	}
	dev.log(t)
}

// Between two published frequencies both parameters are powers of frequency: at the geometric mean
// they are the geometric mean of the neighbours'. Beyond the ends they follow the outermost octaves.
func TestWoodlandBetween(t *testing.T) {
	for _, tc := range []struct{ hz, gamma, am float64 }{
		{math.Sqrt(105.9e6 * 466.475e6), math.Sqrt(0.04 * 0.12), math.Sqrt(9.4 * 18)},
		{math.Sqrt(466.475e6 * 949e6), math.Sqrt(0.12 * 0.17), math.Sqrt(18 * 26.5)},
		{math.Sqrt(949e6 * 1852.2e6), math.Sqrt(0.17 * 0.30), math.Sqrt(26.5 * 29)},
		{math.Sqrt(1852.2e6 * 2117.5e6), math.Sqrt(0.30 * 0.34), math.Sqrt(29 * 34.1)},
		{105.9e6 * 105.9 / 466.475, 0.04 * 0.04 / 0.12, 9.4 * 9.4 / 18},
		{2117.5e6 * 2117.5 / 949, 0.34 * 0.34 / 0.17, 34.1 * 34.1 / 26.5},
	} {
		got := woodlandAt(tc.hz)
		if math.Abs(got.gammaDBPerM-tc.gamma) > 1e-12 || math.Abs(got.amDB-tc.am) > 1e-9 {
			t.Errorf("%.1f MHz: got %+v, want %g dB/m, %g dB", tc.hz/1e6, got, tc.gamma, tc.am)
		}
	}
}

func TestWoodlandNote(t *testing.T) {
	for _, tc := range []struct {
		mhz  float64
		want string
	}{
		{80, "known from 105.9 to 2117.5 MHz, its trend is continued to 80 MHz"},
		{5800, "its trend is continued to 5800 MHz"},
	} {
		if _, note := WoodlandLossDB(tc.mhz*1e6, 10); !strings.Contains(note, tc.want) {
			t.Errorf("%g MHz: note %q, want %q in it", tc.mhz, note, tc.want)
		}
	}
}

// The loss grows with depth, by gamma at most, and stays below Am.
func TestWoodlandProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		hz := rapid.Float64Range(30e6, 6e9).Draw(t, "frequency")
		depth := rapid.Float64Range(0.1, 5000).Draw(t, "depth")
		w := woodlandAt(hz)
		less, _ := WoodlandLossDB(hz, depth)
		more, _ := WoodlandLossDB(hz, depth*1.5)
		if !(less > 0 && more >= less && more <= w.amDB && less <= depth*w.gammaDBPerM) {
			t.Errorf("%g Hz: %g dB at %g m, %g dB at %g m (%+v)", hz, less, depth, more, depth*1.5, w)
		}
	})
}

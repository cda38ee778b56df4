package noise

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Source: -174 dBm/Hz at 290 K, any handbook; k T0 = 4.00388e-21 W/Hz gives -173.975.
func TestThermal(t *testing.T) {
	for _, tc := range []struct{ bandwidthHz, want float64 }{
		{1, -173.975}, {8000, -134.944}, {12500, -133.006}, {1e6, -113.975},
	} {
		if got := ThermalDBm(tc.bandwidthHz); math.Abs(got-tc.want) > 1e-3 {
			t.Errorf("ThermalDBm(%g) = %.4f, want %.3f", tc.bandwidthHz, got, tc.want)
		}
	}
}

// Worked by hand with Friis' formula: a preamplifier of 12 dB and 2 dB figure at the antenna, 3 dB
// of line, a receiver of 7 dB. F = 1.584893 + (1.995262-1)/15.848932 + (5.011872-1)/(15.848932*0.501187)
// = 2.152754; times the gain of 9 dB (7.943282) = 17.099935; over 5.011872 = 3.411886 = 5.32995 dB.
func TestRiseOfPreamplifier(t *testing.T) {
	got := RiseDB(1, []Stage{{12, 2}, Passive(3)}, 7)
	if math.Abs(got-5.32995) > 2e-5 {
		t.Errorf("RiseDB = %.5f, want 5.32995", got)
	}
}

// Properties: losses at the reference temperature leave the noise at the port as it is; external
// noise only raises it, by P.372's closed form, and less the more loss lies before the receiver.
func TestRiseProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		losses := rapid.SliceOf(rapid.Float64Range(0, 20)).Draw(t, "losses")
		fr := rapid.Float64Range(0, 20).Draw(t, "receiver figure")
		fa := ratio(rapid.Float64Range(0, 40).Draw(t, "external figure"))
		var stages []Stage
		l := 1.0
		for _, loss := range losses {
			stages = append(stages, Passive(loss))
			l *= ratio(loss)
		}
		if rise := RiseDB(1, stages, fr); math.Abs(rise) > 1e-9 {
			t.Fatalf("losses alone raise the noise by %g dB", rise)
		}
		want := 10 * math.Log10(1+(fa-1)/(l*ratio(fr)))
		if got := RiseDB(fa, stages, fr); math.Abs(got-want) > 1e-9 {
			t.Fatalf("RiseDB = %g, want %g", got, want)
		}
	})
}

package antenna

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// Rec. ITU-R F.1336-5 recommends 2.1 with k = 0.7, worked by hand for 6 dBi: theta3 = 27.03 deg,
// theta4 = 24.31 deg, plateau 12 - 10 log10(1.7) = 9.696 dB down.
func TestOmniAttenuation(t *testing.T) {
	for _, tc := range []struct{ elDeg, want float64 }{
		{0, 0},
		{13.514, 3},    // half the half-power width
		{-13.514, 3},   // the same below
		{10, 1.6426},   // 12 (10/27.03)^2
		{24.2, 9.6202}, // just inside theta4
		{24.4, 9.6955}, // on the plateau
		{27, 9.6955},   // its end
		{27.1, 9.7098}, // 12 - 10 log10((27.1/27.03)^-1.5 + 0.7)
		{45, 11.3347},  // (45/27.03)^-1.5 = 0.4655
		{90, 12.6320},  // (90/27.03)^-1.5 = 0.1646
	} {
		near(t, "attenuation", omniAttenuationDB(6, tc.elDeg), tc.want, 0.01)
	}
	// The half-power width of 107.6 deg 10^(-G/10): 27 deg at 6 dBi, 13.5 deg at 9 dBi.
	near(t, "width at 9 dBi", gainPatternWidth(t, 9), 13.55, 0.1)
	near(t, "width at 6 dBi", gainPatternWidth(t, 6), 27.03, 0.1)
}

func gainPatternWidth(t *testing.T, gainDBi float64) float64 {
	t.Helper()
	d, err := Omni(gainDBi, Port{})
	return Mount{RollDeg: 90}.VerticalWidthDeg(solved(t, d, err, Setting{FreqHz: 430e6}).Pattern)
}

func TestOmniIsContinuousAndFalls(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		gain := rapid.Float64Range(-20, 15).Draw(t, "gain")
		el := rapid.Float64Range(0, 89.99).Draw(t, "elevation")
		here, further := omniAttenuationDB(gain, el), omniAttenuationDB(gain, el+0.01)
		if further < here-1e-9 {
			t.Fatalf("%g dBi: attenuation falls from %g to %g dB at %g deg", gain, here, further, el)
		}
		// The steepest part is the end of the parabola: 24 theta4/theta3^2 dB per degree; at
		// theta4 and theta3 the Recommendation's rounding leaves steps under 0.02 dB.
		theta3 := 107.6 * math.Pow(10, -0.1*gain)
		if further-here > 0.02+0.01*24/theta3 {
			t.Fatalf("%g dBi: attenuation steps from %g to %g dB at %g deg", gain, here, further, el)
		}
		if here < 0 || here > 12-decibels(0.7) {
			t.Fatalf("%g dBi: attenuation %g dB at %g deg", gain, here, el)
		}
	})
}

func TestOmniBelowItsRange(t *testing.T) {
	d, err := Omni(6, Port{})
	low := solved(t, d, err, Setting{FreqHz: 151.5e6})
	if len(low.Notes) != 1 || !strings.Contains(low.Notes[0], "400 MHz") {
		t.Errorf("notes at 151.5 MHz: %q, want one on 400 MHz", low.Notes)
	}
	if high := solved(t, d, err, Setting{FreqHz: 400e6}); len(high.Notes) != 0 {
		t.Errorf("notes at 400 MHz: %q, want none", high.Notes)
	}
	if !strings.Contains(low.Source, "F.1336-5") || !strings.Contains(low.Source, "envelope") {
		t.Errorf("source %q names no Recommendation or no envelope", low.Source)
	}
}

package antenna

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// Source: the definition of the half-power width, and the rule in Datasheet's documentation.
func TestDatasheet(t *testing.T) {
	d, err := Datasheet(Sheet{GainDBi: 8, WidthHDeg: 65, WidthVDeg: 30, FrontToBackDB: 18}, Port{VSWR: 1.5})
	s := solved(t, d, err, Setting{FreqHz: 430e6})
	for _, tc := range []struct {
		name string
		d    Direction
		want float64
	}{
		{"ahead", Direction{}, 8},
		{"half the width to the right", Direction{32.5, 0}, 5},
		{"and to the left", Direction{327.5, 0}, 5},
		{"half the width up", Direction{0, 15}, 5},
		{"and down", Direction{0, -15}, 5},
		{"the whole width", Direction{-65, 0}, -4},
		{"abeam: the floor", Direction{90, 0}, -10},
		{"behind", Direction{180, 0}, -10},
		{"zenith", Direction{0, 90}, -10},
		{"both halves", Direction{32.5, 15}, 8 - 3 - 3*math.Pow(math.Cos(math.Pi/12), 2)},
	} {
		near(t, tc.name, s.Pattern.GainDBi(tc.d), tc.want, 1e-9)
	}
	if !strings.Contains(s.Source, "common practice, no source") {
		t.Errorf("source %q does not say what the rule is worth", s.Source)
	}
}

func TestDatasheetOfTooMuchGain(t *testing.T) {
	d, err := Datasheet(Sheet{GainDBi: 15, WidthHDeg: 65, WidthVDeg: 30, FrontToBackDB: 18}, Port{})
	s := solved(t, d, err, Setting{FreqHz: 430e6})
	// Source: Kraus's rule, directivity 41253/(width width) = 21 or 13.2 dBi, less what the rear takes.
	if len(s.Notes) != 1 || !strings.Contains(s.Notes[0], "more than a lossless antenna") {
		t.Errorf("15 dBi of 65 by 30 degrees: notes %q, want a doubt", s.Notes)
	}
}

// A lobe without floor: its mean is the solid angle of Kraus's rule to 1 dB.
func TestDatasheetLobeAgainstKraus(t *testing.T) {
	for _, width := range [][2]float64{{20, 20}, {40, 15}, {60, 30}} {
		p := gainPattern(0, Sheet{WidthHDeg: width[0], WidthVDeg: width[1], FrontToBackDB: 60}.attenuationDB)
		near(t, "directivity", -decibels(p.MeanGain()), decibels(41253/(width[0]*width[1])), 1)
	}
}

// However it is reached, a direction has one gain: no seam behind, none at the poles.
func TestDatasheetHasNoSeams(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		sheet := Sheet{
			WidthHDeg:     rapid.Float64Range(1, 360).Draw(t, "width_h"),
			WidthVDeg:     rapid.Float64Range(1, 360).Draw(t, "width_v"),
			FrontToBackDB: rapid.Float64Range(0, 60).Draw(t, "front_to_back"),
		}
		d := anyDirection(t, "direction")
		a := sheet.attenuationDB(d)
		if !(a >= 0 && a <= sheet.FrontToBackDB) {
			t.Fatalf("%+v: attenuation %g towards %v", sheet, a, d)
		}
		round := sheet.attenuationDB(Direction{d.AzDeg - 360, d.ElDeg})
		left, right := sheet.attenuationDB(Direction{180, d.ElDeg}), sheet.attenuationDB(Direction{-180, d.ElDeg})
		if math.Abs(a-round) > 1e-6 || math.Abs(left-right) > 1e-9 {
			t.Fatalf("%+v: %g and %g once round, %g and %g behind", sheet, a, round, left, right)
		}
		one, other := sheet.attenuationDB(Direction{0, 90}), sheet.attenuationDB(Direction{d.AzDeg, 90})
		if math.Abs(one-other) > 1e-9 {
			t.Fatalf("%+v: %g and %g dB at the zenith", sheet, one, other)
		}
	})
}

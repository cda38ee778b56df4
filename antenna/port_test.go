package antenna

import (
	"math"
	"strings"
	"testing"
)

func TestPortShowsItsVSWR(t *testing.T) {
	for _, tc := range []struct {
		port   Port
		want   complex128
		source string
	}{
		{Port{}, 50, "50 ohm"},
		{Port{ImpedanceOhm: 75}, 75, "75 ohm"},
		{Port{VSWR: 1.5}, 75, "VSWR 1.5 against 50 ohm: phase unknown, taken as resistive"},
		{Port{75, 2}, 150, "VSWR 2 against 75 ohm"},
	} {
		d, err := Isotropic(0, tc.port)
		s := solved(t, d, err, Setting{FreqHz: 430e6})
		if s.ImpedanceOhm != tc.want || !strings.Contains(s.Source, tc.source) {
			t.Errorf("%+v: %v ohm, source %q, want %v ohm and %q", tc.port, s.ImpedanceOhm, s.Source, tc.want, tc.source)
		}
		reference, stated := max(tc.port.ImpedanceOhm, 0), max(tc.port.VSWR, 1)
		if reference == 0 {
			reference = 50
		}
		near(t, "VSWR shown", VSWR(s.ImpedanceOhm, reference), stated, 1e-12)
	}
}

func TestStatedKindsRefuseBadFigures(t *testing.T) {
	sheet := Sheet{8, 65, 30, 18}
	edited := func(edit func(*Sheet)) Sheet {
		s := sheet
		edit(&s)
		return s
	}
	isotropic := func(gain float64, p Port) error { _, err := Isotropic(gain, p); return err }
	omni := func(gain float64, p Port) error { _, err := Omni(gain, p); return err }
	datasheet := func(s Sheet) error { _, err := Datasheet(s, Port{}); return err }
	for _, tc := range []struct {
		name string
		err  error
		says string
	}{
		{"isotropic", isotropic(41, Port{}), "gain 41 dBi is out of range: -20 to 40 dBi is allowed"},
		{"omni", omni(-21, Port{}), "gain -21 dBi"},
		{"omni NaN", omni(math.NaN(), Port{}), "gain NaN"},
		{"omni Inf", omni(math.Inf(1), Port{}), "gain +Inf"},
		{"vswr", omni(6, Port{VSWR: 0.9}), "vswr 0.9 is out of range: 1 to 20"},
		{"vswr 21", omni(6, Port{VSWR: 21}), "vswr 21"},
		{"vswr NaN", isotropic(6, Port{VSWR: math.NaN()}), "vswr NaN"},
		{"impedance", isotropic(6, Port{ImpedanceOhm: -50}), "impedance -50 ohm"},
		{"impedance Inf", isotropic(6, Port{ImpedanceOhm: math.Inf(1)}), "impedance +Inf"},
		{"width_h", datasheet(edited(func(s *Sheet) { s.WidthHDeg = 0 })), "width_h 0 deg is out of range: 1 to 360 deg"},
		{"width_v", datasheet(edited(func(s *Sheet) { s.WidthVDeg = 361 })), "width_v 361 deg"},
		{"width_v NaN", datasheet(edited(func(s *Sheet) { s.WidthVDeg = math.NaN() })), "width_v NaN"},
		{"front_to_back", datasheet(edited(func(s *Sheet) { s.FrontToBackDB = -1 })), "front_to_back -1 dB"},
		{"gain of a sheet", datasheet(edited(func(s *Sheet) { s.GainDBi = 99 })), "gain 99 dBi"},
		{"both at once", omni(99, Port{VSWR: 99}), "vswr 99"},
	} {
		wantError(t, tc.name, tc.err, tc.says)
	}
}

func TestStatedSolutions(t *testing.T) {
	omni, errOmni := Omni(6, Port{})
	sheet, errSheet := Datasheet(Sheet{8, 65, 30, 18}, Port{VSWR: 1.5})
	iso, errIso := Isotropic(-3, Port{})
	for _, tc := range []struct {
		kind        string
		d           Design
		err         error
		peak        float64
		directional bool
	}{
		{"omni", omni, errOmni, 6, false}, {"datasheet", sheet, errSheet, 8, true}, {"isotropic", iso, errIso, -3, false},
	} {
		s := solved(t, tc.d, tc.err, Setting{FreqHz: 430e6})
		if tc.d.Kind != tc.kind || tc.d.Directional != tc.directional {
			t.Errorf("%s: kind %q, directional %v", tc.kind, tc.d.Kind, tc.d.Directional)
		}
		if !s.GainKnown || s.Efficiency != 1 || s.Pattern.Phased || !s.Pattern.GainOnly || len(s.Notes) > 0 {
			t.Errorf("%s: %+v, want a stated gain without notes", tc.kind, s)
		}
		near(t, tc.kind+": peak", s.Pattern.PeakDBi, tc.peak, 0)
		near(t, tc.kind+": ahead", s.Pattern.GainDBi(Direction{}), tc.peak, 1e-12)
		if beside, err := tc.d.Solve(Setting{FreqHz: 430e6, MastDiameterM: 0.1, StandoffM: 0.4}); err != nil || len(beside.Notes) != 1 {
			t.Errorf("%s beside a mast: notes %q, %v, want one", tc.kind, beside.Notes, err)
		}
		if onTop, err := tc.d.Solve(Setting{FreqHz: 430e6, MastDiameterM: 0.1}); err != nil || len(onTop.Notes) != 0 {
			t.Errorf("%s on top of a mast: notes %q, %v, want none", tc.kind, onTop.Notes, err)
		}
		_, err := tc.d.Solve(Setting{})
		wantError(t, tc.kind, err, "frequency 0 Hz")
	}
}

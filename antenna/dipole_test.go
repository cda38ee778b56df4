package antenna

import (
	"math"
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestEfficiencyAgainstReference(t *testing.T) {
	for _, row := range referenceRows(t, "conductor_loss.csv") {
		freqHz := 1e6 * number(t, row, "frequency_MHz")
		d, err := Dipole(DipoleSpec{
			Length:    Length{M: number(t, row, "length_m")},
			FeedAt:    0.5,
			DiameterM: 2e-3 * number(t, row, "radius_mm"),
			Material:  Material{row["material"], number(t, row, "conductivity_S_m"), number(t, row, "relative_permeability")},
		})
		s := solved(t, d, err, Setting{FreqHz: freqHz})
		// Six digits in the table; the tolerance is that of closed forms.
		near(t, row["id"]+": efficiency", s.Efficiency, number(t, row, "efficiency_sinusoidal"), 1e-5)
		near(t, row["id"]+": efficiency of a real rod", s.Efficiency, number(t, row, "efficiency"), number(t, row, "tol_efficiency")+0.1*(1-s.Efficiency))
	}
}

// Worked by hand: half wave of 6 mm steel at 150 MHz. Internal resistance 5.272 ohm/m (closed
// form, see the reference), mean square current 1/2: 5.272 0.9993/2 = 2.634 ohm beside 73.08.
func TestEfficiencyByHand(t *testing.T) {
	steel, err := MaterialNamed("steel")
	if err != nil {
		t.Fatal(err)
	}
	d, err := Dipole(DipoleSpec{Length: Length{Wavelengths: 0.5}, FeedAt: 0.5, DiameterM: 6e-3, Material: steel})
	s := solved(t, d, err, Setting{FreqHz: 150e6})
	near(t, "efficiency", s.Efficiency, 73.08/(73.08+2.634), 1e-4)
	near(t, "R", real(s.ImpedanceOhm), 73.08+2.634, 0.01)
	near(t, "X", imag(s.ImpedanceOhm), 42.5+2.634, 0.05) // a steel wire's reactance is its resistance
	near(t, "directivity", s.Pattern.PeakDBi, 2.151, 1e-3)
	if s.GainKnown || !s.Pattern.Phased || s.Pattern.GainOnly {
		t.Errorf("a computed dipole is directivity with phase: %+v", s)
	}
}

// Source: a thin rod resonates at 0.95 to 0.98 of a half wave (handbooks); a moment method gives
// the lengths of the reference. The sinusoidal form comes within 1 % down to L/d = 70.
func TestResonantLengthAgainstReference(t *testing.T) {
	for _, row := range referenceRows(t, "resonance.csv") {
		if row["model"] != "mom" {
			continue
		}
		radius := number(t, row, "radius_wl")
		spec := DipoleSpec{FeedAt: 0.5, DiameterM: 2 * radius * WavelengthM(300e6), Material: Ideal}
		lengthM, err := spec.lengthM(300e6)
		if err != nil {
			t.Fatal(err)
		}
		got, want := lengthM/WavelengthM(300e6), number(t, row, "resonant_length_wl")
		near(t, row["id"]+": resonant length", got, want, 0.01*want)
		d, err := Dipole(spec)
		near(t, row["id"]+": X", imag(solved(t, d, err, Setting{FreqHz: 300e6}).ImpedanceOhm), 0, 1e-6)
	}
}

func TestResonantIsCutForTheDesignFrequency(t *testing.T) {
	spec := DipoleSpec{FeedAt: 0.5, DiameterM: 12e-3, Material: Materials()[1]}
	d, err := Dipole(spec)
	at := func(freqHz float64) complex128 {
		return solved(t, d, err, Setting{FreqHz: freqHz, DesignHz: 153e6}).ImpedanceOhm
	}
	near(t, "X at the design frequency", imag(at(153e6)), 0, 1e-6)
	if x := imag(at(151e6)); !(x < -1) {
		t.Errorf("X below the design frequency = %g, want capacitive", x)
	}
	if x := imag(at(155e6)); !(x > 1) {
		t.Errorf("X above the design frequency = %g, want inductive", x)
	}
	// A length in wavelengths follows the design frequency too.
	spec.Length = Length{Wavelengths: 0.48}
	inWl, err := Dipole(spec)
	z := solved(t, inWl, err, Setting{FreqHz: 151e6, DesignHz: 153e6}).ImpedanceOhm
	spec.Length = Length{M: 0.48 * WavelengthM(153e6)}
	inM, err := Dipole(spec)
	if same := solved(t, inM, err, Setting{FreqHz: 151e6}).ImpedanceOhm; z != same {
		t.Errorf("0.48 wl of the design frequency: %v ohm, the same in metres %v", z, same)
	}
}

func TestDipoleNotes(t *testing.T) {
	for _, tc := range []struct {
		name    string
		spec    DipoleSpec
		setting Setting
		notes   []string
	}{
		{"clear", DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6}, nil},
		{"beside a mast", DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6, MastDiameterM: 0.1, StandoffM: 0.5}, []string{"mast's effect"}},
		{"on a mast", DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6, MastDiameterM: 0.1}, []string{"mast's effect"}},
		{"thick", DipoleSpec{Length: Length{M: 0.9}, FeedAt: 0.5, DiameterM: 0.05, Material: Ideal}, Setting{FreqHz: 150e6}, []string{"radius over 0.01 wl"}},
		{"off a current maximum", DipoleSpec{Length: Length{Wavelengths: 0.75}, FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6}, []string{"far from the largest current"}},
		{"at a current maximum", DipoleSpec{Length: Length{Wavelengths: 0.97}, FeedAt: 0.25, DiameterM: 0.012, Material: Ideal}, Setting{FreqHz: 150e6}, nil},
	} {
		d, err := Dipole(tc.spec)
		got := solved(t, d, err, tc.setting).Notes
		if len(got) != len(tc.notes) {
			t.Errorf("%s: notes %q, want %q", tc.name, got, tc.notes)
			continue
		}
		for i, part := range tc.notes {
			if !strings.Contains(got[i], part) {
				t.Errorf("%s: note %q, want one that says %q", tc.name, got[i], part)
			}
		}
	}
}

func TestDipoleRefusesBadSpecs(t *testing.T) {
	good := DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}
	for _, tc := range []struct {
		name string
		edit func(*DipoleSpec)
		says string
	}{
		{"open end", func(s *DipoleSpec) { s.FeedAt = 0 }, "feed_at 0 is out of range: 0.01 to 0.99"},
		{"feed beyond", func(s *DipoleSpec) { s.FeedAt = 1.2 }, "feed_at 1.2"},
		{"feed NaN", func(s *DipoleSpec) { s.FeedAt = math.NaN() }, "feed_at NaN"},
		{"no diameter", func(s *DipoleSpec) { s.DiameterM = 0 }, "diameter 0 m is not allowed"},
		{"endless diameter", func(s *DipoleSpec) { s.DiameterM = math.Inf(1) }, "diameter +Inf"},
		{"negative length", func(s *DipoleSpec) { s.Length.M = -1 }, "length -1 m"},
		{"NaN length", func(s *DipoleSpec) { s.Length.M = math.NaN() }, "length NaN m"},
		{"too many wavelengths", func(s *DipoleSpec) { s.Length.Wavelengths = 40 }, "length 40 wl is out of range: 0.002 to 10 wl"},
		{"two lengths", func(s *DipoleSpec) { s.Length = Length{1, 0.5} }, "give one"},
		{"no material", func(s *DipoleSpec) { s.Material = Material{} }, "relative permeability"},
	} {
		spec := good
		tc.edit(&spec)
		_, err := Dipole(spec)
		wantError(t, tc.name, err, tc.says)
	}
}

func TestDipoleRefusesWhatHasNoAnswer(t *testing.T) {
	for _, tc := range []struct {
		name    string
		spec    DipoleSpec
		setting Setting
		says    string
	}{
		{"full wave in its middle", DipoleSpec{Length: Length{Wavelengths: 1}, FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6}, "too small at the feed"},
		{"half waves of two sizes", DipoleSpec{Length: Length{Wavelengths: 1.5}, FeedAt: 1.0 / 3, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6}, "both multiples of a half wave"},
		{"stump", DipoleSpec{Length: Length{M: 0.03}, FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6}, "at most a tenth"},
		{"thick resonant", DipoleSpec{FeedAt: 0.5, DiameterM: 0.2, Material: Ideal}, Setting{FreqHz: 150e6}, "at most a tenth"},
		{"resonant, fed at its end", DipoleSpec{FeedAt: 0.01, DiameterM: 0.002, Material: Ideal}, Setting{FreqHz: 150e6}, "too small at the feed"},
		{"resonant, of a choke's metal", DipoleSpec{FeedAt: 0.5, DiameterM: 1e-4, Material: Material{"mu-metal", 2e6, 5e4}}, Setting{FreqHz: 30e6}, "no resonant length"},
		{"no frequency", DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{}, "frequency 0 Hz is out of range"},
		{"NaN frequency", DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: math.NaN()}, "frequency NaN"},
		{"negative standoff", DipoleSpec{FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6, StandoffM: -1}, "standoff -1 m"},
		{"far too long", DipoleSpec{Length: Length{M: 30}, FeedAt: 0.5, DiameterM: 0.004, Material: Ideal}, Setting{FreqHz: 150e6}, "is out of range: 0.002 to 10 wl"},
	} {
		d, err := Dipole(tc.spec)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
			continue
		}
		s, err := d.Solve(tc.setting)
		wantError(t, tc.name, err, tc.says)
		if !reflect.DeepEqual(s, Solution{}) {
			t.Errorf("%s: a solution beside the error: %+v", tc.name, s)
		}
	}
}

func TestDipoleProperties(t *testing.T) {
	metals := Materials()
	rapid.Check(t, func(t *rapid.T) {
		spec := DipoleSpec{
			Length:    Length{M: rapid.Float64Range(0.01, 20).Draw(t, "length")},
			FeedAt:    rapid.Float64Range(0.01, 0.99).Draw(t, "feed"),
			DiameterM: rapid.Float64Range(1e-4, 0.1).Draw(t, "diameter"),
			Material:  rapid.SampledFrom(metals).Draw(t, "metal"),
		}
		d, err := Dipole(spec)
		if err != nil {
			t.Fatal(err)
		}
		s, err := d.Solve(Setting{FreqHz: rapid.Float64Range(30e6, 3e9).Draw(t, "frequency")})
		if err != nil {
			t.Skip(err)
		}
		if !(real(s.ImpedanceOhm) > 0) || math.IsNaN(imag(s.ImpedanceOhm)) || math.IsInf(imag(s.ImpedanceOhm), 0) {
			t.Fatalf("%+v: impedance %v", spec, s.ImpedanceOhm)
		}
		if !(s.Efficiency > 0 && s.Efficiency <= 1) {
			t.Fatalf("%+v: efficiency %g", spec, s.Efficiency)
		}
		gain := s.Pattern.GainDBi(anyDirection(t, "direction"))
		if !(gain >= s.Pattern.PeakDBi-NullFloorDB-1e-9 && gain <= s.Pattern.PeakDBi+1e-4) {
			t.Fatalf("%+v: gain %g of peak %g", spec, gain, s.Pattern.PeakDBi)
		}
	})
}

// A rod fed as far from its top as another from its bottom is the same antenna upside down.
func TestDipoleMirrored(t *testing.T) {
	for _, feed := range []float64{0.1, 0.25, 0.4, 0.47} {
		a, b := dipoleOf(t, 0.72, 1e-3, feed), dipoleOf(t, 0.72, 1e-3, 1-feed)
		near(t, "R", real(a.ImpedanceOhm), real(b.ImpedanceOhm), 1e-9)
		near(t, "X", imag(a.ImpedanceOhm), imag(b.ImpedanceOhm), 1e-9)
		near(t, "gain", a.Pattern.Field(Direction{0, 30}).GainDBi(), b.Pattern.Field(Direction{0, -30}).GainDBi(), 1e-9)
	}
}

func BenchmarkDipoleSolve(b *testing.B) {
	for _, tc := range []struct {
		name   string
		length Length
	}{{"0.47 wl", Length{Wavelengths: 0.47}}, {"resonant", Length{}}} {
		b.Run(tc.name, func(b *testing.B) {
			d, err := Dipole(DipoleSpec{Length: tc.length, FeedAt: 0.5, DiameterM: 12e-3, Material: Materials()[1]})
			if err != nil {
				b.Fatal(err)
			}
			b.ReportAllocs()
			for b.Loop() {
				if _, err := d.Solve(Setting{FreqHz: 151.5e6}); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

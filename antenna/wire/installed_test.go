package wire

import (
	"math"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

// drawnInstallation returns a dipole, Yagi, folded dipole or stack with a resonant part, free, on top
// of a mast or beside one.
func drawnInstallation(t *rapid.T) (Antenna, antenna.Setting) {
	number := func(lo, hi float64, what string) float64 { return rapid.Float64Range(lo, hi).Draw(t, what) }
	diameterM := number(1e-4, 0.012, "diameter")
	metal := antenna.Materials()[rapid.IntRange(0, 5).Draw(t, "metal")]
	dipole, err := Dipole(antenna.DipoleSpec{FeedAt: number(0.35, 0.65, "feed"), DiameterM: diameterM, Material: metal})
	a := dipole
	switch rapid.SampledFrom([]string{"dipole", "folded-dipole", "yagi", "stack"}).Draw(t, "kind") {
	case "folded-dipole":
		a, err = FoldedDipole(FoldedDipoleSpec{Spacing: wavelengthsOf(number(0.03, 0.06, "spacing")), DiameterM: min(diameterM, 0.006), Material: metal})
	case "yagi":
		a, err = Yagi(YagiSpec{DiameterM: diameterM, Material: metal, Elements: []Element{
			{Length: wavelengthsOf(number(0.48, 0.5, "reflector")), At: wavelengthsOf(number(-0.3, -0.15, "behind"))},
			{Driven: true},
			{Length: wavelengthsOf(number(0.4, 0.44, "director")), At: wavelengthsOf(number(0.1, 0.4, "ahead"))},
		}})
	case "stack":
		a, err = Stack(StackSpec{Of: dipole, Count: rapid.IntRange(2, 3).Draw(t, "count"), Spacing: wavelengthsOf(number(0.65, 1.2, "above"))})
	}
	if err != nil {
		t.Fatal(err)
	}
	in := endless(antenna.Setting{FreqHz: testHz})
	if rapid.Bool().Draw(t, "on a mast") {
		in.MastDiameterM = number(0.003, 0.3, "mast")
		if rapid.Bool().Draw(t, "beside it") {
			in.StandoffM = 0.5 + in.MastDiameterM
			in.MastAboveM = number(-0.5, 3, "mast above")
		}
	}
	return a, in
}

// Source: what resonance and energy are. Whatever resonant antenna on whatever mast: no reactance, the
// power in balance, the directivity's mean 1, the cut list positive.
func TestInstalledAntennas(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, in := drawnInstallation(t)
		s, err := a.solve(in)
		if err != nil {
			t.Skip(err)
		}
		if x := imag(s.ImpedanceOhm); abs(x) > 0.05 {
			t.Errorf("%g ohm of reactance at resonance", x)
		}
		if abs(s.balance-1) > 0.01 || s.Efficiency <= 0 || s.Efficiency > 1 {
			t.Errorf("power balance %.4f, efficiency %g", s.balance, s.Efficiency)
		}
		if mean := s.Pattern.MeanGain(); abs(mean-1) > 2e-3 {
			t.Errorf("mean directivity %.5f", mean)
		}
		checked, _ := in.Checked()
		c, err := a.cut(checked)
		if err != nil {
			t.Fatal(err)
		}
		for _, p := range c.parts {
			if !(p.LengthM > 0) {
				t.Errorf("part %q of %g m", p.Name, p.LengthM)
			}
		}
	})
}

// Source: symmetry: an upright antenna in the plane of x and z with its mast in it is alike to the
// left and to the right, without a component across that plane; and one that is its own image
// upside down on an endless mast is alike above and below.
func TestInstalledSymmetry(t *testing.T) {
	a, err := Yagi(testYagi())
	built(t, a, err)
	s, err := a.Solve(endless(antenna.Setting{FreqHz: channelHz, MastDiameterM: 0.114, StandoffM: 0.9}))
	if err != nil {
		t.Fatal(err)
	}
	for az := 0.0; az <= 180; az += 30 {
		for el := -80.0; el <= 80; el += 20 {
			left, right := s.Pattern.Field(antenna.Direction{AzDeg: -az, ElDeg: el}), s.Pattern.Field(antenna.Direction{AzDeg: az, ElDeg: el})
			below := s.Pattern.Field(antenna.Direction{AzDeg: az, ElDeg: -el})
			scale := 1e-3 * math.Sqrt(left.Power()+1e-3)
			if math.Abs(math.Sqrt(left.Power())-math.Sqrt(right.Power())) > scale || math.Abs(math.Sqrt(below.Power())-math.Sqrt(right.Power())) > scale {
				t.Errorf("azimuth %g elevation %g: %v, left %v, below %v", az, el, right, left, below)
			}
			if f := right.Power() - real(right.Theta)*real(right.Theta) - imag(right.Theta)*imag(right.Theta); f > 1e-6 {
				t.Errorf("azimuth %g elevation %g: %v is not vertical", az, el, right)
			}
		}
	}
}

// Source: common practice: beside a mast at a quarter wave the antenna is pushed ahead, at a half wave
// to the sides; far from it, or with a mast that is thin, it is not. A mast below an antenna on top
// changes its resonance by little.
func TestPushOfAMast(t *testing.T) {
	a := rodOf(t, 0, 0.003, 0.5)
	gain := func(diameterM, standoffM, azDeg float64) float64 {
		s, err := a.Solve(endless(antenna.Setting{FreqHz: testHz, MastDiameterM: diameterM, StandoffM: standoffM}))
		if err != nil {
			t.Fatal(err)
		}
		return s.Pattern.Field(antenna.Direction{AzDeg: azDeg}).GainDBi()
	}
	if ahead, back := gain(0.06, 0.25, 0), gain(0.06, 0.25, 180); ahead < 4 || back > ahead-6 {
		t.Errorf("a quarter wave from a mast: %.1f dBi ahead, %.1f behind", ahead, back)
	}
	if ahead, side := gain(0.06, 0.5, 0), gain(0.06, 0.5, 90); side < ahead+4 {
		t.Errorf("half a wave from a mast: %.1f dBi ahead, %.1f to the side", ahead, side)
	}
	near(t, "far from a mast", gain(0.06, 40, 0), 2.13, 0.25)
	near(t, "on top", gain(0.06, 0, 0), 2.13, 0.3)
	free := cutM(t, a)
	in, _ := endless(antenna.Setting{FreqHz: testHz, MastDiameterM: 0.06}).Checked()
	c, err := a.cut(in)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "resonant length on top over that in the clear", c.mainM/free, 1, 0.005)
}

// The names of a Yagi's elements follow from their places, not from their order.
func TestElementNames(t *testing.T) {
	at := []float64{0.5, -0.2, 0, 0.2, -0.4}
	for i, want := range []string{"director 2", "reflector 1", "driven element", "director 1", "reflector 2"} {
		if got := elementName(at, i); got != want {
			t.Errorf("element at %g: %q, want %q", at[i], got, want)
		}
	}
	if got := elementName([]float64{-1, 0}, 0); got != "reflector" {
		t.Errorf("the only reflector is called %q", got)
	}
}

// Layouts by hand: the feed at the origin, a boom's middle, a stack about its centre.
func TestLayouts(t *testing.T) {
	dipole, err := Dipole(antenna.DipoleSpec{Length: wavelengthsOf(0.5), FeedAt: 0.2, DiameterM: 0.01, Material: antenna.Ideal})
	l := built(t, dipole, err).blueprint.lay(2, 1)
	if w := l.wires[0]; w.From != [3]float64{0, 0, -0.2} || w.To != [3]float64{0, 0, 0.8} || l.feeds[0] != (Feed{1, 0.2}) {
		t.Errorf("dipole %+v fed at %+v", w, l.feeds)
	}
	stack, err := Stack(StackSpec{Of: dipole, Count: 3, Spacing: wavelengthsOf(0.75)})
	l = built(t, stack, err).blueprint.lay(2, 1)
	for i, w := range l.wires {
		near(t, "foot in a stack", w.From[2], float64(i-1)*1.5-0.2, 1e-12)
		if l.feeds[i] != (Feed{i + 1, 0.2}) {
			t.Errorf("feed %d: %+v", i+1, l.feeds[i])
		}
	}
	yagi, err := Yagi(testYagi())
	l = built(t, yagi, err).blueprint.lay(2, 0.95)
	near(t, "middle of the boom from the driven element", l.boomMiddleM, (-0.4+0.7)/2, 1e-12)
	if l.wires[1].From != [3]float64{0, 0, -0.475} || l.feeds[0] != (Feed{2, 0.5}) {
		t.Errorf("driven element %+v fed at %+v", l.wires[1], l.feeds)
	}
	folded, err := FoldedDipole(testFolded())
	l = built(t, folded, err).blueprint.lay(2, 0.9)
	if l.wires[0].From[1] != -0.03 || l.wires[1].From[1] != 0.03 || l.wires[2].lengthM() != 0.06 || l.wires[3].From[2] != 0.45 {
		t.Errorf("folded dipole %+v", l.wires)
	}
	lowest, highest := l.extent(vec{0, 1, 0})
	near(t, "reach to the right", lowest, -0.03, 1e-12)
	near(t, "reach to the left", highest, 0.03, 1e-12)
}

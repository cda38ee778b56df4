package antenna

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

const headerCut = "angle_deg,gain_db\n"

// cutFile writes a cut of the whole circle in steps of 5 degrees.
func cutFile(gain func(deg float64) float64) string {
	var b strings.Builder
	b.WriteString(headerCut)
	for deg := 0; deg < 360; deg += 5 {
		fmt.Fprintf(&b, "%d,%.6f\n", deg, gain(math.Remainder(float64(deg), 360)))
	}
	return b.String()
}

// A panel: parabolic main lobes down to a rear of 20 dB with a little structure, the same in both
// cuts behind.
func panelH(deg float64) float64 { return -min(12*deg*deg/65/65, 20+2*math.Cos(radians(3*deg))) }
func panelV(deg float64) float64 { return -min(12*deg*deg/30/30, 20-2*math.Cos(radians(2*deg))) }

func cutsOf(t testing.TB, h, v string, gainDBi float64) Solution {
	t.Helper()
	d, err := Cuts(strings.NewReader(h), strings.NewReader(v), gainDBi, Port{})
	return solved(t, d, err, Setting{FreqHz: 430e6})
}

// Source: the rule's own promise, both cuts given back exactly. The two agree in front (0 dB) and
// behind (-18 dB).
func TestCutsAreGivenBack(t *testing.T) {
	p := cutsOf(t, cutFile(panelH), cutFile(panelV), 9).Pattern
	for deg := -180.0; deg <= 180; deg += 5 {
		near(t, fmt.Sprint("horizontal cut at ", deg), p.Field(Direction{deg, 0}).GainDBi(), 9+panelH(deg), 1e-5)
		front, az := deg, 0.0
		if math.Abs(deg) > 90 {
			front, az = math.Copysign(180, deg)-deg, 180
		}
		near(t, fmt.Sprint("vertical cut at ", deg), p.Field(Direction{az, front}).GainDBi(), 9+panelV(deg), 1e-5)
	}
	near(t, "peak", p.PeakDBi, 9, 0)
}

func TestCutsAreContinuous(t *testing.T) {
	p := cutsOf(t, cutFile(panelH), cutFile(panelV), 9).Pattern
	rapid.Check(t, func(t *rapid.T) {
		d := anyDirection(t, "direction")
		gain := p.Field(d).GainDBi()
		if gain > 9+1e-9 {
			t.Fatalf("gain %g dBi towards %v above the peak", gain, d)
		}
		// The steepest cut falls 2.5 dB per degree.
		toward, theta, phi := d.axes()
		for _, step := range []vector{theta, phi} {
			for i := range 3 {
				step[i] = toward[i] + 1e-5*step[i]
			}
			if beside := p.Field(step.direction()).GainDBi(); math.Abs(beside-gain) > 0.02 {
				t.Fatalf("gain %g dBi towards %v and %g dBi 1e-5 beside", gain, d, beside)
			}
		}
		zenith, other := p.Field(Direction{d.AzDeg, 90}).GainDBi(), p.Field(Direction{0, 90}).GainDBi()
		if math.Abs(zenith-other) > 1e-9 {
			t.Fatalf("gain at the zenith %g dBi by azimuth %g, %g dBi by 0", zenith, d.AzDeg, other)
		}
	})
}

// An omnidirectional antenna's vertical cut is the same in front and behind, and its horizontal
// cut is flat: the join must be the cut turned about the mast.
func TestCutsOfAnOmni(t *testing.T) {
	v := func(deg float64) float64 { return -3 + 20*math.Log10(math.Abs(math.Cos(radians(deg)))+1e-3) }
	p := cutsOf(t, cutFile(func(float64) float64 { return 2 }), cutFile(v), 2.15).Pattern
	for _, az := range []float64{0, 33, 90, 147, 180, 271} {
		for el := -90.0; el <= 90; el += 5 {
			near(t, "gain", p.Field(Direction{az, el}).GainDBi(), 2.15+v(el)-v(0), 1e-5)
		}
	}
}

func TestCutsOfTheFrontHalf(t *testing.T) {
	var front strings.Builder
	front.WriteString(headerCut)
	for deg := 90; deg >= -90; deg -= 5 {
		fmt.Fprintf(&front, "%d,%.6f\n", deg, panelV(float64(deg)))
	}
	s := cutsOf(t, cutFile(panelH), front.String(), 9)
	for deg := -90.0; deg <= 90; deg += 5 {
		near(t, "vertical cut", s.Pattern.Field(Direction{0, deg}).GainDBi(), 9+panelV(deg), 1e-5)
		near(t, "horizontal cut", s.Pattern.Field(Direction{2 * deg, 0}).GainDBi(), 9+panelH(2*deg), 1e-5)
	}
	if len(s.Notes) != 0 {
		t.Errorf("notes %q, want none", s.Notes)
	}
}

// A beam tilted down electrically: the horizontal cut holds at the elevation of the maximum.
func TestCutsOfATiltedBeam(t *testing.T) {
	v := func(deg float64) float64 { return panelV(math.Remainder(deg+5, 360)) }
	s := cutsOf(t, cutFile(panelH), cutFile(v), 15)
	near(t, "maximum", s.Pattern.Field(Direction{0, -5}).GainDBi(), 15, 1e-5)
	near(t, "horizon", s.Pattern.Field(Direction{0, 0}).GainDBi(), 15+v(0), 1e-5)
	near(t, "aside at the beam's elevation", s.Pattern.Field(Direction{30, -5}).GainDBi(), 15+panelH(30), 1e-5)
	near(t, "width", Mount{}.VerticalWidthDeg(s.Pattern), 30, 0.6) // straight lines between points of a parabola
}

func TestCutsNotes(t *testing.T) {
	offBehind := func(deg float64) float64 { return max(panelV(deg), -12) }
	offInFront := func(deg float64) float64 { return panelH(math.Remainder(deg-40, 360)) }
	for _, tc := range []struct {
		name, h, v string
		gain       float64
		says       []string
	}{
		{"agreeing", cutFile(panelH), cutFile(panelV), 9, nil},
		{"rear of another depth", cutFile(panelH), cutFile(offBehind), 9, []string{"differ by 6.0 dB where they cross behind"}},
		{"horizontal maximum aside", cutFile(offInFront), cutFile(panelV), 9, []string{"differ by 4.5 dB where they cross in front", "cross behind"}},
		{"too much gain", cutFile(panelH), cutFile(panelV), 19, []string{"more than a lossless antenna"}},
	} {
		got := cutsOf(t, tc.h, tc.v, tc.gain).Notes
		if len(got) != len(tc.says) {
			t.Errorf("%s: notes %q, want %q", tc.name, got, tc.says)
			continue
		}
		for i, part := range tc.says {
			if !strings.Contains(got[i], part) {
				t.Errorf("%s: note %q, want %q in it", tc.name, got[i], part)
			}
		}
	}
}

func TestCutsAreNormalized(t *testing.T) {
	inDBi := func(cut func(float64) float64) func(float64) float64 {
		return func(deg float64) float64 { return 9 + cut(deg) }
	}
	relative := cutsOf(t, cutFile(panelH), cutFile(panelV), 9).Pattern
	absolute := cutsOf(t, cutFile(inDBi(panelH)), cutFile(inDBi(panelV)), 9).Pattern
	for _, d := range []Direction{{0, 0}, {50, 10}, {200, -40}} {
		near(t, "gain", absolute.Field(d).GainDBi(), relative.Field(d).GainDBi(), 1e-5)
	}
}

func TestCutsErrors(t *testing.T) {
	h, v := cutFile(panelH), cutFile(panelV)
	half := headerCut + "-90,-10\n-60,-5\n-30,-2\n0,0\n30,-2\n60,-5\n90,-10\n"
	for _, tc := range []struct {
		name, h, v, says string
		line             int
	}{
		{"no horizontal", "", v, "horizontal cut: no rows", 0},
		{"no vertical", h, "", "vertical cut: no rows", 0},
		{"header", "deg,dB\n0,0\n", v, "horizontal cut: line 1: header", 1},
		{"angle", headerCut + "400,0\n", v, "angle 400 is out of range: -180 to 360", 2},
		{"gain", headerCut + "0,5000\n", v, "gain 5000 dB is out of range", 2},
		{"twice", h + "0,1\n", v, "angle 0 is in line 2 already", 74},
		{"twice, the circle closed between", h + "360,0\n0,0\n", v, "angle 0 is in line 2 already", 75},
		{"circle closed otherwise", h, v + "360,-1\n", "vertical cut: line 74: angle 360 is in line 2 already", 74},
		{"half a horizontal cut", half, v, "horizontal cut: angles run from -90 to 90: the whole circle is needed", 0},
		{"a quarter", h, headerCut + "0,0\n30,-3\n60,-9\n90,-20\n", "vertical cut: angles run from 0 to 90", 0},
		{"gap", headerCut + "0,0\n20,0\n100,0\n", v, "no rows between angle 20 and 100", 0},
		{"upward beam", h, cutFile(func(deg float64) float64 { return panelV(math.Remainder(deg-60, 360)) }), "its maximum is at elevation 60", 0},
		{"backward beam", h, cutFile(func(deg float64) float64 { return panelV(math.Remainder(deg-180, 360)) }), "its maximum is at elevation", 0},
	} {
		_, err := Cuts(strings.NewReader(tc.h), strings.NewReader(tc.v), 9, Port{})
		wantError(t, tc.name, err, tc.says)
		bad := new(FileError)
		if !errors.As(err, &bad) || bad.Line != tc.line {
			t.Errorf("%s: error %v, want one of line %d", tc.name, err, tc.line)
		}
	}
	if _, err := Cuts(strings.NewReader(h), strings.NewReader(half+"\n"), 9, Port{}); err != nil {
		t.Errorf("half a vertical cut: %v", err)
	}
	if _, err := Cuts(strings.NewReader(h+"360,0\n"), strings.NewReader(v), 9, Port{}); err != nil {
		t.Errorf("circle closed: %v", err)
	}
	_, err := Cuts(strings.NewReader(h), strings.NewReader(v), 77, Port{})
	wantError(t, "gain", err, "gain 77 dBi")
}

func FuzzCuts(f *testing.F) {
	h, v := cutFile(panelH), cutFile(panelV)
	f.Add(h, v)
	f.Add(h, headerCut+"-90,-10\n-60,-5\n-30,-2\n0,0\n30,-2\n60,-5\n90,-10\n")
	f.Add(headerCut+"0,0\n360,0\n", headerCut+"-180,-999\n")
	f.Fuzz(func(t *testing.T, h, v string) {
		d, err := Cuts(strings.NewReader(h), strings.NewReader(v), 9, Port{})
		if err != nil {
			checkFileError(t, err, h+v)
			return
		}
		checkFuzzedPattern(t, solved(t, d, nil, Setting{FreqHz: 430e6}).Pattern)
	})
}

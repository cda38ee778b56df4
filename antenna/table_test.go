package antenna

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// sphere writes a table of the whole sphere in steps, with gains by direction; its rows run from
// the zenith down and the azimuths backwards, since their order is free.
func sphere(header string, stepDeg int, gains func(azDeg, elDeg float64) string) string {
	var b strings.Builder
	b.WriteString(header + "\n")
	for el := 90; el >= -90; el -= stepDeg {
		for az := 360 - stepDeg; az >= 0; az -= stepDeg {
			fmt.Fprintf(&b, "%d,%d,%s\n", az, el, gains(float64(az), float64(el)))
		}
	}
	return b.String()
}

func oneGain(gain func(azDeg, elDeg float64) float64) func(azDeg, elDeg float64) string {
	return func(az, el float64) string { return fmt.Sprintf("%.4f", gain(az, el)) }
}

func TestTable(t *testing.T) {
	// Linear in elevation and in azimuth's distance from ahead: what bilinear in dB gives exactly.
	slope := func(az, el float64) float64 { return 5 - math.Abs(math.Remainder(az, 360))/20 - math.Abs(el)/10 }
	d, err := Table(strings.NewReader(sphere(headerOneGain, 10, oneGain(slope))), Port{VSWR: 1.5})
	s := solved(t, d, err, Setting{FreqHz: 430e6})
	near(t, "peak", s.Pattern.PeakDBi, 5, 1e-4)
	if !s.Pattern.GainOnly || s.Pattern.Phased || !s.GainKnown || d.Kind != "table" || !d.Directional {
		t.Errorf("one gain: %+v of %+v", s, d)
	}
	for _, at := range []Direction{{0, 0}, {10, 20}, {13.7, 4.2}, {355, -1}, {-5, 1}, {359.9, 0}, {184, -33}, {725, 85}, {0, 90}, {77, -90}} {
		near(t, fmt.Sprint("gain towards ", at), s.Pattern.Field(at).GainDBi(), slope(at.AzDeg, at.ElDeg), 1e-4)
	}
}

func TestTableOfTwoGains(t *testing.T) {
	d, err := Table(strings.NewReader(sphere(headerTwoGains, 30, func(az, el float64) string { return "2,-1" })), Port{})
	s := solved(t, d, err, Setting{FreqHz: 430e6})
	if s.Pattern.GainOnly || s.Pattern.Phased {
		t.Errorf("two gains know their polarization and not their phase: %+v", s.Pattern)
	}
	f := s.Pattern.Field(Direction{44, 13})
	near(t, "vertical", 20*math.Log10(real(f.Theta)), 2, 1e-9)
	near(t, "horizontal", 20*math.Log10(real(f.Phi)), -1, 1e-9)
	near(t, "peak", s.Pattern.PeakDBi, decibels(powerRatio(2)+powerRatio(-1)), 1e-9)
	if len(s.Notes) != 2 || !strings.Contains(s.Notes[1], "no phase") {
		t.Errorf("notes %q, want one on the gain and one on the phase", s.Notes)
	}
	// Rolled by a quarter turn the components change places.
	rolled := Mount{RollDeg: 90}.Field(s.Pattern, Direction{})
	near(t, "vertical, rolled", 20*math.Log10(math.Abs(real(rolled.Theta))), -1, 1e-9)
}

func TestTableReadsWhatPeopleWrite(t *testing.T) {
	plain := sphere(headerOneGain, 30, func(az, el float64) string { return "0" })
	withSpaces := "\ufeff# a maker's table\n\n" + strings.ReplaceAll(plain, ",", " , ")
	signed := strings.NewReplacer("\n330,", "\n-30,", "\n300,", "\n-60,").Replace(plain)
	closed := plain
	for el := -90; el <= 90; el += 30 {
		closed += fmt.Sprintf("360,%d,0\n", el)
	}
	nulls := strings.Replace(plain, "\n180,0,0\n", "\n180,0,-999\n", 1)
	uneven := plain
	for az := 0; az < 360; az += 30 {
		uneven += fmt.Sprintf("%d,7.5,0\n", az)
	}
	for name, content := range map[string]string{
		"plain": plain, "spaces, comment, byte order mark": withSpaces, "signed azimuths": signed,
		"circle closed": closed, "null as -999": nulls, "uneven steps": uneven,
		"line ends of another system": strings.ReplaceAll(plain, "\n", "\r\n"),
	} {
		d, err := Table(strings.NewReader(content), Port{})
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		p := solved(t, d, nil, Setting{FreqHz: 430e6}).Pattern
		near(t, name+": gain", p.GainDBi(Direction{-45, 10}), 0, 1e-9)
	}
	d, err := Table(strings.NewReader(nulls), Port{})
	p := solved(t, d, err, Setting{FreqHz: 430e6}).Pattern
	near(t, "null", p.Field(Direction{180, 0}).GainDBi(), -100, 1e-9)
	near(t, "null, as used", p.GainDBi(Direction{180, 0}), -25, 1e-9)
}

func TestTableErrors(t *testing.T) {
	plain := sphere(headerOneGain, 30, func(az, el float64) string { return "0" })
	for _, tc := range []struct {
		name, content, says string
		line                int
	}{
		{"empty", "", "no rows", 0},
		{"header only", headerOneGain + "\n", "no rows", 0},
		{"other header", "az,el,gain\n0,0,0\n", `header "az,el,gain" is not known: it must be azimuth_deg`, 1},
		{"semicolons", strings.ReplaceAll(plain, ",", ";"), "is not known", 1},
		{"too few values", headerOneGain + "\n0,0\n", "2 values where the header has 3", 2},
		{"too many values", headerOneGain + "\n0,0,0,0\n", "4 values where the header has 3", 2},
		{"decimal comma", headerOneGain + "\n0,0,1,5\n", "4 values", 2},
		{"no number", headerOneGain + "\n0,0,0\n0,30,low\n", `"low" is not a number`, 3},
		{"NaN", headerOneGain + "\n0,0,NaN\n", `"NaN" is not a number`, 2},
		{"infinity", headerOneGain + "\n0,0,-Inf\n", "-100 for a null", 2},
		{"quote", headerOneGain + "\n0,0,\"0\n", `"`, 2},
		{"azimuth", headerOneGain + "\n-181,0,0\n", "azimuth -181 is out of range", 2},
		{"elevation", headerOneGain + "\n0,91,0\n", "elevation 91 is out of range", 2},
		{"gain", headerOneGain + "\n0,0,41\n", "gain 41 dBi is out of range", 2},
		{"twice", plain + "0,90,1\n", "azimuth 0 elevation 90 is in line 13 already", 86},
		{"twice alike", plain + "0,90,0\n", "is in line 13 already", 86},
		{"twice, the circle closed between", plain + "360,90,0\n0,90,0\n", "azimuth 0 elevation 90 is in line 13 already", 87},
		{"circle closed otherwise", plain + "360,90,3\n", "azimuth 360 elevation 90 is in line 13 already", 86},
		{"missing", strings.Replace(plain, "\n120,-60,0\n", "\n", 1), "no row for azimuth 120 elevation -60", 0},
		{"half a sphere", strings.ReplaceAll(plain, ",-90,", ",-89,"), "the whole sphere is needed", 0},
		{"one azimuth", headerOneGain + "\n0,-90,0\n0,-60,0\n0,-30,0\n0,0,0\n0,30,0\n0,60,0\n0,90,0\n", "no rows between azimuth 0 and 360", 0},
		{"coarse", headerOneGain + "\n0,-90,0\n0,90,0\n", "no rows between elevation -90 and 90", 0},
		{"no gain at all", strings.ReplaceAll(plain, ",0\n", ",-60\n"), "largest gain -60 dBi is out of range", 0},
	} {
		_, err := Table(strings.NewReader(tc.content), Port{})
		wantError(t, tc.name, err, tc.says)
		bad := new(FileError)
		if !errors.As(err, &bad) || bad.Line != tc.line {
			t.Errorf("%s: error %v, want one of line %d", tc.name, err, tc.line)
		}
	}
	_, err := Table(strings.NewReader(plain), Port{VSWR: -1})
	wantError(t, "port", err, "vswr -1")
}

// A file that claims a grid far larger than itself must not be given the memory for it.
func TestTableOfScatteredRows(t *testing.T) {
	var b strings.Builder
	b.WriteString(headerOneGain + "\n")
	for i := range 20000 {
		fmt.Fprintf(&b, "%g,%g,0\n", float64(i)*0.018, -90+float64(i)*180/19999)
	}
	_, err := Table(strings.NewReader(b.String()), Port{})
	wantError(t, "scattered", err, "no row for azimuth")
}

// zeros is an endless file.
type zeros struct{}

func (zeros) Read(p []byte) (int, error) {
	for i := range p {
		p[i] = '0'
	}
	return len(p), nil
}

func TestTableTooLarge(t *testing.T) {
	_, err := Table(zeros{}, Port{})
	wantError(t, "endless file", err, "larger than 32 MiB")
}

type brokenReader struct{}

func (brokenReader) Read([]byte) (int, error) { return 0, errors.New("the disk is gone") }

func TestTablePassesReadErrorsOn(t *testing.T) {
	_, err := Table(brokenReader{}, Port{})
	wantError(t, "broken reader", err, "the disk is gone")
}

func TestTableIsBetweenItsPoints(t *testing.T) {
	steps := func(az, el float64) float64 { return -math.Mod(az*7+el*13+3000, 19) }
	d, err := Table(strings.NewReader(sphere(headerOneGain, 15, oneGain(steps))), Port{})
	p := solved(t, d, err, Setting{FreqHz: 430e6}).Pattern
	rapid.Check(t, func(t *rapid.T) {
		at := anyDirection(t, "direction")
		low, high := math.Inf(1), math.Inf(-1)
		for _, az := range []float64{math.Floor(at.AzDeg/15) * 15, math.Ceil(at.AzDeg/15) * 15} {
			for _, el := range []float64{math.Floor(at.ElDeg/15) * 15, math.Ceil(at.ElDeg/15) * 15} {
				gain := steps(math.Mod(az+360, 360), el)
				low, high = min(low, gain), max(high, gain)
			}
		}
		if got := p.Field(at).GainDBi(); got < low-1e-6 || got > high+1e-6 {
			t.Fatalf("gain towards %v = %g, its corners are %g to %g", at, got, low, high)
		}
	})
}

func BenchmarkTableField(b *testing.B) {
	content := sphere(headerTwoGains, 2, func(az, el float64) string { return fmt.Sprintf("%.2f,%.2f", -az/30, -math.Abs(el)/9) })
	d, err := Table(strings.NewReader(content), Port{})
	p := solved(b, d, err, Setting{FreqHz: 430e6}).Pattern
	b.ReportAllocs()
	for b.Loop() {
		p.Field(Direction{163.2, -0.8})
	}
}

func FuzzTable(f *testing.F) {
	f.Add(sphere(headerOneGain, 30, func(az, el float64) string { return "0" }))
	f.Add(sphere(headerTwoGains, 30, func(az, el float64) string { return "3,-7.5" }))
	f.Add(headerOneGain + "\n0,0,0\n360,0,0\n")
	f.Add("\ufeff# comment\n" + headerTwoGains + "\n-180,90,\"1\",2\n")
	f.Fuzz(func(t *testing.T, content string) {
		d, err := Table(strings.NewReader(content), Port{})
		if err != nil {
			checkFileError(t, err, content)
			return
		}
		checkFuzzedPattern(t, solved(t, d, nil, Setting{FreqHz: 430e6}).Pattern)
	})
}

func checkFileError(t *testing.T, err error, content string) {
	t.Helper()
	bad := new(FileError)
	if !errors.As(err, &bad) {
		t.Fatalf("error %v is no FileError", err)
	}
	if lines := 1 + strings.Count(content, "\n"); bad.Line < 0 || bad.Line > lines {
		t.Fatalf("error %v is in line %d of %d", err, bad.Line, lines)
	}
}

func checkFuzzedPattern(t *testing.T, p Pattern) {
	t.Helper()
	for az := -180.0; az <= 360; az += 37 {
		for el := -90.0; el <= 90; el += 18 {
			gain := p.GainDBi(Direction{az, el})
			if !(gain <= p.PeakDBi+1e-9 && gain >= p.PeakDBi-NullFloorDB-1e-9) {
				t.Fatalf("gain %g dBi at %g, %g of a peak of %g dBi", gain, az, el, p.PeakDBi)
			}
		}
	}
}

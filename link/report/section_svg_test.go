package report

import (
	"bytes"
	"encoding/xml"
	"io"
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"fellreach/link"

	"pgregory.net/rapid"
)

// Ticks stand at round numbers, four to eleven of them on any span.
func TestTicks(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		low := rapid.Float64Range(-500, 9000).Draw(t, "low")
		span := rapid.Float64Range(0.01, 20_000).Draw(t, "span")
		high := low + span
		list, step := ticks(low, high), tickStep(high-low)
		if mantissa := step / math.Pow10(int(math.Floor(math.Log10(step)+1e-9))); !near(mantissa, 1) && !near(mantissa, 2) && !near(mantissa, 5) {
			t.Fatalf("a step of %g", step)
		}
		if len(list) < 4 || len(list) > 11 {
			t.Fatalf("%d ticks from %g over %g", len(list), low, span)
		}
		slack := 1e-6 + 1e-9*step // ticks are rounded to a millionth
		for _, x := range list {
			if x < low-slack || x > high+slack || !near(math.Round(x/step), x/step) {
				t.Fatalf("tick %g from %g over %g in steps of %g", x, low, span, step)
			}
		}
	})
}

func near(a, b float64) bool { return math.Abs(a-b) < 1e-6*max(1, math.Abs(b)) }

// Whatever the heights, the ground, the ray and the mark of the worst point lie within the frame.
func TestDrawingWithinFrame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := madeSection()
		base := rapid.Float64Range(-400, 5000).Draw(t, "base")
		s.Profile.AslM = rapid.SliceOfN(rapid.Float64Range(base, base+rapid.Float64Range(0.1, 3000).Draw(t, "relief")), 9, 9).Draw(t, "ground")
		from, to := s.Profile.AslM[0]+12, s.Profile.AslM[8]+6
		for i := range s.RayM {
			s.RayM[i] = from + (to-from)*float64(i)/8
		}
		s.Clearance.Index = rapid.IntRange(1, 7).Draw(t, "worst")
		d := newDrawing(s)
		if d.lowM > 0 && d.lowM < 0.1*d.highM {
			t.Fatalf("begins at %g m of %g m, not at sea level", d.lowM, d.highM)
		}
		for i := range s.RayM {
			for _, m := range []float64{d.top(i), s.Profile.AslM[i] + s.BulgeM[i], s.RayM[i]} {
				if y := d.y(m); y < svgTop || y > svgHeight-svgBottom {
					t.Fatalf("%g m is drawn at y = %g in a frame from %d to %d", m, y, svgTop, svgHeight-svgBottom)
				}
			}
		}
	})
}

// Names are the planner's: they cannot break the picture.
func TestSVGNames(t *testing.T) {
	s := madeSection()
	from := *harbour
	from.Name = `A & B <"'> ]]>` + "é→"
	s.Link = &link.Link{From: &from, To: reef, Channel: poll}
	title := ""
	for dec := xml.NewDecoder(strings.NewReader(drawn(t, s))); ; {
		token, err := dec.Token()
		if err == io.EOF {
			break
		}
		if err != nil {
			t.Fatal(err)
		}
		if start, ok := token.(xml.StartElement); ok && start.Name.Local == "title" {
			if err := dec.DecodeElement(&title, &start); err != nil {
				t.Fatal(err)
			}
		}
	}
	if title != from.Name+" → Outer reef" {
		t.Errorf("title %q", title)
	}
}

// A path of two points has no worst point among them to mark.
func TestSVGOfShortPath(t *testing.T) {
	s := &link.Section{
		Link: madeSection().Link, Profile: madeProfile(harbour.At, harbour.At.Bound().Pad(0.0001).Max, 10, 10),
		FromAglM: harbour.AglM, ToAglM: reef.AglM, FreqHz: 151.5e6, RadiusKm: 8931,
		RayM: []float64{22, 16}, BulgeM: []float64{0, 0}, Fresnel1M: []float64{0, 0},
	}
	s.Clearance.Index, s.Clearance.WorstRatio = -1, 3
	for name, text := range map[string]string{"picture": drawn(t, s), "table": tabled(t, s)} {
		if strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
			t.Errorf("%s: not a number in:\n%s", name, text)
		}
	}
}

// Every figure in the picture's paths is one with a decimal at most: the file stays small.
func TestSVGFigures(t *testing.T) {
	for _, path := range regexp.MustCompile(` d="([^"]*)"`).FindAllStringSubmatch(drawn(t, madeSection()), -1) {
		for _, figure := range regexp.MustCompile(`[-0-9.]+`).FindAllString(path[1], -1) {
			if _, err := strconv.ParseFloat(figure, 64); err != nil || strings.Contains(figure, ".") && len(figure)-strings.Index(figure, ".") > 2 {
				t.Errorf("%q in %.80s", figure, path[1])
			}
		}
	}
}

func drawn(t *testing.T, s *link.Section) string {
	t.Helper()
	var text bytes.Buffer
	if err := SectionSVG(&text, s); err != nil {
		t.Fatal(err)
	}
	return text.String()
}

func tabled(t *testing.T, s *link.Section) string {
	t.Helper()
	var text bytes.Buffer
	if err := SectionTable(&text, s); err != nil {
		t.Fatal(err)
	}
	return text.String()
}

// Where roofs around an end hide its antenna, the table says from where the path is seen.
func TestSectionOverRoofs(t *testing.T) {
	s := madeSection()
	if text := tabled(t, s); strings.Contains(text, "roofs") {
		t.Errorf("roofs where there are none:\n%s", text)
	}
	s.FromAglM += 9
	if want, text := s.Link.From.Name+": the path is seen from the roofs around it, ", tabled(t, s); !strings.Contains(text, want) {
		t.Errorf("%q is not in:\n%s", want, text)
	}
}

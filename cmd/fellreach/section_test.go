package main

import (
	"cmp"
	"encoding/csv"
	"encoding/xml"
	"io"
	"math"
	"slices"
	"strings"
	"testing"
)

// The JSON of `section --format json`, by the keys that are promised.
type sectionAnswer struct {
	From, To       string
	DistanceKm     float64 `json:"distance_km"`
	AzimuthDeg     float64 `json:"azimuth_deg"`
	BackAzimuthDeg float64 `json:"back_azimuth_deg"`
	StepM          float64 `json:"step_m"`
	FrequencyHz    float64 `json:"frequency_hz"`
	RadiusKm       float64 `json:"effective_radius_km"`
	Points         []sectionPoint
	Clearance      struct {
		WorstRatio  float64 `json:"worst_ratio"`
		AtKm        float64 `json:"at_km"`
		NeededRatio float64 `json:"needed_ratio"`
	}
}

type sectionPoint struct {
	DKm       float64 `json:"d_km"`
	Lon, Lat  float64
	GroundM   float64 `json:"ground_m"`
	CoverM    float64 `json:"cover_m"`
	Zone      int
	RayM      float64 `json:"ray_m"`
	BulgeM    float64 `json:"bulge_m"`
	Fresnel1M float64 `json:"fresnel1_m"`
}

func sectionOf(t *testing.T, path, link string) sectionAnswer {
	t.Helper()
	return decoded[sectionAnswer](t, succeeds(t, exitDone, "section", path, "--link", link, "--format", "json"))
}

func TestSectionJSONKeys(t *testing.T) {
	type object = map[string]any
	s := decoded[object](t, succeeds(t, exitDone, "section", jacksboro, "--link", "backbone", "--format", "json"))
	haveKeys(t, s, "from", "to", "distance_km", "azimuth_deg", "back_azimuth_deg", "step_m", "points", "clearance", "horizon")
	haveKeys(t, s["points"].([]any)[0].(object), "d_km", "lon", "lat", "ground_m", "cover_m", "zone", "ray_m", "bulge_m", "fresnel1_m")
	haveKeys(t, s["clearance"].(object), "worst_ratio", "at_km", "needed_ratio")
}

// The picture by its own geometry: the ray is straight between the antennas, the Earth's bulge is
// d1 d2 / 2 a, the first Fresnel radius sqrt(lambda d1 d2 / d), and the worst clearance the least
// over the points between.
func TestSectionGeometry(t *testing.T) {
	for _, l := range linksOf(t, demo(t)) {
		link := cmp.Or(l.Name, l.From+".."+l.To)
		s := sectionOf(t, demo(t), link)
		lambdaM := 299792458 / s.FrequencyHz
		last := len(s.Points) - 1
		// The step is the cell's side on the ellipsoid: 30 m over UTM's scale factor of 0.9996 at least.
		if most := 30 / 0.9996; s.StepM > most || s.StepM*float64(last) < s.DistanceKm*1000-1e-6 || float64(last-1)*most > s.DistanceKm*1000 {
			t.Errorf("%s: %d intervals of %g m on %g km", link, last, s.StepM, s.DistanceKm)
		}
		worst := math.Inf(1)
		for i, p := range s.Points {
			d1, d2 := p.DKm, s.DistanceKm-p.DKm
			near(t, "d_km", p.DKm, s.DistanceKm*float64(i)/float64(last), 1e-9)
			near(t, "ray_m", p.RayM, (s.Points[0].RayM*d2+s.Points[last].RayM*d1)/s.DistanceKm, 1e-6)
			near(t, "bulge_m", p.BulgeM, 1000*d1*d2/(2*s.RadiusKm), 1e-6)
			near(t, "fresnel1_m", p.Fresnel1M, math.Sqrt(1000*lambdaM*d1*d2/s.DistanceKm), 1e-3) // the speed of light in round figures
			if i > 0 && i < last {
				worst = min(worst, (p.RayM-p.GroundM-p.CoverM-p.BulgeM)/p.Fresnel1M)
			}
		}
		near(t, "worst_ratio", s.Clearance.WorstRatio, worst, 1e-9)
	}
}

// A link is found by its name and by its ends in either order; its own order stands.
func TestSectionNames(t *testing.T) {
	want := sectionOf(t, jacksboro, "backbone")
	if want.From != "Cairn" || want.To != "Larch top" {
		t.Errorf("the backbone runs from %s to %s", want.From, want.To)
	}
	for _, name := range []string{"Cairn..Larch top", "Larch top..Cairn", "Larch top .. Cairn"} {
		if got := sectionOf(t, jacksboro, name); got.From != want.From || !slices.Equal(got.Points, want.Points) {
			t.Errorf("%s is another section", name)
		}
	}
}

// Two ends without a link are a path of its own, on the plan's only channel.
func TestSectionOfItsOwn(t *testing.T) {
	folder := t.TempDir()
	plan := write(t, folder, "plan.yaml", smallPlan)
	ground(noChange)(t, folder)
	out, back := sectionOf(t, plan, "B..C"), sectionOf(t, plan, "C..B")
	if out.From != "B" || back.From != "C" || out.FrequencyHz != 151.5e6 {
		t.Errorf("from %s and from %s at %g Hz", out.From, back.From, out.FrequencyHz)
	}
	near(t, "azimuth of C..B", back.AzimuthDeg, out.BackAzimuthDeg, 0)
	near(t, "worst clearance of C..B", back.Clearance.WorstRatio, out.Clearance.WorstRatio, 1e-9)
	near(t, "place of it", back.Clearance.AtKm, out.DistanceKm-out.Clearance.AtKm, 1e-9)
}

// The CSV holds every point; its first four columns are a profile, for which `loss` gives the loss
// of the link.
func TestSectionCSVGoesIntoLoss(t *testing.T) {
	s := sectionOf(t, jacksboro, "backbone")
	rows, err := csv.NewReader(strings.NewReader(succeeds(t, exitDone, "section", jacksboro, "--link", "backbone", "--format", "csv"))).ReadAll()
	if err != nil || len(rows) != len(s.Points)+1 {
		t.Fatalf("%d rows of %d points, %v", len(rows), len(s.Points), err)
	}
	var profile strings.Builder
	for _, row := range rows {
		profile.WriteString(strings.Join(row[:4], ",") + "\n")
	}
	path := write(t, t.TempDir(), "profile.csv", profile.String())
	loss := decoded[lossAnswer](t, succeeds(t, exitDone, "loss", path, "--frequency", "157.1 MHz", "--tx-height", "12 m", "--rx-height", "10 m", "--method", "p526", "--latitude", "36.565", "--format", "json"))
	for _, l := range linksOf(t, jacksboro) {
		if l.Name == "backbone" {
			near(t, "loss", loss.LossDB, l.Directions[0].TransmissionLossDB, 1e-3) // heights in millimetres
		}
	}
}

func TestSectionTable(t *testing.T) {
	text := succeeds(t, exitDone, "section", jacksboro, "--link", "Mill weir..Ford gauge")
	for _, want := range []string{"Mill weir → Ford gauge: 14.01 km at 215.1°, back 35.1°, 157.000 MHz", "beyond the horizon", "← worst"} {
		if !strings.Contains(text, want) {
			t.Errorf("want %q in:\n%s", want, text)
		}
	}
	if rows := strings.Count(text, "\n"); rows > 45 {
		t.Errorf("%d lines, for a person to read", rows)
	}
}

// The picture is well-formed XML that names its path and draws within its frame.
func TestSectionSVG(t *testing.T) {
	for _, link := range []string{"backbone", "Mill weir..Ford gauge"} {
		text := succeeds(t, exitDone, "section", jacksboro, "--link", link, "--format", "svg")
		if strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
			t.Errorf("%s: not a number in the picture", link)
		}
		elements := map[string]int{}
		for dec := xml.NewDecoder(strings.NewReader(text)); ; {
			token, err := dec.Token()
			if err == io.EOF {
				break
			}
			if err != nil {
				t.Fatal(err)
			}
			if start, ok := token.(xml.StartElement); ok {
				elements[start.Name.Local]++
			}
		}
		if elements["svg"] != 1 || elements["title"] != 1 || elements["desc"] != 1 || elements["path"] < 6 || elements["circle"] != 2 {
			t.Errorf("%s: elements %v", link, elements)
		}
	}
}

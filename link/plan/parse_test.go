package plan

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// everyKey is a plan that uses every key.
func everyKey(t testing.TB) string {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "..", "testdata", "plans", "every-key.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

func TestParseEveryKey(t *testing.T) {
	p, err := Parse("every-key.yaml", []byte(everyKey(t)))
	if err != nil {
		t.Fatal(err)
	}
	beam := p.Antennas["beam"].Spec.(*Yagi)
	for what, got := range map[string]bool{
		"frequency in Hz":          *p.Channels["voice"].Out == 155.2e6,
		"loss per metre":           near(p.Feeders["half-inch"].Loss[0].DBPerM, 0.022),
		"other loss unit":          near(p.Feeders["half-inch"].Loss[1].DBPerM, 0.049),
		"watts in dBm":             near(float64(*p.Radios["logger"].Power), 36.9897),
		"dBm as they are":          *p.Radios["voice"].Power == 44,
		"dBd in dBi":               near(float64(p.Antennas["stick"].Spec.(*Omni).Gain), 6),
		"place along the boom":     beam.Elements[0].At.M == -0.4 && beam.Elements[2].At.Wavelengths == 0.2,
		"resonant element":         beam.Elements[1].Length.Resonant,
		"millimetres":              near(float64(beam.Diameter), 0.008),
		"facing a site":            p.Sites[0].Antenna.Facing.Site == "Gauge 3",
		"facing a bearing":         p.Sites[1].Antenna.Facing.BearingDeg == 123.5,
		"slant":                    p.Sites[1].Antenna.Polarization.SlantDeg == 45,
		"stations":                 *p.Sites[2].Stations["vhf"].Antenna.Standoff == 1.2,
		"text place without quote": p.Sites[1].At.Text == "UTM 27N 575000 5263420",
		"class of land cover":      p.Ground.Cover.Classes[1].Zone == "sea",
		"link's own aim":           *p.Links.List[1].Aim.Margin == 3,
		"aim of the plan":          *p.Links.List[0].Aim.Margin == 6,
	} {
		if !got {
			t.Errorf("%s: not read as written", what)
		}
	}
}

func near(a, b float64) bool { return a-b < 1e-4 && b-a < 1e-4 }

func TestDefaults(t *testing.T) {
	p, err := Parse("some/bare.yaml", []byte(bare))
	if err != nil {
		t.Fatal(err)
	}
	for what, got := range map[string]bool{
		"title":           p.Title == "bare",
		"ground":          p.Ground.Elevation.Holds == "bare" && p.Ground.Beyond == "void" && *p.Ground.BridgeVoids == 0,
		"air":             *p.Air.N0 == 325 && *p.Air.DeltaN == 45,
		"noise":           p.Noise.Environment == "rural",
		"aim":             *p.Aim.Availability == 99 && *p.Aim.Margin == 6,
		"aim of the link": *p.Links.List[0].Aim.Availability == 99 && *p.Links.List[0].Aim.Margin == 6,
		"noise figure":    *p.Radios["r"].NoiseFigure == 7,
		"duty":            *p.Radios["r"].Duty == 100,
		"velocity factor": *p.Feeders["f"].VelocityFactor == 0.66,
		"clearing":        *p.Sites[0].Clearing == 50,
		"only channel":    p.Links.List[0].Channel == "c",
		"spread":          *p.Prediction.Spread == 9,
	} {
		if !got {
			t.Errorf("%s: not the default of the design", what)
		}
	}
}

// A mast of no stated kind is a pole, for the parser and for the schema.
func TestMastWithoutKind(t *testing.T) {
	text := strings.Replace(bare, "radio: r, antenna", `mast: {height: "5 m", diameter: "60 mm"}, radio: r, antenna`, 1)
	p, err := Parse("x.yaml", []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	if pole, ok := p.Sites[0].Mast.Spec.(*Pole); !ok || p.Sites[0].Mast.Kind != "pole" || *pole.Diameter != 0.06 {
		t.Errorf("the mast is read as %+v", p.Sites[0].Mast)
	}
	if err := compiledSchema(t).Validate(decoded(t, text)); err != nil {
		t.Errorf("the schema refuses it: %v", err)
	}
	for _, wrong := range []string{`width: "0.4 m"`, `kind: tripod`} {
		if _, err := Parse("x.yaml", []byte(strings.Replace(text, `diameter: "60 mm"`, wrong, 1))); err == nil {
			t.Errorf("a mast with %s is read", wrong)
		}
	}
}

// bare is about the least that a plan can be.
const bare = `format: 1
ground: {elevation: {files: [dem.tif]}}
channels: {c: {frequency: "151.5 MHz", bandwidth: "12.5 kHz"}}
feeders: {f: {impedance: "50 ohm", loss: {"150 MHz": "2 dB/100m"}}}
radios: {r: {power: "5 W", sensitivity: "-117 dBm"}}
antennas: {a: {kind: omni, gain: "2 dBi", impedance: "50 ohm"}}
sites:
  - {name: A, at: "47.5 N, 20.1 W", radio: r, antenna: {use: a, above_ground: "5 m"}}
  - {name: B, at: "47.6 N, 20.1 W", radio: r, antenna: {use: a, above_ground: "5 m"}}
links: [{from: A, to: B, fade: "10 dB"}]
`

// A badPlan is the bare plan, or the one with every key, with one thing changed.
type badPlan struct {
	name, old, new string
	want           string // in the message
	form           bool   // the schema refuses it too
}

var badPlans = []badPlan{
	{"bare number", `"151.5 MHz", bandwidth`, `151.5, bandwidth`, "3:27: channels.c.frequency: 151.5 is a bare number and lacks its unit\n    hint: write a frequency in Hz, kHz, MHz or GHz", true},
	{"decimal comma", `"151.5 MHz", bandwidth`, `"151,5 MHz", bandwidth`, `hint: write decimals with a dot, "151.5 MHz"`, true},
	{"no unit in text", `"151.5 MHz", bandwidth`, `"151.5", bandwidth`, "lacks its unit", true},
	{"unit of another kind", `"151.5 MHz", bandwidth`, `"151.5 m", bandwidth`, `the unit "m" does not fit here`, true},
	{"unit misspelt", `"151.5 MHz", bandwidth`, `"151.5 Mhz", bandwidth`, "the unit is written MHz", true},
	{"zero length", `above_ground: "5 m"}}` + "\n  - {name: B", `above_ground: "0 m"}}` + "\n  - {name: B", `"0 m" is not a length above zero`, true},
	{"negative length", `above_ground: "5 m"}}` + "\n  - {name: B", `above_ground: "-5 m"}}` + "\n  - {name: B", "is not a length above zero", true},
	{"NaN", `"5 W"`, `.nan`, "where a text is due", true},
	{"unknown key", "format: 1", "format: 1\nformta: 2", "2:1: formta: is not a key of a plan here", true},
	{"unknown key below", `{power:`, `{pwoer: "1 W", power:`, "radios.r.pwoer: is not a key", true},
	{"missing key", `, bandwidth: "12.5 kHz"`, ``, "channels.c.bandwidth: is missing", true},
	{"missing section", "format: 1\n", "", "format: is missing", true},
	{"other format", "format: 1", "format: 2", "2 is out of range\n    hint: write 1", true},
	{"unknown word", `elevation: {files: [dem.tif]}`, `elevation: {files: [dem.tif], holds: rock}`, `"rock" is not known here`, true},
	{"list for group", `radios: {r: {power: "5 W", sensitivity: "-117 dBm"}}`, `radios: []`, "radios: a list where a group of keys is due", true},
	{"group for list", `files: [dem.tif]`, `files: {a: dem.tif}`, "a group of keys where a list is due", true},
	{"empty list", `files: [dem.tif]`, `files: []`, "has 0 entries", true},
	{"number for name", `{name: A,`, `{name: 12,`, `write it in quotes, "12"`, true},
	{"nothing", `gain: "2 dBi"`, `gain:`, "nothing where a text is due", true},
	{"unknown kind", `kind: omni`, `kind: helix`, `"helix" is not a kind here`, true},
	{"no kind", `kind: omni, `, ``, "antennas.a.kind: is missing", true},
	{"key of another kind", `kind: omni,`, `kind: omni, diameter: "8 mm",`, "antennas.a.diameter: is not a key", true},
	{"two ways to say the frequency", `frequency: "151.5 MHz"`, `frequency: "151.5 MHz", out: "151 MHz"`, "has frequency and out or back", true},
	{"half a pair", `frequency: "151.5 MHz"`, `out: "151.5 MHz"`, "has no frequency", true},
	{"two ways to say the need", `sensitivity: "-117 dBm"`, `sensitivity: "-117 dBm", required_snr: "12 dB"`, "has a sensitivity and a required_snr", true},
	{"no need", `, sensitivity: "-117 dBm"`, ``, "does not say what it needs", true},
	{"margin and chance", "links:", `aim: {margin: "6 dB", chance: "90 %"}` + "\nlinks:", "has a margin and a chance", true},
	{"loss key without unit", `"150 MHz":`, `"150":`, "lacks its unit", true},

	{"twice", "format: 1", "format: 1\nformat: 1", "2:1: format: stands twice, first in line 1", false},
	{"frequency out of range", `frequency: "151.5 MHz"`, `frequency: "27 MHz"`, "it lies from 30 MHz to 6 GHz", false},
	{"no such antenna", `use: a, above_ground: "5 m"}}` + "\n  - {name: B", `use: b, above_ground: "5 m"}}` + "\n  - {name: B", "8:57: sites[0].antenna.use: there is no antenna \"b\"\n    hint: the plan has a", false},
	{"no such radio", `radio: r, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", `radio: q, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", `there is no radio "q"`, false},
	{"no such site", `to: B`, `to: C`, `links[0].to: there is no site "C"`, false},
	{"two sites of a name", `name: B`, `name: A`, `"A" is the name of two sites`, false},
	{"link to itself", `to: B`, `to: A`, "begins and ends at one site", false},
	{"link twice", `links: [`, `links: [{from: A, to: B, fade: "3 dB"}, `, "stands twice", false},
	{"no fade", `, fade: "10 dB"}]`, "}]\nmethod: p526", "links[0].fade: is missing: method p526 does not compute the fading", false},
	{"availability too high", "links:", `aim: {availability: "99.99 %"}` + "\nlinks:", "it lies from 50 to 99.9 %", false},
	{"absurd step", `files: [dem.tif]}`, `files: [dem.tif]}, step: "50 km"`, "ground.step: 50000 m is out of range", false},
	{"absurd mast", `radio: r, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", `radio: r, mast: {height: "18 km"}, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", "sites[0].mast.height: 18000 m is out of range", false},
	{"absurd mast width", `radio: r, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", `radio: r, mast: {kind: lattice, height: "5 m", width: "40 m"}, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", "sites[0].mast.width: 40 m is out of range", false},
	{"amplifier without gain", `radio: r, antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", `radio: r, inserts: [{name: amp, gain: "0 dB", noise_figure: "2 dB", receive_only: true}], antenna: {use: a, above_ground: "5 m"}}` + "\n  - {name: B", "sites[0].inserts[0]: is a preamplifier without gain", false},
	{"absurd height", `above_ground: "5 m"}}` + "\n  - {name: B", `above_ground: "30 km"}}` + "\n  - {name: B", "30000 m is out of range", false},
	{"no power", `power: "5 W", `, ``, `transmits on this link, but radio "r" has no power`, false},
	{"place", `at: "47.5 N, 20.1 W"`, `at: "97.5 N, 20.1 W"`, "sites[0].at: ", false},
	{"anchor", `{r: {power`, `{r: &x {power`, "plans do not use anchors", false},
	{"alias bomb", "format: 1", "a: &a [x, x]\nb: &b [*a, *a]\nformat: 1", "plans do not use anchors", false},
	{"not YAML", "format: 1", "format: [1", "is not YAML", false},
	{"not text", "format: 1", "format: \xff", "is not UTF-8 text", false},
	{"nested", "format: 1", "format: " + strings.Repeat("[", 100) + strings.Repeat("]", 100), "is nested deeper", false},
	{"two documents", "format: 1", "format: 1\n---\nformat: 1", "several documents", false},
}

func TestBadPlans(t *testing.T) {
	for _, tc := range badPlans {
		t.Run(tc.name, func(t *testing.T) {
			text := tc.text(t)
			_, err := Parse("bare.yaml", []byte(text))
			if err == nil {
				t.Fatalf("accepted:\n%s", text)
			}
			if !strings.Contains(err.Error(), tc.want) {
				t.Errorf("got:\n%v\nwant in it: %s", err, tc.want)
			}
			checkPlaces(t, err, text)
		})
	}
}

func (tc badPlan) text(t *testing.T) string {
	if !strings.Contains(bare, tc.old) {
		t.Fatalf("the bare plan does not hold %q", tc.old)
	}
	return strings.Replace(bare, tc.old, tc.new, 1)
}

// checkPlaces asserts that every problem lies within the file.
func checkPlaces(t testing.TB, err error, text string) {
	var all Errors
	if !errors.As(err, &all) || len(all) == 0 {
		t.Fatalf("%v is not an Errors", err)
	}
	lines := strings.Count(text, "\n") + 1
	for _, e := range all {
		if e.Line < 1 || e.Line > lines || e.Column < 1 || e.Problem == "" {
			t.Errorf("%+v lies outside the file's %d lines", *e, lines)
		}
	}
}

// All problems of a file come at once, in its order.
func TestAllProblemsAtOnce(t *testing.T) {
	text := strings.NewReplacer(`"5 W"`, `"5 V"`, `gain: "2 dBi"`, `gain: 2`, `"12.5 kHz"`, `12.5`).Replace(bare)
	_, err := Parse("bare.yaml", []byte(text))
	var all Errors
	if !errors.As(err, &all) || len(all) != 3 {
		t.Fatalf("want 3 problems, got: %v", err)
	}
	for i := 1; i < len(all); i++ {
		if all[i].Line < all[i-1].Line {
			t.Errorf("problem %d stands before problem %d", i, i-1)
		}
	}
}

// An aim that the links inherit is reported where it stands, not with every link.
func TestInheritedAimReportedOnce(t *testing.T) {
	_, err := Parse("bare.yaml", []byte(strings.Replace(bare, "links:", "aim: {chance: \"100 %\"}\nlinks:", 1)))
	var all Errors
	if !errors.As(err, &all) || len(all) != 1 || all[0].Field != "aim.chance" {
		t.Errorf("got %v, want one error at aim.chance", err)
	}
}

func TestTooLarge(t *testing.T) {
	_, err := Parse("large.yaml", []byte(bare+"# "+strings.Repeat("x", 10<<20)))
	if err == nil || !strings.Contains(err.Error(), "larger than a plan may be, 1 MiB") {
		t.Errorf("a plan of 10 MB gave %v", err)
	}
}

func FuzzParse(f *testing.F) {
	f.Add(bare)
	f.Add(everyKey(f))
	for _, tc := range badPlans {
		f.Add(strings.Replace(bare, tc.old, tc.new, 1))
	}
	f.Fuzz(func(t *testing.T, text string) {
		p, err := Parse("fuzz.yaml", []byte(text))
		if err != nil {
			checkPlaces(t, err, text)
		} else if len(p.Sites) == 0 || len(p.Channels) == 0 {
			t.Error("accepted a plan without sites or channels")
		}
	})
}

package plan

import (
	"errors"
	"fmt"
	"math"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/link"
)

// threeSites is a plan in which each site and link states something else.
const threeSites = `format: 1
ground: {elevation: {files: [dem.tif]}}
method: p526
aim: {availability: "95 %", margin: "4 dB"}
channels:
  pair: {out: "155.2 MHz", back: "151.1 MHz", bandwidth: "25 kHz"}
  one: {frequency: "160 MHz", bandwidth: "12.5 kHz"}
feeders: {coax: {impedance: "50 ohm", loss: {"100 MHz": "2 dB/100m", "400 MHz": "4 dB/100m"}}}
radios:
  base: {power: "10 W", duty: "20 %", sensitivity: "-117 dBm"}
  ear: {noise_figure: "5 dB", noise_bandwidth: "8 kHz", required_snr: "12 dB"}
antennas:
  stick: {kind: omni, gain: "2 dBi", impedance: "50 ohm"}
  panel: {kind: datasheet, gain: "8 dBi", width_h: "65 deg", width_v: "30 deg", front_to_back: "18 dB", impedance: "50 ohm"}
sites:
  - name: Base
    at: UTM 27N 500000 5260000
    ground_level: "104.5 m"
    mast: {kind: pole, height: "20 m", diameter: "100 mm"}
    radio: base
    antenna: {use: panel, above_ground: "15 m", standoff: "0.5 m", facing: toward East, tilt: "-2 deg"}
    feeder: {use: coax, length: "25 m", connectors: {count: 2, loss_each: "0.1 dB"}}
    inserts: [{name: duplexer, loss: "1.2 dB"}, {name: amplifier, gain: "15 dB", noise_figure: "2 dB", receive_only: true, where: mast}]
  - name: East
    at: UTM 27N 508000 5260000
    clearing: "20 m"
    stations:
      up: {radio: base, antenna: {use: stick, above_ground: "10 m"}}
      down: {radio: ear, antenna: {use: stick, above_ground: "6 m", polarization: horizontal}}
  - name: South
    at: {epsg: 32627, easting: 500000, northing: 5252000}
    radio: base
    antenna: {use: stick, above_ground: "5 m"}
links:
  - {from: Base, to: East/up, channel: pair, fade: "3 dB", allowances: [{name: wet leaves, loss: "2 dB"}]}
  - {from: South, to: East/down, channel: one, fade: "5 dB", one_way: true, name: telemetry, aim: {availability: "50 %", chance: "90 %"}}
`

// Names become stations, with every figure in its place and the line of the plan that states it.
func TestStations(t *testing.T) {
	n := flatNetwork(t, threeSites)
	base, up, down, south := n.Stations["Base"], n.Stations["East/up"], n.Stations["East/down"], n.Stations["South"]
	if len(n.Stations) != 4 {
		t.Fatalf("%d stations", len(n.Stations))
	}
	for what, holds := range map[string]bool{
		"order":              base.Order == 0 && up.Order == 1 && down.Order == 1 && south.Order == 2,
		"surveyed height":    base.GroundAslM != nil && *base.GroundAslM == 104.5 && up.GroundAslM == nil,
		"clearing":           base.ClearingM == 50 && up.ClearingM == 20,
		"height":             base.AglM == 15 && down.AglM == 6,
		"mast beside":        base.MastDiameterM == 0.1 && base.StandoffM == 0.5,
		"power":              math.Abs(base.Radio.PowerDBm-40) < 1e-12 && base.Radio.DutyPct == 20 && base.Radio.PowerSource == "plan.yaml:10",
		"sensitivity":        base.Radio.Needs.Stated && base.Radio.Needs.SensitivityDBm == -117 && base.Radio.Needs.Source == "plan.yaml:10; noise figure 7 dB assumed",
		"noise":              !down.Radio.Needs.Stated && down.Radio.Needs.FigureDB == 5 && down.Radio.Needs.BandwidthHz == 8e3 && down.Radio.Needs.RequiredSNRDB == 12,
		"feeder":             base.Run.LengthM == 25 && base.Run.Feeder.Name == "coax" && base.Run.Feeder.VelocityFactor == 0.66 && base.RunSource == "plan.yaml:8",
		"connectors":         base.Run.ConnectorCount == 2 && base.Run.ConnectorLossDB == 0.1 && base.ConnectorSource == "plan.yaml:22",
		"no feeder":          up.Run.LengthM == 0 && up.Run.Feeder.ImpedanceOhm == 0,
		"antenna":            base.Antenna.Name == "panel" && base.Antenna.Kind == "datasheet" && base.AntennaSource == "plan.yaml:14",
		"tilt":               base.Mount.TiltDeg == -2,
		"roll":               up.Mount.RollDeg == 0 && down.Mount.RollDeg == 90,
		"same place, by two": up.At == down.At,
	} {
		if !holds {
			t.Errorf("%s: not as the plan states it", what)
		}
	}
	want := []link.Insert{
		{Name: "duplexer", LossDB: 1.2, Source: "plan.yaml:23"},
		{Name: "amplifier", GainDB: 15, FigureDB: 2, ReceiveOnly: true, AtMast: true, Source: "plan.yaml:23"},
	}
	if fmt.Sprint(base.Inserts) != fmt.Sprint(want) {
		t.Errorf("inserts %+v, want %+v", base.Inserts, want)
	}
}

// On the central meridian grid north is true north, and the geodesic that leaves it at a right angle
// is a straight line of the transverse Mercator grid, to its curvature of 1e-5 degrees over 8 km.
func TestFacing(t *testing.T) {
	if got := flatNetwork(t, threeSites).Stations["Base"].Mount.FacingDeg; math.Abs(got-90) > 1e-5 {
		t.Errorf("facing %.7f degrees, want 90", got)
	}
}

func TestLinks(t *testing.T) {
	n := flatNetwork(t, threeSites)
	if len(n.Links) != 2 {
		t.Fatalf("%d links", len(n.Links))
	}
	pair, telemetry := n.Links[0], n.Links[1]
	if pair.From != n.Stations["Base"] || pair.To != n.Stations["East/up"] || pair.OneWay || !telemetry.OneWay || telemetry.Title() != "telemetry" {
		t.Errorf("links %+v and %+v", pair, telemetry)
	}
	if got := (link.Channel{Name: "pair", OutHz: 155.2e6, BackHz: 151.1e6, BandwidthHz: 25e3}); pair.Channel != got {
		t.Errorf("channel %+v", pair.Channel)
	}
	if got := (link.Channel{Name: "one", OutHz: 160e6, BackHz: 160e6, BandwidthHz: 12.5e3}); telemetry.Channel != got {
		t.Errorf("channel %+v", telemetry.Channel)
	}
	if got := (link.Aim{AvailabilityPct: 95, MarginDB: 4}); pair.Aim != got {
		t.Errorf("the plan's aim became %+v", pair.Aim)
	}
	if got := (link.Aim{AvailabilityPct: 50, ChancePct: 90}); telemetry.Aim != got {
		t.Errorf("the link's aim became %+v", telemetry.Aim)
	}
	if got := (link.Allowance{Name: "fading", LossDB: 3, Source: "stated, plan.yaml:35"}); *pair.Fade != got {
		t.Errorf("fade %+v", *pair.Fade)
	}
	if got := (link.Allowance{Name: "wet leaves", LossDB: 2, Source: "plan.yaml:35"}); len(pair.Allowances) != 1 || pair.Allowances[0] != got {
		t.Errorf("allowances %+v", pair.Allowances)
	}
}

// What only the rasters, the antennas' files and the places can tell comes with its place in the
// plan, all of it at once.
func TestOpenErrors(t *testing.T) {
	for _, tc := range []struct {
		name     string
		old, new string
		want     []string
	}{
		{"two sites at one place", "easting: 500000, northing: 5252000", "easting: 500000, northing: 5260000.5", []string{`plan.yaml:31:5: sites[2].at: "South" stands where "Base" stands`}},
		{"a place that the grid cannot hold", "easting: 500000,", "easting: 90000000,", []string{"plan.yaml:31:5: sites[2].at: "}},
		{"a site outside the ground", "UTM 27N 508000", "UTM 27N 708000", []string{"plan.yaml:25:5: sites[1].at: \"East\": the elevation rasters do not reach"}},
		{"no raster", "[dem.tif]", "[none.tif]", []string{"plan.yaml:2:1: ground: elevation raster ", "none.tif: file does not exist"}},
		{"no pattern", "kind: omni, gain: \"2 dBi\"", "kind: table, pattern: none.csv", []string{"antennas.stick: open ", "none.csv: no such file"}},
		{"several at once", "easting: 500000, northing: 5252000", "easting: 500000, northing: 5260000", []string{"sites[2].at", "links[0].via: chains are not computed"}},
		{"links of its own choice", "links:\n", "links: auto\nx:\n", []string{"links: auto is not done"}},
	} {
		t.Run(tc.name, func(t *testing.T) {
			text := strings.Replace(threeSites, tc.old, tc.new, 1)
			switch tc.name {
			case "several at once":
				text = strings.Replace(text, "from: Base,", "from: Base, via: [South],", 1)
			case "links of its own choice":
				text = text[:strings.Index(text, "x:\n")]
			case "no pattern":
				text = strings.NewReplacer(`use: stick, `, `use: stick, facing: "0 deg", `).Replace(text)
			}
			err := openOnFlat(t, text)
			var all Errors
			if !errors.As(err, &all) {
				t.Fatalf("got %v", err)
			}
			checkPlaces(t, err, text)
			for _, want := range tc.want {
				if !strings.Contains(err.Error(), want) {
					t.Errorf("got:\n%v\nwant in it: %s", err, want)
				}
			}
		})
	}
}

// openOnFlat opens a plan on the flat ground and returns what is wrong with it.
func openOnFlat(t *testing.T, text string) error {
	t.Helper()
	flat := flatNetwork(t, threeSites)
	file := filepath.Join(filepath.Dir(flat.plan.file), "plan.yaml")
	p, err := Parse(file, []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	n, err := p.Open()
	if err == nil {
		n.Close()
	}
	return err
}

// Paths in a plan are relative to its folder, wherever the program runs.
func TestPathsFollowThePlan(t *testing.T) {
	p := flatNetwork(t, threeSites).plan
	t.Chdir(t.TempDir())
	n, err := p.Open()
	if err != nil {
		t.Fatal(err)
	}
	n.Close()
}

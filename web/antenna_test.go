package web

import (
	"encoding/json"
	"fmt"
	"math"
	"net/http"
	"strings"
	"testing"

	"fellreach/link/plan"
	"fellreach/link/report"
)

// TestAntennaFree: an antenna by its name is what the antenna command prints.
func TestAntennaFree(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	p, err := plan.LoadAntennas(path)
	if err != nil {
		t.Fatal(err)
	}
	found, err := p.Antenna(plan.AntennaQuery{Name: "rod", Channel: "poll", MastDiameterM: 0.114, StandoffM: 0.5})
	if err != nil {
		t.Fatal(err)
	}
	var b strings.Builder
	if err := report.AntennaJSON(&b, found); err != nil {
		t.Fatal(err)
	}
	got := ask(s, http.MethodGet, "/api/files/antenna.json?antenna=rod&channel=poll&on_mast_m=0.114&standoff_m=0.5", "")
	same(t, "the file antenna.json", string(got.body), b.String())
	a := get[AntennaAnswer](t, s, "/api/antenna?antenna=rod&channel=poll&on_mast_m=0.114&standoff_m=0.5")
	if a.ImpedanceOhm.R != real(found.ImpedanceOhm) || a.ImpedanceOhm.X != imag(found.ImpedanceOhm) || a.Curve != nil {
		t.Errorf("impedance %+v, want %v", a.ImpedanceOhm, found.ImpedanceOhm)
	}
}

// TestAntennaInstalled: a station's antenna is the one that the budget of its link speaks of: the same
// VSWR, and towards the other end the same gain. The budget fills nulls; these directions have none.
func TestAntennaInstalled(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	links := get[report.Links](t, s, "/api/links")
	for _, tc := range []struct {
		station string
		link    int
		azDeg   float64
		elDeg   float64
	}{
		{"Gauge 3", 5, links.Links[5].AzimuthDeg, links.Links[5].Directions[0].DepartureDeg},
		{"Ormvik/coast", 7, links.Links[7].BackAzDeg, links.Links[7].Directions[0].ArrivalDeg},
		{"Hallin Top/gauges", 1, links.Links[1].BackAzDeg, links.Links[1].Directions[0].ArrivalDeg},
	} {
		query := fmt.Sprintf("/api/antenna?station=%s&channel=%s&toward=true&azimuth_deg=%g&elevation_deg=%g", strings.ReplaceAll(tc.station, " ", "+"), links.Links[tc.link].Channel, tc.azDeg, tc.elDeg)
		a := get[AntennaAnswer](t, s, query)
		var gain, radioVSWR, vswr float64
		for _, l := range links.Links[tc.link].Directions[0].Lines {
			switch l.Name {
			case tc.station + ": directivity towards the path", tc.station + ": conductor loss":
				gain += l.ValueDB
			case tc.station + ": mismatch at the radio":
				if _, err := fmt.Sscanf(l.Source, "VSWR %f at the radio, %f at the antenna", &radioVSWR, &vswr); err != nil {
					t.Fatalf("%q: %v", l.Source, err)
				}
			}
		}
		if math.Abs(gain-a.Toward.GainDBi) > 1e-6 {
			t.Errorf("%s: %.6f dBi towards the path, %.6f in the budget", tc.station, a.Toward.GainDBi, gain)
		}
		if math.Abs(vswr-a.VSWR.Value) > 0.015 { // the budget's is that of the channel's worst edge, to two decimals
			t.Errorf("%s: VSWR %.3f, %.2f in the budget", tc.station, a.VSWR.Value, vswr)
		}
	}
}

// TestAntennaMast: leaving the mast out changes a side-mounted antenna, and nothing else.
func TestAntennaMast(t *testing.T) {
	s := serve(t, demo(t))
	on, off := get[AntennaAnswer](t, s, "/api/antenna?station=Ormvik/coast"), get[AntennaAnswer](t, s, "/api/antenna?station=Ormvik/coast&mast=false")
	free := get[AntennaAnswer](t, s, "/api/antenna?antenna=rod&channel=coast")
	if on.DirectivityDBi < free.DirectivityDBi+1 { // a mast a quarter wave behind a dipole makes a beam of it
		t.Errorf("%.2f dBi beside the mast, %.2f dBi without", on.DirectivityDBi, off.DirectivityDBi)
	}
	if off.ImpedanceOhm != free.ImpedanceOhm || off.DirectivityDBi != free.DirectivityDBi {
		t.Errorf("without its mast %+v, free %+v", off.ImpedanceOhm, free.ImpedanceOhm)
	}
	if math.Abs(on.Mount.FacingDeg-314) > 3 { // Ormvik to Gauge 3: 7.6 km west, 7.3 km north
		t.Errorf("faces %g degrees", on.Mount.FacingDeg)
	}
}

func TestAntennaCurve(t *testing.T) {
	s := serve(t, demo(t))
	a := get[AntennaAnswer](t, s, "/api/antenna?station=Gauge+3&curve=true")
	if len(a.Curve) < 11 || a.Channel == nil || a.Channel[0] >= a.Channel[1] {
		t.Fatalf("%d points, channel %v", len(a.Curve), a.Channel)
	}
	least := a.Curve[0]
	for _, p := range a.Curve {
		if p.VSWR < least.VSWR {
			least = p
		}
	}
	if middle := (a.Channel[0] + a.Channel[1]) / 2; math.Abs(least.FrequencyHz/middle-1) > 0.02 || math.Abs(least.VSWR-a.VSWR.Value) > 0.1 {
		t.Errorf("the least VSWR is %+v; on the channel it is %g", least, a.VSWR.Value)
	}
}

func TestAntennaMistakes(t *testing.T) {
	s := serve(t, demo(t))
	for query, says := range map[string]string{
		"":                              "one of the two",
		"station=Gauge+3&antenna=rod":   "one of the two",
		"station=Nowhere":               "Nowhere",
		"antenna=horn":                  "horn",
		"antenna=rod":                   "several channels",
		"antenna=rod&channel=x":         "no channel",
		"antenna=rod&frequency_hz=NaN":  "frequency_hz",
		"antenna=rod&frequency_hz=1e15": "frequency_hz",
		"antenna=rod&channel=poll&on_mast_m=0.1&standoff_m=0.01": "inside",
	} {
		refused(t, ask(s, http.MethodGet, "/api/antenna?"+query, ""), http.StatusUnprocessableEntity, says)
	}
}

// TestHeights: a cell at the plan's own height and antenna is the plan's own margin, and every other
// cell that of a plan with mast, feeder and height written so.
func TestHeights(t *testing.T) {
	s := serve(t, demo(t))
	links := get[report.Links](t, s, "/api/links")
	table := get[Heights](t, s, "/api/heights?station=West+head&from_m=4&to_m=8&step_m=2&antennas=rod,stick")
	if len(table.Cells) != 6 || table.Cells[0].Antenna != "rod" || table.Cells[2].HeightM != 8 || table.Cells[3].Antenna != "stick" {
		t.Fatalf("%+v", table.Cells)
	}
	if worst := links.Links[9]; table.Cells[0].MarginDB != worst.MarginDB || table.Cells[0].Verdict != worst.Verdict || table.Cells[0].WorstLink != "West head to Ormvik/coast (coast)" {
		t.Errorf("as planned: %+v, want %g", table.Cells[0], worst.MarginDB)
	}
	edit := func(value string, path ...string) EditBody {
		return EditBody{plan.SetKey, append([]string{"sites", "West head"}, path...), json.RawMessage(value)}
	}
	for _, cell := range []HeightCell{table.Cells[2], table.Cells[4]} {
		tried := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Link: "West head..Ormvik/coast", Edits: []EditBody{
			edit(fmt.Sprintf(`"%g m"`, cell.HeightM), "mast", "height"), edit(fmt.Sprintf(`"%g m"`, cell.HeightM), "antenna", "above_ground"),
			edit(fmt.Sprintf(`"%g m"`, 6+cell.HeightM-4), "feeder", "length"), edit(`"`+cell.Antenna+`"`, "antenna", "use"),
		}})
		if got := tried.Links.Links[0].MarginDB; math.Abs(got-cell.MarginDB) > 1e-9 {
			t.Errorf("%+v, in the plan %g", cell, got)
		}
	}
	if beam := get[Heights](t, s, "/api/heights?station=West+head&from_m=4&to_m=4&step_m=1&antennas=beam"); beam.Cells[0].MarginDB == table.Cells[0].MarginDB {
		t.Error("a beam does as a rod")
	}
}

func TestHeightsMistakes(t *testing.T) {
	s := serve(t, demo(t))
	const range4to8 = "&from_m=4&to_m=8&step_m=2"
	for query, says := range map[string]string{
		"station=Nowhere&antennas=rod" + range4to8:                     "Nowhere",
		"station=West+head&antennas=horn" + range4to8:                  "horn",
		"station=West+head" + range4to8:                                "antennas",
		"station=West+head&antennas=rod&from_m=8&to_m=4&step_m=1":      "downwards",
		"station=West+head&antennas=rod&from_m=1&to_m=1000&step_m=0.1": "larger step",
		"station=West+head&antennas=rod&from_m=4&to_m=8&step_m=0":      "step_m",
	} {
		refused(t, ask(s, http.MethodGet, "/api/heights?"+query, ""), http.StatusUnprocessableEntity, says)
	}
}

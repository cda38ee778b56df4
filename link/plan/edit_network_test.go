package plan

import (
	"context"
	"math"
	"strings"
	"testing"
)

// reopened opens a changed text of a network's plan after it.
func reopened(t *testing.T, before *Network, antennas *Network, old, changed string) (*Network, error) {
	t.Helper()
	if !strings.Contains(threeSites, old) {
		t.Fatalf("%q is not in the plan", old)
	}
	p, err := Parse(before.plan.file, []byte(strings.Replace(threeSites, old, changed, 1)))
	if err != nil {
		t.Fatal(err)
	}
	return p.OpenAfter(before, antennas)
}

// A plan opened after another stands on its ground where both ask for the same, and on one of its own
// where not; a failure leaves the ground of before open.
func TestOpenAfter(t *testing.T) {
	before := flatNetwork(t, threeSites)
	for _, tc := range []struct {
		old, changed string
		shares       bool
	}{
		{"UTM 27N 508000 5260000", "UTM 27N 507000 5260000", true},
		{"ground: {elevation: {files: [dem.tif]}}", "ground: {elevation: {files: [dem.tif]}, step: \"50 m\"}", false},
		{"ground: {elevation: {files: [dem.tif]}}", "ground: {elevation: {files: [dem.tif]}, beyond: sea}", false},
	} {
		n, err := reopened(t, before, before, tc.old, tc.changed)
		if err != nil {
			t.Fatal(err)
		}
		if n.SharesGround(before) != tc.shares {
			t.Errorf("%s: shares the ground: %v", tc.changed, n.SharesGround(before))
		}
		if !tc.shares {
			n.Close()
		}
	}
	if _, err := reopened(t, before, before, "UTM 27N 508000 5260000", "UTM 27N 608000 5260000"); err == nil {
		t.Error("a site outside the ground is taken")
	}
	if _, err := before.Run(context.Background(), nil); err != nil {
		t.Errorf("the network before: %v", err)
	}
	if before.SharesGround(nil) {
		t.Error("a network shares its ground with none")
	}
}

// Antennas that both plans describe alike are shared, others are made anew; so the links of a plan
// opened after another are those of the plan by itself.
func TestSharedAntennas(t *testing.T) {
	before := flatNetwork(t, threeSites)
	for _, change := range []string{`"2 dBi"`, `"3 dBi"`} {
		n, err := reopened(t, before, before, `stick: {kind: omni, gain: "2 dBi"`, `stick: {kind: omni, gain: `+change)
		if err != nil {
			t.Fatal(err)
		}
		alone := flatNetwork(t, strings.Replace(threeSites, `stick: {kind: omni, gain: "2 dBi"`, `stick: {kind: omni, gain: `+change, 1))
		got, err := n.Run(context.Background(), nil)
		if err != nil {
			t.Fatal(err)
		}
		want, err := alone.Run(context.Background(), nil)
		if err != nil {
			t.Fatal(err)
		}
		for i := range want.Links {
			if got.Links[i].MarginDB != want.Links[i].MarginDB {
				t.Errorf("%s, link %d: %g dB, alone %g dB", change, i, got.Links[i].MarginDB, want.Links[i].MarginDB)
			}
		}
	}
	stacks := strings.Replace(threeSites, "antennas:\n", "antennas:\n  rod: {kind: dipole, length: resonant, diameter: \"12 mm\", material: copper}\n  pair: {kind: stack, of: rod, count: 2, spacing: \"0.8 wl\"}\n", 1)
	p, err := Parse("a.yaml", []byte(stacks))
	if err != nil {
		t.Fatal(err)
	}
	q, err := Parse("a.yaml", []byte(strings.Replace(stacks, `"12 mm"`, `"10 mm"`, 1)))
	if err != nil {
		t.Fatal(err)
	}
	if p.sameAntenna(q, "pair") || !p.sameAntenna(q, "stick") || p.sameAntenna(q, "none") {
		t.Error("a stack of another rod is the same, or a stick another")
	}
}

// The files of a plan are those of its ground and its bought antennas.
func TestFiles(t *testing.T) {
	text := strings.NewReplacer("files: [dem.tif]}", "files: [dem.tif, b.tif]}, cover: {raster: c.tif, classes: {1: {height: \"0 m\"}}}",
		"antennas:\n", "antennas:\n  t: {kind: table, pattern: t.csv, impedance: \"50 ohm\"}\n  u: {kind: cuts, horizontal: h.csv, vertical: v.csv, gain: \"9 dBi\", impedance: \"50 ohm\"}\n").Replace(threeSites)
	p, err := Parse("a.yaml", []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	want := []string{"dem.tif", "b.tif", "c.tif", "t.csv", "h.csv", "v.csv"}
	var got []string
	for _, f := range p.Files() {
		got = append(got, f.Path)
	}
	if strings.Join(got, " ") != strings.Join(want, " ") {
		t.Errorf("files %v, want %v", got, want)
	}
	if err := p.NamesOnly(want); err != nil {
		t.Error(err)
	}
	err = p.NamesOnly([]string{"dem.tif", "c.tif", "t.csv", "v.csv"})
	checkPlaces(t, err, text)
	for _, field := range []string{"ground.elevation.files[1]", "antennas.u.horizontal"} {
		if err == nil || !strings.Contains(err.Error(), field) {
			t.Errorf("%v, want %s in it", err, field)
		}
	}
}

// A station with another antenna at another height has mast and feeder grown along; its links are those
// of a plan that says so.
func TestRefitted(t *testing.T) {
	n := flatNetwork(t, threeSites)
	base := n.Stations["Base"]
	higher, err := n.Refitted(base, "stick", 18)
	if err != nil {
		t.Fatal(err)
	}
	if higher.AglM != 18 || higher.Run.LengthM != 28 || higher.Antenna.Name != "stick" || higher.MastAboveM != base.MastAboveM || base.AglM != 15 || base.Antenna.Name != "panel" {
		t.Errorf("%+v", higher)
	}
	if lower, err := n.Refitted(n.Stations["South"], "stick", 1); err != nil || lower.Run.LengthM != 0 {
		t.Errorf("a feeder of %g m, %v", lower.Run.LengthM, err)
	}
	// South lies 8 km south and 8 km west of East: a panel there looks north-east.
	if beam, err := n.Refitted(n.Stations["South"], "panel", 5); err != nil || math.Abs(beam.Mount.FacingDeg-45) > 0.2 {
		t.Errorf("faces %g degrees, %v", beam.Mount.FacingDeg, err)
	}
	changed := *n.Links[0]
	changed.From = higher
	got, err := n.Compute(&changed)
	if err != nil {
		t.Fatal(err)
	}
	planned := flatNetwork(t, strings.NewReplacer(`height: "20 m"`, `height: "23 m"`, `use: panel, above_ground: "15 m"`, `use: stick, above_ground: "18 m"`, `length: "25 m"`, `length: "28 m"`).Replace(threeSites))
	want, err := planned.Compute(planned.Links[0])
	if err != nil || math.Abs(got.MarginDB-want.MarginDB) > 1e-9 {
		t.Errorf("%g dB, in a plan %g dB, %v", got.MarginDB, want.MarginDB, err)
	}
	for _, tc := range []struct {
		antenna string
		aglM    float64
	}{{"none", 5}, {"stick", 0}, {"stick", 1001}, {"stick", math.NaN()}} {
		if _, err := n.Refitted(base, tc.antenna, tc.aglM); err == nil {
			t.Errorf("%s at %g m is taken", tc.antenna, tc.aglM)
		}
	}
}

// A station's antenna is asked for on its first link's channel unless another is named.
func TestInstalledAntenna(t *testing.T) {
	n := flatNetwork(t, threeSites)
	a, err := n.InstalledAntenna("Base", AntennaQuery{})
	if err != nil || a.FreqHz != (155.2e6+151.1e6)/2 || a.Mount.TiltDeg != -2 || math.Abs(a.Mount.FacingDeg-90) > 0.1 || a.Name != "panel" {
		t.Errorf("%g Hz, %+v, %v", a.FreqHz, a.Mount, err)
	}
	if a, err := n.InstalledAntenna("Base", AntennaQuery{Channel: "one"}); err != nil || a.FreqHz != 160e6 {
		t.Errorf("%g Hz, %v", a.FreqHz, err)
	}
	for _, q := range []struct {
		station string
		AntennaQuery
	}{{"Nowhere", AntennaQuery{}}, {"Base", AntennaQuery{Channel: "none"}}} {
		if _, err := n.InstalledAntenna(q.station, q.AntennaQuery); err == nil {
			t.Errorf("%s on %q is answered", q.station, q.Channel)
		}
	}
}

package plan

import (
	"context"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/terrain"
	"fellreach/terrain/raster"
)

// flatNetwork opens a plan on flat ground of 60 x 60 km around 47.5 N, 21 W.
func flatNetwork(t *testing.T, text string) *Network {
	t.Helper()
	folder := t.TempDir()
	grid := terrain.NewGrid(300, 300)
	for i := range grid.Cells {
		grid.Cells[i] = 100
	}
	if err := raster.WriteGeoTIFF(filepath.Join(folder, "dem.tif"), raster.GeoTIFF{
		Grid: grid, GeoTransform: [6]float64{470000, 200, 0, 5291000, 0, -200}, EPSG: 32627, Type: raster.Int16, Unit: "m",
	}); err != nil {
		t.Fatal(err)
	}
	p, err := Parse(filepath.Join(folder, "plan.yaml"), []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	n, err := p.Open()
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(n.Close)
	return n
}

// twoNets are two pairs of stations 3 km apart each; the pairs are 20 km from each other. Both use
// the channels given.
func twoNets(first, second string) string {
	return `format: 1
ground: {elevation: {files: [dem.tif]}}
aim: {availability: "50 %"}
channels:
  one: {frequency: "151.5 MHz", bandwidth: "12.5 kHz"}
  near: {frequency: "151.51 MHz", bandwidth: "12.5 kHz"}
  far: {frequency: "151.6 MHz", bandwidth: "12.5 kHz"}
radios: {r: {power: "5 W", sensitivity: "-117 dBm", capture: "40 dB"}}
antennas: {a: {kind: omni, gain: "2 dBi", impedance: "50 ohm"}}
sites:
  - {name: A, at: UTM 27N 490000 5260000, radio: r, antenna: {use: a, above_ground: "20 m"}}
  - {name: B, at: UTM 27N 493000 5260000, radio: r, antenna: {use: a, above_ground: "20 m"}}
  - {name: C, at: UTM 27N 510000 5260000, radio: r, antenna: {use: a, above_ground: "20 m"}}
  - {name: D, at: UTM 27N 513000 5260000, radio: r, antenna: {use: a, above_ground: "20 m"}}
links:
  - {from: A, to: B, channel: ` + first + `}
  - {from: C, to: D, channel: ` + second + `}
`
}

func disturbed(t *testing.T, text string) []string {
	t.Helper()
	r, err := flatNetwork(t, text).Run(context.Background(), nil)
	if err != nil {
		t.Fatal(err)
	}
	var found []string
	for _, l := range r.Links {
		for _, w := range l.Warnings {
			if strings.Contains(w.Text, " hears ") {
				found = append(found, w.String())
			}
		}
	}
	return found
}

// Receivers that want 40 dB over a transmitter 17 to 23 km away, from one 3 km away, are disturbed on
// the same frequency and on one that overlaps it, and not on another.
func TestInterference(t *testing.T) {
	for _, tc := range []struct {
		first, second string
		want          int
	}{{"one", "one", 4}, {"one", "near", 4}, {"one", "far", 0}} {
		found := disturbed(t, twoNets(tc.first, tc.second))
		if len(found) != tc.want {
			t.Errorf("channels %s and %s: %d directions disturbed, want %d: %q", tc.first, tc.second, len(found), tc.want, found)
		}
	}
	first := disturbed(t, twoNets("one", "one"))[0]
	for _, part := range []string{"B: on 151.5 MHz hears C at -", "for 1 % of the time", "where it needs 40 dB"} {
		if !strings.Contains(first, part) {
			t.Errorf("%q is not in %q", part, first)
		}
	}
}

// P.526 has no time percentage: the warning does not claim one.
func TestInterferenceOfMedian(t *testing.T) {
	found := disturbed(t, strings.Replace(twoNets("one", "one"), "format: 1", "format: 1\nmethod: p526", 1))
	if len(found) == 0 || strings.Contains(found[0], "% of the time") || !strings.Contains(found[0], "in the median") {
		t.Errorf("got %q", found)
	}
}

// Stations that talk with the same base take turns: none disturbs another's link to it.
func TestOneNetTakesTurns(t *testing.T) {
	text := strings.Replace(twoNets("one", "one"), "{from: C, to: D,", "{from: C, to: B,", 1)
	if found := disturbed(t, text); len(found) != 0 {
		t.Errorf("stations of one net disturb each other: %q", found)
	}
}

// A site stands for its stations where one link alone can be meant.
func TestSectionOfSites(t *testing.T) {
	stations := strings.NewReplacer(
		`5260000, radio: r, antenna: {use: a, above_ground: "20 m"}}`+"\n  - {name: B", `5260000, stations: {low: {radio: r, antenna: {use: a, above_ground: "10 m"}}, high: {radio: r, antenna: {use: a, above_ground: "20 m"}}}}`+"\n  - {name: B",
		"{from: A,", "{from: A/high,", "links:", "links:\n  - {from: A/low, to: C, channel: far}\n  - {from: A/high, to: C, channel: near}")
	n := flatNetwork(t, stations.Replace(twoNets("one", "one")))
	if l, err := n.Named("B..A"); err != nil || l.Title() != "A/high to B (one)" {
		t.Errorf("B..A names %v (%v)", l, err)
	}
	for named, want := range map[string]string{"A..C": "2 links run between A and C", "A..D": "no link runs from site to site", "A..A/low": "one site"} {
		if _, err := n.Named(named); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q gave %v, want %q", named, err, want)
		}
	}
}

// Links are found by name or by ends; ends without a link make a path of its own.
func TestSectionNames(t *testing.T) {
	named := strings.NewReplacer("{from: C, to: D, channel: one}", "{from: C, to: D, channel: one, name: east pair}", "links:", `  - {name: E, at: UTM 27N 490000 5264000, radio: r, antenna: {use: a, above_ground: "20 m"}}
  - {name: F, at: UTM 27N 493000 5264000, radio: r, antenna: {use: a, above_ground: "20 m"}}
links:`)
	n := flatNetwork(t, named.Replace(twoNets("one", "one")))
	for named, want := range map[string]string{"A..B": "A to B (one)", "B..A": "A to B (one)", "east pair": "east pair", "D..C": "east pair", "A .. C": "A to C (one)"} {
		l, err := n.Named(named)
		if err != nil || l.Title() != want {
			t.Errorf("%q names %v (%v), want %s", named, l, err, want)
		}
	}
	for named, want := range map[string]string{"A..X": "does not name two stations", "north": "there is no link", "": "there is no link", "A..A": "one site", "E..F": "have no links, and the plan has several channels"} {
		if _, err := n.Named(named); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q gave %v, want %q", named, err, want)
		}
	}
	l, err := n.Named("A..B")
	if err != nil {
		t.Fatal(err)
	}
	s, err := n.Section(l)
	if err != nil || s.Link.From.Name != "A" || len(s.RayM) != len(s.Profile.DistKm) {
		t.Errorf("section A..B: %v", err)
	}
}

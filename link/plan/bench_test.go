package plan

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"

	"fellreach/link"
	"fellreach/terrain"
	"fellreach/terrain/island"
	"fellreach/terrain/raster"
)

// islandPlan writes Hallin's heights and a plan of a count of links between 40 km of it into a
// folder and returns the plan.
func islandPlan(b *testing.B, links int) *Plan {
	b.Helper()
	folder := b.TempDir()
	grid := terrain.NewGrid(island.Cols, island.Rows)
	for i, dm := range island.Heights() {
		grid.Cells[i] = float32(dm) / 10
	}
	err := raster.WriteGeoTIFF(filepath.Join(folder, "dem.tif"), raster.GeoTIFF{
		Grid: grid, GeoTransform: [6]float64{island.WestM, island.CellM, 0, island.NorthM, 0, -island.CellM}, EPSG: island.EPSG, Type: raster.Int16, Scale: 0.1, Unit: "m",
	})
	if err != nil {
		b.Fatal(err)
	}
	var text strings.Builder
	text.WriteString("format: 1\nground: {elevation: {files: [dem.tif]}, step: \"30 m\"}\nmethod: p526\n" +
		"channels: {c: {frequency: \"151.5 MHz\", bandwidth: \"12.5 kHz\"}}\n" +
		"radios: {r: {power: \"5 W\", sensitivity: \"-117 dBm\"}}\n" +
		"antennas: {a: {kind: dipole, length: resonant, diameter: \"12 mm\", material: copper}}\nsites:\n")
	for i := range links {
		y := 5245000 + 35000*float64(i)/float64(links)
		fmt.Fprintf(&text, "  - {name: W%d, at: UTM 27N 556000 %.1f, radio: r, antenna: {use: a, above_ground: \"5 m\"}}\n", i, y)
		fmt.Fprintf(&text, "  - {name: E%d, at: UTM 27N 596000 %.1f, radio: r, antenna: {use: a, above_ground: \"5 m\"}}\n", i, y)
	}
	text.WriteString("links:\n")
	for i := range links {
		fmt.Fprintf(&text, "  - {from: W%d, to: E%d, fade: \"10 dB\"}\n", i, i)
	}
	path := filepath.Join(folder, "plan.yaml")
	if err := os.WriteFile(path, []byte(text.String()), 0o600); err != nil {
		b.Fatal(err)
	}
	p, err := Load(path)
	if err != nil {
		b.Fatal(err)
	}
	return p
}

// One link of 40 km at 30 m from a GeoTIFF: cold opens the plan's rasters anew each time, warm
// finds the ground in memory.
func BenchmarkLink(b *testing.B) {
	p := islandPlan(b, 1)
	b.Run("cold", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			n, err := p.Open()
			if err != nil {
				b.Fatal(err)
			}
			runOne(b, n)
			n.Close()
		}
	})
	b.Run("warm", func(b *testing.B) {
		n, err := p.Open()
		if err != nil {
			b.Fatal(err)
		}
		defer n.Close()
		b.ReportAllocs()
		for b.Loop() {
			runOne(b, n)
		}
	})
}

func runOne(b *testing.B, n *Network) *link.Result {
	r, err := n.Compute(n.Links[0])
	if err != nil {
		b.Fatal(err)
	}
	return r
}

// A plan of 1,000 links of 40 km, from opening its rasters to the last margin, on all cores.
func BenchmarkThousandLinks(b *testing.B) {
	p := islandPlan(b, 1000)
	b.ReportAllocs()
	for b.Loop() {
		n, err := p.Open()
		if err != nil {
			b.Fatal(err)
		}
		if _, err := n.Run(context.Background(), nil); err != nil {
			b.Fatal(err)
		}
		n.Close()
	}
	var m runtime.MemStats
	runtime.ReadMemStats(&m)
	b.ReportMetric(float64(m.Sys)/(1<<20), "MB-from-system")
}

// Parsing and checking a plan of 1,000 links and 2,000 sites.
func BenchmarkParseThousandLinks(b *testing.B) {
	data, err := os.ReadFile(islandPlan(b, 1000).file)
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("plan.yaml", data); err != nil {
			b.Fatal(err)
		}
	}
}

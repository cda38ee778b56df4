package report

import (
	"bytes"
	"encoding/json"
	"errors"
	"io"
	"strconv"
	"testing"

	"fellreach/link/propagation"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// reports are all that this package writes, on the made figures.
var reports = map[string]func(io.Writer) error{
	"made-links.txt":       func(w io.Writer) error { return LinksTable(w, madeResult()) },
	"made-lines.txt":       func(w io.Writer) error { return LinesTable(w, madeResult()) },
	"made-links.json":      func(w io.Writer) error { return LinksJSON(w, madeResult()) },
	"made-links.csv":       func(w io.Writer) error { return LinksCSV(w, madeResult()) },
	"made-links.geojson":   func(w io.Writer) error { return LinksGeoJSON(w, madeResult()) },
	"made-section.txt":     func(w io.Writer) error { return SectionTable(w, madeSection()) },
	"made-section.json":    func(w io.Writer) error { return SectionJSON(w, madeSection()) },
	"made-section.csv":     func(w io.Writer) error { return SectionCSV(w, madeSection()) },
	"made-section.geojson": func(w io.Writer) error { return SectionGeoJSON(w, madeSection()) },
	"made-section.svg":     func(w io.Writer) error { return SectionSVG(w, madeSection()) },
	"made-loss.txt":        func(w io.Writer) error { return LossTable(w, propagation.P526, madeLoss) },
	"made-loss.json":       func(w io.Writer) error { return LossJSON(w, propagation.P526, madeLoss) },
	"made-terrain.txt":     func(w io.Writer) error { return TerrainTable(w, madeRasters) },
	"made-terrain.json":    func(w io.Writer) error { return TerrainJSON(w, madeRasters) },
}

var madeLoss = propagation.Loss{DB: 131.25, Terms: propagation.Terms{Lbfs: 101.5, Ae: 8930.6}, Notes: []string{"a note of the method"}}

var madeRasters = []raster.Info{
	{
		Path: "north.tif", Driver: "GTiff", Cols: 40, Rows: 30, Bands: 1, CRS: "WGS 84 / UTM zone 1S", EPSG: 32701,
		Extent: raster.Box{173000, 8139000, 174200, 8139900}, LonLat: raster.Box{179.93, -16.82, 180.06, -16.81}, CellXM: 30.01, CellYM: 29.99,
		Type: "Int16", Unit: "ft", UnitM: 0.3048, Scale: 0.1, NoData: new(float64), Datum: "none is stated",
		Summary:  &raster.Summary{Cells: 1200, Voids: 3, MinM: -0.04, MaxM: 812.5, MinAt: orb.Point{179.94, -16.815}, MaxAt: orb.Point{-179.95, -16.812}},
		Warnings: []string{"a warning of the raster"},
	},
	{Path: "own.asc", Driver: "AAIGrid", Cols: 2, Rows: 2, Bands: 3, CRS: "a grid of its own", Scale: 1, UnitM: 1, Type: "Float32", Datum: "none is stated", Warnings: []string{}},
}

func TestGolden(t *testing.T) {
	for name, write := range reports {
		t.Run(name, func(t *testing.T) {
			var text bytes.Buffer
			if err := write(&text); err != nil {
				t.Fatal(err)
			}
			if name == "made-section.json" || name == "made-links.json" {
				goldenNumbers(t, name, text.Bytes())
				return
			}
			golden(t, name, text.String())
		})
	}
}

// goldenNumbers compares JSON that holds computed places and lengths in full precision: another
// machine may round their last bits differently, so they are cut to nine digits first.
func goldenNumbers(t *testing.T, name string, text []byte) {
	t.Helper()
	var value any
	if err := json.Unmarshal(text, &value); err != nil {
		t.Fatal(err)
	}
	short, err := json.MarshalIndent(shortened(value), "", "  ")
	if err != nil {
		t.Fatal(err)
	}
	golden(t, name, string(short)+"\n")
}

func shortened(value any) any {
	switch v := value.(type) {
	case map[string]any:
		for key := range v {
			v[key] = shortened(v[key])
		}
	case []any:
		for i := range v {
			v[i] = shortened(v[i])
		}
	case float64:
		return json.Number(strconv.FormatFloat(v, 'g', 9, 64))
	}
	return value
}

// brokenPipe is a reader that has gone away.
type brokenPipe struct{}

var errGone = errors.New("gone")

func (brokenPipe) Write([]byte) (int, error) { return 0, errGone }

// A report that cannot be written says so.
func TestBrokenPipe(t *testing.T) {
	for name, write := range reports {
		if err := write(brokenPipe{}); !errors.Is(err, errGone) {
			t.Errorf("%s: %v", name, err)
		}
	}
}

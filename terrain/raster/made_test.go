package raster

import (
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// made describes a raster that a test makes: square cells from the top left corner on.
type made struct {
	west, north, cell float64
	cols, rows, epsg  int
	value             func(x, y float64) float64 // at a cell's centre, in the raster's system
	edit              func(*GeoTIFF)             // what else is different, or nil
}

func noData(v float64) *float64 { return &v }

// write makes the raster as float32 metres with nodata -9999.
func (m made) write(t testing.TB, name string) string {
	t.Helper()
	grid := terrain.NewGrid(m.cols, m.rows)
	for row := range m.rows {
		for col := range m.cols {
			grid.Set(col, row, float32(m.value(m.west+(float64(col)+0.5)*m.cell, m.north-(float64(row)+0.5)*m.cell)))
		}
	}
	tiff := GeoTIFF{
		Grid: grid, GeoTransform: [6]float64{m.west, m.cell, 0, m.north, 0, -m.cell},
		EPSG: m.epsg, Type: Float32, NoData: noData(-9999), Unit: "m",
	}
	if m.edit != nil {
		m.edit(&tiff)
	}
	path := filepath.Join(t.TempDir(), name)
	if err := WriteGeoTIFF(path, tiff); err != nil {
		t.Fatal(err)
	}
	return path
}

// plane is ground that rises evenly, which bilinear interpolation keeps exactly.
func plane(x, y float64) float64 { return 100 + (x-400000)*0.01 + (y-5200000)*0.002 }

// hills are smooth ground 5 km from crest to crest in a system of metres.
func hills(x, y float64) float64 {
	return 300 + 200*math.Sin(2*math.Pi*x/5000)*math.Cos(2*math.Pi*y/5000)
}

// utmPlane is the usual small raster of the tests: 9 km by 6 km in UTM 27N.
func utmPlane() made {
	return made{west: 440000, north: 5266000, cell: 30, cols: 300, rows: 200, epsg: 32627, value: plane}
}

// utm returns the place of UTM 27N coordinates.
func utm(t testing.TB, easting, northing float64) orb.Point {
	t.Helper()
	p, err := Locate(terrain.Coordinates{EPSG: 32627, Easting: easting, Northing: northing})
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func open(t testing.TB, spec Spec) *Ground {
	t.Helper()
	g, err := Open(spec)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(g.Close)
	return g
}

// run runs one of GDAL's command-line tools, or skips the test where it is not installed.
func run(t testing.TB, stdin, tool string, args ...string) string {
	t.Helper()
	if _, err := exec.LookPath(tool); err != nil {
		t.Skipf("%s is not installed (Debian package gdal-bin)", tool)
	}
	command := exec.Command(tool, args...)
	command.Stdin = strings.NewReader(stdin)
	out, err := command.CombinedOutput()
	if err != nil {
		t.Fatalf("%s %v: %v\n%s", tool, args, err, out)
	}
	return string(out)
}

func writeFile(t testing.TB, name, content string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, []byte(content), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

package raster

import (
	"bytes"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/terrain"
)

// What is written, GDAL's own tool reads back: place, type, scale, unit, nodata, description.
func TestWriteGeoTIFF(t *testing.T) {
	m := utmPlane()
	m.edit = func(g *GeoTIFF) {
		g.Type, g.Scale, g.NoData, g.About = Int16, 0.1, noData(-32768), "a plane"
		g.Grid.Set(5, 6, float32(math.NaN()))
	}
	path := m.write(t, "written.tif")
	var info struct {
		DriverShortName string
		Size            [2]int
		GeoTransform    [6]float64
		Metadata        map[string]map[string]string
		Bands           []struct {
			Type          string
			NoDataValue   float64
			Scale, Offset float64
			Unit          string
		}
		Stac struct {
			EPSG int `json:"proj:epsg"`
		}
	}
	if err := json.Unmarshal([]byte(run(t, "", "gdalinfo", "-json", path)), &info); err != nil {
		t.Fatal(err)
	}
	band := info.Bands[0]
	if info.DriverShortName != "GTiff" || info.Size != [2]int{300, 200} || info.GeoTransform != [6]float64{440000, 30, 0, 5266000, 0, -30} ||
		band.Type != "Int16" || band.NoDataValue != -32768 || band.Scale != 0.1 || band.Offset != 0 || band.Unit != "m" ||
		info.Stac.EPSG != 32627 || info.Metadata[""]["TIFFTAG_IMAGEDESCRIPTION"] != "a plane" {
		t.Errorf("gdalinfo reads %+v", info)
	}
	value := func(col, row string) string {
		return strings.TrimSpace(run(t, "", "gdallocationinfo", "-valonly", path, col, row))
	}
	// The plane at 440315 east, 5265385 north: 100 + 403.15 + 130.77 m.
	if got := value("10", "20"); got != "6339" {
		t.Errorf("cell 10, 20 holds %s, want 6339", got)
	}
	if got := value("5", "6"); got != "-32768" {
		t.Errorf("the void holds %s", got)
	}
	if names, _ := os.ReadDir(filepath.Dir(path)); len(names) != 1 {
		t.Errorf("the folder holds %v", names)
	}
}

// Equal grids give equal bytes, compressed or not, and replace what was there.
func TestWriteSameBytes(t *testing.T) {
	for _, compress := range []bool{false, true} {
		m := utmPlane()
		m.edit = func(g *GeoTIFF) { g.Compress = compress }
		first, _ := os.ReadFile(m.write(t, "first.tif"))
		again := m.write(t, "again.tif")
		second, _ := os.ReadFile(again)
		if len(first) == 0 || !bytes.Equal(first, second) {
			t.Errorf("compress %v: two files of %d and %d bytes differ", compress, len(first), len(second))
		}
		if got, want := heightOf(t, again), plane(442015, 5263015); math.Abs(got-want) > 1e-4 {
			t.Errorf("compress %v: %g m, want %g", compress, got, want)
		}
	}
}

func TestWriteErrors(t *testing.T) {
	dir := t.TempDir()
	one := func(v float64) *terrain.Grid {
		g := terrain.NewGrid(2, 2)
		for i := range g.Cells {
			g.Cells[i] = 1
		}
		g.Set(1, 0, float32(v))
		return g
	}
	kept := filepath.Join(dir, "kept.tif")
	if err := os.WriteFile(kept, []byte("old"), 0o644); err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct {
		name string
		path string
		tiff GeoTIFF
		want string
	}{
		{"too high", kept, GeoTIFF{Grid: one(4000), EPSG: 32627, Type: Int16, Scale: 0.1}, "column 1, row 0 holds 4000"},
		{"nodata itself", kept, GeoTIFF{Grid: one(7), EPSG: 32627, Type: Uint8, NoData: noData(7)}, "column 1, row 0 holds 7"},
		{"void without nodata", kept, GeoTIFF{Grid: one(math.NaN()), EPSG: 32627, Type: Uint8}, "column 1, row 0 is void"},
		{"infinite", kept, GeoTIFF{Grid: one(math.Inf(1)), EPSG: 32627, Type: Float32}, "holds +Inf"},
		{"nodata of another type", kept, GeoTIFF{Grid: one(math.NaN()), EPSG: 32627, Type: Uint8, NoData: noData(-9999)}, "nodata number -9999 is none that its cell type holds"},
		{"nodata NaN", kept, GeoTIFF{Grid: one(math.NaN()), EPSG: 32627, Type: Int16, NoData: noData(math.NaN())}, "nodata number NaN"},
		{"no system", kept, GeoTIFF{Grid: one(1), EPSG: 99999, Type: Float32}, "EPSG:99999"},
		{"no folder", filepath.Join(dir, "absent", "a.tif"), GeoTIFF{Grid: one(1), EPSG: 32627}, "no such file or directory"},
	} {
		err := WriteGeoTIFF(tc.path, tc.tiff)
		if err == nil || !strings.Contains(err.Error(), tc.want) || !strings.Contains(err.Error(), filepath.Base(tc.path)) {
			t.Errorf("%s: %v, want %q", tc.name, err, tc.want)
		}
	}
	if old, _ := os.ReadFile(kept); string(old) != "old" {
		t.Error("a file that could not be written replaced the old one")
	}
	if names, _ := os.ReadDir(dir); len(names) != 1 {
		t.Errorf("left behind: %v", names)
	}
}

package raster

import (
	"context"
	"errors"
	"math"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/paulmach/orb"
)

// Hand-worked: the plane of 300 by 200 cells rises to the north-east.
func TestInspect(t *testing.T) {
	m := holed(math.NaN(), [2]int{5, 6}, [2]int{7, 8}, [2]int{9, 9})
	path := m.write(t, "plane.tif")
	var shares []float64
	info, err := Inspect(context.Background(), path, func(done float64) { shares = append(shares, done) })
	if err != nil {
		t.Fatal(err)
	}
	if info.Path != path || info.Driver != "GTiff" || info.Cols != 300 || info.Rows != 200 || info.CRS != "WGS 84 / UTM zone 27N" || info.EPSG != 32627 ||
		info.Type != "Float32" || info.Unit != "m" || info.UnitM != 1 || info.Scale != 1 || info.Offset != 0 || *info.NoData != -9999 {
		t.Errorf("%+v", info)
	}
	if info.Extent != (Box{440000, 5260000, 449000, 5266000}) || len(info.Warnings) != 0 || !strings.Contains(info.Datum, "no vertical datum") {
		t.Errorf("extent %v, warnings %q, datum %q", info.Extent, info.Warnings, info.Datum)
	}
	s := info.Summary
	if s.Cells != 60000 || s.Voids != 3 || s.Implausible != 0 || s.VoidShare() != 3.0/60000 {
		t.Errorf("%+v", *s)
	}
	if want := plane(440015, 5260015); math.Abs(s.MinM-want) > 1e-4 {
		t.Errorf("least %g m, want %g", s.MinM, want)
	}
	if want := plane(448985, 5265985); math.Abs(s.MaxM-want) > 1e-4 {
		t.Errorf("greatest %g m, want %g", s.MaxM, want)
	}
	for at, want := range map[orb.Point]orb.Point{s.MinAt: utm(t, 440015, 5260015), s.MaxAt: utm(t, 448985, 5265985)} {
		if missM, _, _ := Inverse(at, want); missM > 1e-3 {
			t.Errorf("an extreme at %v, want %v", at, want)
		}
	}
	for i, corner := range []orb.Point{utm(t, 440000, 5260000), utm(t, 449000, 5260000), utm(t, 449000, 5266000), utm(t, 440000, 5266000)} {
		if corner[0] < info.LonLat[0]-1e-9 || corner[0] > info.LonLat[2]+1e-9 || corner[1] < info.LonLat[1]-1e-9 || corner[1] > info.LonLat[3]+1e-9 {
			t.Errorf("corner %d, %v, is outside %v", i, corner, info.LonLat)
		}
	}
	if !slices.IsSorted(shares) || shares[len(shares)-1] != 1 {
		t.Errorf("progress %v", shares)
	}
}

// However a file stores its cells, each is counted once.
func TestInspectLayouts(t *testing.T) {
	m := holed(math.NaN(), column(5, 0, 99)...)
	m.cols, m.rows = 1500, 1100 // over one window
	base := m.write(t, "rows.tif")
	layouts := map[string]string{"rows": base}
	for name, options := range map[string][]string{
		"tiles":     {"-co", "TILED=YES", "-co", "BLOCKXSIZE=64", "-co", "BLOCKYSIZE=512"},
		"one strip": {"-co", "BLOCKYSIZE=1100"},
	} {
		layouts[name] = filepath.Join(t.TempDir(), "layout.tif")
		run(t, "", "gdal_translate", append(append([]string{"-q"}, options...), base, layouts[name])...)
	}
	for name, path := range layouts {
		info, err := Inspect(context.Background(), path, nil)
		if err != nil || info.Summary.Cells != 1500*1100 || info.Summary.Voids != 100 {
			t.Errorf("%s: %v, %+v", name, err, info.Summary)
		}
	}
}

func TestInspectWarnings(t *testing.T) {
	undeclared := holed(-32768, column(3, 0, 9)...)
	edit := undeclared.edit
	undeclared.edit = func(g *GeoTIFF) { edit(g); g.NoData = nil }
	void := utmPlane()
	void.value = func(x, y float64) float64 { return math.NaN() }
	ellipsoidal := filepath.Join(t.TempDir(), "3d.tif")
	degrees := made{west: 7, north: 48, cell: 0.001, cols: 10, rows: 10, epsg: 4326, value: func(x, y float64) float64 { return 1 }}
	run(t, "", "gdal_translate", "-q", "-a_srs", "EPSG:4979", degrees.write(t, "2d.tif"), ellipsoidal)
	egm := filepath.Join(t.TempDir(), "egm.vrt")
	run(t, "", "gdal_translate", "-q", "-of", "VRT", "-a_srs", "EPSG:4326+5773", degrees.write(t, "2d.tif"), egm)

	for _, tc := range []struct{ name, path, warning, datum string }{
		{"undeclared nodata", undeclared.write(t, "u.tif"), "10 cells hold values such as -32768 m, no height on Earth; the file declares no nodata value", "no vertical datum"},
		{"wrong nodata", holed(12345, [2]int{0, 0}).write(t, "w.tif"), "1 cells hold values such as 12345 m, no height on Earth; the declared nodata value is -9999", "no vertical datum"},
		{"all void", void.write(t, "v.tif"), "every cell is void", "no vertical datum"},
		{"ellipsoidal", ellipsoidal, "ellipsoidal heights", "the file states ellipsoidal heights"},
		{"EGM96", egm, "", "the file states EGM96 height"},
	} {
		info, err := Inspect(context.Background(), tc.path, nil)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
			continue
		}
		if all := strings.Join(info.Warnings, "\n"); !strings.Contains(all, tc.warning) || tc.warning == "" && all != "" {
			t.Errorf("%s: warnings %q lack %q", tc.name, all, tc.warning)
		}
		if !strings.Contains(info.Datum, tc.datum) {
			t.Errorf("%s: datum %q, want %q", tc.name, info.Datum, tc.datum)
		}
	}
}

// A land-cover raster with colours is no ground, but what it holds can be asked.
func TestInspectPicture(t *testing.T) {
	path := filepath.Join(t.TempDir(), "picture.tif")
	run(t, "", "gdal_translate", "-q", "-ot", "Byte", "-b", "1", "-b", "1", "-b", "1", "-co", "PHOTOMETRIC=RGB", utmPlane().write(t, "plane.tif"), path)
	info, err := Inspect(context.Background(), path, nil)
	if err != nil || info.Bands != 3 || info.Type != "Byte" {
		t.Errorf("%v, %+v", err, info)
	}
}

func TestInspectStops(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Inspect(ctx, utmPlane().write(t, "plane.tif"), nil); !errors.Is(err, context.Canceled) {
		t.Errorf("%v, want context.Canceled", err)
	}
	if _, err := Inspect(context.Background(), "absent.tif", nil); err == nil || !strings.Contains(err.Error(), "raster absent.tif") {
		t.Errorf("%v", err)
	}
	if _, err := Inspect(context.Background(), truncate(t, utmPlane().write(t, "cut.tif")), nil); err == nil || !strings.Contains(err.Error(), "cut.tif") {
		t.Errorf("a truncated file: %v", err)
	}
}

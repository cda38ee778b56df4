package raster

import (
	"errors"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/terrain"
)

// Sizes by definition: the international foot 0.3048 m, the US survey foot 1200/3937 m.
func TestUnitSizeM(t *testing.T) {
	for _, tc := range []struct {
		unit string
		want float64
	}{
		{"", 1},
		{"m", 1},
		{"Metre", 1},
		{" meters ", 1},
		{"cm", 0.01},
		{"dm", 0.1},
		{"km", 1000},
		{"mm", 0.001},
		{"ft", 0.3048},
		{"Feet", 0.3048},
		{"foot", 0.3048},
		{"US survey foot", 0.304800609601219},
		{"us_survey_foot", 0.304800609601219},
		{"US-ft", 0.304800609601219},
		{"ftUS", 0.304800609601219},
	} {
		if got, err := unitSizeM(tc.unit); err != nil || math.Abs(got-tc.want) > 1e-15 {
			t.Errorf("unitSizeM(%q) = %.15g, %v, want %.15g", tc.unit, got, err, tc.want)
		}
	}
	for _, unit := range []string{"furlong", "degC", "dB", "0.1 m"} {
		if _, err := unitSizeM(unit); err == nil || !strings.Contains(err.Error(), unit) {
			t.Errorf("unitSizeM(%q): %v", unit, err)
		}
	}
}

// heightOf opens a raster and returns the height of one of its places, 442015 east, 5263015 north
// of UTM 27N, which is a cell's centre of utmPlane.
func heightOf(t *testing.T, path string) float64 {
	t.Helper()
	h, err := open(t, Spec{Elevation: []string{path}}).HeightAslM(utm(t, 442015, 5263015))
	if err != nil {
		t.Fatal(err)
	}
	return h
}

// Whatever way a file writes its heights, the ground has the same: stored numbers, scale, offset
// and unit are honoured. Each is made by GDAL's own tools from the plane, or written with a scale.
func TestHeightsHoweverStored(t *testing.T) {
	want := plane(442015, 5263015)
	base := utmPlane().write(t, "plane.tif")
	translate := func(args ...string) func() string {
		return func() string {
			path := filepath.Join(t.TempDir(), "made.tif")
			run(t, "", "gdal_translate", append(append([]string{"-q"}, args...), base, path)...)
			return path
		}
	}
	withVertical := func(epsg string) func() string {
		inFeet := utmPlane()
		inFeet.value = func(x, y float64) float64 { return plane(x, y) * 3937 / 1200 }
		inFeet.edit = func(g *GeoTIFF) { g.Unit = "" }
		path := inFeet.write(t, "ftus.tif")
		made := filepath.Join(t.TempDir(), "made.vrt")
		run(t, "", "gdal_translate", "-q", "-of", "VRT", "-a_srs", epsg, path, made)
		return func() string { return made }
	}
	decimetres := utmPlane()
	decimetres.edit = func(g *GeoTIFF) { g.Type, g.Scale, g.NoData = Int16, 0.1, noData(-32768) }
	feet := utmPlane()
	feet.value = func(x, y float64) float64 { return plane(x, y) / 0.3048 }
	feet.edit = func(g *GeoTIFF) { g.Unit = "ft" }

	for _, tc := range []struct {
		name string
		path func() string
		tolM float64 // half a step of the stored numbers
	}{
		{"float32", func() string { return base }, 1e-4},
		{"float64", translate("-ot", "Float64"), 1e-4},
		{"int16 metres", translate("-ot", "Int16"), 0.5},
		{"uint32 metres", translate("-ot", "UInt32"), 0.5},
		{"int16 decimetres", func() string { return decimetres.write(t, "dm.tif") }, 0.05},
		{"scale 0.01, offset 150", translate("-ot", "Int32", "-scale", "150", "1150", "0", "100000", "-a_scale", "0.01", "-a_offset", "150"), 0.005},
		{"feet", func() string { return feet.write(t, "feet.tif") }, 1e-4},
		{"US survey feet by the vertical system", withVertical("EPSG:32627+6360"), 1e-4},
		{"metres by the vertical system", translate("-a_srs", "EPSG:32627+5773"), 1e-4},
		{"ESRI text grid", func() string {
			path := filepath.Join(t.TempDir(), "made.asc")
			run(t, "", "gdal_translate", "-q", "-of", "AAIGrid", base, path)
			return path
		}, 1e-3},
	} {
		if got := heightOf(t, tc.path()); math.Abs(got-want) > tc.tolM {
			t.Errorf("%s: %.4f m, want %.4f within %g", tc.name, got, want, tc.tolM)
		}
	}
}

// Nodata numbers, NaN, infinities and cells that a mask leaves out are voids; a number near the
// nodata number is not.
func TestVoids(t *testing.T) {
	dir := t.TempDir()
	ascii := "ncols 4\nnrows 2\nxllcorner 440000\nyllcorner 5260000\ncellsize 30\nNODATA_value -9999\n" +
		"-9999 7 7 7\n7 7 7 7\n"
	text := filepath.Join(dir, "void.asc")
	for name, content := range map[string]string{"void.asc": ascii, "void.prj": "PROJCS[\"WGS_1984_UTM_Zone_27N\",GEOGCS[\"GCS_WGS_1984\",DATUM[\"D_WGS_1984\",SPHEROID[\"WGS_1984\",6378137,298.257223563]],PRIMEM[\"Greenwich\",0],UNIT[\"Degree\",0.017453292519943295]],PROJECTION[\"Transverse_Mercator\"],PARAMETER[\"latitude_of_origin\",0],PARAMETER[\"central_meridian\",-21],PARAMETER[\"scale_factor\",0.9996],PARAMETER[\"false_easting\",500000],PARAMETER[\"false_northing\",0],UNIT[\"Meter\",1]]"} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(content), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	masked := filepath.Join(dir, "masked.tif")
	run(t, "", "gdal_translate", "-q", "-b", "1", "-mask", "1", "-a_nodata", "none", "--config", "GDAL_TIFF_INTERNAL_MASK", "YES",
		holed(0, [2]int{0, 199}).write(t, "zero.tif"), masked)
	inf := holed(0, [2]int{0, 199})
	inf.edit = func(g *GeoTIFF) { g.Grid.Set(0, 199, float32(math.NaN())); g.NoData = noData(math.NaN()) }
	lowest := holed(math.NaN(), [2]int{0, 199})
	edit := lowest.edit
	lowest.edit = func(g *GeoTIFF) { edit(g); g.NoData = noData(-3.4028234663852886e38) }

	for _, tc := range []struct {
		name, path string
		e, n       float64
	}{
		{"text nodata", text, 440015, 5260045},
		{"mask", masked, 440015, 5260015},
		{"NaN", inf.write(t, "nan.tif"), 440015, 5260015},
		{"lowest float", lowest.write(t, "lowest.tif"), 440015, 5260015},
	} {
		g := open(t, Spec{Elevation: []string{tc.path}})
		_, err := g.HeightAslM(utm(t, tc.e, tc.n))
		var void *terrain.VoidError
		if !errors.As(err, &void) || void.Outside {
			t.Errorf("%s: %v, want a void", tc.name, err)
		}
		if _, err := g.HeightAslM(utm(t, tc.e+61, tc.n)); err != nil {
			t.Errorf("%s, two cells on: %v", tc.name, err)
		}
	}
}

// Table of what counts as void, by the stored number.
func TestIsVoid(t *testing.T) {
	single := valueRule{single: true, hasNoData: true, noData: 0.1}
	double := valueRule{hasNoData: true, noData: 0.1}
	none := valueRule{}
	for _, tc := range []struct {
		name   string
		rule   valueRule
		stored float64
		want   bool
	}{
		{"single rounds the nodata number", single, float64(float32(0.1)), true},
		{"single, another", single, 0.2, false},
		{"double", double, 0.1, true},
		{"double does not round", double, float64(float32(0.1)), false},
		{"NaN", none, math.NaN(), true},
		{"infinite", none, math.Inf(-1), true},
		{"zero", none, 0, false},
		{"-32768 undeclared", none, -32768, false},
	} {
		if got := tc.rule.isVoid(tc.stored); got != tc.want {
			t.Errorf("%s: %v, want %v", tc.name, got, tc.want)
		}
	}
}

func TestHugeClass(t *testing.T) {
	big := utmPlane()
	big.value = func(x, y float64) float64 { return 1 << 24 }
	path := filepath.Join(t.TempDir(), "classes.tif")
	run(t, "", "gdal_translate", "-q", "-ot", "UInt32", "-scale", "0", "16777216", "0", "16777217", big.write(t, "big.tif"), path)
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: path})
	_, err := g.Profile(utm(t, 441000, 5263000), utm(t, 442000, 5263000))
	if err == nil || !strings.Contains(err.Error(), "class 16777217 is over 16777216") {
		t.Errorf("%v", err)
	}
}

package raster

import (
	"fmt"
	"math"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/paulmach/orb"
)

// At cell centres the height is the cell's value, as gdallocationinfo reads it with GDAL's own
// reprojection from longitude and latitude.
func TestAgainstLocationInfo(t *testing.T) {
	m := utmPlane()
	m.value = hills
	path := m.write(t, "hills.tif")
	g := open(t, Spec{Elevation: []string{path}})
	var centres strings.Builder
	for i := range 50 {
		fmt.Fprintf(&centres, "%d %d\n", 440015+30*(i*37%300), 5260015+30*(i*53%200))
	}
	places := run(t, centres.String(), "gdaltransform", "-output_xy", "-s_srs", "EPSG:32627", "-t_srs", "EPSG:4326")
	values := strings.Fields(run(t, places, "gdallocationinfo", "-valonly", "-wgs84", path))
	for i, line := range strings.Split(strings.TrimSpace(places), "\n") {
		var at orb.Point
		if _, err := fmt.Sscan(line, &at[0], &at[1]); err != nil {
			t.Fatal(err)
		}
		want, err := strconv.ParseFloat(values[i], 64)
		if err != nil {
			t.Fatal(err)
		}
		got, err := g.HeightAslM(at)
		if err != nil || math.Abs(got-want) > 1e-3 { // a place to 1e-6 m on slopes up to 0.35, float32
			t.Errorf("%s: %.5f m, %v, want %.5f", line, got, err, want)
		}
	}
}

// The same ground in another reference system, on another datum, rotated, or as whole metres gives
// the same profile. GDAL's warper makes each copy, by cubic convolution; the hills bend so
// that two interpolations over 30 m differ by less than 0.1 m, while a datum shift that is left
// out would move the slopes by up to 25 m.
func TestSameGroundInAnySystem(t *testing.T) {
	british := made{west: 330000, north: 680000, cell: 30, cols: 400, rows: 300, epsg: 27700, value: hills}
	base := british.write(t, "bng.tif")
	from, to := orb.Point{-3.08, 55.94}, orb.Point{-2.96, 56.00}
	want, err := open(t, Spec{Elevation: []string{base}}).Profile(from, to)
	if err != nil {
		t.Fatal(err)
	}
	warp := func(args ...string) string {
		path := filepath.Join(t.TempDir(), "warped.tif")
		run(t, "", "gdalwarp", append(append([]string{"-q", "-r", "cubic", "-et", "0"}, args...), base, path)...)
		return path
	}
	// From a copy on WGS 84: between two other datums PROJ has several ways, metres apart.
	onWGS84 := warp("-t_srs", "EPSG:32630", "-tr", "30", "30")
	oblique := filepath.Join(t.TempDir(), "oblique.tif")
	run(t, "", "gdalwarp", "-q", "-r", "cubic", "-et", "0", "-tr", "30", "30",
		"-t_srs", "+proj=omerc +lat_0=56 +lonc=-3 +alpha=30 +gamma=0 +ellps=bessel +towgs84=100,50,-300", onWGS84, oblique)
	for _, tc := range []struct{ name, path string }{
		{"WGS 84 degrees", warp("-t_srs", "EPSG:4326", "-tr", "0.0004", "0.00025")},
		{"UTM", onWGS84},
		{"ETRS89 LAEA", warp("-t_srs", "EPSG:3035", "-tr", "30", "30")},
		{"Web Mercator", warp("-t_srs", "EPSG:3857", "-tr", "40", "40")},
		{"OSGB36 degrees", warp("-t_srs", "EPSG:4277", "-tr", "0.0004", "0.00025")},
		{"UTM with heights of EGM96", warp("-t_srs", "EPSG:32630+5773", "-tr", "30", "30", "-novshift")},
		{"polar stereographic", warp("-t_srs", "EPSG:3995", "-tr", "30", "30")},
		{"oblique on a datum of its own, no code", oblique},
	} {
		got, err := open(t, Spec{Elevation: []string{tc.path}, StepM: 30.01}).Profile(from, to)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
			continue
		}
		worstM := 0.0
		for i, h := range got.AslM {
			k := got.DistKm[i] / want.LengthKm() * float64(len(want.AslM)-1)
			j := min(int(k), len(want.AslM)-2)
			w := want.AslM[j] + (k-float64(j))*(want.AslM[j+1]-want.AslM[j])
			worstM = max(worstM, math.Abs(h-w))
		}
		t.Logf("%s: within %.3f m", tc.name, worstM)
		if worstM > 0.25 { // three linear interpolations over 30 m, the coarse copies over 45 m
			t.Errorf("%s: up to %.3f m apart", tc.name, worstM)
		}
	}
}

// A geotransform may turn the cells: here by 30 degrees. The heights are those of the plane.
func TestRotatedGeotransform(t *testing.T) {
	m := utmPlane()
	sin, cos := math.Sincos(30 * math.Pi / 180)
	m.edit = func(g *GeoTIFF) {
		g.GeoTransform = [6]float64{440000, 30 * cos, 30 * sin, 5266000, 30 * sin, -30 * cos}
		for i := range g.Grid.Cells {
			at := affine(g.GeoTransform).apply(float64(i%g.Grid.Cols)+0.5, float64(i/g.Grid.Cols)+0.5)
			g.Grid.Cells[i] = float32(plane(at[0], at[1]))
		}
	}
	g := open(t, Spec{Elevation: []string{m.write(t, "turned.tif")}})
	if info := g.Files()[0]; math.Abs(info.CellXM-30) > 0.02 || math.Abs(info.CellYM-30) > 0.02 {
		t.Errorf("cells of %g by %g m, want 30", info.CellXM, info.CellYM)
	}
	p, err := g.Profile(utm(t, 442000, 5266000), utm(t, 447000, 5267500))
	if err != nil {
		t.Fatal(err)
	}
	onPlane(t, p, 1e-3)
}

// A raster across the date line, with longitudes counted on beyond 180, or from 0 to 360.
func TestDateLine(t *testing.T) {
	value := func(x, y float64) float64 { return 100 + 50*(x-180) + 20*(y+17) }
	for name, m := range map[string]made{
		"179 to 181": {west: 179, north: -16, cell: 0.01, cols: 200, rows: 200, epsg: 4326, value: value},
		"0 to 360":   {west: 0, north: -16, cell: 0.5, cols: 720, rows: 8, epsg: 4326, value: func(x, y float64) float64 { return 7 }},
		"round":      {west: -180, north: -16, cell: 0.5, cols: 720, rows: 8, epsg: 4326, value: func(x, y float64) float64 { return 7 }},
	} {
		g := open(t, Spec{Elevation: []string{m.write(t, "date.tif")}, StepM: 500})
		p, err := g.Profile(orb.Point{179.5, -16.6}, orb.Point{-179.5, -17.3})
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		for i, at := range p.Points {
			lon := at.Lon()
			if lon < 0 {
				lon += 360
			}
			want := 7.0
			if name == "179 to 181" {
				want = value(lon, at.Lat())
			}
			if math.Abs(p.AslM[i]-want) > 1e-4 {
				t.Errorf("%s: %g m at %v, want %g", name, p.AslM[i], at, want)
			}
		}
	}
}

// A raster around the pole: its extent holds it, and a path crosses it.
func TestPole(t *testing.T) {
	m := made{west: -50000, north: 50000, cell: 1000, cols: 100, rows: 100, epsg: 3413, value: func(x, y float64) float64 { return 10 }}
	g := open(t, Spec{Elevation: []string{m.write(t, "pole.tif")}})
	p, err := g.Profile(orb.Point{10, 89.9}, orb.Point{-170, 89.8})
	if err != nil || math.Abs(p.LengthKm()-33.508) > 0.01 { // 0.3 degrees of 111.69 km
		t.Errorf("%v, %g km", err, p.LengthKm())
	}
	if box := g.Files()[0].LonLat; box[0] != -180 || box[2] != 180 || box[3] != 90 || math.Abs(box[1]-89.347) > 0.002 {
		// A corner is 70.71 km away on the map, whose scale at the pole is (1+sin 70 deg)/2: 72.9 km.
		t.Errorf("extent %v, want all around the pole from 89.347 N", box)
	}
}

func TestBallparkWarning(t *testing.T) {
	m := made{west: 7, north: 48, cell: 0.001, cols: 10, rows: 10, epsg: 4326, value: func(x, y float64) float64 { return 1 }}
	path := filepath.Join(t.TempDir(), "odd.tif")
	run(t, "", "gdal_translate", "-q", "-a_srs", `GEOGCS["odd",DATUM["odd",SPHEROID["Bessel",6377397.155,299.1528128]],PRIMEM["Greenwich",0],UNIT["degree",0.0174532925199433]]`, m.write(t, "m.tif"), path)
	warnings := strings.Join(open(t, Spec{Elevation: []string{path}}).Files()[0].Warnings, "\n")
	if !strings.Contains(warnings, "no datum shift") {
		t.Errorf("warnings %q", warnings)
	}
}

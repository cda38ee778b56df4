package raster

import (
	"bytes"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// Source: GDAL's own tools, and its rules for a cloud-optimised GeoTIFF: what it lays out as one it
// names so in the image structure.
func TestWriteCOG(t *testing.T) {
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "a.tif")}})
	frame, err := g.Frame(utm(t, 444500, 5263000), 2000, 10)
	if err != nil {
		t.Fatal(err)
	}
	cells := make([]float32, frame.Cols*frame.Rows)
	for i := range cells {
		cells[i] = float32(100 + 30*math.Sin(float64(i)/777))
	}
	cells[5] = float32(math.NaN())
	var written [2][]byte
	for i := range written {
		path := filepath.Join(t.TempDir(), "map.tif")
		if err := WriteCOG(path, COG{Frame: frame, Cells: cells, Unit: "dB", About: "a map", Small: i == 9}); err != nil {
			t.Fatal(err)
		}
		if written[i], err = os.ReadFile(path); err != nil {
			t.Fatal(err)
		}
		info := run(t, "", "gdalinfo", path)
		for _, want := range []string{"LAYOUT=COG", "NoData Value=-9999", "Unit Type: dB", "TIFFTAG_IMAGEDESCRIPTION=a map", "WGS 84 / UTM zone 27N", "Pixel Size = (10.000000000000000,-10.000000000000000)"} {
			if !strings.Contains(info, want) {
				t.Errorf("gdalinfo lacks %q:\n%s", want, info)
			}
		}
	}
	if !bytes.Equal(written[0], written[1]) {
		t.Error("two writings differ")
	}
}

// Source: geodesics and coordinates by PROJ at single places. The stated bound is 1 m; the systems
// are a UTM zone, degrees, and an equal-area projection of which a cell is no cell of the Earth.
func TestDiscPlaces(t *testing.T) {
	for _, tc := range []struct {
		name   string
		ground made
		site   orb.Point
	}{
		{"UTM", made{west: 300000, north: 5420000, cell: 2000, cols: 160, rows: 160, epsg: 32627, value: hillsAnywhere}, orb.Point{-20.118, 47.5231}},
		{"degrees", made{west: -24, north: 50, cell: 0.02, cols: 400, rows: 250, epsg: 4326, value: hillsAnywhere}, orb.Point{-20.118, 47.5231}},
		{"degrees, far north", made{west: 0, north: 85, cell: 0.1, cols: 500, rows: 80, epsg: 4326, value: hillsAnywhere}, orb.Point{22, 80.5}},
		{"equal area", made{west: 2200000, north: 3300000, cell: 2000, cols: 400, rows: 400, epsg: 3035, value: hillsAnywhere}, orb.Point{-2.5, 50}},
	} {
		g := open(t, Spec{Elevation: []string{tc.ground.write(t, "a.tif")}})
		f, worst := g.elevation[0], 0.0
		for _, radiusM := range []float64{3000, 150_000} {
			d := &terrain.Disc{Site: tc.site, RadiusM: radiusM}
			var err error
			if d.Places, err = discMesh(radiusM, func(nodes []orb.Point) error { return fromPlane(tc.site, nodes) }); err != nil {
				t.Fatal(err)
			}
			mesh, err := f.discMesh(d)
			if err != nil {
				t.Fatal(err)
			}
			for i := range 1000 {
				az, distM := float64(i)*37.7, radiusM*math.Sqrt(float64(i)/1000)
				sin, cos := math.Sincos(az * math.Pi / 180)
				at := []orb.Point{Direct(tc.site, az, distM)}
				places := []orb.Point{at[0]}
				if err := f.crs.forward(at); err != nil {
					t.Fatal(err)
				}
				wantCol, wantRow := f.cell(at[0])
				col, row := mesh.At(distM*sin, distM*cos)
				eastM, northM := tc.ground.cell, tc.ground.cell
				if tc.ground.epsg == 4326 {
					northM *= 111_320
					eastM = northM * math.Cos(places[0].Lat()*math.Pi/180)
				}
				worst = math.Max(worst, math.Hypot((col-wantCol)*eastM, (row-wantRow)*northM))
			}
		}
		if worst > 0.5 {
			t.Errorf("%s: places are off by %.3g m", tc.name, worst)
		}
		t.Logf("%s: places within %.3g m", tc.name, worst)
	}
}

func hillsAnywhere(x, y float64) float64 { return 300 + 200*math.Sin(x)*math.Cos(y) }

// Source: PROJ's transform of single cell centres, and the geodesic to each: the cells of a frame
// are where it says, in the raster's own system on the raster's own cell borders, or in UTM.
func TestFrame(t *testing.T) {
	site := utm(t, 444510, 5263005)
	degrees := made{west: -21, north: 48, cell: 0.001, cols: 2000, rows: 1000, epsg: 4326, value: hillsAnywhere}
	for _, tc := range []struct {
		name   string
		ground made
		epsg   string
	}{{"own system", utmPlane(), "EPSG:32627"}, {"UTM for degrees", degrees, "EPSG:32627"}} {
		g := open(t, Spec{Elevation: []string{tc.ground.write(t, "a.tif")}})
		for _, cellM := range []float64{30, 500} {
			const radiusM = 40_000
			f, err := g.Frame(site, radiusM, cellM)
			if err != nil {
				t.Fatal(err)
			}
			if tc.name == "own system" && math.Mod(f.GeoTransform[0]-tc.ground.west, cellM) != 0 {
				t.Errorf("%s: the frame begins at %g, off the raster's borders", tc.name, f.GeoTransform[0])
			}
			crs, err := transformTo(tc.epsg)
			if err != nil {
				t.Fatal(err)
			}
			for i := range 500 {
				col, row := (i*7919)%f.Cols, (i*104729)%f.Rows
				at := []orb.Point{affine(f.GeoTransform).apply(float64(col)+0.5, float64(row)+0.5)}
				if err := crs.inverse(at); err != nil {
					t.Fatal(err)
				}
				distM, az, _ := Inverse(site, at[0])
				sin, cos := math.Sincos(az * math.Pi / 180)
				east, north := f.Plane.At(float64(col), float64(row))
				if off := math.Hypot(east-distM*sin, north-distM*cos); off > 0.05 {
					t.Errorf("%s, %g m: cell %d, %d is off by %.3g m", tc.name, cellM, col, row, off)
				}
			}
		}
	}
}

// Source: Ground.HeightAslM and CoverAt, which ask the files place by place.
func TestDiscIsTheGround(t *testing.T) {
	first := utmPlane()
	first.value = func(x, y float64) float64 {
		if x > 443000 && x < 444000 {
			return math.NaN()
		}
		return hills(x, y)
	}
	wide := made{west: 430000, north: 5276000, cell: 90, cols: 300, rows: 200, epsg: 32627, value: plane}
	cover := made{west: 438000, north: 5267000, cell: 25, cols: 500, rows: 400, epsg: 32627, value: func(x, _ float64) float64 { return float64(int(x/700) % 3) }}
	cover.edit = func(tiff *GeoTIFF) { tiff.Type, tiff.NoData = Uint8, nil }
	g := open(t, Spec{
		Elevation: []string{first.write(t, "a.tif"), wide.write(t, "b.tif")}, Cover: cover.write(t, "c.tif"),
		Classes: map[int]terrain.Class{0: {}, 1: {HeightM: 12}, 2: {Zone: terrain.Sea}},
	})
	site := utm(t, 444500, 5263000)
	d, err := g.Disc(site, 4500)
	if err != nil {
		t.Fatal(err)
	}
	for i := range 3000 {
		az, distM := float64(i)*61.3, 4500*math.Sqrt(float64(i)/3000)
		sin, cos := math.Sincos(az * math.Pi / 180)
		at := Direct(site, az, distM)
		want, err := g.HeightAslM(at)
		if err != nil {
			t.Fatal(err)
		}
		got, coverM, zone := d.Point(distM*sin, distM*cos)
		if math.Abs(got-want) > 0.05 {
			t.Errorf("%v: height %.3f, the ground says %.3f m", at, got, want)
		}
		class, known, err := g.CoverAt(at)
		if err != nil {
			t.Fatal(err)
		}
		if known && (class.HeightM != coverM || (class.Zone == terrain.Sea) != (zone == terrain.Sea)) {
			p := []orb.Point{at}
			_ = g.cover.crs.forward(p)
			if border := math.Mod(p[0][0], 700); border > 0.1 && border < 699.9 {
				t.Errorf("%v: cover %g m in zone %d, the ground says %+v", at, coverM, zone, class)
			}
		}
	}
}

func TestDiscRefuses(t *testing.T) {
	far := made{west: 700000, north: 5267000, cell: 25, cols: 50, rows: 50, epsg: 32627, value: func(_, _ float64) float64 { return 1 }}
	far.edit = func(tiff *GeoTIFF) { tiff.Type, tiff.NoData = Uint8, nil }
	near := far
	near.west, near.north = 444000, 5263500
	bad := utmPlane()
	bad.value = func(x, _ float64) float64 { return map[bool]float64{true: 30000, false: 100}[x > 445000] }
	ground := utmPlane().write(t, "a.tif")
	site := utm(t, 444500, 5263000)
	for _, tc := range []struct {
		name string
		spec Spec
		at   orb.Point
		says string
	}{
		{"cover elsewhere", Spec{Elevation: []string{ground}, Cover: far.write(t, "far.tif"), Classes: map[int]terrain.Class{1: {}}}, site, "does not overlap the range"},
		{"class not in the table", Spec{Elevation: []string{ground}, Cover: near.write(t, "near.tif"), Classes: map[int]terrain.Class{2: {}}}, site, "of class 1"},
		{"no height on Earth", Spec{Elevation: []string{bad.write(t, "bad.tif")}}, site, "no height on Earth"},
		{"ground elsewhere", Spec{Elevation: []string{ground}}, orb.Point{10, 50}, "do not reach"},
	} {
		g := open(t, tc.spec)
		if _, err := g.Disc(tc.at, 3000); err == nil || !strings.Contains(err.Error(), tc.says) {
			t.Errorf("%s: error %v, want %q", tc.name, err, tc.says)
		}
	}
}

package raster

import (
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
	"fellreach/terrain/island"
)

// The classes of the rasters below.
const (
	seaClass  = 1
	landClass = 2
	lakeClass = 3
)

var coastClasses = map[int]terrain.Class{seaClass: {Zone: terrain.Sea}, landClass: {HeightM: 4}, lakeClass: {}}

// asClasses makes a raster one of land cover in bytes.
func asClasses(m made) made {
	m.edit = func(g *GeoTIFF) { g.Type, g.NoData, g.Unit = Uint8, noData(0), "" }
	return m
}

// seaWest is a cover raster of 160 km from west to east with the sea west of an easting, and an
// elevation raster under it with a height of its own at each easting.
func seaWest(t testing.TB, coastE float64, aslM func(x float64) float64) Spec {
	cover := asClasses(made{west: 440000, north: 5266000, cell: 100, cols: 1600, rows: 200, epsg: 32627, value: func(x, y float64) float64 {
		if x < coastE {
			return seaClass
		}
		return landClass
	}})
	ground := made{west: 440000, north: 5266000, cell: 200, cols: 800, rows: 100, epsg: 32627, value: func(x, y float64) float64 { return aslM(x) }}
	return Spec{Elevation: []string{ground.write(t, "dem.tif")}, Cover: cover.write(t, "cover.tif"), Classes: coastClasses, StepM: 200}
}

func flat(aslM float64) func(float64) float64 { return func(float64) float64 { return aslM } }

// toleranceKm is what the blocks leave open: the diagonal of 500 m by 500 m, and the curvature
// that a metric taken half-way leaves out, some tens of metres.
const toleranceKm = 0.75

// A straight coast: the border between coastal and inland land lies 50 km from it on the
// ellipsoid, whether the path begins at the sea or far from it.
func TestStraightCoast(t *testing.T) {
	const coastE = 450000
	g := open(t, seaWest(t, coastE, flat(60)))
	shore := utm(t, coastE, 5256000)
	for _, fromE := range []float64{441000, 470000} {
		p, err := g.Profile(utm(t, fromE, 5256000), utm(t, 595000, 5256000))
		if err != nil {
			t.Fatal(err)
		}
		for i, at := range p.Points {
			distM, azDeg, _ := Inverse(shore, at)
			km := distM / 1000
			if azDeg > 180 {
				km = -km
			}
			want := terrain.Inland
			switch {
			case math.Abs(km) < 0.11 || math.Abs(km-50) < toleranceKm:
				continue
			case km < 0:
				want = terrain.Sea
			case km < 50:
				want = terrain.Coastal
			}
			if p.Zone[i] != want {
				t.Errorf("from %g: zone %d at %.2f km from the shore, want %d", fromE, p.Zone[i], km, want)
			}
		}
	}
}

// Land above 100 m is inland however near the sea, with coastal land on both sides of it; at 100 m
// it is coastal.
func TestHighGroundIsInland(t *testing.T) {
	g := open(t, seaWest(t, 450000, func(x float64) float64 {
		if x > 460000 && x < 465000 {
			return 100.5
		}
		return 100
	}))
	p, err := g.Profile(utm(t, 452000, 5256000), utm(t, 475000, 5256000))
	if err != nil {
		t.Fatal(err)
	}
	for i, h := range p.AslM {
		if inland := h > 100; inland != (p.Zone[i] == terrain.Inland) {
			t.Errorf("%.1f m: zone %d", h, p.Zone[i])
		}
	}
	if low, high := slices.Index(p.Zone, terrain.Coastal), slices.Index(p.Zone, terrain.Inland); low != 0 || high < 30 || high > 50 {
		t.Errorf("coastal from point %d, inland from %d, want 0 and about 40", low, high)
	}
}

// A path along the coast sees the sea although it never crosses it; a lake makes no coast; and
// what the table calls coastal stays so.
func TestWhatMakesACoast(t *testing.T) {
	spec := seaWest(t, 450000, flat(5))
	from, to := utm(t, 460000, 5247000), utm(t, 460000, 5265000)
	zones := func(classes map[int]terrain.Class) []terrain.Zone {
		spec.Classes = classes
		p, err := open(t, spec).Profile(from, to)
		if err != nil {
			t.Fatal(err)
		}
		return slices.Compact(p.Zone)
	}
	for _, tc := range []struct {
		name    string
		classes map[int]terrain.Class
		want    terrain.Zone
	}{
		{"sea", coastClasses, terrain.Coastal},
		{"the water is a lake", map[int]terrain.Class{seaClass: {}, landClass: {}}, terrain.Inland},
		{"stated coastal", map[int]terrain.Class{seaClass: {}, landClass: {Zone: terrain.Coastal}}, terrain.Coastal},
	} {
		if got := zones(tc.classes); !slices.Equal(got, []terrain.Zone{tc.want}) {
			t.Errorf("%s: zones %d, want %d", tc.name, got, tc.want)
		}
	}
}

// Without a class of sea, or without land cover, there is no shore and nothing is read.
func TestNoSeaNothingRead(t *testing.T) {
	spec := seaWest(t, 450000, flat(5))
	spec.BeyondSea = true
	spec.Classes = map[int]terrain.Class{seaClass: {}, landClass: {}}
	bare := spec
	bare.Cover = ""
	for _, spec := range []Spec{spec, bare} {
		g := open(t, spec)
		c, err := g.Coast([]orb.Point{{-180, -90}, {180, 90}})
		if g.shore != nil || err != nil {
			t.Errorf("a shore, or %v", err)
		}
		if got := c.Zone(terrain.Inland, 5, 3, 3); got != terrain.Inland {
			t.Errorf("zone %d", got)
		}
	}
}

// Beyond the elevation rasters lies the sea: it makes a coast of what is near, and inland begins
// 50 km from the raster's edges. Without that, a raster with a class of sea but no cell of it has none.
func TestOpenSeaMakesACoast(t *testing.T) {
	square := func(cell float64, cols int, value float64) made {
		return made{west: 440000, north: 5400000, cell: cell, cols: cols, rows: cols, epsg: 32627, value: func(x, y float64) float64 { return value }}
	}
	spec := Spec{
		Elevation: []string{square(500, 260, 20).write(t, "dem.tif")}, // 130 km by 130 km
		Cover:     asClasses(square(500, 200, landClass)).write(t, "cover.tif"),
		Classes:   coastClasses, StepM: 500,
	}
	from, to := utm(t, 441000, 5335000), utm(t, 569000, 5335000)
	for _, beyond := range []bool{true, false} {
		spec.BeyondSea = beyond
		p, err := open(t, spec).Profile(from, to)
		if err != nil {
			t.Fatal(err)
		}
		for i, at := range p.Points {
			west, _, _ := Inverse(at, utm(t, 440000, 5335000))
			east, _, _ := Inverse(at, utm(t, 570000, 5335000))
			km := min(west, east) / 1000
			coastal := beyond && km < 50
			if math.Abs(km-50) > toleranceKm && coastal != (p.Zone[i] == terrain.Coastal) {
				t.Errorf("beyond sea %v: zone %d at %.2f km from the edge", beyond, p.Zone[i], km)
			}
		}
	}
}

// On Hallin no land is 50 km from the sea: whatever is low is coastal, all else inland. Its lake
// and rivers are no sea.
func TestHallinsCoast(t *testing.T) {
	dem, cover := terrain.NewGrid(island.Cols, island.Rows), terrain.NewGrid(island.Cols, island.Rows)
	for i, dm := range island.Heights() {
		dem.Cells[i] = float32(dm) / 10
	}
	for i, class := range island.Cover() {
		cover.Cells[i] = float32(class)
	}
	write := func(name string, tiff GeoTIFF) string {
		tiff.GeoTransform, tiff.EPSG = [6]float64{island.WestM, island.CellM, 0, island.NorthM, 0, -island.CellM}, island.EPSG
		path := filepath.Join(t.TempDir(), name)
		if err := WriteGeoTIFF(path, tiff); err != nil {
			t.Fatal(err)
		}
		return path
	}
	g := open(t, Spec{
		Elevation: []string{write("dem.tif", GeoTIFF{Grid: dem, Type: Int16, Scale: 0.1})},
		Cover:     write("cover.tif", GeoTIFF{Grid: cover, Type: Uint8}),
		Classes:   map[int]terrain.Class{island.Sea: {Zone: terrain.Sea}, island.Open: {}, island.Wood: {HeightM: 12}, island.Village: {HeightM: 6}, island.Fresh: {}},
		BeyondSea: true,
	})
	count := map[terrain.Zone]int{}
	for _, northing := range []float64{5248000, 5258000, 5268000} {
		p, err := g.Profile(utm(t, 546000, northing), utm(t, 605000, northing+3000))
		if err != nil {
			t.Fatal(err)
		}
		for i, zone := range p.Zone {
			count[zone]++
			if zone != terrain.Sea && (zone == terrain.Coastal) != (p.AslM[i] <= 100) {
				t.Errorf("%.1f m at %v: zone %d", p.AslM[i], p.Points[i], zone)
			}
		}
	}
	if count[terrain.Sea] < 300 || count[terrain.Coastal] < 300 || count[terrain.Inland] < 300 {
		t.Errorf("points by zone: %v", count)
	}
}

// A coast gives the zones that profiles have.
func TestCoastAgreesWithProfiles(t *testing.T) {
	g := open(t, seaWest(t, 450000, func(x float64) float64 { return 60 + 50*math.Sin(x/3000) }))
	p, err := g.Profile(utm(t, 445000, 5247000), utm(t, 595000, 5265000))
	if err != nil {
		t.Fatal(err)
	}
	c, err := g.Coast(p.Points)
	if err != nil {
		t.Fatal(err)
	}
	at := slices.Clone(p.Points)
	if err := g.cover.crs.forward(at); err != nil {
		t.Fatal(err)
	}
	for i, zone := range p.Zone {
		col, row := g.cover.cell(at[i])
		cover := terrain.Inland
		if col < 99.5 { // the sea, to 450000
			cover = terrain.Sea
		}
		if got := c.Zone(cover, p.AslM[i], col, row); got != zone {
			t.Errorf("%g km: zone %d, the profile has %d", p.DistKm[i], got, zone)
		}
	}
}

// A coast covers its places and one block around; too many kilometres are refused, and so is what
// is no place.
func TestCoastRectangle(t *testing.T) {
	g := open(t, seaWest(t, 450000, flat(60)))
	c, err := g.Coast([]orb.Point{utm(t, 490000, 5250000), utm(t, 530000, 5257000)})
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range []float64{489600, 530400} {
		for _, n := range []float64{5249600, 5257400} {
			want := terrain.Coastal
			if e > 500000 {
				want = terrain.Inland
			}
			if got := c.Zone(terrain.Inland, 5, (e-440000)/100-0.5, (5266000-n)/100-0.5); got != want {
				t.Errorf("%g, %g: zone %d, want %d", e, n, got, want)
			}
		}
	}
	for _, tc := range []struct {
		places []orb.Point
		want   string
	}{
		{[]orb.Point{{-40, 30}, {0, 60}}, "smaller area"},
		{[]orb.Point{{math.NaN(), 30}}, "cannot hold"},
	} {
		if _, err = g.Coast(tc.places); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%v: %v, want %q", tc.places, err, tc.want)
		}
	}
}

// On a raster across the date line, land on both sides of 180 degrees is near the one cell of sea
// on it.
func TestCoastAcrossTheDateLine(t *testing.T) {
	path := writeOneSea(t, 480, 240, 240, 120, 4326, affine{179, 1.0 / 240, 0, 52.5, 0, -1.0 / 240})
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: path, Classes: coastClasses})
	c, err := g.Coast([]orb.Point{{179.2, 51.6}, {-179.2, 52.4}})
	if err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct {
		lon  float64
		want terrain.Zone
	}{ // half a degree of longitude at 52 N is 34.3 km, 0.78 are 53.5 km
		{179.22, terrain.Inland}, {179.5, terrain.Coastal}, {-179.5, terrain.Coastal}, {-179.22, terrain.Inland},
	} {
		col, row := g.cover.cell(orb.Point{tc.lon, 52})
		if got := c.Zone(terrain.Inland, 5, col, row); got != tc.want {
			t.Errorf("%g E: zone %d, want %d", tc.lon, got, tc.want)
		}
	}
}

// Many goroutines from the first touch on: each gets the zones of one alone. Run with -race.
func TestCoastConcurrent(t *testing.T) {
	spec := seaWest(t, 450000, flat(60))
	from, to := utm(t, 441000, 5247000), utm(t, 595000, 5265000)
	want, err := open(t, spec).Profile(from, to)
	if err != nil {
		t.Fatal(err)
	}
	g := open(t, spec)
	var group sync.WaitGroup
	for range 12 {
		group.Go(func() {
			got, err := g.Profile(from, to)
			if err != nil || !slices.Equal(got.Zone, want.Zone) {
				t.Errorf("%v, or other zones", err)
			}
			if _, err := g.Coast(want.Points); err != nil {
				t.Error(err)
			}
		})
	}
	group.Wait()
}

// A cover raster that breaks off is an error that names it, for the profile far from the break as
// well: where the sea is cannot be told.
func TestTruncatedCover(t *testing.T) {
	spec := seaWest(t, 440000, flat(60)) // no sea, so that all of it must be read
	if err := os.Truncate(spec.Cover, 200_000); err != nil {
		t.Fatal(err)
	}
	g, err := Open(spec)
	if err != nil { // where the header says it at once
		return
	}
	defer g.Close()
	for range 2 {
		if _, err = g.Profile(utm(t, 445000, 5265500), utm(t, 460000, 5265500)); err == nil || !strings.Contains(err.Error(), "cover.tif") {
			t.Errorf("%v, want an error that names cover.tif", err)
		}
	}
}

// What stands at a place, with its height even where the elevation raster holds it.
func TestCoverAt(t *testing.T) {
	spec := Spec{
		Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: coverRaster(t), Surface: true,
		Classes: map[int]terrain.Class{1: {Zone: terrain.Sea}, 2: {HeightM: 3.5}},
	}
	g := open(t, spec)
	for _, tc := range []struct {
		name    string
		easting float64
		want    terrain.Class
		known   bool
		err     string
	}{
		{"sea", 440500, terrain.Class{Zone: terrain.Sea}, true, ""},
		{"bushes", 441500, terrain.Class{HeightM: 3.5, Zone: terrain.Inland}, true, ""},
		{"not in the table", 442500, terrain.Class{}, false, "class 3"},
		{"void", 443500, terrain.Class{}, false, ""},
		{"outside", 447000, terrain.Class{}, false, ""},
	} {
		got, known, err := g.CoverAt(utm(t, tc.easting, 5263000))
		if got != tc.want || known != tc.known || (err == nil) != (tc.err == "") || err != nil && !strings.Contains(err.Error(), tc.err) {
			t.Errorf("%s: %+v, %v, %v, want %+v, %v, %q", tc.name, got, known, err, tc.want, tc.known, tc.err)
		}
	}
	if _, _, err := g.CoverAt(orb.Point{0, 91}); err == nil {
		t.Error("latitude 91 has a cover")
	}
	spec.Cover = ""
	if _, known, err := open(t, spec).CoverAt(utm(t, 440500, 5263000)); known || err != nil {
		t.Errorf("no raster: %v, %v", known, err)
	}
}

package raster

import (
	"math"
	"path/filepath"
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// mapTile is a picture of 256 by 256 pixels of the web's map tiles, by the definition of the Mercator
// projection on the sphere: x grows with longitude, y from the pole southwards.
func mapTile(z, x, y int) Picture {
	size := math.Exp2(float64(z))
	return Picture{
		Cols: 256, Rows: 256, PixelM: 40075016.686 / size / 256 * math.Cos(47.5*math.Pi/180),
		Place: func(col, row float64) orb.Point {
			u, v := (float64(x)+(col+0.5)/256)/size, (float64(y)+(row+0.5)/256)/size
			return orb.Point{360*u - 180, math.Atan(math.Sinh(math.Pi*(1-2*v))) * 180 / math.Pi}
		},
	}
}

// tileOf is the tile of a zoom that holds a place.
func tileOf(z int, p orb.Point) (x, y int) {
	size, lat := math.Exp2(float64(z)), p.Lat()*math.Pi/180
	return int((p.Lon() + 180) / 360 * size), int((1 - math.Asinh(math.Tan(lat))/math.Pi) / 2 * size)
}

func picture(t testing.TB, g *Ground, p Picture) *terrain.Grid {
	t.Helper()
	grid, err := g.Heights(p)
	if err != nil {
		t.Fatal(err)
	}
	return grid
}

// TestPictureHeights compares every pixel with the height of its place, which is sampled from the file
// at the place's own coordinates. Pixels at most two cells wide may differ by what the interpolation of
// places is off, centimetres on these slopes; coarser ones by the ground's change over the cells that
// are left out.
func TestPictureHeights(t *testing.T) {
	steepest := 200 * 2 * math.Pi / 5000 * math.Sqrt2 // of the hills, at most
	middle := utm(t, 444500, 5263000)
	utm27 := utmPlane()
	utm27.value = hills
	lonLat := made{west: -22.2, north: 47.8, cell: 1.0 / 1200, cols: 1000, rows: 700, epsg: 4326, value: func(x, y float64) float64 { return 300 + 200*math.Sin(x*90)*math.Cos(y*70) }}
	for _, tc := range []struct {
		name  string
		made  made
		slope float64
	}{{"UTM", utm27, steepest}, {"degrees", lonLat, 200 * 90 * math.Sqrt2 / 75000}} {
		g := open(t, Spec{Elevation: []string{tc.made.write(t, "dem.tif")}})
		for z := 8; z <= 15; z++ {
			x, y := tileOf(z, middle)
			p := mapTile(z, x, y)
			every := float64(g.elevation[0].every(p.PixelM))
			allowed := tc.slope * (0.03*p.PixelM + 0.1)
			if every > 1 {
				allowed = tc.slope * 1.5 * every * g.Files()[0].CellYM
			}
			grid, worst, held := picture(t, g, p), 0.0, 0
			for i := 0; i < len(grid.Cells); i += 37 {
				want, err := g.HeightAslM(p.Place(float64(i%256), float64(i/256)))
				if got := float64(grid.Cells[i]); err == nil && got == got {
					worst, held = max(worst, math.Abs(got-want)), held+1
				} else if (err == nil) != (got == got) && every == 1 && z > 12 {
					t.Errorf("%s z %d: pixel %d holds %g where the ground has %g, %v", tc.name, z, i, got, want, err)
				}
			}
			if worst > allowed || held == 0 {
				t.Errorf("%s z %d, every %g: %d pixels up to %.3f m off, allowed %.3f m", tc.name, z, every, held, worst, allowed)
			}
			t.Logf("%s z %d, pixels of %.0f m, every %g: at most %.3f m off (%d pixels)", tc.name, z, p.PixelM, every, worst, held)
		}
	}
}

// TestPictureEdges checks that pictures side by side see the same ground: a picture some pixels to the
// right and below holds what the other holds there.
func TestPictureEdges(t *testing.T) {
	m := utmPlane()
	m.value = hills
	g := open(t, Spec{Elevation: []string{m.write(t, "dem.tif")}})
	middle := utm(t, 444500, 5263000)
	for z := 9; z <= 14; z++ {
		x, y := tileOf(z, middle)
		p := mapTile(z, x, y)
		moved := p
		moved.Place = func(col, row float64) orb.Point { return p.Place(col+10, row+6) }
		a, b := picture(t, g, p), picture(t, g, moved)
		both := 0
		for row := range 256 - 6 {
			for col := range 256 - 10 {
				got, want := float64(b.At(col, row)), float64(a.At(col+10, row+6))
				if math.IsNaN(got) != math.IsNaN(want) && z > 12 || math.Abs(got-want) > 0.005*p.PixelM {
					t.Fatalf("z %d: pixel %d, %d is %g in one picture and %g in the other", z, col, row, want, got)
				}
				if got == got {
					both++
				}
			}
		}
		if both == 0 {
			t.Errorf("z %d: the pictures share no ground", z)
		}
	}
}

// TestPictureVoids checks what a picture holds where there is no height.
func TestPictureVoids(t *testing.T) {
	holed := utmPlane()
	holed.value = func(x, y float64) float64 {
		switch {
		case math.Hypot(x-444500, y-5263000) < 300:
			return math.NaN()
		case math.Hypot(x-446500, y-5263000) < 300:
			return 20000 // no height on Earth
		}
		return 50
	}
	filler := utmPlane()
	filler.value = func(x, _ float64) float64 { return 7 }
	first, second := holed.write(t, "holed.tif"), filler.write(t, "filler.tif")
	hole, odd, beyond := utm(t, 444500, 5263000), utm(t, 446500, 5263000), utm(t, 470000, 5263000)
	at := func(spec Spec, p orb.Point) float64 {
		g := open(t, spec)
		return float64(picture(t, g, Picture{Cols: 2, Rows: 2, PixelM: 30, Place: func(float64, float64) orb.Point { return p }}).At(0, 0))
	}
	for _, tc := range []struct {
		name string
		spec Spec
		at   orb.Point
		want float64
	}{
		{"a void", Spec{Elevation: []string{first}}, hole, math.NaN()},
		{"no height on Earth", Spec{Elevation: []string{first}}, odd, math.NaN()},
		{"a void filled by the next raster", Spec{Elevation: []string{first, second}}, hole, 7},
		{"the first raster", Spec{Elevation: []string{first, second}}, utm(t, 445500, 5263000), 50},
		{"outside", Spec{Elevation: []string{first}}, beyond, math.NaN()},
		{"outside, in the sea", Spec{Elevation: []string{first}, BeyondSea: true}, beyond, 0},
		{"a void beside the sea", Spec{Elevation: []string{first}, BeyondSea: true}, hole, math.NaN()},
		{"the other side of the Earth", Spec{Elevation: []string{first}}, orb.Point{160, -47}, math.NaN()},
	} {
		if got := at(tc.spec, tc.at); got != tc.want && !(math.IsNaN(got) && math.IsNaN(tc.want)) {
			t.Errorf("%s: %g, want %g", tc.name, got, tc.want)
		}
	}
}

func TestRelief(t *testing.T) {
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "dem.tif")}})
	least, most, err := g.Relief()
	// The plane's lowest corner is in the south-west, its highest in the north-east.
	if want := plane(440015, 5260015); err != nil || math.Abs(least-want) > 1e-3 {
		t.Errorf("least height %g, %v, want %g", least, err, want)
	}
	if want := plane(448985, 5265985); math.Abs(most-want) > 1e-3 {
		t.Errorf("greatest height %g, want %g", most, want)
	}
	if !math.IsInf(g.CoarsestM(), 1) {
		t.Errorf("a small raster is slow above %g m", g.CoarsestM())
	}
}

// TestHugeOverview looks at a raster of 40,000 by 40,000 cells, most of them not stored: pictures of
// any size that is called quick, and the relief, come from a small part of it.
func TestHugeOverview(t *testing.T) {
	path := filepath.Join(t.TempDir(), "huge.tif")
	run(t, "", "gdal_create", "-of", "GTiff", "-ot", "Int16", "-outsize", "40000", "40000", "-a_srs", "EPSG:32627", "-a_ullr", "0", "6200000", "1200000", "5000000", "-co", "SPARSE_OK=YES", "-co", "TILED=YES", "-co", "COMPRESS=DEFLATE", path)
	g := open(t, Spec{Elevation: []string{path}})
	if got := g.CoarsestM(); math.Abs(got-16*30) > 5 {
		t.Errorf("pictures are quick up to %g m a pixel, want about 480", got)
	}
	for _, z := range []int{8, 10, 13} {
		x, y := tileOf(z, utm(t, 444500, 5263000))
		if h := picture(t, g, mapTile(z, x, y)).At(128, 128); h != 0 {
			t.Errorf("z %d: %g m, want 0", z, h)
		}
	}
	if least, most, err := g.Relief(); err != nil || least != 0 || most != 0 {
		t.Errorf("relief %g to %g, %v", least, most, err)
	}
}

func BenchmarkPicture(b *testing.B) {
	m := utmPlane()
	m.value = hills
	g := open(b, Spec{Elevation: []string{m.write(b, "dem.tif")}})
	x, y := tileOf(12, utm(b, 444500, 5263000))
	b.ReportAllocs()
	for b.Loop() {
		picture(b, g, mapTile(12, x, y))
	}
}

package raster

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"

	"fellreach/terrain"
)

// The points of a profile lie ceil(length/step) equal intervals apart on the geodesic, and its
// heights are those of the places.
func TestProfile(t *testing.T) {
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, StepM: 30})
	from, to := utm(t, 440500, 5260500), utm(t, 448500, 5265500)
	p, err := g.Profile(from, to)
	if err != nil {
		t.Fatal(err)
	}
	distM, azDeg, backAzDeg := Inverse(from, to)
	n := int(math.Ceil(distM / 30))
	if len(p.DistKm) != n+1 || len(p.AslM) != n+1 || len(p.CoverM) != n+1 || len(p.Zone) != n+1 || len(p.Points) != n+1 {
		t.Fatalf("%d points for %.3f m, want %d", len(p.DistKm), distM, n+1)
	}
	if p.Points[0] != from || p.Points[n] != to || p.DistKm[0] != 0 || p.AzDeg != azDeg || p.BackAzDeg != backAzDeg || len(p.Notes) != 0 {
		t.Errorf("ends %v, %v; azimuths %g, %g; notes %q", p.Points[0], p.Points[n], p.AzDeg, p.BackAzDeg, p.Notes)
	}
	for i, place := range p.Points {
		fromM, _, _ := Inverse(from, place)
		if want := distM * float64(i) / float64(n); math.Abs(fromM-want) > 1e-6 || math.Abs(p.DistKm[i]*1000-want) > 1e-6 {
			t.Errorf("point %d is %.7f m along, DistKm %.9f, want %.7f m", i, fromM, p.DistKm[i], want)
		}
		if h, err := g.HeightAslM(place); err != nil || h != p.AslM[i] {
			t.Errorf("point %d: %g m in the profile, %g alone, %v", i, p.AslM[i], h, err)
		}
		if p.CoverM[i] != 0 || p.Zone[i] != terrain.Inland {
			t.Errorf("point %d has cover %g m, zone %d without a cover raster", i, p.CoverM[i], p.Zone[i])
		}
	}
}

// Both directions give the same points exactly, and so the same heights.
func TestProfileReciprocal(t *testing.T) {
	m := utmPlane()
	m.value = hills
	g := open(t, Spec{Elevation: []string{m.write(t, "hills.tif")}})
	rapid.Check(t, func(rt *rapid.T) {
		end := func(name string) orb.Point {
			return utm(t, rapid.Float64Range(440100, 448900).Draw(rt, name+" easting"), rapid.Float64Range(5260100, 5265900).Draw(rt, name+" northing"))
		}
		a, b := end("a"), end("b")
		there, err := g.Profile(a, b)
		if d, _, _ := Inverse(a, b); d < minPathM {
			if err == nil {
				rt.Fatalf("a path of %g m has a profile", d)
			}
			return
		}
		back, err2 := g.Profile(b, a)
		if err != nil || err2 != nil {
			rt.Fatal(err, err2)
		}
		back = back.Reversed()
		if !slices.Equal(there.Points, back.Points) || !slices.Equal(there.AslM, back.AslM) || there.AzDeg != back.AzDeg || there.BackAzDeg != back.BackAzDeg {
			rt.Fatalf("%v to %v differs from its reverse", a, b)
		}
		for i := range there.DistKm {
			if math.Abs(there.DistKm[i]-back.DistKm[i]) > 1e-9 {
				rt.Fatalf("point %d at %g and %g km", i, there.DistKm[i], back.DistKm[i])
			}
		}
	})
}

func TestProfileErrors(t *testing.T) {
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, StepM: 0.001})
	a := utm(t, 441000, 5264000)
	for _, tc := range []struct {
		name string
		b    orb.Point
		want string
	}{
		{"same place", a, "0.00 m apart"},
		{"0.5 m", Direct(a, 20, 0.5), "0.50 m apart: a path needs at least 1 m"},
		{"no place", orb.Point{0, -91}, "latitude -91"},
		{"NaN", orb.Point{math.NaN(), 0}, "NaN"},
		{"too many points", utm(t, 445000, 5264000), "more than 1000000 points"},
	} {
		if _, err := g.Profile(a, tc.b); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%s: %v, want %q", tc.name, err, tc.want)
		}
	}
	short, err := g.Profile(a, Direct(a, 20, 1.5))
	if err != nil || len(short.AslM) < 2 {
		t.Errorf("1.5 m: %v", err)
	}
}

// holed is the plane with cells made void, or given a value, by column and row.
func holed(value float64, holes ...[2]int) made {
	m := utmPlane()
	m.edit = func(g *GeoTIFF) {
		for _, hole := range holes {
			g.Grid.Set(hole[0], hole[1], float32(value))
		}
	}
	return m
}

// column returns holes from one row to another in a column.
func column(col, firstRow, lastRow int) (holes [][2]int) {
	for row := firstRow; row <= lastRow; row++ {
		holes = append(holes, [2]int{col, row})
	}
	return holes
}

// A wall of void cells across a path: an error with its place and length, bridged if that is
// allowed. Along a row of cell centres one void column leaves less than two cells without height.
func TestProfileVoid(t *testing.T) {
	path := holed(math.NaN(), column(100, 0, 199)...).write(t, "holed.tif") // column 100: easting 443015
	from, to := utm(t, 441015, 5263015), utm(t, 446015, 5263015)
	_, err := open(t, Spec{Elevation: []string{path}}).Profile(from, to)
	var void *terrain.VoidError
	if !errors.As(err, &void) {
		t.Fatalf("%v, want a VoidError", err)
	}
	if void.Outside || void.AtEnd || math.Abs(void.StartKm-1.97) > 0.03 || void.LengthM < 60 || void.LengthM > 90.1 {
		t.Errorf("void is %+v", void)
	}
	if missM, _, _ := Inverse(void.From, utm(t, 443000, 5263015)); missM > 45 {
		t.Errorf("the void begins %g m from where it does", missM)
	}
	for _, want := range []string{"bridge_voids", "from 1.9", "47.518"} {
		if !strings.Contains(err.Error(), want) {
			t.Errorf("%q lacks %q", err, want)
		}
	}
	p, err := open(t, Spec{Elevation: []string{path}, BridgeM: 100}).Profile(from, to)
	if err != nil || len(p.Notes) != 1 || !strings.HasPrefix(p.Notes[0], "bridged a void of ") {
		t.Fatalf("%v, notes %q", err, p.Notes)
	}
	onPlane(t, p, 1e-3)
	if _, err := open(t, Spec{Elevation: []string{path}, BridgeM: 50}).Profile(from, to); !errors.As(err, &void) {
		t.Errorf("bridge of 50 m: %v", err)
	}
}

// onPlane checks a profile against the plane, at its own places.
func onPlane(t *testing.T, p terrain.Profile, tolM float64) {
	t.Helper()
	crs, err := transformTo("EPSG:32627")
	if err != nil {
		t.Fatal(err)
	}
	at := slices.Clone(p.Points)
	if err := crs.forward(at); err != nil {
		t.Fatal(err)
	}
	for i, h := range p.AslM {
		if want := plane(at[i][0], at[i][1]); math.Abs(h-want) > tolM {
			t.Fatalf("%.4f m at %v, want %.4f", h, at[i], want)
		}
	}
}

// A value that is no height is an error wherever it contributes, even where the interpolated
// height would pass for one.
func TestProfileImplausible(t *testing.T) {
	path := holed(-32768, [2]int{100, 99}).write(t, "undeclared.tif") // centre 443015, 5263015
	g := open(t, Spec{Elevation: []string{path}})
	_, err := g.Profile(utm(t, 441015, 5263044), utm(t, 446015, 5263044))
	var height *terrain.HeightError
	if !errors.As(err, &height) || height.HeightM != -32768 || height.File != path {
		t.Fatalf("%v, want a HeightError", err)
	}
	if missM, _, _ := Inverse(height.At, utm(t, 443015, 5263015)); missM > 60 {
		t.Errorf("named %g m from the cell", missM)
	}
	if _, err := g.Profile(utm(t, 441015, 5263060), utm(t, 446015, 5263060)); err != nil {
		t.Errorf("a cell that does not contribute matters: %v", err)
	}
}

// The first raster wins; the second fills its voids and goes on beyond its edge.
func TestJoinedRasters(t *testing.T) {
	first := holed(math.NaN(), column(100, 0, 199)...).write(t, "first.tif")
	wide := utmPlane()
	wide.west, wide.cols = 439000, 500
	wide.value = func(x, y float64) float64 { return plane(x, y) + 1000 }
	second := wide.write(t, "second.tif")
	g := open(t, Spec{Elevation: []string{first, second}})
	for _, tc := range []struct {
		name    string
		easting float64
		offset  float64
	}{
		{"first wins", 442015, 0},
		{"void of the first", 443015, 1000},
		{"beside the void, where the first's four cells hold one", 443030, 1000},
		{"beyond the first", 450015, 1000},
	} {
		h, err := g.HeightAslM(utm(t, tc.easting, 5263015))
		if want := plane(tc.easting, 5263015) + tc.offset; err != nil || math.Abs(h-want) > 1e-3 {
			t.Errorf("%s: %g, %v, want %g", tc.name, h, err, want)
		}
	}
	p, err := g.Profile(utm(t, 441015, 5263015), utm(t, 452015, 5263015))
	if err != nil || len(p.Notes) != 0 {
		t.Errorf("%v, %q", err, p.Notes)
	}
}

// Two rasters that touch leave no gap on their seam.
func TestSeam(t *testing.T) {
	west, east := utmPlane(), utmPlane()
	east.west = 449000
	g := open(t, Spec{Elevation: []string{west.write(t, "west.tif"), east.write(t, "east.tif")}})
	for i := range 200 {
		if _, err := g.HeightAslM(utm(t, 449000, 5260100+float64(i)*29.3)); err != nil {
			t.Fatal(err)
		}
	}
}

// Beyond the rasters lies a void or the sea; a hole in a raster is a void all the same.
func TestBeyond(t *testing.T) {
	path := holed(math.NaN(), column(100, 0, 199)...).write(t, "holed.tif")
	from, to := utm(t, 448000, 5263015), utm(t, 452000, 5263015)
	_, err := open(t, Spec{Elevation: []string{path}, BridgeM: 1e9}).Profile(from, to)
	var void *terrain.VoidError
	if !errors.As(err, &void) || !void.Outside || !void.AtEnd || math.Abs(void.LengthM-3000) > 40 {
		t.Errorf("%v", err)
	}
	sea := open(t, Spec{Elevation: []string{path}, BeyondSea: true})
	p, err := sea.Profile(from, to)
	if err != nil {
		t.Fatal(err)
	}
	for i := range p.AslM {
		if atSea := p.DistKm[i] > 1.001; atSea != (p.Zone[i] == terrain.Sea) || atSea != (p.AslM[i] == 0) {
			t.Errorf("%g km: %g m, zone %d", p.DistKm[i], p.AslM[i], p.Zone[i])
		}
	}
	if _, err := sea.Profile(utm(t, 442000, 5263015), to); !errors.As(err, &void) || void.Outside {
		t.Errorf("a hole becomes sea: %v", err)
	}
}

// coverRaster has classes in stripes of 1 km: 1, 2, 3, void; east of 446000 nothing.
func coverRaster(t *testing.T) string {
	return made{
		west: 440000, north: 5266000, cell: 20, cols: 300, rows: 300, epsg: 32627,
		value: func(x, y float64) float64 {
			if class := int(x-440000) / 1000 % 4; class < 3 {
				return float64(class + 1)
			}
			return math.NaN()
		},
		edit: func(g *GeoTIFF) { g.Type, g.NoData, g.Unit = Uint8, noData(0), "" },
	}.write(t, "cover.tif")
}

func TestCover(t *testing.T) {
	spec := Spec{
		Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: coverRaster(t),
		Classes: map[int]terrain.Class{1: {Zone: terrain.Sea}, 2: {HeightM: 3.5}, 3: {HeightM: 12, Zone: terrain.Inland}},
	}
	from, to := utm(t, 440010, 5263015), utm(t, 448010, 5263015)
	p, err := open(t, spec).Profile(from, to)
	if err != nil {
		t.Fatal(err)
	}
	unknown := 0
	for i, d := range p.DistKm {
		x := 440.010 + d*(8000/(p.LengthKm()*1000)) // km of easting
		if r := math.Abs(math.Remainder(x, 1)); r < 0.002 {
			continue // too near a border between two stripes to say here
		}
		wantM, wantZone := 0.0, terrain.Inland
		switch stripe := int(x-440) % 4; {
		case x > 446 || stripe == 3:
			unknown++
		case stripe == 0:
			wantZone = terrain.Sea
		case stripe == 1:
			wantM = 3.5
		case stripe == 2:
			wantM = 12
		}
		if p.CoverM[i] != wantM || p.Zone[i] != wantZone {
			t.Errorf("%g km: cover %g m, zone %d, want %g and %d", d, p.CoverM[i], p.Zone[i], wantM, wantZone)
		}
	}
	share := fmt.Sprintf("unknown on %.0f %%", math.Ceil(100*float64(unknown)/float64(len(p.DistKm))))
	if len(p.Notes) != 1 || !strings.Contains(p.Notes[0], share) {
		t.Errorf("notes %q, want one with %q", p.Notes, share)
	}

	spec.Surface = true
	s, err := open(t, spec).Profile(from, to)
	if err != nil || slices.Max(s.CoverM) != 0 || !slices.Equal(s.Zone, p.Zone) {
		t.Errorf("surface: %v, cover up to %g m", err, slices.Max(s.CoverM))
	}

	delete(spec.Classes, 3)
	_, err = open(t, spec).Profile(from, to)
	var class *terrain.ClassError
	if !errors.As(err, &class) || class.Class != 3 {
		t.Fatalf("%v, want a ClassError for 3", err)
	}
	if missM, _, _ := Inverse(class.At, utm(t, 442000, 5263015)); missM > 31 {
		t.Errorf("class 3 is named %g m from where the path meets it", missM)
	}
}

// Where the sea lies beyond the elevation rasters, the cover raster is not asked.
func TestCoverBeyondSea(t *testing.T) {
	m := utmPlane()
	m.cols = 50 // to 441500
	g := open(t, Spec{
		Elevation: []string{m.write(t, "plane.tif")}, Cover: coverRaster(t), BeyondSea: true,
		Classes: map[int]terrain.Class{1: {HeightM: 4}, 2: {HeightM: 5}},
	}) // class 3 is missing
	p, err := g.Profile(utm(t, 440100, 5263015), utm(t, 445000, 5263015))
	if err != nil || len(p.Notes) != 0 {
		t.Fatalf("%v, notes %q", err, p.Notes)
	}
	if last := len(p.Zone) - 1; p.Zone[last] != terrain.Sea || p.CoverM[last] != 0 || p.CoverM[0] != 4 {
		t.Errorf("sea: zone %d, cover %g m; land: %g m", p.Zone[last], p.CoverM[last], p.CoverM[0])
	}
}

// Many goroutines, few tiles in memory: each gets the plane. Run with -race.
func TestConcurrent(t *testing.T) {
	m := utmPlane()
	m.cols, m.rows = 1200, 1000
	g := open(t, Spec{Elevation: []string{m.write(t, "plane.tif")}})
	g.cache = newTileCache(3 * tileBytes)
	want, err := g.Profile(utm(t, 441000, 5265000), utm(t, 475000, 5237000))
	if err != nil {
		t.Fatal(err)
	}
	var group sync.WaitGroup
	for worker := range 16 {
		group.Go(func() {
			for range 4 {
				got, err := g.Profile(want.Points[0], want.Points[len(want.Points)-1])
				if err != nil || !slices.Equal(got.AslM, want.AslM) {
					t.Errorf("worker %d: %v", worker, err)
				}
			}
		})
	}
	group.Wait()
	if n := len(g.cache.tiles); n > 3 {
		t.Errorf("%d tiles are kept", n)
	}
	onPlane(t, want, 1e-3)
}

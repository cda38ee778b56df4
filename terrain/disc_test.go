package terrain

import (
	"errors"
	"math"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"
)

func mesh(t testing.TB, half, spacing float64, f func(orb.Point) orb.Point) *Mesh {
	t.Helper()
	m, err := NewMesh(orb.Bound{Min: orb.Point{-half, -half}, Max: orb.Point{half, half}}, spacing, func(nodes []orb.Point) error {
		for i, p := range nodes {
			nodes[i] = f(p)
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// Source: bilinear interpolation keeps a + bx + cy + dxy exactly, prolonged beyond the area too.
func TestMesh(t *testing.T) {
	f := func(p orb.Point) orb.Point { return orb.Point{3 + 2*p[0] - p[1] + 0.01*p[0]*p[1], p[1]} }
	m := mesh(t, 1000, 130, f)
	rapid.Check(t, func(t *rapid.T) {
		p := orb.Point{rapid.Float64Range(-1100, 1100).Draw(t, "x"), rapid.Float64Range(-1100, 1100).Draw(t, "y")}
		x, y := m.At(p[0], p[1])
		if want := f(p); math.Abs(x-want[0]) > 1e-8*(1+math.Abs(want[0])) || math.Abs(y-want[1]) > 1e-9 {
			t.Errorf("at %v: %g, %g, want %v", p, x, y, want)
		}
	})
	broken := errors.New("broken")
	if _, err := NewMesh(orb.Bound{Max: orb.Point{1, 1}}, 1, func([]orb.Point) error { return broken }); !errors.Is(err, broken) {
		t.Errorf("error %v", err)
	}
}

// disc is made of a ramp with a void, another height for where the first knows none, and cover.
func disc(t testing.TB) *Disc {
	place := func(p orb.Point) orb.Point { return orb.Point{50 + p[0]/10, 50 - p[1]/10} }
	ramp, rest := NewGrid(101, 101), NewGrid(61, 101)
	for row := range 101 {
		for col := range 101 {
			if col != 70 {
				ramp.Set(col, row, float32(100+col-2*row))
			}
			if col < 61 {
				rest.Set(col, row, 55)
			}
		}
	}
	d := &Disc{
		RadiusM: 500,
		Heights: []Layer{{ramp, mesh(t, 500, 100, place)}, {rest, mesh(t, 500, 100, func(p orb.Point) orb.Point { return orb.Point{p[0]/10 - 10, 50 - p[1]/10} })}},
		Cover:   &CoverLayer{Cols: 101, Rows: 101, Cells: make([]uint8, 101*101), Classes: []Class{{Zone: Inland}, {HeightM: 12, Zone: Inland}, {Zone: Sea}}, Place: mesh(t, 500, 100, place)},
	}
	for i := range d.Cover.Cells {
		d.Cover.Cells[i] = uint8(i / 7 % 3)
	}
	return d
}

// Source: the ramp's formula; the second grid where the first is void; the cells themselves.
func TestDiscHeight(t *testing.T) {
	d := disc(t)
	for _, tc := range []struct{ east, north, want float64 }{
		{0, 0, 50},
		{33, -21, 100 + 53.3 - 2*52.1},
		{200, 0, 55},                       // in the void
		{195, 0, 55},                       // beside it
		{190.001, 0, 100 + 69.0001 - 2*50}, // on the centre of the cell before it
		{900, 0, math.NaN()},
	} {
		if got, sea := d.Height(tc.east, tc.north); sea || math.Abs(got-tc.want) > 2e-3 || math.IsNaN(got) != math.IsNaN(tc.want) {
			t.Errorf("at %g, %g: %g (sea %v), want %g", tc.east, tc.north, got, sea, tc.want)
		}
	}
	d.BeyondSea = true
	if h, cover, zone := d.Point(900, 0); h != 0 || cover != 0 || zone != Sea {
		t.Errorf("beyond the rasters: %g m, cover %g m, zone %d", h, cover, zone)
	}
}

// The points of a ray are those that are asked for one by one: coasts and cover too.
func TestSampleIsPoint(t *testing.T) {
	d := disc(t)
	d.BeyondSea = true
	d.Coast = &Coast{FirstCol: -100, FirstRow: -100, BlockCols: 20, BlockRows: 20, Cols: 20, Rows: 20, Near: make([]bool, 400)}
	for i := range d.Coast.Near {
		d.Coast.Near[i] = i%3 == 0
	}
	rapid.Check(t, func(t *rapid.T) {
		az := rapid.Float64Range(0, 2*math.Pi).Draw(t, "azimuth")
		step := rapid.Float64Range(1, 12).Draw(t, "step")
		r := Ray{East: 1.7, North: -2.3, StepEast: step * math.Sin(az), StepNorth: step * math.Cos(az)}
		const n = 50
		aslM, coverM, zones := make([]float64, n), make([]float64, n), make([]Zone, n)
		d.Sample(r, aslM, coverM, zones)
		for i := range n {
			east, north := r.East+float64(i)*r.StepEast, r.North+float64(i)*r.StepNorth
			if col, row := 50+east/10, 50-north/10; math.Abs(math.Remainder(col-0.5, 1)) < 1e-9 || math.Abs(math.Remainder(row-0.5, 1)) < 1e-9 {
				continue // on a border of cells rounding decides
			}
			h, cover, zone := d.Point(east, north)
			if math.Abs(h-aslM[i]) > 1e-6 || cover != coverM[i] || zone != zones[i] {
				t.Errorf("point %d: %g m, %g m, zone %d; alone %g, %g, %d", i, aslM[i], coverM[i], zones[i], h, cover, zone)
			}
		}
	})
}

package terrain

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// gridOf makes a grid from rows of values.
func gridOf(rows ...[]float32) *Grid {
	g := NewGrid(len(rows[0]), len(rows))
	for row, values := range rows {
		for col, v := range values {
			g.Set(col, row, v)
		}
	}
	return g
}

var void = float32(math.NaN())

// same says whether two values agree to a tolerance or are both void.
func same(a, b, tol float64) bool {
	return math.IsNaN(a) && math.IsNaN(b) || math.Abs(a-b) <= tol
}

// Hand-worked: (1-v)[(1-u)a + u b] + v[(1-u)c + u d] on the cells 10 20 / 40 80 and their
// neighbours.
func TestBilinear(t *testing.T) {
	g := gridOf(
		[]float32{10, 20, void},
		[]float32{40, 80, 5},
	)
	for _, tc := range []struct {
		name           string
		col, row, want float64
	}{
		{"centre", 0, 0, 10},
		{"centre beside a void", 1, 0, 20},
		{"centre of a void", 2, 0, math.NaN()},
		{"middle of four", 0.5, 0.5, 37.5},
		{"quarter", 0.25, 0.75, 0.25*(0.75*10+0.25*20) + 0.75*(0.75*40+0.25*80)}, // 40.625
		{"along a row", 0.1, 1, 44},
		{"along a column", 1, 0.4, 44},
		{"one of four is void", 1.5, 0.5, math.NaN()},
		{"a hair towards the void", 1 + 1e-9, 0.5, math.NaN()},
		{"row under the void", 1.5, 1, 42.5},
		{"west edge", -0.5, 0, 10},
		{"beyond the last centre", 0, 1.5, 40},
		{"south-east corner", 2.5, 1.5, 5},
		{"north edge between cells", 0.5, -0.3, 15},
		{"outside, west", -0.51, 0, math.NaN()},
		{"outside, south", 0, 1.51, math.NaN()},
		{"outside, far", 1e9, -1e9, math.NaN()},
		{"no position", math.NaN(), 0, math.NaN()},
	} {
		if got := g.Bilinear(tc.col, tc.row); !same(got, tc.want, 1e-12) {
			t.Errorf("%s: Bilinear(%g, %g) = %g, want %g", tc.name, tc.col, tc.row, got, tc.want)
		}
	}
}

func TestNearest(t *testing.T) {
	g := gridOf([]float32{1, 2}, []float32{3, void})
	for _, tc := range []struct{ col, row, want float64 }{
		{0, 0, 1}, {0.49, 0.49, 1}, {0.5, 0, 2}, {-0.5, -0.5, 1}, {1.5, 0.4, 2}, {0, 1.5, 3}, {1, 1, math.NaN()}, {2, 0, math.NaN()}, {0, -0.6, math.NaN()},
	} {
		if got := g.Nearest(tc.col, tc.row); !same(got, tc.want, 0) {
			t.Errorf("Nearest(%g, %g) = %g, want %g", tc.col, tc.row, got, tc.want)
		}
	}
}

// A grid of one cell holds its value everywhere on it.
func TestSingleCell(t *testing.T) {
	g := gridOf([]float32{7})
	for _, at := range []float64{-0.5, 0, 0.3, 0.5} {
		if got := g.Bilinear(at, -at); got != 7 {
			t.Errorf("Bilinear(%g, %g) = %g", at, -at, got)
		}
	}
}

// Interpolation keeps a plane, stays between the lowest and highest cell, and is continuous.
func TestBilinearProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		cols, rows := rapid.IntRange(1, 8).Draw(t, "cols"), rapid.IntRange(1, 8).Draw(t, "rows")
		flat, bumpy := NewGrid(cols, rows), NewGrid(cols, rows)
		a, b := rapid.Float64Range(-10, 10).Draw(t, "a"), rapid.Float64Range(-10, 10).Draw(t, "b")
		lowest, highest := math.Inf(1), math.Inf(-1)
		for i := range flat.Cells {
			flat.Cells[i] = float32(100 + a*float64(i%cols) + b*float64(i/cols))
			bumpy.Cells[i] = rapid.Float32Range(-400, 9000).Draw(t, "cell")
			lowest, highest = min(lowest, float64(bumpy.Cells[i])), max(highest, float64(bumpy.Cells[i]))
		}
		col := rapid.Float64Range(0, float64(cols-1)).Draw(t, "col")
		row := rapid.Float64Range(0, float64(rows-1)).Draw(t, "row")
		if got, want := flat.Bilinear(col, row), 100+a*col+b*row; math.Abs(got-want) > 1e-4 { // float32 cells
			t.Fatalf("plane at %g, %g is %g, want %g", col, row, got, want)
		}
		h := bumpy.Bilinear(col, row)
		if h < lowest-1e-9 || h > highest+1e-9 {
			t.Fatalf("%g is outside %g to %g", h, lowest, highest)
		}
		if near := bumpy.Bilinear(col+1e-7, row-1e-7); math.Abs(near-h) > 4*9400*1e-7 {
			t.Fatalf("%g jumps to %g within 1e-7 cells", h, near)
		}
	})
}

func TestImplausible(t *testing.T) {
	g := gridOf([]float32{1, -32768}, []float32{void, 9001})
	for _, tc := range []struct {
		col, row, want float64
		ok             bool
	}{
		{0, 0, 0, true}, {0.01, 0, -32768, false}, {0, 1, 0, true}, {0.5, 1, 9001, false}, {5, 5, 0, true},
	} {
		if h, ok := g.Implausible(tc.col, tc.row); h != tc.want || ok != tc.ok {
			t.Errorf("Implausible(%g, %g) = %g, %v, want %g, %v", tc.col, tc.row, h, ok, tc.want, tc.ok)
		}
	}
}

func TestNewGrid(t *testing.T) {
	for _, v := range NewGrid(3, 2).Cells {
		if v == v {
			t.Fatalf("a new cell holds %g", v)
		}
	}
	defer func() {
		if recover() == nil {
			t.Error("a grid of no rows does not panic")
		}
	}()
	NewGrid(3, 0)
}

func BenchmarkBilinear(b *testing.B) {
	g := NewGrid(257, 257)
	for i := range g.Cells {
		g.Cells[i] = float32(i % 97)
	}
	b.ReportAllocs()
	for b.Loop() {
		g.Bilinear(100.3, 57.8)
	}
}

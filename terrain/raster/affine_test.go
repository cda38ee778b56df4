package raster

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Hand-worked: a raster from 100 east, 200 north, cells of 10 by 20.
func TestAffine(t *testing.T) {
	a := affine{100, 10, 0, 200, 0, -20}
	if p := a.apply(3, 4); p[0] != 130 || p[1] != 120 {
		t.Errorf("corner of column 3, row 4 at %v", p)
	}
	back, ok := a.inverse()
	if p := back.toCentres().apply(135, 110); !ok || p[0] != 3 || p[1] != 4 {
		t.Errorf("135, 110 is the centre of %v", p)
	}
	for _, flat := range []affine{{}, {0, 1, 2, 0, 2, 4}, {1: math.NaN(), 5: 1}} {
		if _, ok := flat.inverse(); ok {
			t.Errorf("%v has an inverse", flat)
		}
	}
}

func TestAffineInverse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		sin, cos := math.Sincos(rapid.Float64Range(0, 2*math.Pi).Draw(t, "turn"))
		cell := rapid.Float64Range(0.1, 1000).Draw(t, "cell")
		a := affine{rapid.Float64Range(-1e6, 1e6).Draw(t, "x0"), cell * cos, cell * sin, rapid.Float64Range(-1e7, 1e7).Draw(t, "y0"), cell * sin, -cell * cos}
		back, ok := a.inverse()
		col, row := rapid.Float64Range(0, 40000).Draw(t, "col"), rapid.Float64Range(0, 40000).Draw(t, "row")
		p := a.apply(col, row)
		if q := back.apply(p[0], p[1]); !ok || math.Hypot(q[0]-col, q[1]-row) > 1e-7/cell+1e-9 {
			t.Fatalf("%g, %g comes back as %v", col, row, q)
		}
	})
}

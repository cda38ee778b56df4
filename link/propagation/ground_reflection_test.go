package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Source: textbooks of optics. Glass of index 1.5 returns 4 % of the power head on and water of
// index 9 64 %. At Brewster's angle, 56.31 degrees off the normal for that glass, nothing vertically
// polarized comes back and of the other sin(2 x 56.31 - 90) = 5/13 of the field. Grazing rays are
// returned whole.
func TestFresnelCoefficients(t *testing.T) {
	for _, tc := range []struct {
		name                      string
		eta                       complex128
		sin, horizontal, vertical float64
	}{
		{"glass, head on", 2.25, 1, 0.2, 0.2},
		{"glass, Brewster", 2.25, math.Sin(math.Atan(1 / 1.5)), 5. / 13, 0},
		{"water, head on", 81, 1, 0.8, 0.8},
		{"land, grazing", complex(22, -0.36), 0, 1, 1},
	} {
		h, v := fresnelCoefficients(tc.eta, tc.sin)
		if math.Abs(h-tc.horizontal) > 1e-12 || math.Abs(v-tc.vertical) > 1e-12 {
			t.Errorf("%s: %.6f and %.6f, want %.6f and %.6f", tc.name, h, v, tc.horizontal, tc.vertical)
		}
	}
}

// Horizontal polarization is returned better than vertical, the more so the flatter the ray, and a
// mixture lies between them.
func TestGroundReflectionProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		hz := rapid.Float64Range(30e6, 6e9).Draw(t, "frequency")
		sin := rapid.Float64Range(1e-5, 0.9).Draw(t, "sine")
		sea := rapid.Bool().Draw(t, "sea")
		h, v := groundReflection(hz, 0, sea, sin), groundReflection(hz, 1, sea, sin)
		if steeper := groundReflection(hz, 0, sea, sin*1.1); !(v >= 0 && v <= h && h < 1 && steeper < h) {
			t.Errorf("horizontal %g, steeper %g, vertical %g", h, steeper, v)
		}
		if half := groundReflection(hz, 0.5, sea, sin); math.Abs(half-(h+v)/2) > 1e-12 {
			t.Errorf("half and half %g, want the mean of %g and %g", half, h, v)
		}
	})
}

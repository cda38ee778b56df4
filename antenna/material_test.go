package antenna

import (
	"math"
	"testing"
)

// Source: handbook conductivities, from memory.
func TestMaterialNamed(t *testing.T) {
	for _, tc := range []struct {
		name             string
		sigma, permeable float64
	}{
		{"copper", 5.8e7, 1},
		{"aluminium", 2.5e7, 1},
		{"brass", 1.57e7, 1},
		{"stainless", 1.39e6, 1},
		{"steel", 6e6, 100},
		{"ideal", math.Inf(1), 1},
	} {
		got, err := MaterialNamed(tc.name)
		if want := (Material{tc.name, tc.sigma, tc.permeable}); err != nil || got != want {
			t.Errorf("MaterialNamed(%q) = %v, %v, want %v", tc.name, got, err, want)
		}
		if err := got.check(); err != nil {
			t.Errorf("%s: %v", tc.name, err)
		}
	}
	_, err := MaterialNamed("gold")
	wantError(t, "gold", err, "copper, aluminium, brass, stainless, steel, ideal")
}

func TestMaterialCheck(t *testing.T) {
	for _, tc := range []struct {
		m    Material
		says string
	}{
		{Material{}, "relative permeability"},
		{Material{"tin", 0, 1}, "conductivity of tin 0 S/m is out of range: 1000 to 1e+09 S/m"},
		{Material{"tin", math.NaN(), 1}, "conductivity of tin NaN"},
		{Material{"tin", 9e6, 0.5}, "relative permeability of tin 0.5"},
	} {
		wantError(t, tc.m.Name, tc.m.check(), tc.says)
	}
}

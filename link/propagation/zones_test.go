package propagation

import (
	"math"
	"testing"

	"fellreach/terrain"
)

func TestSeaShare(t *testing.T) {
	const s, c, i = terrain.Sea, terrain.Coastal, terrain.Inland
	for _, tc := range []struct {
		zones []terrain.Zone
		want  float64
	}{
		{[]terrain.Zone{i, i, i, i, i}, 0},
		{[]terrain.Zone{s, s, s, s, s}, 1},
		{[]terrain.Zone{s, i, i, i, i}, 0.05}, // half of the first interval of 1 km in 10
		{[]terrain.Zone{i, i, s, c, c}, 0.35}, // half of 3 km to the left and half of 4 km to the right
		{[]terrain.Zone{s, s, c, c, s}, 0.35}, // 1 + 3/2 + 2/2
	} {
		p := terrain.Profile{DistKm: []float64{0, 1, 4, 8, 10}, Zone: tc.zones}
		if got := seaShare(p); math.Abs(got-tc.want) > 1e-12 {
			t.Errorf("sea share of %v = %g, want %g", tc.zones, got, tc.want)
		}
	}
}

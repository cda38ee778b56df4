package terrain

import (
	"math"
	"strings"
	"testing"
)

// Hand-worked: two rows of three blocks of 4 by 2 cells, the first block's first cell in column
// -8, row 10. Cell centres are whole numbers, so that a block begins half a cell before its first.
func TestCoastZone(t *testing.T) {
	c := Coast{FirstCol: -8, FirstRow: 10, BlockCols: 4, BlockRows: 2, Cols: 3, Rows: 2, Near: []bool{
		true, false, true,
		false, true, false,
	}}
	for _, tc := range []struct {
		name     string
		cover    Zone
		aslM     float64
		col, row float64
		want     Zone
	}{
		{"first corner", Inland, 5, -8.5, 9.5, Coastal},
		{"end of the first block", Inland, 5, -4.51, 11.49, Coastal},
		{"second block", Inland, 5, -4.5, 9.5, Inland},
		{"second row", Inland, 5, -4.5, 11.5, Coastal},
		{"last block", Inland, 5, 3.49, 13.49, Inland},
		{"at 100 m", Inland, 100, -8, 10, Coastal},
		{"above", Inland, 100.01, -8, 10, Inland},
		{"below the sea", Inland, -4, -8, 10, Coastal},
		{"a height of NaN", Inland, math.NaN(), -8, 10, Inland},
		{"sea", Sea, 0, -8, 10, Sea},
		{"coastal as stated", Coastal, 5, -4.5, 9.5, Coastal},
		{"sea outside", Sea, 0, 1000, 10, Sea},
	} {
		if got := c.Zone(tc.cover, tc.aslM, tc.col, tc.row); got != tc.want {
			t.Errorf("%s: zone %d, want %d", tc.name, got, tc.want)
		}
	}
	if got := (&Coast{}).Zone(Inland, 5, 1e9, math.NaN()); got != Inland {
		t.Errorf("without a sea: zone %d", got)
	}
}

func TestCoastZoneOutside(t *testing.T) {
	c := Coast{BlockCols: 1, BlockRows: 1, Cols: 1, Rows: 1, Near: []bool{true}}
	for _, at := range [][2]float64{{-0.51, 0}, {0.5, 0}, {0, -0.51}, {0, 0.5}, {math.NaN(), 0}, {0, math.Inf(1)}} {
		func() {
			defer func() {
				if text, ok := recover().(string); !ok || !strings.HasPrefix(text, "terrain: column") {
					t.Errorf("%v: %v, want a panic", at, text)
				}
			}()
			c.Zone(Inland, 5, at[0], at[1])
		}()
	}
}

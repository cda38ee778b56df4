package coverage

import (
	"testing"

	"pgregory.net/rapid"
)

// area2 is twice the area of a ring, positive where it runs with its inside on the left, rows
// counting downwards.
func area2(ring []corner) (sum int) {
	for i, a := range ring {
		b := ring[(i+1)%len(ring)]
		sum -= int(a.col)*int(b.row) - int(b.col)*int(a.row)
	}
	return sum
}

// Source: Green's theorem. The rings of a class enclose as many cells as it has, whatever the map;
// outer rings run one way, holes the other.
func TestPatchesHoldTheirCells(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		cols, rows := rapid.IntRange(1, 12).Draw(t, "cols"), rapid.IntRange(1, 12).Draw(t, "rows")
		classes := rapid.SliceOfN(rapid.Uint8Range(0, 2), cols*rows, cols*rows).Draw(t, "classes")
		want, got := map[uint8]int{}, map[uint8]int{}
		for _, class := range classes {
			if class > 0 {
				want[class]++
			}
		}
		for _, p := range patchesOf(classes, cols, rows, 1) {
			for i, ring := range p.rings {
				area := area2(ring)
				if (i == 0) != (area > 0) {
					t.Errorf("ring %d of a patch of class %d has twice the area %d: %v", i, p.class, area, ring)
				}
				got[p.class] += area
			}
		}
		for class, cells := range want {
			if got[class] != 2*cells {
				t.Errorf("class %d has %d cells, its rings enclose half of %d", class, cells, got[class])
			}
		}
	})
}

// Two cells that touch by a corner are two patches; a ring around one is a patch with a hole.
func TestPatches(t *testing.T) {
	for _, tc := range []struct {
		name            string
		classes         []uint8
		least           int
		patches, corner int // corners of all rings
	}{
		{"one cell", []uint8{0, 0, 0, 0, 1, 0, 0, 0, 0}, 1, 1, 4},
		{"diagonal", []uint8{1, 0, 0, 0, 1, 0, 0, 0, 1}, 1, 3, 12},
		{"ring", []uint8{1, 1, 1, 1, 0, 1, 1, 1, 1}, 1, 1, 8},
		{"ring, hole of another class", []uint8{1, 1, 1, 1, 2, 1, 1, 1, 1}, 1, 2, 12},
		{"ring, hole absorbed", []uint8{1, 1, 1, 1, 2, 1, 1, 1, 1}, 2, 1, 4},
		{"all small", []uint8{1, 2, 1, 2, 1, 2, 1, 2, 1}, 4, 1, 4},
		{"nothing", []uint8{0, 0, 0, 0, 0, 0, 0, 0, 0}, 1, 0, 0},
	} {
		patches := patchesOf(tc.classes, 3, 3, tc.least)
		corners := 0
		for _, p := range patches {
			for _, ring := range p.rings {
				corners += len(ring)
			}
		}
		if len(patches) != tc.patches || corners != tc.corner {
			t.Errorf("%s: %d patches of %d corners, want %d of %d: %v", tc.name, len(patches), corners, tc.patches, tc.corner, patches)
		}
	}
}

// Source: Douglas and Peucker's promise, every corner within the tolerance; here of a staircase, which
// becomes its slope.
func TestSmoothed(t *testing.T) {
	var ring []corner
	for i := range int32(10) {
		ring = append(ring, corner{i, i}, corner{i, i + 1})
	}
	ring = append(ring, corner{10, 10}, corner{20, 10}, corner{20, 0})
	raw, smooth := smoothed(ring, 0), smoothed(ring, 1)
	if len(raw) != len(ring)+1 || raw[0] != raw[len(ring)] {
		t.Errorf("without a tolerance: %v", raw)
	}
	if len(smooth) > 6 || smooth[0] != smooth[len(smooth)-1] {
		t.Errorf("smoothed: %v", smooth)
	}
	if cell := smoothed([]corner{{0, 0}, {0, 1}, {1, 1}, {1, 0}}, 5); len(cell) != 5 {
		t.Errorf("a cell that would vanish: %v", cell)
	}
}

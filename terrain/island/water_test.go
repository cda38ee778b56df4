package island

import (
	"testing"

	"pgregory.net/rapid"
)

// terrainOf makes a field with a frame of sea around the given heights.
func terrainOf(cols int, mm []int32) (field, []bool) {
	rows := len(mm) / cols
	f := field{cols + 2, rows + 2, 30, make([]int32, (cols+2)*(rows+2))}
	land := make([]bool, len(f.v))
	for i, v := range mm {
		at := (i/cols+1)*f.cols + i%cols + 1
		f.v[at], land[at] = v, true
	}
	return f, land
}

// The lowest level from which each cell's water reaches the sea, found the slow way: relaxing
// level = max(own height, lowest neighbour's level) until nothing changes (the fixed point that
// defines a filled surface).
func filled(h field, land []bool) []int32 {
	level := make([]int32, len(h.v))
	for i := range level {
		if land[i] {
			level[i] = maxMm
		}
	}
	for changed := true; changed; {
		changed = false
		for i, dry := range land {
			if !dry {
				continue
			}
			for _, step := range h.around() {
				if v := max(h.v[i], level[i+step], 1); v < level[i] {
					level[i], changed = v, true
				}
			}
		}
	}
	return level
}

func TestDrain(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		cols := rapid.IntRange(1, 9).Draw(t, "cols")
		mm := rapid.SliceOfN(rapid.Int32Range(1, 40), cols, 9*cols).Draw(t, "mm")
		h, land := terrainOf(cols, mm[:len(mm)/cols*cols])
		w := drain(h, land)
		want, before, total := filled(h, land), make([]bool, len(land)), int32(0)
		for _, i := range w.order {
			r := w.receiver[i]
			if w.levelMm[i] != want[i] {
				t.Fatalf("cell %d is filled to %d mm, want %d", i, w.levelMm[i], want[i])
			}
			if land[r] && !before[r] || w.levelMm[r] > w.levelMm[i] {
				t.Fatalf("cell %d at %d mm drains to %d at %d mm, which does not come before it", i, w.levelMm[i], r, w.levelMm[r])
			}
			before[i] = true
		}
		for i, cells := range w.catchment() {
			if land[i] != before[i] {
				t.Fatalf("cell %d is land: %t, but drained: %t", i, land[i], before[i])
			}
			if !land[i] {
				total += cells
			}
		}
		if int(total) != len(w.order) {
			t.Fatalf("%d cells reach the sea, want all %d", total, len(w.order))
		}
	})
}

// A valley one cell wide between walls: what falls into it passes its mouth.
func TestCatchment(t *testing.T) {
	h, land := terrainOf(3, []int32{
		9000, 9000, 9000,
		9000, 80, 9000,
		9000, 50, 9000,
		9000, 20, 9000,
	})
	w := drain(h, land)
	cells := w.catchment()
	head := 2*h.cols + 2
	for row := range 3 {
		i := head + row*h.cols
		if got := cells[i]; got < int32(row+1) {
			t.Errorf("catchment of row %d is %d cells, want at least %d", row, got, row+1)
		}
		if row < 2 && w.receiver[i] != int32(i+h.cols) {
			t.Errorf("row %d drains to %d, want %d", row, w.receiver[i], i+h.cols)
		}
	}
}

func TestLake(t *testing.T) {
	h, land := terrainOf(5, []int32{
		50, 50, 50, 50, 50,
		50, 10, 12, 50, 50,
		50, 10, 50, 45, 50,
		50, 50, 30, 50, 50,
		50, 50, 30, 50, 50,
	})
	w := drain(h, land)
	lake := w.lake(h)
	for i, wet := range lake {
		if want := land[i] && h.v[i] < 30; wet != want {
			t.Errorf("cell %d, ground %d mm, is lake: %t, want %t", i, h.v[i], wet, want)
		}
		if wet && w.levelMm[i] != 30 { // the sill
			t.Errorf("lake at %d mm, want 30", w.levelMm[i])
		}
	}
}

// uniform is a field of one value, shaped like another.
func uniform(like field, v int32) field {
	f := field{like.cols, like.rows, like.cellM, make([]int32, len(like.v))}
	for i := range f.v {
		f.v[i] = v
	}
	return f
}

// One cell amid the sea, worked by hand: the root of its catchment is sqrt(30^2 + 40000) = 202 m, its
// step to the sea 30 m, or 42 m when chance sends it obliquely.
func TestErodeOneCell(t *testing.T) {
	for _, tc := range []struct {
		name              string
		uplift, cliff     int32
		straight, oblique int32
	}{
		{"slope", 20_000, 0, 2970, 4158},           // 20000 x 30 / 202
		{"cliff", 20_000, 50_000, 38582, 39770},    // + 50000 x 500 / (500 + 202)
		{"steepest", 4_000_000, 0, 19_200, 26_880}, // 640 x 30
	} {
		h, land := terrainOf(1, []int32{1000})
		ground{height: h, uplift: uniform(h, tc.uplift), cliff: uniform(h, tc.cliff), land: land}.erode()
		if got := h.v[h.cols+1]; got != tc.straight && got != tc.oblique {
			t.Errorf("%s: %d mm, want %d or %d", tc.name, got, tc.straight, tc.oblique)
		}
	}
}

// The law is linear in the uplift as long as the water keeps its way and nothing stands at the
// steepest slope; whole millimetres cost at most 1 mm a cell.
func TestErodeIsLinear(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		mm := rapid.SliceOfN(rapid.Int32Range(1, 5000), 81, 81).Draw(t, "mm")
		uplift := rapid.Int32Range(1000, 50_000).Draw(t, "uplift")
		once, land := terrainOf(9, mm)
		twice, _ := terrainOf(9, mm)
		still := uniform(once, 0)
		ground{height: once, uplift: uniform(once, uplift), cliff: still, land: land}.erode()
		ground{height: twice, uplift: uniform(once, 2*uplift), cliff: still, land: land}.erode()
		for i, v := range once.v {
			if d := twice.v[i] - 2*v; d < 0 || d > 81 {
				t.Fatalf("cell %d: %d mm, with twice the uplift %d mm", i, v, twice.v[i])
			}
		}
	})
}

// Beds are cut by the root of the catchment, in twice as many millimetres as metres.
func TestCutBeds(t *testing.T) {
	h, land := terrainOf(1, []int32{1000})
	ground{height: h, land: land}.cutBeds()
	if got := h.v[h.cols+1]; got != 1000-2*202 {
		t.Errorf("bed at %d mm, want %d", got, 1000-2*202)
	}
}

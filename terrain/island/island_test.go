package island

import (
	"crypto/sha256"
	"encoding/binary"
	"encoding/hex"
	"sync"
	"testing"
)

// grids makes the island once for all tests of the package.
var grids = sync.OnceValues(func() ([]int16, []uint8) { return Heights(), Cover() })

// TestSameEverywhere is a regression check: the sums are those this package printed itself. They
// must not depend on the processor; a change of them changes every result of the demonstration.
func TestSameEverywhere(t *testing.T) {
	dm, cover := grids()
	raw := make([]byte, 0, 2*len(dm))
	for _, v := range dm {
		raw = binary.LittleEndian.AppendUint16(raw, uint16(v))
	}
	for _, tc := range []struct {
		name, want string
		raw        []byte
	}{
		{"heights, int16 little-endian", "d925d77724e8c9d5bbcba7d0321d7d57157cb923bced6c11c44a59b8b1308b92", raw},
		{"cover", "861aa554a26a7ce5c4fe2393d3e01c3996c30ab04ce262ca8817502944628b92", cover},
	} {
		sum := sha256.Sum256(tc.raw)
		if got := hex.EncodeToString(sum[:]); got != tc.want {
			t.Errorf("SHA-256 of the %s = %s, want %s", tc.name, got, tc.want)
		}
	}
}

// What the island promises, from its design rather than from an outside source.
func TestShape(t *testing.T) {
	dm, cover := grids()
	if len(dm) != Cols*Rows || len(cover) != Cols*Rows {
		t.Fatalf("%d heights and %d covers, want %d", len(dm), len(cover), Cols*Rows)
	}
	land, highest, kinds := 0, int16(0), [Fresh + 1]int{}
	for i, h := range dm {
		if (cover[i] == Sea) != (h == 0) || h < 0 {
			t.Fatalf("cell %d has height %d dm and cover %d", i, h, cover[i])
		}
		if x, y := i%Cols, i/Cols; h > 0 && (x == 0 || y == 0 || x == Cols-1 || y == Rows-1) {
			t.Fatalf("land at the frame, column %d row %d", x, y)
		}
		if h > 0 {
			land++
		}
		highest = max(highest, h)
		kinds[cover[i]]++
	}
	if km2 := land * CellM * CellM / 1_000_000; km2 < 1000 || km2 > 1800 {
		t.Errorf("land covers %d km^2, want 1000 to 1800", km2)
	}
	if highest < 6000 || highest > 9000 {
		t.Errorf("highest summit %d dm, want 6000 to 9000", highest)
	}
	for kind, atLeast := range map[int]int{Open: land / 3, Wood: land / 10, Village: 1000, Fresh: 10000} {
		if kinds[kind] < atLeast {
			t.Errorf("%d cells of cover %d, want at least %d", kinds[kind], kind, atLeast)
		}
	}
}

// Climbing from the sea without ever going down must reach all land: then water from
// every cell comes down to the sea.
func TestNoHollows(t *testing.T) {
	dm, _ := grids()
	reached := climb(dm, func(int) bool { return true })
	for i := range dm {
		if !reached[i] {
			t.Fatalf("no way down to the sea from column %d row %d, %d dm", i%Cols, i/Cols, dm[i])
		}
	}
}

// The same along fresh water alone: rivers are unbroken and never run uphill.
func TestRiversRunDown(t *testing.T) {
	dm, cover := grids()
	reached := climb(dm, func(i int) bool { return cover[i] == Fresh })
	for i := range dm {
		if cover[i] == Fresh && !reached[i] {
			t.Fatalf("the water at column %d row %d, %d dm, has no way to the sea", i%Cols, i/Cols, dm[i])
		}
	}
}

// climb marks what can be reached from the sea over cells that pass, never stepping down.
func climb(dm []int16, pass func(i int) bool) []bool {
	reached, todo := make([]bool, len(dm)), []int{}
	for i, h := range dm {
		if h == 0 {
			reached[i] = true
			todo = append(todo, i)
		}
	}
	for len(todo) > 0 {
		i := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		for _, step := range (field{cols: Cols}).around() {
			if n := i + step; n >= 0 && n < len(dm) && !reached[n] && pass(n) && dm[n] >= dm[i] {
				reached[n] = true
				todo = append(todo, n)
			}
		}
	}
	return reached
}

func TestLakeIsLevel(t *testing.T) {
	_, w, lake := flooded()
	cells, level := 0, int32(0)
	for i, wet := range lake {
		if !wet {
			continue
		}
		if cells++; cells == 1 {
			level = w.levelMm[i]
		}
		if w.levelMm[i] != level {
			t.Fatalf("the lake lies at %d mm and at %d mm", level, w.levelMm[i])
		}
	}
	if km2 := float64(cells) * CellM * CellM / 1e6; km2 < 3 || km2 > 15 {
		t.Errorf("the lake covers %.1f km^2, want 3 to 15", km2)
	}
}

func BenchmarkHeights(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		Heights()
	}
}

package terrain

import (
	"fmt"
	"math"
)

// A Grid is a raster, or a window of one, in memory: row after row of values, NaN where a cell
// is void.
//
// Positions in it are cell-centre coordinates: (0, 0) is the middle of the first cell, (0.5, 0)
// the border between it and the next cell of the row.
type Grid struct {
	Cols, Rows int
	Cells      []float32 // row by row, Cols*Rows of them
}

// NewGrid returns a grid of void cells. It panics on sizes below 1.
func NewGrid(cols, rows int) *Grid {
	if cols < 1 || rows < 1 {
		panic(fmt.Sprintf("terrain: grid of %d x %d cells", cols, rows))
	}
	g := &Grid{cols, rows, make([]float32, cols*rows)}
	for i := range g.Cells {
		g.Cells[i] = float32(math.NaN())
	}
	return g
}

// At returns the value of one cell, NaN for a void.
func (g *Grid) At(col, row int) float32 { return g.Cells[row*g.Cols+col] }

// Set writes one cell.
func (g *Grid) Set(col, row int, value float32) { g.Cells[row*g.Cols+col] = value }

// Bilinear returns the value between the surrounding cell centres, linear along both axes.
// Nearer than half a cell to the grid's outer edge the edge's value holds. It is NaN outside the
// grid and where a cell that contributes is void; a cell of no weight does not contribute.
func (g *Grid) Bilinear(col, row float64) float64 {
	if !Inside(g.Cols, g.Rows, col, row) {
		return math.NaN()
	}
	c0, c1, u := neighbours(col, g.Cols)
	r0, r1, v := neighbours(row, g.Rows)
	upper := float64(g.At(c0, r0))*(1-u) + float64(g.At(c1, r0))*u
	lower := float64(g.At(c0, r1))*(1-u) + float64(g.At(c1, r1))*u
	return upper*(1-v) + lower*v
}

// Nearest returns the value of the cell under a position, NaN outside the grid or in a void. On
// a border between two cells it is the later one's.
func (g *Grid) Nearest(col, row float64) float64 {
	if !Inside(g.Cols, g.Rows, col, row) {
		return math.NaN()
	}
	return float64(g.At(nearest(col, g.Cols), nearest(row, g.Rows)))
}

// edgeSlack is by how much, in cells, a position may miss the outer edge: what rounding does to
// coordinates. A point on the seam of two rasters then lies in at least one of them.
const edgeSlack = 1e-6

// Inside says whether a position lies on a raster of cols by rows cells, outer edges included.
func Inside(cols, rows int, col, row float64) bool {
	const edge = 0.5 + edgeSlack
	return col >= -edge && col <= float64(cols)-1+edge && row >= -edge && row <= float64(rows)-1+edge
}

// neighbours returns the two cells of an axis whose centres enclose a position and the weight of
// the second; they are one cell, and the weight 0, at a centre and beyond the outermost ones.
func neighbours(at float64, count int) (first, second int, weight float64) {
	at = min(max(at, 0), float64(count-1))
	whole := math.Floor(at)
	first, weight = int(whole), at-whole
	if weight == 0 {
		return first, first, 0
	}
	return first, first + 1, weight
}

// nearest returns the cell of an axis in which a position lies; before the first one it is the
// first, so that rounding towards 0 will do.
func nearest(at float64, count int) int {
	return min(max(int(at+0.5), 0), count-1)
}

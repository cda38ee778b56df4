package raster

import (
	"fmt"
	"math"
	"slices"

	"github.com/lukeroth/gdal"
	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A shore knows which blocks of the cover raster's grid hold sea, and which lie near it. The grid
// goes on beyond the raster.
type shore struct {
	cover                *file
	classes              []int32 // those of the raster that are sea
	openSea              []*file // outside all of these lies the sea; empty where it does not
	blockCols, blockRows int     // cells of a block

	sea  *sheetTable[seaSheet]
	near *sheetTable[blockSet]
}

// newShore returns the shore of a ground, nil where no class of its cover is sea. It reads no
// cells.
func newShore(g *Ground) *shore {
	if g.cover == nil {
		return nil
	}
	s := &shore{cover: g.cover}
	for value, class := range g.spec.Classes {
		if class.Zone == terrain.Sea && value > noClass && value <= math.MaxInt32 && !g.cover.values.isVoid(float64(value)) {
			s.classes = append(s.classes, int32(value))
		}
	}
	if s.classes == nil {
		return nil
	}
	if g.spec.BeyondSea {
		s.openSea = g.elevation
	}
	s.blockCols, s.blockRows = blockCells(g.cover.info.CellXM), blockCells(g.cover.info.CellYM)
	s.sea, s.near = newSheetTable(s.findSea), newSheetTable(s.findNear)
	return s
}

// blockCells is how many cells of a size make the side of a block.
func blockCells(cellM float64) int {
	const most = 1 << 20 // for cells of no size, such as those at a pole
	return int(min(max(blockM/cellM, 1), most))
}

// findSea marks the blocks of a sheet that hold sea: those with a cell of such a class, and those
// whose middle lies in the open sea.
func (s *shore) findSea(key sheetKey) (*seaSheet, error) {
	var sea blockSet
	if err := s.markClasses(key, &sea); err != nil {
		return nil, err
	}
	if err := s.markOpenSea(key, &sea); err != nil {
		return nil, err
	}
	return newSeaSheet(&sea), nil
}

// A window is a rectangle of cells, the last column and row not included.
type window struct{ firstCol, firstRow, lastCol, lastRow int }

func (w window) empty() bool { return w.firstCol >= w.lastCol || w.firstRow >= w.lastRow }

// window is the part of a sheet that lies on the raster.
func (s *shore) window(key sheetKey) window {
	cols, rows := sheetBlocks*s.blockCols, sheetBlocks*s.blockRows
	return window{
		max(key.col*cols, 0), max(key.row*rows, 0),
		min((key.col+1)*cols, s.cover.info.Cols), min((key.row+1)*rows, s.cover.info.Rows),
	}
}

// mayHoldSea says whether a sheet is worth looking at.
func (s *shore) mayHoldSea(key sheetKey) bool {
	return len(s.openSea) > 0 || !s.window(key).empty()
}

// markClasses reads all cells of a sheet, some rows at a time. Overviews of the file would be
// quicker, but whoever made them may have blended classes into others.
func (s *shore) markClasses(key sheetKey, sea *blockSet) error {
	w := s.window(key)
	if w.empty() {
		return nil
	}
	width := w.lastCol - w.firstCol
	step := max(1, windowCells/width)
	for row := w.firstRow; row < w.lastRow; {
		cells, err := s.cover.readClasses(w.firstCol, row, width, min(step, w.lastRow-row))
		if err != nil {
			return err
		}
		for line := range slices.Chunk(cells, width) {
			s.markRow(line, &sea[row/s.blockRows-key.row*sheetBlocks])
			row++
		}
	}
	return nil
}

// noClass stands for a cell that is masked out.
const noClass = math.MinInt32

// readClasses reads a window of cells as they are stored, several times quicker than read does.
// The nodata number stands as it is.
func (f *file) readClasses(col, row, cols, rows int) ([]int32, error) {
	cells := make([]int32, cols*rows)
	err := f.with(func(dataset gdal.Dataset) error {
		band := dataset.RasterBand(1)
		if err := band.IO(gdal.Read, col, row, cols, rows, cells, cols, rows, 0, 0); err != nil || !f.values.masked {
			return err
		}
		mask := make([]uint8, len(cells))
		err := band.GetMaskBand().IO(gdal.Read, col, row, cols, rows, mask, cols, rows, 0, 0)
		for i, m := range mask {
			if m == 0 {
				cells[i] = noClass
			}
		}
		return err
	})
	if err != nil {
		return nil, fmt.Errorf("%s: reading the cells from column %d, row %d on: %w", f.info.Path, col, row, err)
	}
	return cells, nil
}

// markRow marks the blocks of which a row of cells holds sea. The first cell begins a block.
func (s *shore) markRow(cells []int32, blocks *[sheetBlocks]bool) {
	block := 0
	for run := range slices.Chunk(cells, s.blockCols) {
		blocks[block] = blocks[block] || slices.ContainsFunc(run, s.isSea)
		block++
	}
}

func (s *shore) isSea(class int32) bool { return slices.Contains(s.classes, class) }

// markOpenSea marks the blocks whose middle lies outside all elevation rasters, where the sea is
// there.
func (s *shore) markOpenSea(key sheetKey, sea *blockSet) error {
	if len(s.openSea) == 0 {
		return nil
	}
	var middles []orb.Point
	for row := range sheetBlocks {
		for col := range sheetBlocks {
			middles = append(middles, s.middle(key.col*sheetBlocks+col, key.row*sheetBlocks+row))
		}
	}
	places, err := s.cover.places(middles, 0, 0)
	if err != nil {
		return err
	}
	outside, err := outsideAll(s.openSea, places)
	for i, out := range outside {
		if out && onEarth(places[i]) {
			sea[i/sheetBlocks][i%sheetBlocks] = true
		}
	}
	return err
}

// outsideAll says which places lie outside all of the rasters.
func outsideAll(files []*file, places []orb.Point) ([]bool, error) {
	outside := slices.Repeat([]bool{true}, len(places))
	for _, f := range files {
		at := slices.Clone(places)
		if err := f.crs.forward(at); err != nil {
			return nil, err
		}
		for i, p := range at {
			col, row := f.cell(p)
			outside[i] = outside[i] && !terrain.Inside(f.info.Cols, f.info.Rows, col, row)
		}
	}
	return outside, nil
}

// middle is the middle of a block, in cells from the outer corner of the raster's first.
func (s *shore) middle(blockCol, blockRow int) orb.Point {
	return orb.Point{(float64(blockCol) + 0.5) * float64(s.blockCols), (float64(blockRow) + 0.5) * float64(s.blockRows)}
}

// block returns the block of a position in cell-centre coordinates; ok is false for what is no
// position, or none that is worth a thought.
func (s *shore) block(col, row float64) (blockCol, blockRow int, ok bool) {
	const farthest = 1e9
	if !(math.Abs(col) < farthest && math.Abs(row) < farthest) {
		return 0, 0, false
	}
	return int(math.Floor((col + 0.5) / float64(s.blockCols))), int(math.Floor((row + 0.5) / float64(s.blockRows))), true
}

// sheetOf returns the sheet of a block and the block's place in it.
func sheetOf(blockCol, blockRow int) (key sheetKey, col, row int) {
	key = sheetKey{floorDiv(blockCol, sheetBlocks), floorDiv(blockRow, sheetBlocks)}
	return key, blockCol - key.col*sheetBlocks, blockRow - key.row*sheetBlocks
}

// floorDiv divides and rounds down, below zero too.
func floorDiv(a, b int) int {
	q := a / b
	if a%b < 0 {
		q--
	}
	return q
}

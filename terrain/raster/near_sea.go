package raster

import (
	"math"
	"slices"

	"github.com/paulmach/orb"
)

// nearSeaM is how far from the sea land is coastal; its source stands at [terrain.MaxCoastalAslM].
const nearSeaM = 50_000

// maxReachBlocks bounds how many blocks are looked over in one direction. It cuts the 50 km short
// only where blocks are less than 12 m wide, such as within 1.4 degrees of a pole on a raster of
// the whole Earth in degrees.
const maxReachBlocks = 4096

// A metric tells distances on the ellipsoid near one place: the square of the distance, in m^2,
// over x columns and y rows of blocks is xx x^2 + 2 xy x y + yy y^2.
type metric struct{ xx, xy, yy float64 }

// newMetric measures a block by the middles of its four sides.
func newMetric(left, right, top, bottom orb.Point) metric {
	xEast, xNorth := eastNorth(left, right)
	yEast, yNorth := eastNorth(top, bottom)
	return metric{xEast*xEast + xNorth*xNorth, xEast*yEast + xNorth*yNorth, yEast*yEast + yNorth*yNorth}
}

// eastNorth returns the way between two places near each other, in metres; NaN where one is no
// place on Earth.
func eastNorth(from, to orb.Point) (eastM, northM float64) {
	if !onEarth(from) || !onEarth(to) {
		return math.NaN(), math.NaN()
	}
	distM, azDeg, _ := Inverse(from, to)
	sin, cos := math.Sincos(azDeg * math.Pi / 180)
	return distM * sin, distM * cos
}

// span returns the columns, from first to last as seen from the middle of a block, of the blocks y
// rows on whose middles are within 50 km; last is less than first where there are none.
func (m metric) span(y int) (first, last int) {
	dy := float64(y)
	rest := nearSeaM*nearSeaM - (m.yy-m.xy*m.xy/m.xx)*dy*dy
	if !(rest >= 0) {
		return 0, -1
	}
	middle, half := -m.xy*dy/m.xx, math.Sqrt(rest/m.xx)
	return int(max(math.Ceil(middle-half), -maxReachBlocks)), int(min(math.Floor(middle+half), maxReachBlocks))
}

// reach returns how many columns and rows of blocks 50 km come to at most; ok is false where they
// cannot be told.
func (m metric) reach() (cols, rows int, ok bool) {
	det := m.xx*m.yy - m.xy*m.xy
	if !(det > 0) {
		return 0, 0, false
	}
	cut := func(blocks float64) int { return int(min(math.Ceil(blocks), maxReachBlocks)) }
	return cut(nearSeaM * math.Sqrt(m.yy/det)), cut(nearSeaM * math.Sqrt(m.xx/det)), true
}

// A surround is how far 50 km reach around the blocks of a sheet. Distances between two rows go by
// the metric half-way between them, in the sheet's middle column: on a grid in degrees that keeps
// them right although columns draw nearer to each other towards the poles.
type surround struct {
	key        sheetKey
	cols, rows int      // reach in blocks
	metrics    []metric // one for each row of blocks from firstRow on
	firstRow   int
}

// around measures what lies around a sheet; ok is false where the grid leaves the Earth.
func (s *shore) around(key sheetKey) (a surround, ok bool, err error) {
	a.key = key
	top := key.row * sheetBlocks
	middle, err := s.metrics(key.col, top+sheetBlocks/2, 1)
	if err != nil {
		return a, false, err
	}
	if _, a.rows, ok = middle[0].reach(); !ok {
		return a, false, nil
	}
	// Rows may draw nearer to each other: on a Mercator map at 85 degrees by 9 % over 50 km.
	a.rows = min(a.rows+a.rows/8+1, maxReachBlocks)
	a.firstRow = top - a.rows/2 - 1
	a.metrics, err = s.metrics(key.col, a.firstRow, sheetBlocks+2*(a.rows/2+1))
	for _, m := range a.metrics {
		if cols, _, ok := m.reach(); ok {
			a.cols = max(a.cols, cols)
		}
	}
	return a, true, err
}

// metrics measures rows of blocks in the middle column of a column of sheets.
func (s *shore) metrics(sheetCol, firstRow, count int) ([]metric, error) {
	halfCol, halfRow := float64(s.blockCols)/2, float64(s.blockRows)/2
	var sides []orb.Point
	for row := firstRow; row < firstRow+count; row++ {
		at := s.middle(sheetCol*sheetBlocks+sheetBlocks/2, row)
		x, y := at[0], at[1]
		sides = append(sides, orb.Point{x - halfCol, y}, orb.Point{x + halfCol, y}, orb.Point{x, y - halfRow}, orb.Point{x, y + halfRow})
	}
	places, err := s.cover.places(sides, 0, 0)
	if err != nil {
		return nil, err
	}
	all := make([]metric, count)
	for i := range all {
		all[i] = newMetric(places[4*i], places[4*i+1], places[4*i+2], places[4*i+3])
	}
	return all, nil
}

// sheets lists the sheets within reach, the nearest first.
func (a surround) sheets() []sheetKey {
	first, _, _ := sheetOf(a.key.col*sheetBlocks-a.cols, a.key.row*sheetBlocks-a.rows)
	last, _, _ := sheetOf((a.key.col+1)*sheetBlocks-1+a.cols, (a.key.row+1)*sheetBlocks-1+a.rows)
	var keys []sheetKey
	for row := first.row; row <= last.row; row++ {
		for col := first.col; col <= last.col; col++ {
			keys = append(keys, sheetKey{col, row})
		}
	}
	far := func(k sheetKey) int {
		col, row := k.col-a.key.col, k.row-a.key.row
		return col*col + row*row
	}
	slices.SortStableFunc(keys, func(x, y sheetKey) int { return far(x) - far(y) })
	return keys
}

// spread marks the blocks of the sheet that are within 50 km of the sea on another sheet, or on
// its own, and returns how many were not marked before.
func (a surround) spread(sea *seaSheet, key sheetKey, near *blockSet) (added int) {
	east := (a.key.col - key.col) * sheetBlocks
	for seaRow := range sheetBlocks {
		if !sea.has(seaRow, 0, sheetBlocks-1) {
			continue
		}
		for row := range sheetBlocks {
			from, to := a.key.row*sheetBlocks+row, key.row*sheetBlocks+seaRow
			if abs(to-from) > a.rows {
				continue
			}
			first, last := a.metrics[floorDiv(from+to, 2)-a.firstRow].span(to - from)
			for col := range sheetBlocks {
				if !near[row][col] && sea.has(seaRow, east+col+first, east+col+last) {
					near[row][col] = true
					added++
				}
			}
		}
	}
	return added
}

func abs(n int) int { return max(n, -n) }

// findNear marks the blocks of a sheet from whose middle that of a block with sea is within 50 km.
// It stops reading when all are marked, so that near a shore little is read.
func (s *shore) findNear(key sheetKey) (*blockSet, error) {
	near := new(blockSet)
	a, ok, err := s.around(key)
	if err != nil || !ok {
		return near, err
	}
	missing := sheetBlocks * sheetBlocks
	for _, other := range a.sheets() {
		if !s.mayHoldSea(other) {
			continue
		}
		sea, err := s.sea.get(other)
		if err != nil {
			return nil, err
		}
		if missing -= a.spread(sea, other, near); missing == 0 {
			break
		}
	}
	return near, nil
}

// A nearSampler says for one goroutine where the sea is near. It holds the last sheet.
type nearSampler struct {
	shore *shore
	key   sheetKey
	last  *blockSet
}

// at says whether the sea is near a position in cell-centre coordinates.
func (s *nearSampler) at(col, row float64) (near bool, err error) {
	blockCol, blockRow, ok := s.shore.block(col, row)
	if !ok {
		return false, nil
	}
	key, blockCol, blockRow := sheetOf(blockCol, blockRow)
	if s.last == nil || s.key != key {
		if s.last, err = s.shore.near.get(key); err != nil {
			return false, err
		}
		s.key = key
	}
	return s.last[blockRow][blockCol], nil
}

package terrain

import "fmt"

// MaxCoastalAslM is the greatest height of coastal land, which is that up to 100 m above the sea
// and within 50 km of the nearest sea, in any direction: Rec. ITU-R P.1812, the table of
// radio-climatic zones (from memory).
const MaxCoastalAslM = 100

// IsCoastalNearSea says whether a place of a zone, its ground aslM metres above sea level, would
// be coastal land if the sea were near: low land that is not said to be of another zone.
func (z Zone) IsCoastalNearSea(aslM float64) bool { return z == Inland && aslM <= MaxCoastalAslM }

// A Coast says where the sea is near, within 50 km, for a rectangle of a land-cover raster's grid:
// in blocks of cells, row by row. Many goroutines may ask it. The zero value is for rasters that
// hold no sea; with it nothing is coastal.
type Coast struct {
	FirstCol, FirstRow   int // the first cell of the first block, in the raster; may be negative
	BlockCols, BlockRows int // cells of a block
	Cols, Rows           int // blocks
	Near                 []bool
}

// Zone returns the zone of a place: Coastal where its cover's zone is Inland, its ground, aslM
// metres above sea level, is low, and the sea is near; else the zone of its cover, as it is given.
// The place is stated in the raster's cell-centre coordinates, which may lie beyond the raster's
// edge. Zone panics for low inland outside the rectangle, and for NaN.
func (c *Coast) Zone(cover Zone, aslM, col, row float64) Zone {
	if c.Near == nil || !cover.IsCoastalNearSea(aslM) {
		return cover
	}
	blockCol := (col + 0.5 - float64(c.FirstCol)) / float64(c.BlockCols)
	blockRow := (row + 0.5 - float64(c.FirstRow)) / float64(c.BlockRows)
	if !(blockCol >= 0 && blockRow >= 0 && blockCol < float64(c.Cols) && blockRow < float64(c.Rows)) {
		panic(fmt.Sprintf("terrain: column %g, row %g of the land cover is outside the rectangle of its coast", col, row))
	}
	if c.Near[int(blockRow)*c.Cols+int(blockCol)] {
		return Coastal
	}
	return cover
}

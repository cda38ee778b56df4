package raster

import (
	"fmt"
	"math"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// maxCoastalAslM is the greatest height of coastal land.
const maxCoastalAslM = 100

// mayBeCoastal says whether land would be coastal if the sea were near.
//
// Coastal land is that up to 100 m above the sea and within 50 km of the nearest sea, in any
// direction: Rec. ITU-R P.1812, the table of radio-climatic zones (from memory).
func mayBeCoastal(zone terrain.Zone, aslM float64) bool {
	return zone == terrain.Inland && aslM <= maxCoastalAslM
}

// markCoast makes the low land of a profile coastal where the sea is near; at holds its points in
// the cover raster's system.
func (g *Ground) markCoast(p *terrain.Profile, at []orb.Point) error {
	if g.shore == nil {
		return nil
	}
	s := nearSampler{shore: g.shore}
	for i, zone := range p.Zone {
		if !mayBeCoastal(zone, p.AslM[i]) {
			continue
		}
		near, err := s.at(g.cover.cell(at[i]))
		if err != nil {
			return err
		}
		if near {
			p.Zone[i] = terrain.Coastal
		}
	}
	return nil
}

// A Coast tells coastal land from inland within a bound. It is made once, by [Ground.Coast], and
// then asked from memory alone; many goroutines may ask it.
type Coast struct {
	shore  *shore // nil where there is no coast
	first  sheetKey
	cols   int
	sheets []*blockSet // row by row
}

// Coast returns the coast within a bound of longitudes and latitudes, in degrees; a bound that
// crosses the date line goes on beyond 180. It reads the land cover of the bound and up to 50 km
// around, less where the shore is near, and keeps 1 KB for every 16 by 16 km. Where no class of
// the land cover is sea it reads nothing. More than a million square kilometres are refused.
//
// Sea are the cells of a class that is, and, if the spec says that the sea lies beyond the
// elevation rasters, all places outside those, on the cover raster or not. The 50 km hold to
// within the diagonal of a block of cells: about 0.7 km, or one cell's where that is larger.
func (g *Ground) Coast(bound orb.Bound) (*Coast, error) {
	s := g.shore
	if s == nil {
		return &Coast{}, nil
	}
	first, last, err := s.sheetsOf(bound)
	if err != nil {
		return nil, err
	}
	c := &Coast{shore: s, first: first, cols: last.col - first.col + 1}
	if rows := last.row - first.row + 1; c.cols > maxSheets || rows > maxSheets || c.cols*rows > maxSheets {
		return nil, fmt.Errorf("%s: the coast of %d by %d km is asked for, more than a million square kilometres: take a smaller area",
			g.cover.info.Path, c.cols*sheetBlocks*blockM/1000, rows*sheetBlocks*blockM/1000)
	}
	for row := first.row; row <= last.row; row++ {
		for col := first.col; col <= last.col; col++ {
			near, err := s.near.get(sheetKey{col, row})
			if err != nil {
				return nil, err
			}
			c.sheets = append(c.sheets, near)
		}
	}
	return c, nil
}

// sheetsOf returns the first and the last sheet, both ways, of a bound of longitudes and latitudes
// and one block around.
func (s *shore) sheetsOf(bound orb.Bound) (first, last sheetKey, err error) {
	var edge []orb.Point
	for i := range edgePoints + 1 {
		t := float64(i) / edgePoints
		lon := bound.Left() + t*(bound.Right()-bound.Left())
		lat := bound.Bottom() + t*(bound.Top()-bound.Bottom())
		edge = append(edge, orb.Point{lon, bound.Bottom()}, orb.Point{lon, bound.Top()}, orb.Point{bound.Left(), lat}, orb.Point{bound.Right(), lat})
	}
	if err := s.cover.crs.forward(edge); err != nil {
		return first, last, err
	}
	blocks := orb.Bound{Min: orb.Point{math.Inf(1), math.Inf(1)}, Max: orb.Point{math.Inf(-1), math.Inf(-1)}}
	for _, p := range edge {
		col, row, ok := s.block(s.cover.cell(p))
		if !ok {
			return first, last, fmt.Errorf("%s: its reference system cannot hold all of longitude %g to %g, latitude %g to %g",
				s.cover.info.Path, bound.Left(), bound.Right(), bound.Bottom(), bound.Top())
		}
		blocks = blocks.Extend(orb.Point{float64(col), float64(row)})
	}
	first, _, _ = sheetOf(int(blocks.Left())-1, int(blocks.Bottom())-1)
	last, _, _ = sheetOf(int(blocks.Right())+1, int(blocks.Top())+1)
	return first, last, nil
}

// Zone returns the zone of a place: coastal where its cover is inland, its ground, aslM metres
// above sea level, is low, and the sea is near; else the zone of its cover, as it is given. The
// place is stated in the cover raster's cell-centre coordinates, which may lie beyond its edge.
// Zone panics for a place outside the bound that the coast was made for.
func (c *Coast) Zone(cover terrain.Zone, aslM, col, row float64) terrain.Zone {
	if c.shore == nil || !mayBeCoastal(cover, aslM) {
		return cover
	}
	blockCol, blockRow, ok := c.shore.block(col, row)
	if !ok {
		return cover
	}
	key, blockCol, blockRow := sheetOf(blockCol, blockRow)
	sheetCol, sheetRow := key.col-c.first.col, key.row-c.first.row
	if sheetCol < 0 || sheetCol >= c.cols || sheetRow < 0 || sheetRow >= len(c.sheets)/c.cols {
		panic(fmt.Sprintf("raster: column %g, row %g of the land cover is outside the bound of its coast", col, row))
	}
	if c.sheets[sheetRow*c.cols+sheetCol][blockRow][blockCol] {
		return terrain.Coastal
	}
	return cover
}

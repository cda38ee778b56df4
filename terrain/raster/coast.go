package raster

import (
	"fmt"
	"slices"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// markCoast makes the low land of a profile coastal where the sea is near; at holds its points in
// the cover raster's system.
func (g *Ground) markCoast(p *terrain.Profile, at []orb.Point) error {
	if g.shore == nil {
		return nil
	}
	s := nearSampler{shore: g.shore}
	for i, zone := range p.Zone {
		if !zone.IsCoastalNearSea(p.AslM[i]) {
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

// Coast returns where the sea is near in the smallest rectangle of the cover raster's grid that
// holds all of the places, and some kilometres around; the places may lie beyond the raster. It
// reads the land cover of the rectangle and up to 50 km around, less where the shore is near, and
// keeps 1 KB for every 16 by 16 km. Where no class of the land cover is sea it reads nothing and
// the coast is the zero value. More than a million square kilometres are refused.
//
// Sea are the cells of a class that is, and, if the spec says that the sea lies beyond the
// elevation rasters, all places outside those, on the cover raster or not. The 50 km hold to
// within the diagonal of a block of cells: about 0.7 km, or one cell's where that is larger.
func (g *Ground) Coast(places []orb.Point) (*terrain.Coast, error) {
	s := g.shore
	if s == nil {
		return &terrain.Coast{}, nil
	}
	first, last, err := s.sheetsOf(places)
	if err != nil {
		return nil, err
	}
	cols, rows := last.col-first.col+1, last.row-first.row+1
	if cols > maxSheets || rows > maxSheets || cols*rows > maxSheets {
		return nil, fmt.Errorf("%s: the coast of %d by %d km is asked for, more than a million square kilometres: take a smaller area",
			g.cover.info.Path, cols*sheetBlocks*blockM/1000, rows*sheetBlocks*blockM/1000)
	}
	c := &terrain.Coast{
		FirstCol: first.col * sheetBlocks * s.blockCols, FirstRow: first.row * sheetBlocks * s.blockRows,
		BlockCols: s.blockCols, BlockRows: s.blockRows,
		Cols: cols * sheetBlocks, Rows: rows * sheetBlocks,
	}
	for sheetRow := first.row; sheetRow <= last.row; sheetRow++ {
		if err := s.appendNear(c, sheetRow, first.col, last.col); err != nil {
			return nil, err
		}
	}
	return c, nil
}

// appendNear adds a row of sheets to a coast.
func (s *shore) appendNear(c *terrain.Coast, sheetRow, firstCol, lastCol int) error {
	var sheets []*blockSet
	for sheetCol := firstCol; sheetCol <= lastCol; sheetCol++ {
		near, err := s.near.get(sheetKey{sheetCol, sheetRow})
		if err != nil {
			return err
		}
		sheets = append(sheets, near)
	}
	for row := range sheetBlocks {
		for _, near := range sheets {
			c.Near = append(c.Near, near[row][:]...)
		}
	}
	return nil
}

// sheetsOf returns the first and the last sheet, both ways, of places and one block around them.
func (s *shore) sheetsOf(places []orb.Point) (first, last sheetKey, err error) {
	at := slices.Clone(places)
	if err := s.cover.crs.forward(at); err != nil {
		return first, last, err
	}
	blocks := make(orb.MultiPoint, len(at))
	for i, p := range at {
		col, row, ok := s.block(s.cover.cell(p))
		if !ok {
			return first, last, fmt.Errorf("%s: its reference system cannot hold %s", s.cover.info.Path, terrain.FormatDecimal(places[i]))
		}
		blocks[i] = orb.Point{float64(col), float64(row)}
	}
	bound := blocks.Bound().Pad(1)
	first, _, _ = sheetOf(int(bound.Left()), int(bound.Bottom()))
	last, _, _ = sheetOf(int(bound.Right()), int(bound.Top()))
	return first, last, nil
}

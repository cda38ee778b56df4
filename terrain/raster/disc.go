package raster

import (
	"fmt"
	"math"

	"github.com/lukeroth/gdal"
	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// MaxDiscCells bounds the cells of one raster that a [terrain.Disc] may hold, 1.6 GB of heights.
const MaxDiscCells = 400_000_000

// Disc reads the ground within radiusM of a site into memory: of each raster the window that is
// needed. Implausible heights are an error, as are cover classes that the table lacks.
//
// Places come from PROJ at nodes no farther apart than 1 km; between them they are interpolated,
// which is off by less than 0.2 m up to 80 degrees of latitude (tested).
func (g *Ground) Disc(site orb.Point, radiusM float64) (*terrain.Disc, error) {
	if err := checkPlace(site); err != nil {
		return nil, err
	}
	d := &terrain.Disc{Site: site, RadiusM: radiusM, BeyondSea: g.spec.BeyondSea}
	var err error
	if d.Places, err = discMesh(radiusM, func(nodes []orb.Point) error { return fromPlane(site, nodes) }); err != nil {
		return nil, err
	}
	for _, f := range g.elevation {
		place, err := f.discMesh(d)
		if err != nil {
			return nil, err
		}
		layer, err := f.heightLayer(place)
		if err != nil {
			return nil, err
		}
		if layer != nil {
			d.Heights = append(d.Heights, *layer)
		}
	}
	if len(d.Heights) == 0 {
		return nil, &terrain.VoidError{From: site, To: site, Outside: true}
	}
	if g.cover == nil {
		return d, nil
	}
	place, err := g.cover.discMesh(d)
	if err != nil {
		return nil, err
	}
	var first cellWindow
	if d.Cover, first, err = g.coverLayer(place); err != nil {
		return nil, err
	}
	if d.Coast, err = g.Coast(d.Places.Nodes()); err != nil {
		return nil, err
	}
	d.Coast.FirstCol -= first.col
	d.Coast.FirstRow -= first.row
	return d, nil
}

// nodeSpacingM is the distance of the nodes of a disc's meshes.
func nodeSpacingM(radiusM float64) float64 { return min(max(radiusM/64, 50), 1000) }

// discMesh lays a mesh over the plane of a disc.
func discMesh(radiusM float64, fill func([]orb.Point) error) (*terrain.Mesh, error) {
	half := radiusM + nodeSpacingM(radiusM)
	return terrain.NewMesh(orb.Bound{Min: orb.Point{-half, -half}, Max: orb.Point{half, half}}, nodeSpacingM(radiusM), fill)
}

// discMesh leads from the plane of a disc to the file's cells.
func (f *file) discMesh(d *terrain.Disc) (*terrain.Mesh, error) {
	return discMesh(d.RadiusM, func(nodes []orb.Point) error { return f.toCells(d.Site, d.Places.Nodes(), nodes) })
}

// fromPlane turns positions of the plane into longitude and latitude, in place.
func fromPlane(site orb.Point, nodes []orb.Point) error {
	for i, p := range nodes {
		nodes[i] = Direct(site, math.Atan2(p[0], p[1])*180/math.Pi, math.Hypot(p[0], p[1]))
		nodes[i][0] = site[0] + math.Remainder(nodes[i][0]-site[0], 360)
	}
	return nil
}

// toCells puts the cell-centre coordinates of places into nodes. Longitudes run on from the site's,
// so that no edge of a raster cuts between two nodes.
func (f *file) toCells(site orb.Point, places, nodes []orb.Point) error {
	copy(nodes, places)
	start := []orb.Point{site}
	if err := f.crs.forward(start); err != nil {
		return err
	}
	if err := f.crs.forward(nodes); err != nil {
		return err
	}
	turn := start[0][0] // of the site on the raster's own turn around the Earth
	if !math.IsNaN(f.wrapsDeg) {
		turn = f.wrapsDeg + math.Remainder(turn-f.wrapsDeg, 360)
	}
	for i, p := range nodes {
		if !math.IsNaN(f.wrapsDeg) {
			p[0] = turn + math.Remainder(p[0]-turn, 360)
		}
		nodes[i] = f.toCell.apply(p[0], p[1])
	}
	return nil
}

// A cellWindow is a part of a raster.
type cellWindow struct{ col, row, cols, rows int }

// windowOf returns the part of the raster that holds all nodes; ok is false where there is none.
func (f *file) windowOf(nodes []orb.Point) (w cellWindow, ok bool) {
	bound := orb.Bound{Min: orb.Point{math.Inf(1), math.Inf(1)}, Max: orb.Point{math.Inf(-1), math.Inf(-1)}}
	for _, p := range nodes {
		if finite(p) {
			bound = bound.Extend(p)
		}
	}
	const beside = 2 // cells for the interpolation
	west, north := max(bound.Min[0]-beside, 0), max(bound.Min[1]-beside, 0)
	east, south := min(bound.Max[0]+beside, float64(f.info.Cols-1)), min(bound.Max[1]+beside, float64(f.info.Rows-1))
	if !(west <= east && north <= south) {
		return cellWindow{}, false
	}
	w.col, w.row = int(west), int(north)
	w.cols, w.rows = int(math.Ceil(east))-w.col+1, int(math.Ceil(south))-w.row+1
	return w, true
}

// moveTo lets the mesh count from the window's first cell.
func (w cellWindow) moveTo(m *terrain.Mesh) {
	for i, p := range m.Nodes() {
		m.Nodes()[i] = orb.Point{p[0] - float64(w.col), p[1] - float64(w.row)}
	}
}

// heightLayer reads the part of an elevation raster that a mesh covers, nil where there is none.
func (f *file) heightLayer(place *terrain.Mesh) (*terrain.Layer, error) {
	w, ok := f.windowOf(place.Nodes())
	if !ok {
		return nil, nil
	}
	grid := &terrain.Grid{Cols: w.cols, Rows: w.rows}
	err := f.readStrips(w, func(strip *terrain.Grid, row int) error {
		if grid.Cells == nil {
			grid.Cells = make([]float32, w.cols*w.rows)
		}
		copy(grid.Cells[row*w.cols:], strip.Cells)
		return f.checkHeights(strip, w.col, w.row+row)
	})
	w.moveTo(place)
	return &terrain.Layer{Grid: grid, Place: place}, err
}

// checkHeights refuses what is no height on Earth.
func (f *file) checkHeights(strip *terrain.Grid, col, row int) error {
	for i, h := range strip.Cells {
		if h < terrain.MinHeightM || h > terrain.MaxHeightM {
			at, err := f.places([]orb.Point{{float64(col + i%strip.Cols), float64(row + i/strip.Cols)}}, 0.5, 0.5)
			if err != nil {
				return err
			}
			return &terrain.HeightError{At: at[0], HeightM: float64(h), File: f.info.Path}
		}
	}
	return nil
}

// discStripCells is about how many cells are read at once.
const discStripCells = 1 << 18

// keepFewBlocks bounds GDAL's cache of file blocks more tightly until the function it returns is
// called: what is read or written in one go is not asked for again.
func keepFewBlocks() (restore func()) {
	const bytes = 8 << 20
	prepareGDAL()
	gdal.SetCacheMax(bytes)
	return func() { gdal.SetCacheMax(gdalCacheBytes) }
}

// readStrips reads a window some rows at a time; row counts from the window's first.
func (f *file) readStrips(w cellWindow, use func(strip *terrain.Grid, row int) error) error {
	if cells := float64(w.cols) * float64(w.rows); cells > MaxDiscCells {
		return fmt.Errorf("%s: %d x %d cells lie within the range, %.1f GB in memory; at most %d million are taken: shorten the range, or use a coarser raster", f.info.Path, w.cols, w.rows, cells*4/1e9, MaxDiscCells/1_000_000)
	}
	defer keepFewBlocks()()
	height := max(1, discStripCells/w.cols)
	for row := 0; row < w.rows; row += height {
		strip, err := f.read(w.col, w.row+row, w.cols, min(height, w.rows-row))
		if err != nil {
			return err
		}
		if err := use(strip, row); err != nil {
			return err
		}
	}
	return nil
}

// coverLayer reads the part of the cover raster that a mesh covers. A cover raster that lies
// elsewhere is an error: it was meant for this ground.
func (g *Ground) coverLayer(place *terrain.Mesh) (*terrain.CoverLayer, cellWindow, error) {
	w, ok := g.cover.windowOf(place.Nodes())
	if !ok {
		return nil, w, fmt.Errorf("cover raster %s does not overlap the range: it lies at longitude %.3f to %.3f, latitude %.3f to %.3f; list one that does, or none",
			g.cover.info.Path, g.cover.info.LonLat[0], g.cover.info.LonLat[2], g.cover.info.LonLat[1], g.cover.info.LonLat[3])
	}
	layer := &terrain.CoverLayer{Cols: w.cols, Rows: w.rows, Classes: []terrain.Class{{Zone: terrain.Inland}}, Place: place}
	index := map[float32]uint8{}
	err := g.cover.readStrips(w, func(strip *terrain.Grid, row int) error {
		if layer.Cells == nil {
			layer.Cells = make([]uint8, w.cols*w.rows)
		}
		last, number := float32(math.NaN()), uint8(0)
		for i, v := range strip.Cells {
			if v != last { // neighbours are mostly alike
				var err error
				if number, err = g.classNumber(layer, index, v, w.col+i%w.cols, w.row+row+i/w.cols); err != nil {
					return err
				}
				last = v
			}
			layer.Cells[row*w.cols+i] = number
		}
		return nil
	})
	w.moveTo(place)
	return layer, w, err
}

// classNumber returns the number in the layer of what a cell's value stands for, 0 for a void.
func (g *Ground) classNumber(layer *terrain.CoverLayer, index map[float32]uint8, value float32, col, row int) (uint8, error) {
	if number, seen := index[value]; seen || math.IsNaN(float64(value)) {
		return number, nil
	}
	at, err := g.cover.places([]orb.Point{{float64(col), float64(row)}}, 0.5, 0.5)
	if err != nil {
		return 0, err
	}
	class, err := terrain.Classes(g.spec.Classes).At(int(value), at[0])
	if err != nil {
		return 0, err
	}
	if len(layer.Classes) > math.MaxUint8 {
		return 0, fmt.Errorf("%s holds more than %d classes within the range: group them", g.cover.info.Path, math.MaxUint8)
	}
	if g.spec.Surface {
		class.HeightM = 0
	}
	index[value] = uint8(len(layer.Classes))
	layer.Classes = append(layer.Classes, class)
	return index[value], nil
}

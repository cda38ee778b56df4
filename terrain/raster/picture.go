package raster

import (
	"math"

	"github.com/lukeroth/gdal"
	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A Picture is a lattice of places to look at the ground at, such as the pixels of a map's tile.
type Picture struct {
	Cols, Rows int
	// Place leads from a pixel's column and row, counted between pixel centres from 0, to its place. It
	// is asked at some of the pixels; between them places are spaced evenly.
	Place func(col, row float64) orb.Point
	// PixelM is the size of a pixel on the ground. Of rasters whose cells are less than half as large,
	// only every 2nd, 4th, 8th... cell is looked at, or an overview of the file.
	PixelM float64
}

// pictureSpacing is the distance of the pixels whose places are worked out. A geodesic or grid line
// bends by L^2/8R on the way L between two of them: 8 m on 20 km.
const pictureSpacing = 16

// Heights returns the heights of the ground at the pixels of a picture, in metres above sea level:
// NaN in voids, where a value is no height on Earth, and outside the rasters unless the sea lies
// there. Neighbouring pictures of one PixelM agree along their common edge. It reads what it needs of
// the files and keeps nothing.
func (g *Ground) Heights(p Picture) (*terrain.Grid, error) {
	grid := terrain.NewGrid(p.Cols, p.Rows)
	outside := make([]bool, len(grid.Cells))
	for i := range outside {
		outside[i] = true
	}
	places, err := p.mesh(func(nodes []orb.Point) error {
		for i, pixel := range nodes {
			nodes[i] = p.Place(pixel[0], pixel[1])
		}
		return nil
	})
	if err != nil {
		return nil, err
	}
	middle := p.Place(float64(p.Cols-1)/2, float64(p.Rows-1)/2)
	for _, f := range g.elevation {
		if !f.mayHold(places.Nodes()) {
			continue
		}
		cells, err := p.mesh(func(nodes []orb.Point) error { return f.toCells(middle, places.Nodes(), nodes) })
		if err != nil {
			return nil, err
		}
		if err := f.picture(grid, outside, cells, f.every(p.PixelM)); err != nil {
			return nil, err
		}
	}
	if g.spec.BeyondSea {
		for i, out := range outside {
			if out {
				grid.Cells[i] = 0
			}
		}
	}
	return grid, nil
}

func (p Picture) mesh(fill func([]orb.Point) error) (*terrain.Mesh, error) {
	return terrain.NewMesh(orb.Bound{Max: orb.Point{float64(p.Cols - 1), float64(p.Rows - 1)}}, pictureSpacing, fill)
}

// mayHold tells whether some of an area, given by places in it, may lie on the raster. It spares
// asking a reference system for places far outside what it is made for.
func (f *file) mayHold(places []orb.Point) bool {
	box := f.info.LonLat
	middle, half := (box[0]+box[2])/2, (box[2]-box[0])/2
	area := orb.Bound{Min: orb.Point{math.Inf(1), math.Inf(1)}, Max: orb.Point{math.Inf(-1), math.Inf(-1)}}
	for _, p := range places {
		area = area.Extend(orb.Point{math.Remainder(p[0]-middle, 360), p[1]})
	}
	return area.Min[0] <= half && area.Max[0] >= -half && area.Min[1] <= box[3] && area.Max[1] >= box[1]
}

// every returns which cells of the raster are looked at for pixels of a size: every 1st, 2nd, 4th...
func (f *file) every(pixelM float64) int {
	cells := pixelM / max(f.info.CellXM, f.info.CellYM)
	every := 1
	for float64(2*every) <= cells && 2*every <= min(f.info.Cols, f.info.Rows) {
		every *= 2
	}
	return every
}

// picture fills in the pixels that have no height yet.
func (f *file) picture(grid *terrain.Grid, outside []bool, cells *terrain.Mesh, every int) error {
	w, ok := f.windowOf(cells.Nodes())
	if !ok {
		return nil
	}
	w = w.whole(every, f.info.Cols, f.info.Rows)
	coarse, err := f.readCoarse(w, every)
	if err != nil {
		return err
	}
	scale := 1 / float64(every)
	for i := range grid.Cells {
		col, row := cells.At(float64(i%grid.Cols), float64(i/grid.Cols))
		if grid.Cells[i] == grid.Cells[i] || !terrain.Inside(f.info.Cols, f.info.Rows, col, row) {
			continue
		}
		outside[i] = false
		u := (col-float64(w.col)+0.5)*scale - 0.5
		v := (row-float64(w.row)+0.5)*scale - 0.5
		h := coarse.Bilinear(within(u, coarse.Cols), within(v, coarse.Rows))
		if h >= terrain.MinHeightM && h <= terrain.MaxHeightM {
			grid.Cells[i] = float32(h)
		}
	}
	return nil
}

// within holds a position on an axis between the middles of its outermost cells.
func within(at float64, count int) float64 { return min(max(at, 0), float64(count-1)) }

// whole widens a window to begin at a multiple of a number of cells and to hold whole ones, as far as
// the raster goes: pictures side by side then look at the same cells. A neighbour is added on every
// side for the interpolation.
func (w cellWindow) whole(every, cols, rows int) cellWindow {
	widen := func(from, count, most int) (int, int) {
		first := max(from/every-1, 0) * every
		last := min(((from+count-1)/every+2)*every, most)
		return first, last - first
	}
	w.col, w.cols = widen(w.col, w.cols, cols)
	w.row, w.rows = widen(w.row, w.rows, rows)
	return w
}

// readCoarse reads every n-th cell of a window, in rows and columns. Cells left over at the raster's
// end that make no whole one are left out, but for the first.
func (f *file) readCoarse(w cellWindow, every int) (*terrain.Grid, error) {
	grid := terrain.NewGrid(max(w.cols/every, 1), max(w.rows/every, 1))
	w.cols, w.rows = min(grid.Cols*every, w.cols), min(grid.Rows*every, w.rows)
	err := f.with(func(dataset gdal.Dataset) error {
		return f.values.readCoarse(dataset.RasterBand(1), w, grid)
	})
	return grid, err
}

// readCoarse fills a grid, which may have fewer cells, from a window of the band.
func (r valueRule) readCoarse(band gdal.RasterBand, w cellWindow, grid *terrain.Grid) error {
	stored := make([]float64, len(grid.Cells))
	if err := band.IO(gdal.Read, w.col, w.row, w.cols, w.rows, stored, grid.Cols, grid.Rows, 0, 0); err != nil {
		return err
	}
	mask := make([]uint8, len(stored))
	if r.masked {
		if err := band.GetMaskBand().IO(gdal.Read, w.col, w.row, w.cols, w.rows, mask, grid.Cols, grid.Rows, 0, 0); err != nil {
			return err
		}
	}
	for i, v := range stored {
		if !r.isVoid(v) && !(r.masked && mask[i] == 0) {
			grid.Cells[i] = float32(v*r.scaleM + r.offsetM)
		}
	}
	return nil
}

// A coarse look at a raster is at this many cells of each side. Of one that is large and holds no
// overviews, it is at as many small windows, so that not all of it is read.
const (
	lookCells   = 512
	largeCells  = 1 << 26
	lookWindows = 12
	windowSide  = 32
)

// Relief returns the least and the greatest height of the ground as far as a coarse look at its rasters
// tells, in metres above sea level; both 0 where there is none.
func (g *Ground) Relief() (minM, maxM float64, err error) {
	minM, maxM = math.Inf(1), math.Inf(-1)
	for _, f := range g.elevation {
		err := f.look(func(grid *terrain.Grid) {
			for _, v := range grid.Cells {
				if h := float64(v); h >= terrain.MinHeightM && h <= terrain.MaxHeightM {
					minM, maxM = min(minM, h), max(maxM, h)
				}
			}
		})
		if err != nil {
			return 0, 0, err
		}
	}
	if g.spec.BeyondSea {
		minM, maxM = min(minM, 0), max(maxM, 0)
	}
	if minM > maxM {
		return 0, 0, nil
	}
	return minM, maxM, nil
}

// look shows cells from all over the raster.
func (f *file) look(use func(*terrain.Grid)) error {
	cols, rows := f.info.Cols, f.info.Rows
	all := cellWindow{0, 0, cols, rows}
	every, windows := max(1, max(cols, rows)/lookCells), []cellWindow{all}
	if cols*rows > largeCells && !f.hasOverviews() {
		every, windows = 1, nil
		for i := range lookWindows * lookWindows {
			col, row := (2*(i%lookWindows)+1)*cols/(2*lookWindows), (2*(i/lookWindows)+1)*rows/(2*lookWindows)
			windows = append(windows, cellWindow{col, row, min(windowSide, cols-col), min(windowSide, rows-row)})
		}
	}
	for _, w := range windows {
		grid, err := f.readCoarse(w, every)
		if err != nil {
			return err
		}
		use(grid)
	}
	return nil
}

// CoarsestM returns the greatest size of pixels, in metres, at which a [Picture] of the ground is quick
// to read: without limit where the rasters hold overviews or are small.
func (g *Ground) CoarsestM() float64 {
	const most = 16 // of every how many cells may be read
	coarsest := math.Inf(1)
	for _, f := range g.elevation {
		if f.info.Cols*f.info.Rows > largeCells && !f.hasOverviews() {
			coarsest = min(coarsest, most*max(f.info.CellXM, f.info.CellYM))
		}
	}
	return coarsest
}

func (f *file) hasOverviews() bool {
	count := 0
	err := f.with(func(dataset gdal.Dataset) error {
		band := dataset.RasterBand(1)
		count = band.OverviewCount()
		return nil
	})
	return err == nil && count > 0
}

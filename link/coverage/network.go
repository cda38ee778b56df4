package coverage

import (
	"fmt"
	"math"

	"fellreach/terrain/raster"
)

// A member is one site of a network: its map and what it asks.
type member struct {
	name                string
	frame               *raster.Frame
	marginDB, fieldDBuV []float32
	aimDB               float64
	outHz               float64
}

// A network joins the maps of several sites on one frame. Cells where no site's margin is known are
// NaN.
type network struct {
	frame  *raster.Frame
	bestDB []float32 // the largest margin
	server []float32 // the number of the site that has it, from 1 on, in the order of the sites
	count  []float32 // of sites that reach their aim
	// ratioDB is the median level of the serving site over that of the strongest other one that
	// transmits on its frequency; NaN where there is none.
	ratioDB []float32

	servedBy []float32 // field of the serving site, dB(uV/m)
}

func join(members []member) (*network, error) {
	frame, err := around(members)
	if err != nil {
		return nil, err
	}
	cells := frame.Cols * frame.Rows
	n := &network{frame: frame, bestDB: voidCells(cells), server: voidCells(cells), count: voidCells(cells), ratioDB: voidCells(cells), servedBy: voidCells(cells)}
	for i := range members {
		n.add(i, &members[i])
	}
	for i := range members {
		n.disturb(i, members)
	}
	return n, nil
}

// add lays one site's map over the others. Of equal margins the site listed first serves.
func (n *network) add(number int, m *member) {
	n.each(m, func(at, from int) {
		margin := m.marginDB[from]
		if math.IsNaN(float64(margin)) {
			return
		}
		if math.IsNaN(float64(n.bestDB[at])) {
			n.count[at] = 0
		}
		if !(margin <= n.bestDB[at]) {
			n.bestDB[at], n.server[at], n.servedBy[at] = margin, float32(number+1), m.fieldDBuV[from]
		}
		if float64(margin) >= m.aimDB {
			n.count[at]++
		}
	})
}

// disturb looks at a site as an unwanted one where another serves on its frequency.
func (n *network) disturb(number int, members []member) {
	m := &members[number]
	n.each(m, func(at, from int) {
		server := n.server[at]
		if !(server > 0) || int(server) == number+1 || members[int(server)-1].outHz != m.outHz {
			return
		}
		if ratio := n.servedBy[at] - m.fieldDBuV[from]; ratio == ratio && !(ratio >= n.ratioDB[at]) {
			n.ratioDB[at] = ratio
		}
	})
}

// each calls f for the cells of a site's map with their places in both.
func (n *network) each(m *member, f func(at, from int)) {
	left, top := offset(n.frame, m.frame)
	for row := range m.frame.Rows {
		at, from := (top+row)*n.frame.Cols+left, row*m.frame.Cols
		for col := range m.frame.Cols {
			f(at+col, from+col)
		}
	}
}

// offset returns where the first cell of a frame lies in a larger one.
func offset(larger, f *raster.Frame) (col, row int) {
	a, b := larger.GeoTransform, f.GeoTransform
	return int(math.Round((b[0] - a[0]) / f.CellM)), int(math.Round((a[3] - b[3]) / f.CellM))
}

// around returns the smallest frame that holds those of all members.
func around(members []member) (*raster.Frame, error) {
	first := members[0].frame
	west, north := math.Inf(1), math.Inf(-1)
	east, south := math.Inf(-1), math.Inf(1)
	for _, m := range members {
		f := m.frame
		if f.WKT != first.WKT || f.CellM != first.CellM {
			return nil, fmt.Errorf("the maps of %s and %s cannot be joined: they differ in cell size or reference system; give all coverage entries one cell, and list first an elevation raster in a system projected in metres", members[0].name, m.name)
		}
		t := f.GeoTransform
		west, north = min(west, t[0]), max(north, t[3])
		east, south = max(east, t[0]+float64(f.Cols)*f.CellM), min(south, t[3]-float64(f.Rows)*f.CellM)
	}
	cols, rows := math.Round((east-west)/first.CellM), math.Round((north-south)/first.CellM)
	if cols*rows > MaxCells {
		return nil, fmt.Errorf("the maps of all sites together span %.0f million cells; at most %d million are joined: map them in groups with --site, or in larger cells", cols*rows/1e6, MaxCells/1_000_000)
	}
	return &raster.Frame{
		Cols: int(cols), Rows: int(rows), CellM: first.CellM, WKT: first.WKT,
		GeoTransform: [6]float64{west, first.CellM, 0, north, 0, -first.CellM},
	}, nil
}

package raster

import (
	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// Cells leads from the pixels of a picture to the frame's cell-centre coordinates. Where the frame's
// reference system cannot hold a place they are not finite.
func (f *Frame) Cells(p Picture) (*terrain.Mesh, error) {
	crs, err := transformTo(f.WKT)
	if err != nil {
		return nil, err
	}
	toCell, _ := affine(f.GeoTransform).inverse() // cells have an area
	toCell = toCell.toCentres()
	return p.mesh(func(nodes []orb.Point) error {
		for i, pixel := range nodes {
			nodes[i] = p.Place(pixel[0], pixel[1])
		}
		if err := crs.forward(nodes); err != nil {
			return err
		}
		for i, at := range nodes {
			nodes[i] = toCell.apply(at[0], at[1])
		}
		return nil
	})
}

// Bounds returns the bounds of the frame in longitude and latitude.
func (f *Frame) Bounds() (orb.Bound, error) {
	edge := make([]orb.Point, 0, 4*edgePoints)
	cols, rows := float64(f.Cols), float64(f.Rows)
	for i := range edgePoints {
		t := float64(i) / edgePoints
		edge = append(edge, orb.Point{t * cols, 0}, orb.Point{cols, t * rows}, orb.Point{cols - t*cols, rows}, orb.Point{0, rows - t*rows})
	}
	err := f.Places(edge)
	return orb.MultiPoint(edge).Bound(), err
}

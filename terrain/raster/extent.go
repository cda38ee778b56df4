package raster

import (
	"fmt"
	"math"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// locate relates the raster to WGS 84 and measures its cells and its extent there.
func (f *file) locate() error {
	in := &f.info
	horizontal := in.readCRS()
	var err error
	if f.crs, err = transformTo(horizontal.text); err != nil {
		return fmt.Errorf("coordinate reference system %q: %w", in.CRS, err)
	}
	centre := affine(in.GeoTransform).apply(float64(in.Cols)/2, float64(in.Rows)/2)
	f.wrapsDeg = math.NaN()
	if horizontal.isGeographic() {
		f.wrapsDeg = centre[0]
	}
	places, err := f.places([]orb.Point{{0, 0}, {1, 0}, {0, 1}}, float64(in.Cols)/2, float64(in.Rows)/2)
	if err != nil {
		return err
	}
	if !onEarth(places[0]) || !onEarth(places[1]) || !onEarth(places[2]) {
		return fmt.Errorf("its middle, %g, %g, lies outside what its reference system %q can hold: the geotransform and the system do not belong together", centre[0], centre[1], in.CRS)
	}
	in.CellXM, _, _ = Inverse(places[0], places[1])
	in.CellYM, _, _ = Inverse(places[0], places[2])
	if f.crs.isBallpark(places[0]) {
		in.Warnings = append(in.Warnings, fmt.Sprintf("PROJ has no datum shift between %q and WGS 84: places may be off by some hundred metres", in.CRS))
	}
	return f.measureExtent(places[0])
}

// onEarth says whether PROJ gave a place that is one; longitudes may count on beyond 180 degrees.
func onEarth(p orb.Point) bool {
	return finite(p) && math.Abs(p.Lat()) <= 90 && math.Abs(p.Lon()) <= 360
}

// places returns places on WGS 84 of positions counted in cells from the outer corner of the
// first, after adding an offset to each.
func (f *file) places(positions []orb.Point, col, row float64) ([]orb.Point, error) {
	at := make([]orb.Point, len(positions))
	for i, p := range positions {
		at[i] = affine(f.info.GeoTransform).apply(col+p[0], row+p[1])
	}
	return at, f.crs.inverse(at)
}

// edgePoints is how many points of each edge are looked at for a raster's extent in longitude
// and latitude, since edges are curved there.
const edgePoints = 32

// measureExtent works out the bounds of the raster in its own system and on WGS 84.
func (f *file) measureExtent(centre orb.Point) error {
	in := &f.info
	cols, rows := float64(in.Cols), float64(in.Rows)
	var edge []orb.Point
	for i := range edgePoints {
		t := float64(i) / edgePoints
		edge = append(edge, orb.Point{t * cols, 0}, orb.Point{cols, t * rows}, orb.Point{cols - t*cols, rows}, orb.Point{0, rows - t*rows})
	}
	toGround := affine(in.GeoTransform)
	in.Extent = box(orb.MultiPoint{toGround.apply(0, 0), toGround.apply(cols, 0), toGround.apply(cols, rows), toGround.apply(0, rows)}.Bound())
	places, err := f.places(edge, 0, 0)
	if err != nil {
		return err
	}
	lonLat := centre.Bound()
	for _, p := range places {
		if finite(p) {
			p[0] = centre[0] + math.Remainder(p[0]-centre[0], 360)
			lonLat = lonLat.Extend(p)
		}
	}
	lonLat, err = f.extendToPoles(lonLat)
	in.LonLat = box(lonLat)
	return err
}

// extendToPoles widens the extent of a raster that holds a pole, which its edges do not tell.
func (f *file) extendToPoles(lonLat orb.Bound) (orb.Bound, error) {
	poles := [...]orb.Point{{0, 90}, {0, -90}}
	at := poles
	if err := f.crs.forward(at[:]); err != nil {
		return lonLat, err
	}
	in := &f.info
	for i, pole := range poles {
		if col, row := f.cell(at[i]); terrain.Inside(in.Cols, in.Rows, col, row) {
			lonLat = lonLat.Extend(pole)
			lonLat.Min[0], lonLat.Max[0] = -180, 180
		}
	}
	return lonLat, nil
}

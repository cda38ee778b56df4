package raster

import "github.com/paulmach/orb"

// An affine maps one plane to another in the order of GDAL's geotransform: x' is
// a[0] + x a[1] + y a[2], y' is a[3] + x a[4] + y a[5]. A geotransform leads from columns and
// rows, counted from the outer corner of the first cell, to the reference system.
type affine [6]float64

func (a affine) apply(x, y float64) orb.Point {
	return orb.Point{a[0] + x*a[1] + y*a[2], a[3] + x*a[4] + y*a[5]}
}

// inverse is the map back; ok is false where there is none.
func (a affine) inverse() (back affine, ok bool) {
	det := a[1]*a[5] - a[2]*a[4]
	if det == 0 || det != det {
		return affine{}, false
	}
	back = affine{1: a[5] / det, 2: -a[2] / det, 4: -a[4] / det, 5: a[1] / det}
	back[0] = -(a[0]*back[1] + a[3]*back[2])
	back[3] = -(a[0]*back[4] + a[3]*back[5])
	return back, true
}

// toCentres moves the origin of the result from the outer corner of the first cell to its centre.
func (a affine) toCentres() affine {
	a[0] -= 0.5
	a[3] -= 0.5
	return a
}

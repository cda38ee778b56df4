package coverage

import (
	"math"

	"fellreach/terrain/raster"
)

// A Band is the part of a map whose values lie from FromDB up to the next band's; the last has no
// upper end.
type Band struct {
	FromDB  float64  `json:"from_db"`
	ToDB    *float64 `json:"to_db"`
	Cells   int      `json:"cells"`
	AreaKm2 float64  `json:"area_km2"` // on the ellipsoid
}

// classify gives every cell the number of its band, counted from 1; 0 lies under the first band, or
// is void. fromDB grows.
func classify(cells []float32, fromDB []float64) []uint8 {
	classes := make([]uint8, len(cells))
	for i, v := range cells {
		for k := len(fromDB) - 1; k >= 0; k-- {
			if float64(v) >= fromDB[k] {
				classes[i] = uint8(k + 1)
				break
			}
		}
	}
	return classes
}

// areaBlock is the side, in cells, of the squares within which all cells are taken to be as large.
const areaBlock = 32

// measure counts the cells of each class 1 to count and their areas.
func measure(classes []uint8, f *raster.Frame, fromDB []float64) []Band {
	bands := make([]Band, len(fromDB))
	for k := range bands {
		bands[k].FromDB = fromDB[k]
		if k+1 < len(bands) {
			bands[k].ToDB = &fromDB[k+1]
		}
	}
	for top := 0; top < f.Rows; top += areaBlock {
		for left := 0; left < f.Cols; left += areaBlock {
			var counts [math.MaxUint8 + 1]int
			bottom, right := min(top+areaBlock, f.Rows), min(left+areaBlock, f.Cols)
			for row := top; row < bottom; row++ {
				for _, class := range classes[row*f.Cols+left : row*f.Cols+right] {
					counts[class]++
				}
			}
			area := cellKm2(f, float64(left+right-1)/2, float64(top+bottom-1)/2)
			for k := range bands {
				bands[k].Cells += counts[k+1]
				bands[k].AreaKm2 += area * float64(counts[k+1])
			}
		}
	}
	return bands
}

// cellKm2 is the area of a cell on the ellipsoid. The plane of geodesics keeps lengths from the
// site and stretches those across them by x/sin x, x the distance over the Earth's radius: on a
// sphere exactly, on the ellipsoid to 1e-6 at 150 km.
func cellKm2(f *raster.Frame, col, row float64) float64 {
	e0, n0 := f.Plane.At(col-0.5, row)
	e1, n1 := f.Plane.At(col+0.5, row)
	e2, n2 := f.Plane.At(col, row-0.5)
	e3, n3 := f.Plane.At(col, row+0.5)
	area := math.Abs((e1-e0)*(n3-n2)-(e3-e2)*(n1-n0)) / 1e6
	const earthRadiusM = 6371e3
	if x := math.Hypot((e0+e1)/2, (n0+n1)/2) / earthRadiusM; x > 0 {
		area *= math.Sin(x) / x
	}
	return area
}

package terrain

import (
	"math"

	"github.com/paulmach/orb"
)

// A Disc is the ground within some distance of a site, in memory.
//
// A place in it is given by its position on the plane of geodesics from the site: the geodesic's
// length times the sine and the cosine of its azimuth at the site, metres to the east and to the
// north. Geodesics from the site are straight lines there, and true to length.
type Disc struct {
	Site    orb.Point
	RadiusM float64
	// Heights are asked in turn: the first that knows a place's height wins.
	Heights []Layer
	// Cover tells what stands on the ground; nil where nothing is known.
	Cover *CoverLayer
	// Coast tells, in the cover layer's cells, where low land is coastal.
	Coast *Coast
	// BeyondSea says that outside all rasters lies the sea.
	BeyondSea bool
	// Places leads from the plane to longitude and latitude.
	Places *Mesh
}

// A Layer is a window of a raster; Place leads from the plane to its cell-centre coordinates.
type Layer struct {
	Grid  *Grid
	Place *Mesh
}

// A CoverLayer is a window of a land-cover raster: for each cell the index of its class in Classes,
// of which the first stands for unknown cover.
type CoverLayer struct {
	Cols, Rows int
	Cells      []uint8
	Classes    []Class
	Place      *Mesh
}

// centreSlack is how near to the centre of a row or column, in cells, a position next to a void is
// taken to lie on it: far more than the meshes are off, far less than matters.
const centreSlack = 1e-3

// height returns the bilinear height at a position of the grid, NaN outside it and in a void. Close
// to the centre of a row or column, the void cells beside it do not count.
func (l *Layer) height(col, row float64) float64 {
	g := l.Grid
	c, r := int(col), int(row)
	if col >= 0 && row >= 0 && c < g.Cols-1 && r < g.Rows-1 {
		u, v := col-float64(c), row-float64(r)
		i := r*g.Cols + c
		upper, lower := g.Cells[i:i+2:i+2], g.Cells[i+g.Cols:i+g.Cols+2:i+g.Cols+2]
		a, b := float64(upper[0]), float64(lower[0])
		a += (float64(upper[1]) - a) * u
		b += (float64(lower[1]) - b) * u
		if h := a + (b-a)*v; h == h {
			return h
		}
	}
	return g.Bilinear(onCentre(col), onCentre(row))
}

func onCentre(at float64) float64 {
	if whole := math.Round(at); math.Abs(at-whole) < centreSlack {
		return whole
	}
	return at
}

// Height returns the height at a position of the plane, NaN in a void or, unless the sea lies
// there, outside all rasters. sea tells that the place lies in the open sea beyond the rasters.
func (d *Disc) Height(east, north float64) (aslM float64, sea bool) {
	outside := true
	for i := range d.Heights {
		l := &d.Heights[i]
		col, row := l.Place.At(east, north)
		if h := l.height(col, row); h == h {
			return h, false
		}
		outside = outside && !Inside(l.Grid.Cols, l.Grid.Rows, col, row)
	}
	if outside && d.BeyondSea {
		return 0, true
	}
	return math.NaN(), false
}

// Point returns the height of the ground at a position of the plane (as [Disc.Height]) and what
// stands on it.
func (d *Disc) Point(east, north float64) (aslM, coverM float64, zone Zone) {
	aslM, sea := d.Height(east, north)
	switch {
	case sea:
		return aslM, 0, Sea
	case d.Cover == nil:
		return aslM, 0, Inland
	}
	coverM, zone = d.Cover.at(d.Cover.Place.At(east, north))
	return aslM, coverM, d.Coastal(zone, aslM, east, north)
}

// Coastal returns the zone of a place on the plane, its ground aslM metres above sea level (NaN
// where that is not known), from the zone of its cover.
func (d *Disc) Coastal(zone Zone, aslM, east, north float64) Zone {
	if d.Coast == nil || !zone.IsCoastalNearSea(aslM) {
		return zone
	}
	col, row := d.Cover.Place.At(east, north)
	return d.Coast.Zone(zone, aslM, col, row)
}

func (c *CoverLayer) at(col, row float64) (heightM float64, zone Zone) {
	if !Inside(c.Cols, c.Rows, col, row) {
		return 0, Inland
	}
	class := &c.Classes[c.Cells[nearest(row, c.Rows)*c.Cols+nearest(col, c.Cols)]]
	return class.HeightM, class.Zone
}

// A Ray is a straight line of the plane with points at equal distances.
type Ray struct{ East, North, StepEast, StepNorth float64 } // its first point, and the way to the next

// rayPoints is how many points of a ray lie between two that are looked up in the meshes; between
// them places are spaced evenly, which a kilometre or so of geodesic keeps within millimetres.
const rayPoints = 16

// Sample fills in the heights (as [Disc.Height]), covers and zones of the first len(aslM) points of
// a ray. The slices are of equal length.
func (d *Disc) Sample(r Ray, aslM, coverM []float64, zones []Zone) {
	for i := range aslM {
		coverM[i], zones[i] = 0, Inland
	}
	if d.Cover != nil {
		d.Cover.sample(r, coverM, zones)
	}
	d.Heights[0].sample(r, aslM)
	for i, h := range aslM {
		if h == h {
			continue
		}
		var sea bool
		at := float64(i)
		if aslM[i], sea = d.Height(r.East+at*r.StepEast, r.North+at*r.StepNorth); sea {
			coverM[i], zones[i] = 0, Sea
		}
	}
	if d.Coast == nil {
		return
	}
	for i, zone := range zones {
		at := float64(i)
		zones[i] = d.Coastal(zone, aslM[i], r.East+at*r.StepEast, r.North+at*r.StepNorth)
	}
}

// sample fills in the heights of the first points of a ray.
func (l *Layer) sample(r Ray, aslM []float64) {
	for from := 0; from < len(aslM); from += rayPoints {
		part := aslM[from:min(from+rayPoints, len(aslM))]
		s := r.stretch(l.Place, from, len(part))
		for i := range part {
			part[i] = l.height(s.at(i))
		}
	}
}

// sample fills in the covers and zones of the first points of a ray.
func (c *CoverLayer) sample(r Ray, coverM []float64, zones []Zone) {
	for from := 0; from < len(coverM); from += rayPoints {
		to := min(from+rayPoints, len(coverM))
		s := r.stretch(c.Place, from, to-from)
		for i := from; i < to; i++ {
			coverM[i], zones[i] = c.at(s.at(i - from))
		}
	}
}

// A stretch is a part of a ray on a raster: the place of its first point, and the way to the next.
type stretch struct{ col, row, stepCol, stepRow float64 }

func (s *stretch) at(i int) (col, row float64) {
	k := float64(i)
	return s.col + k*s.stepCol, s.row + k*s.stepRow
}

// stretch looks up count points of a ray, at most rayPoints.
func (r *Ray) stretch(place *Mesh, from, count int) stretch {
	at, to := float64(from), float64(from+count)
	col, row := place.At(r.East+at*r.StepEast, r.North+at*r.StepNorth)
	endCol, endRow := place.At(r.East+to*r.StepEast, r.North+to*r.StepNorth)
	return stretch{col, row, (endCol - col) / float64(count), (endRow - row) / float64(count)}
}

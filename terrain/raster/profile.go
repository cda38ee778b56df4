package raster

import (
	"fmt"
	"math"
	"slices"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// minPathM is the least distance of two places that are told apart.
const minPathM = 1

// maxIntervals bounds the points of a profile, and with them its memory.
const maxIntervals = 1_000_000

// Profile returns the ground under the geodesic from one place to another, in ceil(length/step)
// equal intervals: the same points whichever end is named first. Voids up to the spec's length
// are bridged with a note; a longer one is a [*terrain.VoidError], a value that is no height a
// [*terrain.HeightError], and a land-cover class that the table lacks a [*terrain.ClassError].
// Places nearer to each other than 1 m are an error.
//
// Zones come from the land cover and from where the sea lies; land up to 100 m high within 50 km
// of the sea is coastal, as [Ground.Coast] says in full.
func (g *Ground) Profile(from, to orb.Point) (terrain.Profile, error) {
	p, err := g.path(from, to)
	if err != nil {
		return terrain.Profile{}, err
	}
	aslM, outside, err := g.heights(p.Points)
	if err != nil {
		return terrain.Profile{}, err
	}
	p.AslM = aslM
	if g.spec.BeyondSea {
		for i, out := range outside {
			if out {
				p.AslM[i], p.Zone[i] = 0, terrain.Sea
			}
		}
	}
	if p.Notes, err = terrain.Bridge(p.DistKm, p.AslM, p.Points, outside, g.spec.BridgeM); err != nil {
		return terrain.Profile{}, err
	}
	if err := g.addCover(&p, outside); err != nil {
		return terrain.Profile{}, err
	}
	return p, nil
}

// path lays out the points of a profile: distances and places, no heights yet, zones inland.
func (g *Ground) path(from, to orb.Point) (terrain.Profile, error) {
	for _, end := range []orb.Point{from, to} {
		if err := checkPlace(end); err != nil {
			return terrain.Profile{}, err
		}
	}
	// The geodesic is always worked out from the same end, so that its points are the very same.
	swapped := from[0] > to[0] || from[0] == to[0] && from[1] > to[1]
	if swapped {
		from, to = to, from
	}
	distM, azDeg, backAzDeg := Inverse(from, to)
	if distM < minPathM {
		return terrain.Profile{}, fmt.Errorf("%s and %s are %.2f m apart: a path needs at least %d m", terrain.FormatDecimal(from), terrain.FormatDecimal(to), distM, minPathM)
	}
	n, err := intervals(distM, g.stepM)
	if err != nil {
		return terrain.Profile{}, err
	}
	p := terrain.Profile{
		DistKm: make([]float64, n+1),
		CoverM: make([]float64, n+1),
		Zone:   slices.Repeat([]terrain.Zone{terrain.Inland}, n+1),
		Points: make([]orb.Point, n+1),
		AzDeg:  azDeg, BackAzDeg: backAzDeg,
	}
	Line(from, azDeg, distM/float64(n), p.Points)
	p.Points[0], p.Points[n] = from, to
	if swapped {
		slices.Reverse(p.Points)
		p.AzDeg, p.BackAzDeg = backAzDeg, azDeg
	}
	for i := range p.DistKm {
		p.DistKm[i] = distM / 1000 * float64(i) / float64(n)
	}
	return p, nil
}

// intervals is how many equal steps of at most stepM a length takes.
func intervals(distM, stepM float64) (int, error) {
	n := math.Ceil(distM / stepM)
	if n > maxIntervals {
		return 0, fmt.Errorf("a path of %.1f km in steps of %g m has more than %d points: take a longer step", distM/1000, stepM, maxIntervals)
	}
	return int(n), nil
}

// heights returns the heights at places, NaN in voids, and which places lie outside all
// rasters. Rasters after the first are asked for what is still missing alone.
func (g *Ground) heights(points []orb.Point) (aslM []float64, outside []bool, err error) {
	aslM, outside = make([]float64, len(points)), make([]bool, len(points))
	missing := make([]int, len(points))
	for i := range points {
		aslM[i], outside[i], missing[i] = math.NaN(), true, i
	}
	placed := placing{points: points}
	for _, f := range g.elevation {
		if len(missing) == 0 {
			break
		}
		at, err := placed.in(f.crs, missing)
		if err != nil {
			return nil, nil, err
		}
		if missing, err = g.sampleHeights(f, at, points, missing, aslM, outside); err != nil {
			return nil, nil, err
		}
	}
	return aslM, outside, nil
}

// sampleHeights fills in the missing heights that a file holds and returns what is missing still.
func (g *Ground) sampleHeights(f *file, at, points []orb.Point, missing []int, aslM []float64, outside []bool) (still []int, err error) {
	s := sampler{cache: g.cache, file: f}
	for _, i := range missing {
		col, row := f.cell(at[i])
		if !terrain.Inside(f.info.Cols, f.info.Rows, col, row) {
			still = append(still, i)
			continue
		}
		outside[i] = false
		h, ok, err := s.height(col, row)
		switch {
		case err != nil:
			return nil, err
		case !ok:
			return nil, &terrain.HeightError{At: points[i], HeightM: h, File: f.info.Path}
		case math.IsNaN(h):
			still = append(still, i)
		}
		aslM[i] = h
	}
	return still, nil
}

// A placing holds the same places in the reference systems asked for so far.
type placing struct {
	points []orb.Point
	held   map[*transform][]orb.Point
}

// in returns the places in a reference system; those of the given indices are valid. Later calls
// for the system may ask for a part of them alone.
func (p *placing) in(crs *transform, indices []int) ([]orb.Point, error) {
	if at := p.held[crs]; at != nil {
		return at, nil
	}
	some := make([]orb.Point, len(indices))
	for k, i := range indices {
		some[k] = p.points[i]
	}
	if err := crs.forward(some); err != nil {
		return nil, err
	}
	at := make([]orb.Point, len(p.points))
	for k, i := range indices {
		at[i] = some[k]
	}
	if p.held == nil {
		p.held = map[*transform][]orb.Point{}
	}
	p.held[crs] = at
	return at, nil
}

// addCover fills in cover heights and zones. The open sea beyond the rasters has none.
func (g *Ground) addCover(p *terrain.Profile, outside []bool) error {
	if g.cover == nil {
		return nil
	}
	at := slices.Clone(p.Points)
	if err := g.cover.crs.forward(at); err != nil {
		return err
	}
	s := sampler{cache: g.cache, file: g.cover}
	unknown := 0
	for i := range at {
		if outside[i] && g.spec.BeyondSea {
			continue
		}
		class, known, err := g.class(&s, at[i], p.Points[i])
		if err != nil {
			return err
		}
		if !known {
			unknown++
			continue
		}
		p.Zone[i] = class.Zone
		if !g.spec.Surface {
			p.CoverM[i] = class.HeightM
		}
	}
	if unknown > 0 {
		p.Notes = append(p.Notes, fmt.Sprintf("land cover is unknown on %.0f %% of the path: taken as bare land there", math.Ceil(100*float64(unknown)/float64(len(at)))))
	}
	return g.markCoast(p, at)
}

// class looks up what stands at a place, given in the cover raster's system too.
func (g *Ground) class(s *sampler, at, place orb.Point) (class terrain.Class, known bool, err error) {
	col, row := s.file.cell(at)
	if !terrain.Inside(s.file.info.Cols, s.file.info.Rows, col, row) {
		return terrain.Class{}, false, nil
	}
	value, known, err := s.class(col, row)
	if err != nil || !known {
		return terrain.Class{}, false, err
	}
	class, err = terrain.Classes(g.spec.Classes).At(value, place)
	return class, err == nil, err
}

package raster

import (
	"errors"
	"math"
	"sync"

	"github.com/paulmach/orb"
	"github.com/twpayne/go-proj/v11"
)

// A transform leads from longitude and latitude on WGS 84 to another coordinate reference
// system, axes in the order east, north. Many goroutines may use it at once: a PROJ object serves
// one at a time, so each takes one from the idle ones or makes its own.
type transform struct {
	crs string // anything PROJ takes: a code or WKT

	mutex sync.Mutex
	idle  []*proj.PJ
}

// newTransform checks that PROJ can relate the system to WGS 84 at all.
func newTransform(crs string) (*transform, error) {
	t := &transform{crs: crs}
	pj, err := t.create()
	if err != nil {
		return nil, err
	}
	t.idle = []*proj.PJ{pj}
	return t, nil
}

// create makes a PROJ object with a context of its own.
func (t *transform) create() (*proj.PJ, error) {
	pj, err := proj.NewContext().NewCRSToCRS("EPSG:4326", t.crs, nil)
	if err != nil {
		return nil, errors.New("PROJ does not know it, or cannot relate it to WGS 84")
	}
	return pj.NormalizeForVisualization()
}

// forward turns places on WGS 84 into eastings and northings, in place. What the system cannot
// hold becomes infinite.
func (t *transform) forward(points []orb.Point) error {
	return t.apply(proj.DirectionFwd, points)
}

// inverse turns eastings and northings into places on WGS 84, in place.
func (t *transform) inverse(points []orb.Point) error {
	return t.apply(proj.DirectionInv, points)
}

func (t *transform) apply(direction proj.Direction, points []orb.Point) error {
	pj, err := t.take()
	if err != nil {
		return err
	}
	defer t.put(pj)
	coords := make([]proj.Coord, len(points))
	for i, p := range points {
		// An infinite time means none: 0 would be the year 0 to systems that drift.
		coords[i] = proj.Coord{p[0], p[1], 0, math.Inf(1)}
	}
	// The error tells of single points only, and those come back infinite.
	_ = pj.TransArray(direction, coords)
	for i, c := range coords {
		points[i] = orb.Point{c[0], c[1]}
	}
	return nil
}

// take returns an idle PROJ object, or a new one.
func (t *transform) take() (*proj.PJ, error) {
	t.mutex.Lock()
	if n := len(t.idle); n > 0 {
		defer t.mutex.Unlock()
		pj := t.idle[n-1]
		t.idle = t.idle[:n-1]
		return pj, nil
	}
	t.mutex.Unlock() // making one takes milliseconds
	return t.create()
}

func (t *transform) put(pj *proj.PJ) {
	t.mutex.Lock()
	defer t.mutex.Unlock()
	t.idle = append(t.idle, pj)
}

// isBallpark says whether PROJ, for want of the datum shift, takes the other system's longitudes
// and latitudes for those of WGS 84 at a place. That can be hundreds of metres out.
func (t *transform) isBallpark(place orb.Point) bool {
	pj, err := t.take()
	if err != nil {
		return false
	}
	defer t.put(pj)
	if _, err := pj.Forward(proj.Coord{place[0], place[1], 0, math.Inf(1)}); err != nil {
		return false
	}
	used, err := pj.GetLastUsedOperation()
	return err == nil && used.HasBallparkTransformation()
}

// finite says whether PROJ gave a place for a point.
func finite(p orb.Point) bool {
	return !math.IsInf(p[0], 0) && !math.IsInf(p[1], 0) && !math.IsNaN(p[0]) && !math.IsNaN(p[1])
}

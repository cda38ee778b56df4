package raster

import (
	"errors"
	"math"
	"sync"

	"github.com/paulmach/orb"
	"github.com/twpayne/go-proj/v11"
)

// A transform leads from longitude and latitude on WGS 84 to another coordinate reference
// system, axes in the order east, north. Many goroutines may use it at once.
type transform struct {
	objects *pool[*proj.PJ]
	area    func() (area, bool) // what the system is meant for, if PROJ knows it
}

// transforms holds the transforms in use, by reference system. PROJ takes milliseconds to make
// one and keeps a file open for each; Go's garbage collector sees neither.
var transforms struct {
	sync.Mutex
	to map[string]*transform
}

// maxTransforms bounds the transforms that are held; beyond it the map starts afresh.
const maxTransforms = 64

// transformTo returns the transform to a reference system, given as anything PROJ takes: a code
// such as "EPSG:32627", or WKT. It is an error if PROJ cannot relate the system to WGS 84.
func transformTo(crs string) (*transform, error) {
	transforms.Lock()
	defer transforms.Unlock()
	if t := transforms.to[crs]; t != nil {
		return t, nil
	}
	t := &transform{
		objects: newPool(func() (*proj.PJ, error) { return newProjection(crs) }),
		area:    sync.OnceValues(func() (area, bool) { return areaOfUse(crs) }),
	}
	if err := t.objects.with(func(*proj.PJ) error { return nil }); err != nil {
		return nil, err
	}
	if transforms.to == nil || len(transforms.to) >= maxTransforms {
		transforms.to = map[string]*transform{}
	}
	transforms.to[crs] = t
	return t, nil
}

// newProjection makes a PROJ object with a context of its own.
func newProjection(crs string) (*proj.PJ, error) {
	pj, err := proj.NewContext().NewCRSToCRS("EPSG:4326", crs, nil)
	if err != nil {
		return nil, errors.New("PROJ does not know it, or cannot relate it to WGS 84")
	}
	return pj.NormalizeForVisualization()
}

// forward turns places on WGS 84 into eastings and northings, in place. What the system cannot
// hold becomes infinite or NaN.
func (t *transform) forward(points []orb.Point) error {
	return t.apply(proj.DirectionFwd, points)
}

// inverse turns eastings and northings into places on WGS 84, in place.
func (t *transform) inverse(points []orb.Point) error {
	return t.apply(proj.DirectionInv, points)
}

func (t *transform) apply(direction proj.Direction, points []orb.Point) error {
	coords := make([]proj.Coord, len(points))
	for i, p := range points {
		coords[i] = coord(p)
	}
	err := t.objects.with(func(pj *proj.PJ) error {
		// The error tells of single points only, and those come back infinite.
		_ = pj.TransArray(direction, coords)
		return nil
	})
	for i, c := range coords {
		points[i] = orb.Point{c[0], c[1]}
	}
	return err
}

// coord is a point for PROJ. An infinite time means none: 0 would be the year 0 to systems that
// drift.
func coord(p orb.Point) proj.Coord { return proj.Coord{p[0], p[1], 0, math.Inf(1)} }

// isBallpark says whether PROJ, for want of the datum shift, takes the other system's longitudes
// and latitudes for those of WGS 84 at a place. That can be hundreds of metres out.
func (t *transform) isBallpark(place orb.Point) (ballpark bool) {
	err := t.objects.with(func(pj *proj.PJ) error {
		if _, err := pj.Forward(coord(place)); err != nil {
			return err
		}
		used, err := pj.GetLastUsedOperation()
		ballpark = err == nil && used.HasBallparkTransformation()
		return err
	})
	return err == nil && ballpark
}

// finite says whether PROJ gave a place for a point.
func finite(p orb.Point) bool {
	return !math.IsInf(p[0], 0) && !math.IsInf(p[1], 0) && !math.IsNaN(p[0]) && !math.IsNaN(p[1])
}

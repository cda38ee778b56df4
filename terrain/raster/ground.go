package raster

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A Spec names the rasters of a [Ground] and how they are read.
type Spec struct {
	Elevation []string // paths, absolute or from the working directory; the first listed wins
	Surface   bool     // heights hold trees and roofs already, so cover heights are not added

	Cover   string                // path of the land-cover raster, or empty
	Classes map[int]terrain.Class // what its values stand for

	StepM     float64 // spacing of profile points, 0 for the default; see [Ground.StepM]
	BridgeM   float64 // longest void that a profile may cross, 0 for none
	BeyondSea bool    // outside all elevation rasters lies the sea
}

// A Ground is the terrain as a set of rasters tells it. Many goroutines may ask it at once. It
// keeps at most 512 MB of cells in memory, whatever the size of the files, and GDAL at most 128 MB
// of file blocks; where the sea is near takes up to 8 MB.
type Ground struct {
	spec      Spec
	stepM     float64
	elevation []*file
	cover     *file  // nil where there is none
	shore     *shore // nil where no class of it is sea
	cache     *tileCache
}

// Open opens all rasters of a spec. The errors name the file, what is wrong with it and what
// helps.
func Open(spec Spec) (*Ground, error) {
	if err := spec.check(); err != nil {
		return nil, err
	}
	g := &Ground{spec: spec, cache: newTileCache(cacheBytes)}
	if err := g.openFiles(); err != nil {
		g.Close()
		return nil, err
	}
	g.shore = newShore(g)
	g.stepM = spec.StepM
	if g.stepM == 0 {
		g.stepM = g.defaultStepM()
	}
	return g, nil
}

func (s Spec) check() error {
	switch {
	case len(s.Elevation) == 0:
		return errors.New("no elevation raster is listed")
	case !(s.StepM >= 0) || math.IsInf(s.StepM, 0):
		return fmt.Errorf("a step of %g m between profile points is not above 0", s.StepM)
	case !(s.BridgeM >= 0):
		return fmt.Errorf("a bridged void of %g m is below 0", s.BridgeM)
	}
	return terrain.Classes(s.Classes).Check()
}

func (g *Ground) openFiles() error {
	for _, path := range g.spec.Elevation {
		f, err := openFile(path, forElevation)
		if err != nil {
			return err
		}
		g.elevation = append(g.elevation, f)
	}
	if g.spec.Cover == "" {
		return nil
	}
	var err error
	g.cover, err = openFile(g.spec.Cover, forCover)
	return err
}

// minStepM is the least default spacing of profile points.
const minStepM = 30

// defaultStepM is the larger of the finest raster's cell, the shorter of its sides, and 30 m.
func (g *Ground) defaultStepM() float64 {
	finestM := math.Inf(1)
	for _, f := range g.elevation {
		finestM = min(finestM, f.info.CellXM, f.info.CellYM)
	}
	return max(finestM, minStepM)
}

// StepM returns the greatest spacing of profile points in metres: the spec's, or the larger of
// 30 m and the finest raster's cell (the shorter of its sides on the ellipsoid, at its middle).
func (g *Ground) StepM() float64 { return g.stepM }

// Files tells what the rasters say of themselves, elevation in its order, then cover.
func (g *Ground) Files() []Info {
	var all []Info
	for _, f := range g.files() {
		all = append(all, f.info)
	}
	return all
}

func (g *Ground) files() []*file {
	if g.cover == nil {
		return g.elevation
	}
	return append(slices.Clone(g.elevation), g.cover)
}

// Close closes the files. Nobody may be asking the ground any more.
func (g *Ground) Close() {
	for _, f := range g.files() {
		f.close()
	}
}

// HeightAslM returns the height of the bare ground (of the surface, where the spec says so) at a
// place, in metres above sea level. In a void, or outside the rasters unless the sea lies there,
// it is a [*terrain.VoidError].
func (g *Ground) HeightAslM(at orb.Point) (float64, error) {
	if err := checkPlace(at); err != nil {
		return 0, err
	}
	points := []orb.Point{at}
	aslM, outside, err := g.heights(points)
	if err != nil {
		return 0, err
	}
	if outside[0] && g.spec.BeyondSea {
		return 0, nil
	}
	if math.IsNaN(aslM[0]) {
		return 0, &terrain.VoidError{From: at, To: at, Outside: outside[0]}
	}
	return aslM[0], nil
}

// checkPlace refuses what is no longitude and latitude.
func checkPlace(p orb.Point) error {
	if !(math.Abs(p.Lat()) <= 90) || !(math.Abs(p.Lon()) <= 180) {
		return fmt.Errorf("longitude %g, latitude %g is no place on Earth: allowed are -180 to 180 and -90 to 90 degrees", p.Lon(), p.Lat())
	}
	return nil
}

// CoverAt returns what stands at a place, with its height even where the elevation rasters hold
// that already. known is false where there is no land cover. A class that the table lacks is a
// [*terrain.ClassError]. The zone is the class's own, never coastal unless the table says so.
func (g *Ground) CoverAt(at orb.Point) (class terrain.Class, known bool, err error) {
	if err := checkPlace(at); err != nil {
		return terrain.Class{}, false, err
	}
	if g.cover == nil {
		return terrain.Class{}, false, nil
	}
	inCover := []orb.Point{at}
	if err := g.cover.crs.forward(inCover); err != nil {
		return terrain.Class{}, false, err
	}
	return g.class(&sampler{cache: g.cache, file: g.cover}, inCover[0], at)
}

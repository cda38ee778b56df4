package coverage

import (
	"context"
	"fmt"
	"math"
	"runtime"
	"sync/atomic"

	"fellreach/link/propagation"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"golang.org/x/sync/errgroup"
)

// A Spec says what a sweep goes over and how.
type Spec struct {
	RangeM float64
	// StepM is the distance of a profile's points, BridgeM the longest void that it may cross.
	StepM, BridgeM float64
	// AglM is the height of the site's antenna over its ground, FarAglM that of the antennas in the
	// cells. GroundAslM is a surveyed height of the site's ground, nil where there is none; cover
	// nearer than ClearingM to the site is left out.
	AglM, FarAglM float64
	GroundAslM    *float64
	ClearingM     float64
	// DeltaN is the average fall of refractivity through the lowest kilometre, N-units/km.
	DeltaN float64
	// Fine takes twice the radials, and 8 points of each profile on the cell's own bearing, not 4.
	Fine bool
	// LowestHz is the lowest frequency that is asked for; Beta says that a percentage of time below
	// 50 is.
	LowestHz float64
	Beta     bool
	// Workers is the number of goroutines, 0 for one on each core. Results do not depend on it.
	Workers int
}

// A sweep is a spec ready to go.
type sweep struct {
	Spec
	disc  *terrain.Disc
	frame *raster.Frame
	site  siteGround

	workers, radials  int
	ownPoints, points int // own points of a profile; points of a radial beyond the site
	stepM, stepKm, ae float64
	needsBeta         bool
	perRadian         float64 // radials
	clearLimit        float64 // tightness times distance from which on nothing is lost at any frequency
}

// siteGround is the first point of all profiles.
type siteGround struct {
	groundM, antennaM float64
	zone              terrain.Zone
}

func newSweep(s Spec, disc *terrain.Disc, frame *raster.Frame) (*sweep, error) {
	w := &sweep{Spec: s, disc: disc, frame: frame, stepM: s.StepM, stepKm: s.StepM / 1000, needsBeta: s.Beta, ownPoints: 4}
	w.workers = s.Workers
	if w.workers == 0 {
		w.workers = runtime.GOMAXPROCS(0)
	}
	w.radials = int(math.Ceil(2 * math.Pi * s.RangeM / frame.CellM))
	if s.Fine {
		w.radials, w.ownPoints = 2*w.radials, mostOwn
	}
	w.radials = max(w.radials, 8)
	w.perRadian = float64(w.radials) / (2 * math.Pi)
	w.points = interiorPoints(s.RangeM, s.StepM) + 1
	w.ae = propagation.EffectiveEarthRadiusKm(s.DeltaN)
	// J(nu) is 0 up to nu = -0.78, and nu^2 is tightness times d times 0.002 over the wavelength.
	const blindNu, slack, lightMPerS = 0.78, 1.001, 2.998e8
	w.clearLimit = slack * blindNu * blindNu * lightMPerS / s.LowestHz / 0.002
	groundM, _, zone := disc.Point(0, 0)
	if s.GroundAslM != nil {
		groundM = *s.GroundAslM
	}
	if math.IsNaN(groundM) {
		return nil, &terrain.VoidError{From: disc.Site, To: disc.Site}
	}
	w.site = siteGround{groundM, groundM + s.AglM, zone}
	return w, nil
}

// run visits every cell within range whose profile is known, on all cores. visitor makes the function
// of one goroutine; a cell is visited once, and by one goroutine. progress, if not nil, is told how
// many radials are done.
func (s *sweep) run(ctx context.Context, visitor func() func(*Cell), progress func(done, total int)) (tally, error) {
	p, err := s.divide(ctx)
	if err != nil {
		return tally{}, err
	}
	var next, done, visited atomic.Int64
	work, ctx := errgroup.WithContext(ctx)
	for range s.workers {
		work.Go(func() error {
			w, visit := newWalk(s), visitor()
			for {
				radial := int(next.Add(1)) - 1
				if radial >= s.radials {
					return nil
				}
				if err := ctx.Err(); err != nil {
					return fmt.Errorf("stopped at radial %d of %d: %w", radial, s.radials, err)
				}
				visited.Add(w.visit(radial, p.cells[p.start[radial]:p.start[radial+1]], visit))
				if count := int(done.Add(1)); progress != nil {
					progress(count, s.radials)
				}
			}
		})
	}
	err = work.Wait()
	return tally{len(p.cells), int(visited.Load())}, err
}

// A tally counts the cells within range, and those of them that were visited.
type tally struct{ cells, visited int }

// visit walks one radial, visits its cells on the way and returns how many have a profile.
func (w *walk) visit(radial int, cells []int32, visit func(*Cell)) (visited int64) {
	if len(cells) == 0 {
		return 0
	}
	w.start(radial)
	for _, p := range w.list.of(w.sweep, cells) {
		if w.cell.set(p) {
			visit(&w.cell)
			visited++
		}
	}
	return visited
}

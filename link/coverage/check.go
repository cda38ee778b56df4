package coverage

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"math/bits"
	"slices"
	"sync"

	"fellreach/link"
	"fellreach/terrain"

	"golang.org/x/sync/errgroup"
)

// A Check is how far the map is from other evaluations of its cells, on a sample of them.
type Check struct {
	Samples int `json:"samples"`
	// SweepMaxDB is the largest difference between the loss of the sweep and the direct evaluation
	// of the very same profile.
	SweepMaxDB float64 `json:"sweep_max_db"`
	// The others are differences between the loss of a cell and that of its own profile as a link
	// would take it, in equal steps on its own bearing: the map's sampling error.
	CellMedianDB float64 `json:"cell_median_db"`
	CellP95DB    float64 `json:"cell_p95_db"`
	CellMaxDB    float64 `json:"cell_max_db"`
}

// mostSweepDB is the promise of the sweep.
const mostSweepDB = 1e-6

// A sampling keeps a part of the cells for the check, the same ones in every run.
type sampling struct {
	sweep *sweep
	every uint32

	mutex sync.Mutex
	kept  []sampledCell
}

type sampledCell struct {
	index        int
	lot          uint32 // drawn from the index: the lowest lots are looked at
	lossDB       float64
	verticalPart float64
}

// wantedSamples is how many cells are looked at, where the map has so many. A plenty more are kept
// until it is known how many cells have a profile: a map may be mostly void.
const (
	wantedSamples = 1500
	plenty        = 64
)

func newSampling(s *sweep) *sampling {
	cells := math.Pi * s.RangeM * s.RangeM / (s.frame.CellM * s.frame.CellM)
	return &sampling{sweep: s, every: uint32(max(1, cells/(wantedSamples*plenty)))}
}

// loss keeps a cell if it is one of the sample.
func (s *sampling) loss(r *reckoner, lossDB float64) {
	index := r.cell.Index
	lot := bits.Reverse32(uint32(index) * 2654435761) // Knuth's multiplicative hash, its best bits last
	if lot%s.every != 0 {
		return
	}
	s.mutex.Lock()
	s.kept = append(s.kept, sampledCell{index, lot / s.every, lossDB, r.VerticalShare()})
	s.mutex.Unlock()
}

// check evaluates the sample. A sweep that is off is an error.
func (s *sampling) check(ctx context.Context, t *Task, places *link.Places) (Check, error) {
	slices.SortFunc(s.kept, func(a, b sampledCell) int { return cmp.Or(cmp.Compare(a.lot, b.lot), cmp.Compare(a.index, b.index)) })
	s.kept = s.kept[:min(len(s.kept), wantedSamples)]
	slices.SortFunc(s.kept, func(a, b sampledCell) int { return cmp.Compare(a.index, b.index) })
	sweepDB, cellDB := make([]float64, len(s.kept)), make([]float64, len(s.kept))
	work, ctx := errgroup.WithContext(ctx)
	work.SetLimit(s.sweep.workers)
	const batch = 50
	for from := 0; from < len(s.kept); from += batch {
		work.Go(func() error {
			if ctx.Err() != nil {
				return ctx.Err()
			}
			w := newWalk(s.sweep)
			for i := from; i < min(from+batch, len(s.kept)); i++ {
				var err error
				if sweepDB[i], cellDB[i], err = s.compare(t, w, places.Directions[0].FreqHz, s.kept[i]); err != nil {
					return err
				}
			}
			return nil
		})
	}
	if err := work.Wait(); err != nil {
		return Check{}, err
	}
	return summary(sweepDB, cellDB)
}

// compare evaluates a cell on the profile of the sweep, and on its own. Where the latter crosses a
// void the difference is NaN.
func (s *sampling) compare(t *Task, w *walk, freqHz float64, c sampledCell) (sweepDB, cellDB float64, err error) {
	evaluate := func(p terrain.Profile, latDeg float64) (float64, error) {
		loss, err := t.Conditions.Method.Loss(s.sweep.path(p, latDeg, freqHz, c.verticalPart, t.Conditions.N0))
		return math.Abs(loss.DB - c.lossDB), err
	}
	p, latDeg, ok := w.statedProfile(c.index)
	if !ok {
		return 0, 0, fmt.Errorf("coverage: cell %d has a loss without a profile", c.index)
	}
	if sweepDB, err = evaluate(p, latDeg); err != nil {
		return 0, 0, err
	}
	if p, latDeg, ok = s.sweep.ownProfile(c.index); !ok {
		return sweepDB, math.NaN(), nil
	}
	cellDB, err = evaluate(p, latDeg)
	return sweepDB, cellDB, err
}

func summary(sweepDB, cellDB []float64) (Check, error) {
	c := Check{Samples: len(sweepDB)}
	if c.Samples == 0 {
		return c, nil
	}
	c.SweepMaxDB = slices.Max(sweepDB)
	cellDB = slices.DeleteFunc(cellDB, math.IsNaN)
	if len(cellDB) > 0 {
		slices.Sort(cellDB)
		at := func(share float64) float64 { return cellDB[int(share*float64(len(cellDB)-1))] }
		c.CellMedianDB, c.CellP95DB, c.CellMaxDB = at(0.5), at(0.95), at(1)
	}
	if !(c.SweepMaxDB <= mostSweepDB) {
		return c, fmt.Errorf("the map failed its self-check: the sweep is off by %.3g dB from the direct evaluation of the same profiles, more than %g dB; this is a fault of the program", c.SweepMaxDB, float64(mostSweepDB))
	}
	return c, nil
}

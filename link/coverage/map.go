package coverage

import (
	"context"
	"math"
	"time"

	"fellreach/link"
	"fellreach/terrain"
	"fellreach/terrain/raster"
)

// A Map is the coverage of one site, cell by cell; NaN where a cell lies beyond the range or its
// profile is not known. Layers that were not asked for are nil.
type Map struct {
	Frame *raster.Frame
	// LossDB is the basic transmission loss from the site for half of time and locations, FieldDBuV
	// the field strength, dB(uV/m), that goes with it, and MarginDB the smaller of the link's
	// directions.
	LossDB, MarginDB, FieldDBuV []float32

	Cells, VoidCells int // within range; those of them whose profile is not known
	Radials          int
	Took             time.Duration // the sweep alone
	Check            Check

	disc *terrain.Disc
}

// Compute maps a task over the ground. progress, if not nil, is told how many radials are done, from
// several goroutines. A site without ground is a [*terrain.VoidError].
func Compute(ctx context.Context, ground *raster.Ground, t Task, wanted Layers, progress func(done, total int)) (*Map, error) {
	if err := t.check(wanted); err != nil {
		return nil, err
	}
	places, err := link.NewPlaces(t.Link, t.Conditions)
	if err != nil {
		return nil, err
	}
	frame, err := ground.Frame(t.Link.From.At, t.RangeM, t.CellM)
	if err != nil {
		return nil, err
	}
	disc, err := ground.Disc(t.Link.From.At, t.RangeM+t.CellM+t.StepM)
	if err != nil {
		return nil, err
	}
	return t.over(ctx, places, disc, frame, wanted, progress)
}

// over maps a task over a disc of ground.
func (t *Task) over(ctx context.Context, places *link.Places, disc *terrain.Disc, frame *raster.Frame, wanted Layers, progress func(done, total int)) (*Map, error) {
	s, err := newSweep(t.spec(places), disc, frame)
	if err != nil {
		return nil, err
	}
	m := &Map{Frame: frame, Radials: s.radials, disc: disc}
	for _, layer := range []struct {
		wanted bool
		cells  *[]float32
	}{{wanted.Loss, &m.LossDB}, {wanted.Margin, &m.MarginDB}, {wanted.Field, &m.FieldDBuV}} {
		if layer.wanted {
			*layer.cells = voidCells(frame.Cols * frame.Rows)
		}
	}
	samples := newSampling(s)
	started := time.Now()
	count, err := s.run(ctx, func() func(*Cell) { return newReckoner(t, places, s, m, samples).visit }, progress)
	if err != nil {
		return nil, err
	}
	m.Cells, m.VoidCells, m.Took = count.cells, count.cells-count.visited, time.Since(started)
	m.Check, err = samples.check(ctx, t, places)
	return m, err
}

func voidCells(n int) []float32 {
	cells := make([]float32, n)
	for i := range cells {
		cells[i] = float32(math.NaN())
	}
	return cells
}

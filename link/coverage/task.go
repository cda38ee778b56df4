package coverage

import (
	"fmt"
	"math"

	"fellreach/link"
)

// A Task asks for the map of one site.
type Task struct {
	// Link is the link to every cell: From is the site's station, To the station of the far end,
	// whose antenna is the same in all directions and whose place is each cell's in turn.
	Link       *link.Link
	Conditions link.Conditions
	// LocationsPct is the part of the places of a cell, 1 to 99, for which the loss is not exceeded;
	// 50 takes no location line.
	LocationsPct float64
	RangeM       float64 // 1 to 150 km
	CellM        float64 // 5 to 500 m
	Fine         bool    // see [Spec]
	// StepM is the distance of a profile's points, BridgeM the longest void that it may cross.
	StepM, BridgeM float64
	// Workers is the number of goroutines, 0 for one on each core. Results do not depend on it.
	Workers int
}

// Layers say which results are wanted.
type Layers struct{ Loss, Margin, Field bool }

func (l Layers) count() int {
	n := 0
	for _, wanted := range [...]bool{l.Loss, l.Margin, l.Field} {
		if wanted {
			n++
		}
	}
	return n
}

// Limits of a task.
const (
	minRangeM, maxRangeM = 1_000, 150_000
	minCellM, maxCellM   = 5, 500
	// MaxCells bounds the cells of a map.
	MaxCells = 150_000_000
)

func (t *Task) check(l Layers) error {
	switch {
	case !(t.RangeM >= minRangeM && t.RangeM <= maxRangeM):
		return fmt.Errorf("a range of %g km is outside %d to %d km", t.RangeM/1000, minRangeM/1000, maxRangeM/1000)
	case !(t.CellM >= minCellM && t.CellM <= maxCellM):
		return fmt.Errorf("a cell of %g m is outside %d to %d m", t.CellM, minCellM, maxCellM)
	case !(t.LocationsPct >= 1 && t.LocationsPct <= 99):
		return fmt.Errorf("%g %% of the locations is outside 1 to 99 %%", t.LocationsPct)
	case !(t.StepM > 0):
		return fmt.Errorf("a step of %g m between profile points is not above 0", t.StepM)
	case l.count() == 0:
		return fmt.Errorf("nothing is asked for")
	}
	side := 2 * t.RangeM / t.CellM
	if side*side <= MaxCells {
		return nil
	}
	// 4 bytes a cell for each layer, and as many for the list of cells.
	const bytes = 4
	gigabytes := side * side * bytes * float64(l.count()+1) / 1e9
	fits := math.Ceil(2 * t.RangeM / math.Sqrt(MaxCells))
	return fmt.Errorf("a range of %g km in cells of %g m makes %.0f million cells, %.1f GB in memory; at most %d million are taken: a cell of %.0f m fits",
		t.RangeM/1000, t.CellM, side*side/1e6, gigabytes, MaxCells/1_000_000, fits)
}

// spec is what the sweep needs to know of the task.
func (t *Task) spec(p *link.Places) Spec {
	s := Spec{
		RangeM: t.RangeM, StepM: t.StepM, BridgeM: t.BridgeM, GroundAslM: t.Link.From.GroundAslM,
		DeltaN: t.Conditions.DeltaN, Fine: t.Fine, Workers: t.Workers, Beta: p.ComputesFade(), LowestHz: math.Inf(1),
	}
	s.AglM, s.FarAglM, s.ClearingM = p.Heights()
	for _, d := range p.Directions {
		s.LowestHz = min(s.LowestHz, d.FreqHz)
	}
	return s
}

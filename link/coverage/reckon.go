package coverage

import (
	"math"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/propagation"
)

// A reckoner works out the budgets of cells for one goroutine.
type reckoner struct {
	task    *Task
	places  *link.Places
	into    *Map
	samples *sampling

	briefs []*propagation.Brief // one for each direction
	losses []propagation.Combined

	cell *Cell                 // at hand
	now  *link.PlacesDirection // whose path was worked out last
	seen bool                  // path and pair are those of the cell and the direction
	path link.PlacePath
	pair antennaPair
	// budget is that of the direction now.
	budget cellBudget
}

// An antennaPair is what both antennas do on a path: see [link.PlacesDirection.Antennas].
type antennaPair struct{ sentDBi, caughtDB, verticalPart float64 }

// requests are the loss itself and what a fading allowance is made of.
func requests(p *link.Places, availabilityPct float64) []propagation.Request {
	all := []propagation.Request{{TimePct: 50, Ducting: true}}
	if p.ComputesFade() {
		all = append(all, propagation.Request{TimePct: 50}, propagation.Request{TimePct: link.MirroredTimePct(availabilityPct)})
	}
	return all
}

func newReckoner(t *Task, places *link.Places, s *sweep, into *Map, samples *sampling) *reckoner {
	r := &reckoner{task: t, places: places, into: into, samples: samples}
	asked := requests(places, t.Link.Aim.AvailabilityPct)
	r.losses = make([]propagation.Combined, len(asked))
	for i := range places.Directions {
		freqHz := places.Directions[i].FreqHz
		r.briefs = append(r.briefs, propagation.NewBrief(t.Conditions.Method, freqHz, t.Conditions.N0, s.region(), asked))
	}
	return r
}

// region bounds the paths of the sweep for the path method.
func (s *sweep) region() propagation.Region {
	south, north := math.Inf(1), math.Inf(-1)
	for _, place := range s.disc.Places.Nodes() {
		south, north = min(south, place.Lat()), max(north, place.Lat())
	}
	return propagation.Region{MostKm: s.RangeM/1000 + 1, LeastLatDeg: max(0, south, -north)}
}

// path is the path to a cell as the antennas and the fading see it.
func (c *Cell) path() link.PlacePath {
	o := &c.Outline
	az := c.AzimuthDeg()
	back := az + 180
	if back >= 360 {
		back -= 360
	}
	return link.PlacePath{
		Toward: antenna.Direction{AzDeg: az, ElDeg: mradToDeg(o.ThetaT)},
		Back:   antenna.Direction{AzDeg: back, ElDeg: mradToDeg(o.ThetaR)},
		Trans:  o.TransHorizon, LengthKm: o.LengthKm, TxAslM: o.Hts, RxAslM: o.Hrs,
	}
}

func mradToDeg(mrad float64) float64 { return mrad / 1000 * 180 / math.Pi }

// visit works out one cell.
func (r *reckoner) visit(c *Cell) {
	r.cell, r.seen = c, false
	margin := math.Inf(1)
	for i := range r.places.Directions {
		b := r.direction(i)
		if i == 0 {
			r.write(r.into.LossDB, b.lossDB)
			if r.into.FieldDBuV != nil {
				d := r.now
				r.write(r.into.FieldDBuV, propagation.FieldStrength(d.FreqHz, d.SentDBm+r.antennas().sentDBi, b.lossDB))
			}
			r.samples.loss(r, b.lossDB)
			if r.into.MarginDB == nil {
				return
			}
		}
		margin = min(margin, b.marginDB)
	}
	r.write(r.into.MarginDB, margin)
}

func (r *reckoner) write(layer []float32, value float64) {
	if layer != nil {
		layer[r.cell.Index] = float32(value)
	}
}

// antennas are what both antennas do on the path at hand; they are asked when needed.
func (r *reckoner) antennas() *antennaPair {
	if !r.seen {
		r.path = r.cell.path()
		r.pair.sentDBi, r.pair.caughtDB, r.pair.verticalPart = r.now.Antennas(&r.path)
		r.seen = true
	}
	return &r.pair
}

// VerticalShare implements [propagation.Shares].
func (r *reckoner) VerticalShare() float64 { return r.antennas().verticalPart }

// A cellBudget is what one direction comes to in a cell. PathDB is what its margin owes to the path:
// antennas, loss, fading and locations.
type cellBudget struct{ lossDB, pathDB, marginDB float64 }

// direction works out one direction of the cell at hand. On one frequency the path is the same both
// ways.
func (r *reckoner) direction(i int) (b cellBudget) {
	d := &r.places.Directions[i]
	if i > 0 && d.FreqHz == r.now.FreqHz {
		b = r.budget
	} else {
		r.now, r.seen = d, false
		b = r.overPath(i)
		r.budget = b
	}
	b.marginDB = d.SentDBm + d.FixedDB + b.pathDB
	return b
}

func (r *reckoner) overPath(i int) (b cellBudget) {
	c, d := r.cell, r.now
	r.briefs[i].Loss(&c.Outline, c, r, r.losses)
	b.lossDB = r.losses[0].LossDB(0)
	if r.into.MarginDB == nil {
		return b
	}
	pair := r.antennas()
	if len(r.losses) > 1 {
		r.path.MedianLossDB, r.path.BestLossDB = r.losses[1].LossDB(0), r.losses[2].LossDB(0)
		r.path.LatDeg = c.LatDeg()
	}
	b.pathDB = pair.sentDBi + pair.caughtDB - b.lossDB - r.places.FadeDB(d, &r.path) - r.task.locationDB(d.FreqHz, c.CoverM, r.losses[0])
	return b
}

// locationDB returns the location line at a cell: what the loss gains when it shall not be exceeded
// at the task's part of the locations in a cell among cover of that height.
func (t *Task) locationDB(freqHz, coverM float64, loss propagation.Combined) float64 {
	if t.LocationsPct == 50 {
		return 0
	}
	spread := propagation.LocationSpreadDB(freqHz, t.CellM, t.Link.To.AglM, coverM)
	return loss.LossDB(propagation.LocationDB(t.LocationsPct, spread)) - loss.LossDB(0)
}

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

	briefs []*propagation.Brief // one for each direction; the same where the frequency is
	losses []propagation.Combined
}

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
	return link.PlacePath{
		Toward: antenna.Direction{AzDeg: az, ElDeg: mradToDeg(o.ThetaT)},
		Back:   antenna.Direction{AzDeg: math.Mod(az+180, 360), ElDeg: mradToDeg(o.ThetaR)},
		Trans:  o.TransHorizon, LengthKm: o.LengthKm, TxAslM: o.Hts, RxAslM: o.Hrs,
	}
}

func mradToDeg(mrad float64) float64 { return mrad / 1000 * 180 / math.Pi }

// visit works out one cell.
func (r *reckoner) visit(c *Cell) {
	path := c.path()
	margin := math.Inf(1)
	for i := range r.places.Directions {
		d := &r.places.Directions[i]
		b := r.direction(i, d, c, &path)
		if i == 0 {
			r.write(r.into.LossDB, c.Index, b.lossDB)
			r.write(r.into.FieldDBuV, c.Index, propagation.FieldStrength(d.FreqHz, d.SentDBm+b.sentDBi, b.lossDB))
			r.samples.loss(c, b)
			if r.into.MarginDB == nil {
				return
			}
		}
		margin = min(margin, b.marginDB)
	}
	r.write(r.into.MarginDB, c.Index, margin)
}

func (r *reckoner) write(layer []float32, index int, value float64) {
	if layer != nil {
		layer[index] = float32(value)
	}
}

// A cellBudget is what one direction comes to in a cell.
type cellBudget struct{ sentDBi, verticalPart, lossDB, marginDB float64 }

// direction works out one direction of a cell.
func (r *reckoner) direction(i int, d *link.PlacesDirection, c *Cell, path *link.PlacePath) (b cellBudget) {
	var caughtDB float64
	b.sentDBi, caughtDB, b.verticalPart = d.Antennas(path)
	r.briefs[i].Loss(&c.Outline, c, b.verticalPart, r.losses)
	b.lossDB = r.losses[0].LossDB(0)
	if r.into.MarginDB == nil {
		return b
	}
	if len(r.losses) > 1 {
		path.MedianLossDB, path.BestLossDB = r.losses[1].LossDB(0), r.losses[2].LossDB(0)
		path.LatDeg = c.LatDeg()
	}
	b.marginDB = d.SentDBm + b.sentDBi - b.lossDB + caughtDB + d.FixedDB -
		r.places.FadeDB(d, path) - r.task.locationDB(d.FreqHz, c.CoverM, r.losses[0])
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

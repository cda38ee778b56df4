package link

import (
	"slices"

	"fellreach/antenna"
	"fellreach/link/propagation"
	"fellreach/terrain"
)

// A way is the ground between the ends of a link, from the first end to the second, and the
// losses found on it.
type way struct {
	link          *Link
	first, second *Station
	profile       terrain.Profile
	conditions    Conditions
	timePct       float64 // part of the time for which the loss is not exceeded

	toSecond, toFirst antenna.Direction
	trans             bool
	losses            map[lossKey]propagation.Loss
	verticalShare     float64 // of the budget computed last
}

// lossKey tells evaluations of the path method apart.
type lossKey struct{ freqHz, verticalShare float64 }

// newWay prepares the ground for the path method: surveyed heights at the ends, no cover within
// their clearings, nor where their surroundings are described in its place. It finds where the
// path leaves each end, which depends neither on frequency nor on polarization.
func newWay(l *Link, p terrain.Profile, c Conditions) (*way, error) {
	w := &way{link: l, first: l.From, second: l.To, conditions: c, timePct: 50, losses: map[lossKey]propagation.Loss{}}
	if l.To.Order < l.From.Order {
		w.first, w.second = l.To, l.From
	}
	w.profile = p.Cleared(w.first.clearM(), w.second.clearM())
	w.profile.AslM = slices.Clone(p.AslM)
	if g := w.first.GroundAslM; g != nil {
		w.profile.AslM[0] = *g
	}
	if g := w.second.GroundAslM; g != nil {
		w.profile.AslM[len(p.AslM)-1] = *g
	}
	loss, err := propagation.FreeSpace.Loss(w.path(l.Channel.OutHz, 1))
	if err != nil {
		return nil, err
	}
	w.trans = loss.TransHorizon
	w.toSecond = antenna.Direction{AzDeg: w.profile.AzDeg, ElDeg: loss.TxElDeg}
	w.toFirst = antenna.Direction{AzDeg: w.profile.BackAzDeg, ElDeg: loss.RxElDeg}
	return w, nil
}

// noCoastKm is P.1812's distance to the coast where there is none.
const noCoastKm = 500

// path is what the path method is told, always from the first end.
func (w *way) path(freqHz, verticalShare float64) propagation.Path {
	p := propagation.Path{
		Profile: w.profile, FreqHz: freqHz, TxAglM: w.first.pathAglM(), RxAglM: w.second.pathAglM(), VerticalShare: verticalShare,
		DeltaN: w.conditions.DeltaN, N0: w.conditions.N0, TimePct: w.timePct, LocationPct: 50,
		TxCoastKm: noCoastKm, RxCoastKm: noCoastKm,
	}
	if n := len(w.profile.Points); n > 0 {
		p.LatDeg = w.profile.Points[n/2].Lat()
	}
	if first, last, ok := w.profile.CoastKm(); ok {
		p.TxCoastKm, p.RxCoastKm = first, last
	}
	return p
}

// toward is the direction in which a station sees the path.
func (w *way) toward(from *Station) antenna.Direction {
	if from == w.first {
		return w.toSecond
	}
	return w.toFirst
}

// loss evaluates the path method once for each frequency and polarization, always from the first
// end, so that both directions of one frequency have the same loss.
func (w *way) loss(freqHz, verticalShare float64) (propagation.Loss, error) {
	key := lossKey{freqHz, verticalShare}
	if known, ok := w.losses[key]; ok {
		return known, nil
	}
	loss, err := w.conditions.Method.Loss(w.path(freqHz, verticalShare))
	if err == nil {
		w.losses[key] = loss
	}
	return loss, err
}

// seenFromFrom returns the profile and its worst point as seen from the link's From.
func (w *way) seenFromFrom() (terrain.Profile, propagation.FresnelClearance, error) {
	found, err := propagation.Clearance(w.path(w.link.Channel.CentreHz(), 1))
	if err != nil || w.first == w.link.From {
		return w.profile, found, err
	}
	found.AtKm = w.profile.LengthKm() - found.AtKm
	if found.Index >= 0 {
		found.Index = len(w.profile.DistKm) - 1 - found.Index
	}
	return w.profile.Reversed(), found, nil
}

package link

import (
	"fmt"
	"math"
	"slices"

	"fellreach/antenna"
	"fellreach/link/propagation"
	"fellreach/terrain"
)

// A Result is a link computed: one budget for each direction, From to To first.
type Result struct {
	Link *Link
	// Profile is the ground from From to To, as the path method saw it.
	Profile    terrain.Profile
	Directions []Budget
	// MarginDB and ChancePct are the smaller of the directions', Verdict holds them against the aim.
	MarginDB, ChancePct float64
	Verdict             Verdict
	Clearance           propagation.FresnelClearance // AtKm counts from From
	Warnings            []Warning
}

// Compute works out a link over the ground between its ends. The profile p runs from the end
// whose station has the lower Order (From where they are equal) to the other.
//
// It returns an error where an antenna, a feeder or the path method has no answer.
func Compute(l *Link, p terrain.Profile, c Conditions) (*Result, error) {
	w := newWay(l, p, c)
	if err := w.geometry(); err != nil {
		return nil, err
	}
	ground, clearance, err := w.seenFromFrom()
	if err != nil {
		return nil, err
	}
	r := &Result{Link: l, Profile: ground, Clearance: clearance, MarginDB: math.Inf(1), ChancePct: math.Inf(1)}
	if err := r.direct(w, l.From, l.To, l.Channel.OutHz); err != nil {
		return nil, err
	}
	if !l.OneWay {
		if err := r.direct(w, l.To, l.From, l.Channel.BackHz); err != nil {
			return nil, err
		}
	}
	r.Verdict = l.Aim.judge(r.MarginDB, r.ChancePct)
	return r, nil
}

// direct adds the budget of one direction.
func (r *Result) direct(w *way, from, to *Station, freqHz float64) error {
	b, err := w.budget(from, to, freqHz)
	if err != nil {
		return err
	}
	r.Directions = append(r.Directions, b)
	r.MarginDB = min(r.MarginDB, b.MarginDB)
	r.ChancePct = min(r.ChancePct, b.ChancePct)
	for _, warning := range b.Warnings {
		r.Warnings = addWarning(r.Warnings, warning)
	}
	return nil
}

// seenFromFrom returns the profile and its worst point as seen from the link's From.
func (w *way) seenFromFrom() (terrain.Profile, propagation.FresnelClearance, error) {
	found, err := propagation.Clearance(w.path(w.link.Channel.centreHz(), 1))
	if err != nil || w.first == w.link.From {
		return w.profile, found, err
	}
	found.AtKm = w.profile.LengthKm() - found.AtKm
	if found.Index >= 0 {
		found.Index = len(w.profile.DistKm) - 1 - found.Index
	}
	return w.profile.Reversed(), found, nil
}

// A way is the ground between the ends of a link, from the first end to the second, and the
// losses found on it.
type way struct {
	link          *Link
	first, second *Station
	profile       terrain.Profile
	conditions    Conditions

	toSecond, toFirst antenna.Direction
	trans             bool
	losses            map[lossKey]propagation.Loss
}

// lossKey tells evaluations of the path method apart.
type lossKey struct{ freqHz, verticalShare float64 }

func newWay(l *Link, p terrain.Profile, c Conditions) *way {
	w := &way{link: l, first: l.From, second: l.To, conditions: c, losses: map[lossKey]propagation.Loss{}}
	if l.To.Order < l.From.Order {
		w.first, w.second = l.To, l.From
	}
	w.profile = p.Cleared(w.first.ClearingM, w.second.ClearingM)
	w.profile.AslM = slices.Clone(p.AslM)
	if g := w.first.GroundAslM; g != nil {
		w.profile.AslM[0] = *g
	}
	if g := w.second.GroundAslM; g != nil {
		w.profile.AslM[len(p.AslM)-1] = *g
	}
	return w
}

func (w *way) path(freqHz, verticalShare float64) propagation.Path {
	p := propagation.Path{
		Profile: w.profile, FreqHz: freqHz, TxAglM: w.first.AglM, RxAglM: w.second.AglM, VerticalShare: verticalShare,
		DeltaN: w.conditions.DeltaN, N0: w.conditions.N0, TimePct: 50, LocationPct: 50,
	}
	if n := len(w.profile.Points); n > 0 {
		p.LatDeg = w.profile.Points[n/2].Lat()
	}
	return p
}

// geometry finds where the path leaves each end; that depends neither on frequency nor on
// polarization.
func (w *way) geometry() error {
	loss, err := propagation.FreeSpace.Loss(w.path(w.link.Channel.OutHz, 1))
	if err != nil {
		return err
	}
	w.trans = loss.TransHorizon
	w.toSecond = antenna.Direction{AzDeg: w.profile.AzDeg, ElDeg: loss.TxElDeg}
	w.toFirst = antenna.Direction{AzDeg: w.profile.BackAzDeg, ElDeg: loss.RxElDeg}
	return nil
}

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

// Crossed antennas lose at most this much: on a clear path by Rec. ITU-R BT.419 (from memory), on
// an obstructed one by common practice, no source.
const (
	crossedClearDB      = 16
	crossedObstructedDB = 10
)

// budget computes one direction.
func (w *way) budget(from, to *Station, freqHz float64) (Budget, error) {
	b := Budget{From: from.Name, To: to.Name, FreqHz: freqHz}
	tx, err := from.frontEnd(freqHz, w.link.Channel)
	if err != nil {
		return b, err
	}
	rx, err := to.frontEnd(freqHz, w.link.Channel)
	if err != nil {
		return b, err
	}
	out, in := w.toward(from), w.toward(to)
	b.DepartureDeg, b.ArrivalDeg = out.ElDeg, in.ElDeg
	sent, caught := tx.field(out), rx.field(in)

	b.add(PowerLine, from.Name+": transmitter "+from.Radio.Name, from.Radio.PowerDBm, from.Radio.PowerSource)
	tx.lines(&b, out, true)
	if err := w.pathLines(&b, freqHz, verticalShare(sent, caught)); err != nil {
		return b, err
	}
	w.polarizationLine(&b, sent, caught, tx.solution.Pattern.Phased && rx.solution.Pattern.Phased)
	rx.lines(&b, in, false)
	rx.need(&b)
	w.allowanceLines(&b)
	b.warn("", w.profile.Notes...)
	b.close()
	b.ChancePct = w.conditions.chancePct(b.MarginDB)
	return b, nil
}

// pathLines writes the basic transmission loss as free space and what the ground and the air add.
func (w *way) pathLines(b *Budget, freqHz, verticalShare float64) error {
	loss, err := w.loss(freqHz, verticalShare)
	if err != nil {
		return err
	}
	m := w.conditions.Method
	b.TransmissionLossDB = loss.DB
	b.add(LossLine, fmt.Sprintf("free space, %.2f km", w.profile.LengthKm()), -loss.Terms.Lbfs, fmt.Sprintf("P.525 at %g MHz", freqHz/1e6))
	if m.Name != propagation.FreeSpace.Name {
		b.add(LossLine, "terrain and air", -(loss.DB - loss.Terms.Lbfs), fmt.Sprintf("%s over %d points of %.0f m, median Earth radius %.0f km", m.Edition, len(w.profile.DistKm), w.stepM(), loss.Terms.Ae))
	}
	b.warn("", loss.Notes...)
	return nil
}

// verticalShare is the part of the power between two antennas that goes by vertical polarization,
// the same whichever of them transmits. Crossed antennas share none: then it is the mean of both.
func verticalShare(a, b antenna.Field) float64 {
	va, vb := a.VerticalShare(), b.VerticalShare()
	vertical, horizontal := va*vb, (1-va)*(1-vb)
	if vertical+horizontal == 0 {
		return (va + vb) / 2
	}
	return vertical / (vertical + horizontal)
}

func (w *way) stepM() float64 {
	return w.profile.LengthKm() * 1000 / float64(len(w.profile.DistKm)-1)
}

func (w *way) polarizationLine(b *Budget, sent, caught antenna.Field, phased bool) {
	floor, source := float64(crossedClearDB), "antennas as installed, at most 16 dB (BT.419, from memory)"
	if w.trans {
		floor, source = crossedObstructedDB, "antennas as installed, at most 10 dB on an obstructed path (common practice, no source)"
	}
	if !phased && sent.VerticalShare() > 0 && sent.VerticalShare() < 1 {
		source += "; phases not known, taken as zero"
	}
	b.add(LossLine, "polarization", -antenna.PolarizationMatchDB(sent, caught, floor), source)
}

// allowanceLines writes the fading allowance and the planner's own.
func (w *way) allowanceLines(b *Budget) {
	if f := w.link.Fade; f != nil && w.link.Aim.AvailabilityPct > 50 {
		b.FadeDB = f.LossDB
		b.add(AllowanceLine, fmt.Sprintf("fading, %g %% of the year", w.link.Aim.AvailabilityPct), -f.LossDB, f.Source)
	}
	for _, a := range w.link.Allowances {
		b.add(AllowanceLine, a.Name, -a.LossDB, a.Source)
	}
}

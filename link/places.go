package link

import (
	"fmt"
	"math"

	"fellreach/antenna"
	"fellreach/link/propagation"
)

// Places is a link from a station to very many places: what does not depend on the place is worked
// out once, and a place adds a few terms to it. The sum is what [Compute] says for the link's To
// standing there.
type Places struct {
	link       *Link
	conditions Conditions
	// Directions are the link's, From to To first.
	Directions []PlacesDirection
}

// A PlacesDirection is one direction of [Places].
type PlacesDirection struct {
	FreqHz float64
	// SentDBm is the power that goes into the transmitting antenna's pattern, FixedDB the sum of all
	// other lines that are the same at every place.
	SentDBm, FixedDB float64

	tx, rx  frontEnd
	outward bool           // From transmits
	atPlace *antenna.Field // of the antenna at the place, where it is the same in all directions
}

// A PlacePath is the path to a place: its directions as seen at the link's From and at the place,
// and what fading needs to know.
type PlacePath struct {
	Toward, Back                     antenna.Direction
	Trans                            bool // trans-horizon
	LengthKm, TxAslM, RxAslM, LatDeg float64
	MedianLossDB, BestLossDB         float64 // without ducting, for 50 % and for [MirroredTimePct] of the time
}

// NewPlaces prepares a link.
func NewPlaces(l *Link, c Conditions) (*Places, error) {
	p := &Places{link: l, conditions: c}
	if err := p.checkFade(); err != nil {
		return nil, err
	}
	if err := p.add(l.From, l.To, l.Channel.OutHz, true); err != nil || l.OneWay {
		return p, err
	}
	return p, p.add(l.To, l.From, l.Channel.BackHz, false)
}

// checkFade refuses what [way.fade] refuses.
func (p *Places) checkFade() error {
	q := p.link.Aim.AvailabilityPct
	switch {
	case !p.ComputesFade():
		return nil
	case p.conditions.Method.Name != propagation.P1812.Name:
		return fmt.Errorf("method %s does not compute the fading that %g %% availability asks for: state it, or ask for 50 %%", p.conditions.Method.Name, q)
	case q > MaxAvailabilityPct:
		return fmt.Errorf("no fading allowance is computed for %g %% availability: the most is %g %%; state the fade", q, MaxAvailabilityPct)
	}
	return nil
}

// ComputesFade tells whether the fading allowance comes from the path, so that [PlacePath] needs
// the losses without ducting.
func (p *Places) ComputesFade() bool {
	return p.link.Aim.AvailabilityPct > 50 && p.link.Fade == nil
}

func (p *Places) add(from, to *Station, freqHz float64, outward bool) error {
	d := PlacesDirection{FreqHz: freqHz, outward: outward, SentDBm: from.Radio.PowerDBm}
	var err error
	if d.tx, err = from.frontEnd(freqHz, p.link.Channel); err != nil {
		return err
	}
	if d.rx, err = to.frontEnd(freqHz, p.link.Channel); err != nil {
		return err
	}
	place := &d.rx
	if !outward {
		place = &d.tx
	}
	if place.Antenna.Kind == "isotropic" && place.Mount == (antenna.Mount{}) {
		field := place.field(antenna.Direction{})
		d.atPlace = &field
	}
	fixed := Budget{FreqHz: freqHz}
	d.SentDBm += d.tx.fixedDB(true)
	from.surroundingsLine(&fixed, freqHz)
	to.surroundingsLine(&fixed, freqHz)
	d.rx.need(&fixed)
	for _, a := range p.link.Allowances {
		fixed.add(AllowanceLine, a.Name, -a.LossDB, a.Source)
	}
	fixed.close()
	d.FixedDB = fixed.MarginDB + d.rx.fixedDB(false)
	p.Directions = append(p.Directions, d)
	return nil
}

// fixedDB adds up the station's lines but that of the antenna's pattern.
func (f *frontEnd) fixedDB(transmits bool) (sum float64) {
	add := func(_ Kind, _ string, dB float64, _ string) { sum += dB }
	f.insertLines(add, transmits, false)
	f.feederLines(add)
	f.insertLines(add, transmits, true)
	if !f.solution.GainKnown {
		sum += 10 * math.Log10(f.solution.Efficiency)
	}
	return sum
}

// Antennas returns what the antennas do on the path to a place: the gain of the transmitting one
// towards it, dBi, the gain of the receiving one less what the polarizations lose between them, and
// the part of the power that is vertically polarized.
func (d *PlacesDirection) Antennas(p *PlacePath) (sentDBi, caughtDB, verticalPart float64) {
	out, in := p.Toward, p.Back
	if !d.outward {
		out, in = in, out
	}
	var sent, caught antenna.Field
	switch {
	case d.atPlace == nil:
		sent, caught = d.tx.field(out), d.rx.field(in)
	case d.outward:
		sent, caught = d.tx.field(out), *d.atPlace
	default:
		sent, caught = *d.atPlace, d.rx.field(in)
	}
	floor := float64(crossedClearDB)
	if p.Trans {
		floor = crossedObstructedDB
	}
	return sent.GainDBi(), caught.GainDBi() - antenna.PolarizationMatchDB(sent, caught, floor), verticalShare(sent, caught)
}

// FadeDB returns the fading allowance of a direction on the path to a place.
func (p *Places) FadeDB(d *PlacesDirection, path *PlacePath) float64 {
	q := p.link.Aim.AvailabilityPct
	switch {
	case q <= 50:
		return 0
	case p.link.Fade != nil:
		return p.link.Fade.LossDB
	}
	fade := FadeDB(q, path.MedianLossDB, path.BestLossDB)
	m := propagation.Multipath{
		FreqHz: d.FreqHz, LengthKm: path.LengthKm, TxAslM: path.TxAslM, RxAslM: path.RxAslM,
		LatDeg: path.LatDeg, Dn1: p.conditions.Dn1, RoughnessM: p.conditions.RoughnessM,
	}
	if !path.Trans && m.Applies() {
		fade = max(fade, m.FadeDB(q))
	}
	return fade
}

// Heights returns the heights above ground from which the path method sees the path at the link's
// From and at a place, and how far from From cover heights are left out.
func (p *Places) Heights() (fromAglM, toAglM, clearM float64) {
	return p.link.From.pathAglM(), p.link.To.pathAglM(), p.link.From.clearM()
}

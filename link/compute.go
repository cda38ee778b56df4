package link

import (
	"math"

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
	Sensitivity         Sensitivity
	Warnings, Remarks   []Warning
}

// Compute works out a link over the ground between its ends. The profile p runs from the end
// whose station has the lower Order (From where they are equal) to the other.
//
// It returns an error where an antenna, a feeder or the path method has no answer.
func Compute(l *Link, p terrain.Profile, c Conditions) (*Result, error) {
	r, err := compute(l, p, c)
	if err != nil {
		return nil, err
	}
	r.Sensitivity, err = sensitivity(r, l, p, c)
	return r, err
}

// compute is Compute without the sensitivity, which is made of several of it.
func compute(l *Link, p terrain.Profile, c Conditions) (*Result, error) {
	w, err := newWay(l, p, c)
	if err != nil {
		return nil, err
	}
	r := &Result{Link: l, MarginDB: math.Inf(1), ChancePct: math.Inf(1)}
	r.Profile, r.Clearance, err = w.seenFromFrom()
	if err != nil {
		return nil, err
	}
	if err := r.direct(w, l.From, l.To, l.Channel.OutHz); err != nil {
		return nil, err
	}
	if !l.OneWay {
		if err := r.direct(w, l.To, l.From, l.Channel.BackHz); err != nil {
			return nil, err
		}
	}
	r.Warnings = append(r.Warnings, w.warnings(r.Clearance)...)
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
	for _, remark := range b.Remarks {
		r.Remarks = addWarning(r.Remarks, remark)
	}
	return nil
}

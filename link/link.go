package link

import "fellreach/link/propagation"

// A Link is a path that must work, on a channel, up to an aim.
type Link struct {
	Name     string // the planner's own, may be empty
	From, To *Station
	Channel  Channel
	OneWay   bool
	Aim      Aim
	// Fade is a stated fading allowance; nil asks the method for one.
	Fade       *Allowance
	Allowances []Allowance
}

// A Channel is the frequency from a link's From to its To (OutHz) and back (BackHz), the same
// where one frequency serves both ways.
type Channel struct {
	Name          string
	OutHz, BackHz float64
	BandwidthHz   float64
}

// CentreHz is what resonant lengths are cut for: the mean of out and back.
func (c Channel) CentreHz() float64 { return (c.OutHz + c.BackHz) / 2 }

// An Allowance is a loss set aside, in dB, not negative.
type Allowance struct {
	Name   string
	LossDB float64
	Source string
}

// An Aim is what a link must reach: an availability of an average year, with a margin in dB or,
// when ChancePct is above zero, with a chance that the link meets it once built.
type Aim struct {
	AvailabilityPct     float64
	MarginDB, ChancePct float64
}

// Conditions hold for all links of a plan.
type Conditions struct {
	Method propagation.Model
	// DeltaN and N0 are the refractivity of the air, in N-units per km and N-units.
	DeltaN, N0 float64
	// Dn1 is the refractivity gradient of the lowest 65 m not exceeded for 1 % of the year, in N-units
	// per km; RoughnessM the standard deviation of the terrain by P.530, 0 where it is not known.
	Dn1, RoughnessM float64
	Dn1Source       string
	// SpreadDB is the standard deviation of the prediction, BiasDB its mean error (added to the
	// margin), Readings the count of readings behind them, 0 when they are assumed.
	SpreadDB, BiasDB float64
	Readings         int
}

// Title names a link for people: its own name, or its ends and channel.
func (l *Link) Title() string {
	if l.Name != "" {
		return l.Name
	}
	return l.From.Name + " to " + l.To.Name + " (" + l.Channel.Name + ")"
}

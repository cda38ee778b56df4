package wire

import "fellreach/antenna"

// A Wire is a straight round wire. Coordinates are in metres in the antenna's frame: x the facing,
// y to its left, z up. Wires whose ends meet are joined there.
type Wire struct {
	From, To  [3]float64
	DiameterM float64
	Material  antenna.Material
	// Segments overrides the rule by which the wire is divided (see [Structure]), for the whole
	// wire; its feeds divide them in proportion. Zero is the rule.
	Segments int
}

// A Feed is a gap in a wire, small against everything else. Wire is the wire's number, counted
// from 1 as in all messages; At is the place as a fraction of the wire from its From, 0 to 1. The
// gap lies exactly there. At 0 and 1 it is in series between the wire and whatever else is joined
// to that end. Positive current flows along the wire.
type Feed struct {
	Wire int
	At   float64
}

// A Mast is a straight pole beside or below the wires: a conductor without loss, joined to none
// of them. The zero value is no mast.
type Mast struct {
	From, To  [3]float64
	DiameterM float64
}

// A Structure is wires in free space, their feeds, and the mast they hang on.
//
// Each wire is divided at its feeds, and what lies between them into equal segments, by this rule:
// segments are no longer than a fortieth of a wavelength, a twelfth of a wire with a feed inside,
// and 1.5 times the shortest piece of their wire; but not shorter than two radii, if that leaves
// one. (The rule of 10 segments for a half wave and 12 for a fed wire is common practice; two
// radii are what a gap on a tube allows.)
type Structure struct {
	Wires []Wire
	Feeds []Feed
	Mast  Mast
}

func (w Wire) line() line       { return line{w.From, w.To} }
func (w Wire) radiusM() float64 { return w.DiameterM / 2 }
func (w Wire) lengthM() float64 { return w.line().along().length() }

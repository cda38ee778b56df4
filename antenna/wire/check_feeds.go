package wire

import (
	"errors"
	"fmt"
	"math"
)

// checkFeeds returns what is wrong with the feeds by themselves.
func (s Structure) checkFeeds() error {
	if len(s.Feeds) == 0 {
		return errors.New("no feed is given: at least one is needed")
	}
	var errs []error
	for i, f := range s.Feeds {
		switch {
		case f.Wire < 1 || f.Wire > len(s.Wires):
			errs = append(errs, fmt.Errorf("feed %d is on wire %d: the wires are numbered 1 to %d", i+1, f.Wire, len(s.Wires)))
		case !(f.At >= 0 && f.At <= 1):
			errs = append(errs, fmt.Errorf("feed %d on wire %d: place %g is out of range: 0 to 1 is allowed", i+1, f.Wire, f.At))
		case f.At > 0 && f.At < 1 && s.Wires[f.Wire-1].Segments == 1:
			errs = append(errs, fmt.Errorf("feed %d on wire %d: the wire has one segment, which leaves no node for a feed inside; give 2 or more", i+1, f.Wire))
		}
		for j, other := range s.Feeds[:i] {
			if f == other {
				errs = append(errs, fmt.Errorf("feeds %d and %d are in the same place on wire %d", j+1, i+1, f.Wire))
			}
		}
	}
	return errors.Join(errs...)
}

// checkEndFeeds returns an error for each feed at a wire's end that is joined to nothing, and for
// each two that are one gap, on either side of the node of two wires.
func (s Structure) checkEndFeeds(wavelengthM float64) error {
	var errs []error
	for i, f := range s.Feeds {
		if f.At > 0 && f.At < 1 {
			continue
		}
		place := s.Wires[f.Wire-1].line().at(f.At)
		joined := s.joinedTo(f.Wire-1, place, wavelengthM)
		if joined == 0 {
			errs = append(errs, fmt.Errorf("feed %d is at the open end of wire %d: no current flows there; place it along the wire, or join another wire to that end", i+1, f.Wire))
		}
		for j, g := range s.Feeds[:i] {
			other := s.Wires[g.Wire-1]
			near := other.line().at(g.At).apart(place) < joinM(other.radiusM(), s.Wires[f.Wire-1].radiusM(), wavelengthM)
			if joined == 1 && near {
				errs = append(errs, fmt.Errorf("feeds %d and %d are one gap, where wires %d and %d meet", j+1, i+1, g.Wire, f.Wire))
			}
		}
	}
	return errors.Join(errs...)
}

// feedDoubts returns what is doubtful of the feeds.
func (s Structure) feedDoubts(wavelengthM float64) []string {
	var doubts []string
	for i, f := range s.Feeds {
		w := s.Wires[f.Wire-1]
		if w.radiusM() > thickFeedWl*wavelengthM {
			doubts = append(doubts, fmt.Sprintf("feed %d: radius %.3g wl of wire %d is over %g wl: resistance is uncertain by 5 to 10 %%, resonance by 1 %%", i+1, w.radiusM()/wavelengthM, f.Wire, thickFeedWl))
		}
		if wl := w.lengthM() / wavelengthM; math.Abs(f.At-0.5) < 0.05 && wl > shortFullWaveWl && wl < longFullWaveWl {
			doubts = append(doubts, fmt.Sprintf("feed %d: in the middle of a wire of %.2f wl the impedance depends on the size of the gap (up to 30 %%)", i+1, wl))
		}
	}
	return doubts
}

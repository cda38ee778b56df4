package wire

import (
	"errors"
	"fmt"
	"math"

	"fellreach/antenna"
)

// The limits of the thin-wire method that are checked, in wavelengths, radii and degrees. Sources:
// trials with this formulation, as the tests repeat them; common practice where no trial settles
// it.
const (
	longestSegmentWl = 0.1
	shortestSegment  = 1    // radii, refused below; doubtful below leastRadii
	thickFeedWl      = 0.01 // radius, doubtful above
	thickWl          = 0.02 // radius, doubtful above
	stubbyLength     = 20   // radii, doubtful below
	refusedGap       = 3    // between the axes of separate wires, in radii of the thicker
	doubtfulGap      = 6
	refusedAngleDeg  = 5 // between joined wires
	doubtfulAngleDeg = 30
	doubtfulRadii    = 4 // ratio at a node
	doubtfulSegments = 3 // ratio of lengths at a node
	mostSegments     = 2000
	mostWires        = 1000
	shortFullWaveWl  = 0.85 // centre-fed wires about a full wave
	longFullWaveWl   = 1.1
	farthestM        = 1e5 // coordinates
)

// check returns what is wrong with a structure before it is divided, and what is doubtful.
func (s Structure) check(wavelengthM float64) (warnings []string, err error) {
	if err := errors.Join(s.checkEach(), s.Mast.check(wavelengthM)); err != nil {
		return nil, err
	}
	if err := s.checkSize(wavelengthM); err != nil {
		return nil, err
	}
	errs := []error{s.checkEndFeeds(wavelengthM)}
	note := func(doubts []string, err error) {
		warnings = append(warnings, doubts...)
		errs = append(errs, err)
	}
	for i, w := range s.Wires {
		open := s.joinedTo(i, w.From, wavelengthM) == 0 || s.joinedTo(i, w.To, wavelengthM) == 0
		note(w.doubts(i+1, open, wavelengthM), nil)
		for j := range i {
			note(s.checkPair(j, i, wavelengthM))
		}
		note(s.checkMast(i))
	}
	note(s.feedDoubts(wavelengthM), nil)
	return warnings, errors.Join(errs...)
}

// checkEach returns what is wrong with the wires and feeds by themselves, at any frequency.
func (s Structure) checkEach() error {
	if len(s.Wires) == 0 || len(s.Wires) > mostWires {
		return fmt.Errorf("%d wires are given: 1 to %d are allowed", len(s.Wires), mostWires)
	}
	var errs []error
	for i, w := range s.Wires {
		errs = append(errs, w.check(i+1))
	}
	return errors.Join(append(errs, s.checkFeeds())...)
}

// check returns what is wrong with a wire of a number by itself.
func (w Wire) check(number int) error {
	lengthM := w.lengthM()
	switch {
	case !vec(w.From).finite() || !vec(w.To).finite() || vec(w.From).length()+vec(w.To).length() > farthestM:
		return fmt.Errorf("wire %d: its ends %v and %v must be finite, within %g m", number, w.From, w.To, farthestM)
	case !(w.DiameterM > 0) || math.IsInf(w.DiameterM, 0):
		return fmt.Errorf("wire %d: diameter %g m is not allowed: it must be above 0", number, w.DiameterM)
	case lengthM == 0:
		return fmt.Errorf("wire %d has no length: it begins and ends at %v m", number, w.From)
	case lengthM <= w.DiameterM:
		return fmt.Errorf("wire %d is thicker than it is long: diameter %g m, length %.4g m; the method is for thin wires", number, w.DiameterM, lengthM)
	case w.Segments < 0:
		return fmt.Errorf("wire %d: %d segments are not allowed: give 1 or more, or 0 for the rule", number, w.Segments)
	}
	if err := checkMaterial(w.Material); err != nil {
		return fmt.Errorf("wire %d: %w", number, err)
	}
	return nil
}

func checkMaterial(m antenna.Material) error {
	if m.ConductivitySPerM > 0 && m.RelativePermeability >= 1 && !math.IsInf(m.RelativePermeability, 1) {
		return nil
	}
	return fmt.Errorf("material %q has conductivity %g S/m and relative permeability %g: above 0 and at least 1 is needed", m.Name, m.ConductivitySPerM, m.RelativePermeability)
}

// doubts returns what is doubtful of a wire by itself. open tells that one of its ends is.
func (w Wire) doubts(number int, open bool, wavelengthM float64) []string {
	var doubts []string
	if w.radiusM() > thickWl*wavelengthM {
		doubts = append(doubts, fmt.Sprintf("wire %d: radius %.3g wl is not thin (over %g wl)", number, w.radiusM()/wavelengthM, thickWl))
	}
	if open && w.lengthM() < stubbyLength*w.radiusM() {
		doubts = append(doubts, fmt.Sprintf("wire %d: length is only %.1f radii (under %d): its ends are not modelled", number, w.lengthM()/w.radiusM(), stubbyLength))
	}
	return doubts
}

// checkSize returns an error if the wires have more segments than are allowed.
func (s Structure) checkSize(wavelengthM float64) error {
	segments := 0
	for i, w := range s.Wires {
		for _, count := range w.segmentsOf(w.cuts(i, s.Feeds), wavelengthM) {
			segments += count
		}
	}
	if segments <= mostSegments {
		return nil
	}
	const bytes = 16 + 32 // for each pair: in the matrix, and in the blocks it is made from
	return fmt.Errorf("%d segments would take %.3g MB: at most %d are allowed; use fewer or shorter wires, or fewer segments", segments, float64(segments)*float64(segments)*bytes/1e6, mostSegments)
}

// joinedTo returns how many ends of other wires meet a place on a wire, by its index.
func (s Structure) joinedTo(index int, place vec, wavelengthM float64) int {
	count := 0
	for i, w := range s.Wires {
		for _, end := range []vec{w.From, w.To} {
			if i != index && end.apart(place) < joinM(w.radiusM(), s.Wires[index].radiusM(), wavelengthM) {
				count++
			}
		}
	}
	return count
}

// checkPair checks two wires, by their indices, against each other.
func (s Structure) checkPair(i, j int, wavelengthM float64) (doubts []string, err error) {
	a, b := s.Wires[i], s.Wires[j]
	thickerM := max(a.radiusM(), b.radiusM())
	if out, other, ok := joined(a, b, wavelengthM); ok {
		angleDeg := math.Acos(max(-1, min(1, out.dot(other)))) * 180 / math.Pi
		switch {
		case angleDeg < refusedAngleDeg:
			return nil, fmt.Errorf("wires %d and %d overlap: they leave their common end at an angle of %.2g degrees (under %d)", i+1, j+1, angleDeg, refusedAngleDeg)
		case angleDeg < doubtfulAngleDeg:
			doubts = append(doubts, fmt.Sprintf("wires %d and %d meet at %.0f degrees (under %d): resistance is uncertain by 5 to 20 %%", i+1, j+1, angleDeg, doubtfulAngleDeg))
		}
		if ratio := thickerM / min(a.radiusM(), b.radiusM()); ratio > doubtfulRadii {
			doubts = append(doubts, fmt.Sprintf("wires %d and %d meet with radii in the ratio %.1f (over %d)", i+1, j+1, ratio, doubtfulRadii))
		}
		return doubts, nil
	}
	switch gapM := a.line().apart(b.line()); {
	case gapM < a.radiusM()+b.radiusM():
		return nil, fmt.Errorf("wires %d and %d cross, touch or overlap without a common end: divide them where they meet, or move them apart", i+1, j+1)
	case gapM < refusedGap*thickerM:
		return nil, fmt.Errorf("wires %d and %d are %.3g m apart: at least %d radii (%.3g m) is needed", i+1, j+1, gapM, refusedGap, refusedGap*thickerM)
	case gapM < doubtfulGap*thickerM:
		doubts = append(doubts, fmt.Sprintf("wires %d and %d are only %.1f radii apart (under %d): current crowds to one side, which is not modelled", i+1, j+1, gapM/thickerM, doubtfulGap))
	}
	return doubts, nil
}

// joined returns the directions in which two wires leave a common end, if they have one.
func joined(a, b Wire, wavelengthM float64) (out, other vec, ok bool) {
	const ends = 2
	joinedM := joinM(a.radiusM(), b.radiusM(), wavelengthM)
	for i := range ends {
		for j := range ends {
			from, to := [ends]vec{a.From, a.To}, [ends]vec{b.From, b.To}
			if from[i].apart(to[j]) < joinedM {
				return from[i].to(from[1-i]).unit(), to[j].to(to[1-j]).unit(), true
			}
		}
	}
	return vec{}, vec{}, false
}

// checkMast checks a wire against the mast's surface.
func (s Structure) checkMast(i int) (doubts []string, err error) {
	if !s.Mast.exists() {
		return nil, nil
	}
	w := s.Wires[i]
	gapM := s.Mast.gapM(w.line())
	switch thin := w.radiusM(); {
	case gapM <= thin:
		return nil, fmt.Errorf("wire %d runs into the mast: its axis is %.3g m from the mast's surface", i+1, gapM)
	case gapM < refusedGap*thin:
		return nil, fmt.Errorf("wire %d is %.3g m from the mast's surface: at least %d radii (%.3g m) is needed", i+1, gapM, refusedGap, refusedGap*thin)
	case gapM < doubtfulGap*thin:
		doubts = append(doubts, fmt.Sprintf("wire %d is only %.3g m from the mast's surface: current crowds to one side, which is not modelled", i+1, gapM))
	}
	return doubts, nil
}

// check returns what is wrong with a mesh, and what is doubtful.
func (m *mesh) check(wavelengthM float64) (warnings []string, err error) {
	var errs []error
	for _, r := range m.runs {
		warning, err := r.check(wavelengthM)
		errs = append(errs, err)
		if warning != "" {
			warnings = append(warnings, warning)
		}
	}
	for i, p := range m.ports {
		if len(p) == 0 {
			errs = append(errs, fmt.Errorf("feed %d: no current can flow there; place it along the wire", i+1))
		}
	}
	for _, b := range m.bases {
		p, q := m.runs[b[0].run], m.runs[b[1].run]
		if ratio := max(p.stepM/q.stepM, q.stepM/p.stepM); ratio > doubtfulSegments {
			warnings = append(warnings, fmt.Sprintf("wires %d and %d meet with segments in the ratio %.1f (over %d)", p.wire+1, q.wire+1, ratio, doubtfulSegments))
		}
	}
	return warnings, errors.Join(errs...)
}

func (r *run) check(wavelengthM float64) (warning string, err error) {
	switch radii := r.stepM / r.radiusM; {
	case r.stepM > longestSegmentWl*wavelengthM:
		return "", fmt.Errorf("wire %d: segments of %.3g wl are too long: at most %g wl is allowed; the wire may be too thick (segments are not under two radii), or its segments too few", r.wire+1, r.stepM/wavelengthM, longestSegmentWl)
	case radii < shortestSegment:
		return "", fmt.Errorf("wire %d: segments of %.2f radii are too short: at least %d is needed; the feed may be too close to an end, or the segments too many", r.wire+1, radii, shortestSegment)
	case radii < leastRadii*(1-1e-9):
		return fmt.Sprintf("wire %d: segments of %.2f radii are short (under %d)", r.wire+1, radii, leastRadii), nil
	}
	return "", nil
}

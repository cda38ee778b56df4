package wire

import (
	"errors"
	"fmt"

	"fellreach/antenna"
)

// A StackSpec describes equal antennas one above the other, Spacing between their centres.
type StackSpec struct {
	Of      Antenna
	Count   int
	Spacing antenna.Length
}

// mostStacked is the largest number of antennas in a stack.
const mostStacked = 16

// Stack returns a vertical stack about the origin, its antennas coupled and fed in phase with equal
// voltages: as by a harness of equal lines of a multiple of a half wave. Its impedance is that of
// [Network.TogetherOhm]; the harness's own loss is left to whoever knows the cable. Antennas that
// are resonant are cut all alike, so that this impedance has no reactance.
func Stack(spec StackSpec) (Antenna, error) {
	errs := []error{checkLength("spacing", spec.Spacing)}
	if spec.Of.blueprint.lay == nil {
		errs = append(errs, errors.New("the antenna to be stacked is missing"))
	}
	if spec.Count < 2 || spec.Count > mostStacked {
		errs = append(errs, fmt.Errorf("count %d is out of range: 2 to %d is allowed", spec.Count, mostStacked))
	}
	if err := errors.Join(errs...); err != nil {
		return Antenna{}, err
	}
	b := spec.Of.blueprint
	b.lay = spec.lay
	return newAntenna("stack", spec.Of.Directional, b), nil
}

func (spec StackSpec) lay(wavelengthM, mainM float64) layout {
	one := spec.Of.blueprint.lay(wavelengthM, mainM)
	spacingM := metres(spec.Spacing, wavelengthM)
	l := layout{boomMiddleM: one.boomMiddleM}
	for n := range spec.Count {
		up := vec{0, 0, (float64(n) - float64(spec.Count-1)/2) * spacingM}
		for _, f := range one.feeds {
			l.feeds = append(l.feeds, Feed{f.Wire + len(l.wires), f.At})
		}
		for _, w := range one.wires {
			w.From, w.To = up.plus(w.From), up.plus(w.To)
			l.wires = append(l.wires, w)
		}
	}
	for _, p := range one.parts {
		l.parts = append(l.parts, Part{"each " + p.Name, p.LengthM})
	}
	for n := 1; n < spec.Count; n++ {
		l.parts = append(l.parts, Part{fmt.Sprintf("antenna %d above antenna 1", n+1), float64(n) * spacingM})
	}
	return l
}

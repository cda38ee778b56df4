package wire

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"fellreach/antenna"
)

// A YagiSpec describes parallel elements along a boom, all of one rod. The boom itself is taken as
// insulated from them, and without effect.
type YagiSpec struct {
	Elements  []Element
	DiameterM float64
	Material  antenna.Material
}

// An Element is one rod of a Yagi. Length may be zero for the driven one: resonant. At is its
// place along the boom, in metres or wavelengths, growing towards the beam; it may be negative.
type Element struct {
	Length antenna.Length
	At     antenna.Length
	Driven bool
}

// Yagi returns a Yagi with its elements along z, its beam along the facing and its driven element,
// fed in the middle, at the origin. It is held there beside a mast, at the middle of its boom on
// top of one.
func Yagi(spec YagiSpec) (Antenna, error) {
	if err := spec.check(); err != nil {
		return Antenna{}, err
	}
	spec.Elements = slices.Clone(spec.Elements)
	return newAntenna("yagi", true, blueprint{main: spec.Elements[spec.driven()].Length, hasMain: true, lay: spec.lay}), nil
}

func (spec YagiSpec) driven() int {
	return slices.IndexFunc(spec.Elements, func(e Element) bool { return e.Driven })
}

func (spec YagiSpec) check() error {
	errs := []error{checkRod(spec.DiameterM, spec.Material)}
	driven := 0
	for i, e := range spec.Elements {
		name := fmt.Sprintf("element %d: ", i+1)
		if e.Driven {
			driven++
		}
		if (e.Length != antenna.Length{}) {
			errs = append(errs, checkLength(name+"length", e.Length))
		} else if !e.Driven {
			errs = append(errs, errors.New(name+"only the driven element can be resonant: give its length"))
		}
		if at := e.At.M + e.At.Wavelengths; math.IsNaN(at) || math.IsInf(at, 0) {
			errs = append(errs, fmt.Errorf("%splace %g m and %g wl along the boom must be finite", name, e.At.M, e.At.Wavelengths))
		}
	}
	if driven != 1 {
		errs = append(errs, fmt.Errorf("%d of %d elements are driven: exactly one must be", driven, len(spec.Elements)))
	}
	return errors.Join(errs...)
}

func (spec YagiSpec) lay(wavelengthM, drivenM float64) layout {
	driven := spec.driven()
	l := layout{feeds: []Feed{{driven + 1, 0.5}}}
	atM := make([]float64, len(spec.Elements))
	for i, e := range spec.Elements {
		atM[i] = metres(e.At, wavelengthM) - metres(spec.Elements[driven].At, wavelengthM)
		lengthM := metres(e.Length, wavelengthM)
		if e.Driven {
			lengthM = drivenM
		}
		l.wires = append(l.wires, rod(vec{atM[i], 0, -lengthM / 2}, lengthM, spec.DiameterM, spec.Material))
	}
	for i, w := range l.wires {
		l.parts = append(l.parts, Part{elementName(atM, i), w.lengthM()})
	}
	l.boomMiddleM = (slices.Min(atM) + slices.Max(atM)) / 2
	return l
}

// elementName returns what an element is called by its place from the driven one at 0, and its
// number from there if there are several.
func elementName(atM []float64, i int) string {
	name, number, alike := "driven element", 1, 0
	if atM[i] != 0 {
		name = "director"
		if atM[i] < 0 {
			name = "reflector"
		}
		for _, at := range atM {
			if at*atM[i] > 0 {
				alike++
				if math.Abs(at) < math.Abs(atM[i]) {
					number++
				}
			}
		}
	}
	if alike > 1 {
		return fmt.Sprintf("%s %d", name, number)
	}
	return name
}

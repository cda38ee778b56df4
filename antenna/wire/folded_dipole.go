package wire

import (
	"errors"

	"fellreach/antenna"
)

// A FoldedDipoleSpec describes two parallel limbs joined by bars at both ends, all of one rod.
type FoldedDipoleSpec struct {
	// Length is that of the limbs between the axes of the end bars, the zero value the one that
	// makes the antenna resonant. Spacing is between the axes of the limbs.
	Length, Spacing antenna.Length
	DiameterM       float64
	Material        antenna.Material
}

// FoldedDipole returns a folded dipole with its limbs along z, side by side as seen from the
// facing, fed in the middle of the one to the right.
func FoldedDipole(spec FoldedDipoleSpec) (Antenna, error) {
	errs := []error{checkLength("spacing", spec.Spacing), checkRod(spec.DiameterM, spec.Material)}
	if (spec.Length != antenna.Length{}) {
		errs = append(errs, checkLength("length", spec.Length))
	}
	if err := errors.Join(errs...); err != nil {
		return Antenna{}, err
	}
	return newAntenna("folded-dipole", false, blueprint{main: spec.Length, hasMain: true, lay: spec.lay}), nil
}

func (spec FoldedDipoleSpec) lay(wavelengthM, limbM float64) layout {
	spacingM := metres(spec.Spacing, wavelengthM)
	fed := rod(vec{0, -spacingM / 2, -limbM / 2}, limbM, spec.DiameterM, spec.Material)
	plain := rod(vec{0, spacingM / 2, -limbM / 2}, limbM, spec.DiameterM, spec.Material)
	bar := func(from, to [3]float64) Wire {
		return Wire{From: from, To: to, DiameterM: spec.DiameterM, Material: spec.Material}
	}
	return layout{
		wires: []Wire{fed, plain, bar(fed.From, plain.From), bar(fed.To, plain.To)},
		feeds: []Feed{{1, 0.5}},
		parts: []Part{{"fed limb", limbM}, {"plain limb", limbM}, {"spacing, axis to axis", spacingM}},
	}
}

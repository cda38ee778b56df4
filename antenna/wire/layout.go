package wire

import (
	"fmt"
	"math"

	"fellreach/antenna"
)

// A Part is a piece of an antenna to be cut, or a distance to be kept: LengthM in metres.
type Part struct {
	Name    string
	LengthM float64
}

// A layout is an antenna in wires, and what its builder cuts.
type layout struct {
	wires []Wire
	feeds []Feed
	parts []Part
	// boomMiddleM is where along the facing the antenna is held on top of a mast. Beside one it is
	// held at the origin.
	boomMiddleM float64
}

// extent returns how far the metal reaches along a direction.
func (l layout) extent(along vec) (lowest, highest float64) {
	lowest, highest = math.Inf(1), math.Inf(-1)
	for _, w := range l.wires {
		from, to := vec(w.From).dot(along), vec(w.To).dot(along)
		lowest, highest = min(lowest, from, to), max(highest, from, to)
	}
	return lowest, highest
}

// A blueprint is a kind of antenna with its measures, which may be in wavelengths or left to
// resonance.
type blueprint struct {
	// main is the length of the part that is fed; the zero value is the one that makes the
	// antenna resonant. Antennas of listed wires have none.
	main    antenna.Length
	hasMain bool
	// lay makes the wires for the wavelength of the design frequency and the length of the main
	// part.
	lay func(wavelengthM, mainM float64) layout
}

func (b blueprint) resonant() bool { return b.hasMain && b.main == antenna.Length{} }

// metres returns a length for the wavelength of the design frequency.
func metres(l antenna.Length, wavelengthM float64) float64 { return l.M + l.Wavelengths*wavelengthM }

// checkLength returns an error unless a length that is given is above zero and finite.
func checkLength(name string, l antenna.Length) error {
	switch {
	case l.M != 0 && l.Wavelengths != 0:
		return fmt.Errorf("%s is given both in metres and in wavelengths: give one", name)
	case !(l.M+l.Wavelengths > 0) || math.IsInf(l.M+l.Wavelengths, 1):
		return fmt.Errorf("%s of %g m and %g wl is not allowed: it must be above 0 and finite", name, l.M, l.Wavelengths)
	}
	return nil
}

// checkRod returns an error unless diameter and material are those of a rod.
func checkRod(diameterM float64, m antenna.Material) error {
	if !(diameterM > 0) || math.IsInf(diameterM, 1) {
		return fmt.Errorf("diameter %g m is not allowed: it must be above 0 and finite", diameterM)
	}
	return checkMaterial(m)
}

// rod returns a wire parallel to z, its lower end at a place.
func rod(from vec, lengthM, diameterM float64, m antenna.Material) Wire {
	return Wire{From: from, To: from.plus(vec{0, 0, lengthM}), DiameterM: diameterM, Material: m}
}

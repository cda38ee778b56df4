package antenna

import (
	"errors"
	"math"
)

// A Design is an antenna as a plan describes it, ready to be solved at a frequency.
// Every kind (a dipole, a reference pattern, a maker's table) is a function that makes one.
type Design struct {
	// Name is the plan's, left to whoever reads the plan; Kind is the plan's word for the kind.
	Name string
	Kind string
	// Directional tells whether the design has a facing of its own, so that a site must give one.
	Directional bool
	// Solve computes the antenna in the given setting. It is safe for concurrent use.
	Solve func(Setting) (Solution, error)
}

// A Setting is how and where an antenna is used: its frequency and the metal beside it.
type Setting struct {
	// FreqHz is the frequency of interest, DesignHz that for which resonant lengths and lengths
	// in wavelengths are cut; zero means FreqHz.
	FreqHz, DesignHz float64
	// MastDiameterM is the diameter of the mast beside or below the antenna, StandoffM the
	// distance between their axes. Zero standoff is an antenna on top of its mast.
	MastDiameterM, StandoffM float64
	// MastAboveM is how far a mast beside the antenna goes on above its feed (a stack's centre),
	// in metres: infinity if it goes on and on. It says nothing where there is no standoff.
	MastAboveM float64
	// RollDeg is how far the mount rolls the antenna about its facing (see [Mount]); the mast
	// stands upright all the same.
	RollDeg float64
}

// The frequencies a Setting may have: beyond them no method of this program speaks.
const (
	lowestHz  = 1e6
	highestHz = 100e9
)

// Checked returns the setting with DesignHz filled in, or an error that names the value that is
// out of range. Every Design's Solve begins with it.
func (s Setting) Checked() (Setting, error) {
	if s.DesignHz == 0 {
		s.DesignHz = s.FreqHz
	}
	return s, errors.Join(
		within("frequency", s.FreqHz, lowestHz, highestHz, "Hz"),
		within("design frequency", s.DesignHz, lowestHz, highestHz, "Hz"),
		within("mast diameter", s.MastDiameterM, 0, 10, "m"),
		within("standoff", s.StandoffM, 0, 1000, "m"),
		within("roll", s.RollDeg, -360, 360, "deg"),
		within("mast's height above the antenna", s.MastAboveM, math.Inf(-1), math.Inf(1), "m"),
	)
}

// mastNote is what a method that knows no metal but the antenna's own says of a mast.
func (s Setting) mastNote(method string) []string {
	if s.MastDiameterM == 0 {
		return nil
	}
	return []string{"the mast's effect is not computed by " + method}
}

// A Solution is an antenna at one frequency.
type Solution struct {
	Pattern Pattern
	// ImpedanceOhm is the impedance at the antenna's own port, before any matching transformer.
	ImpedanceOhm complex128
	// Efficiency is radiated over accepted power, in (0, 1]. It is 1 where the pattern is a
	// gain that holds the conductor loss already (GainKnown).
	Efficiency float64
	// GainKnown says that the pattern is gain and not directivity, as makers state it.
	GainKnown bool
	// Source says how the figures came about, for the budget's lines; Remarks how the antenna was
	// taken to be installed; Notes hold the limits of the method that were touched.
	Source         string
	Remarks, Notes []string
}

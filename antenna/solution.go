package antenna

// A Design is an antenna as a plan describes it, ready to be solved at a frequency.
// Every kind (a dipole, a reference pattern, a maker's table) is a function that makes one.
type Design struct {
	Name string
	Kind string
	// Directional tells whether the design has a facing of its own, so that a site must give one.
	Directional bool
	// Solve computes the antenna in the given setting. It is safe for concurrent use.
	Solve func(Setting) (Solution, error)
}

// A Setting is how and where an antenna is used: its frequency and the metal beside it.
type Setting struct {
	// FreqHz is the frequency of interest, DesignHz that for which resonant lengths are cut;
	// zero means FreqHz.
	FreqHz, DesignHz float64
	// MastDiameterM is the diameter of the mast beside or below the antenna, StandoffM the
	// distance between their axes. Zero standoff is an antenna on top of its mast.
	MastDiameterM, StandoffM float64
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
	// Source says how the figures came about, for the budget's lines; Notes hold the limits
	// of the method that were touched.
	Source string
	Notes  []string
}

// A Pattern is what an antenna radiates at one frequency, in the antenna's own frame: azimuth 0
// is its facing, elevation 90 the zenith when it is mounted upright.
type Pattern struct {
	// Field returns the components of the far field towards a direction, theta pointing down
	// and phi towards growing azimuth, scaled so that |theta|^2 + |phi|^2 is the gain or
	// directivity over an isotropic antenna (a power ratio). A pattern without phase returns
	// real, positive components.
	Field func(Direction) (theta, phi complex128)
	// PeakDBi is the largest gain over all directions.
	PeakDBi float64
	// Phased says that the phase between the components is known.
	Phased bool
}

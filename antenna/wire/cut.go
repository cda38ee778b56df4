package wire

import (
	"errors"
	"fmt"
	"slices"

	"fellreach/antenna"
)

// A cut is an antenna with its lengths, for an installation but for its frequency.
type cut struct {
	layout
	structure Structure
	mainM     float64
}

// at returns the structure for a frequency. One far above the design frequency needs more segments
// than the wires were given there.
func (c cut) at(freqHz, designHz float64) Structure {
	s := c.structure
	if meshHz(freqHz, designHz) != designHz {
		s.Wires = c.wires
	}
	return s
}

// network solves the antenna at a frequency.
func (c cut) network(freqHz, designHz float64) (*Network, error) {
	return c.at(freqHz, designHz).Solve(freqHz, designHz)
}

// The lengths between which a resonance is sought, and where it is first looked for, in
// wavelengths.
const (
	shortestResonantWl = 0.3
	longestResonantWl  = 0.6
	guessedResonantWl  = 0.47
)

// cut cuts the antenna for an installation, which has been checked. Its wires are divided by the
// rule for a length near the resonance, or the length given, and stay so whatever is done with
// them: else the length found and what follows from it would jump with the number of segments.
func (a Antenna) cut(in antenna.Setting) (cut, error) {
	in.FreqHz = in.DesignHz
	return a.cuts.get(in, func() (cut, error) {
		wavelengthM := designWavelengthM(in)
		mainM := metres(a.blueprint.main, wavelengthM)
		if a.blueprint.resonant() {
			mainM = guessedResonantWl * wavelengthM
		}
		c := a.lay(in, mainM, nil)
		p, err := c.structure.prepare(in.DesignHz, 0)
		if err != nil {
			return cut{}, err
		}
		segments := p.mesh.segmentsOfWires(len(c.wires))
		if a.blueprint.resonant() {
			if mainM, err = a.resonantM(in, segments); err != nil {
				return cut{}, err
			}
		}
		return a.lay(in, mainM, segments), nil
	})
}

// lay lays the antenna out with a length of its main part and numbers of segments of its wires, or
// for nil those of its blueprint, and puts it on its mast.
func (a Antenna) lay(in antenna.Setting, mainM float64, segments []int) cut {
	c := cut{layout: a.blueprint.lay(designWavelengthM(in), mainM), mainM: mainM}
	c.structure = Structure{Wires: c.wires, Feeds: c.feeds, Mast: mastOf(in, c.layout)}
	if segments != nil {
		c.structure = c.structure.divided(segments)
	}
	return c
}

// segments returns the numbers of segments that the wires were given.
func (s Structure) segments() []int {
	counts := make([]int, len(s.Wires))
	for i, w := range s.Wires {
		counts[i] = w.Segments
	}
	return counts
}

// divided returns the structure with numbers of segments of its wires.
func (s Structure) divided(segments []int) Structure {
	s.Wires = slices.Clone(s.Wires)
	for i := range s.Wires {
		s.Wires[i].Segments = segments[i]
	}
	return s
}

// resonantM returns the length of the main part at which the antenna has no reactance at the
// design frequency, rising with the length.
func (a Antenna) resonantM(in antenna.Setting, segments []int) (float64, error) {
	wavelengthM := designWavelengthM(in)
	var last *Network
	reactance := func(wl float64) (float64, error) {
		n, err := a.lay(in, wl*wavelengthM, segments).structure.solveAfter(last, in.DesignHz)
		if err != nil {
			return 0, err
		}
		last = n
		return imag(n.TogetherOhm()), nil
	}
	const step = 0.02
	wl, err := risingZero(shortestResonantWl, longestResonantWl, guessedResonantWl, step, reactance)
	if errors.Is(err, errNoZero) {
		return 0, fmt.Errorf("no resonant length between %g and %g wl at %g Hz as installed: give the length, or make the rod thinner", shortestResonantWl, longestResonantWl, in.DesignHz)
	}
	return wl * wavelengthM, err
}

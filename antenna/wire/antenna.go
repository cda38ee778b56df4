package wire

import (
	"errors"
	"fmt"

	"fellreach/antenna"
)

// An Antenna is a design of wires: it is solved like any other, and analysed beyond that. What has
// been solved in a setting is remembered, and it is safe for concurrent use.
type Antenna struct {
	antenna.Design
	blueprint blueprint
	cuts      *memo[Installation, cut]
	solved    *memo[Installation, solved]
}

func newAntenna(kind string, directional bool, b blueprint) Antenna {
	a := Antenna{
		Design:    antenna.Design{Kind: kind, Directional: directional},
		blueprint: b,
		cuts:      &memo[Installation, cut]{},
		solved:    &memo[Installation, solved]{},
	}
	a.Solve = func(s antenna.Setting) (antenna.Solution, error) { return a.SolveInstalled(installed(s)) }
	return a
}

// A cut is an antenna with its lengths, for an installation but for its frequency.
type cut struct {
	layout
	structure Structure
	mainM     float64
}

// A solved antenna is what its solution came from.
type solved struct {
	antenna.Solution
	network *Network
	balance float64
}

// SolveInstalled solves the antenna in an installation.
//
// The solution's pattern is the directivity of the antenna with the mast, both components with
// their phase, in the frame of the antenna before the mount's roll.
func (a Antenna) SolveInstalled(in Installation) (antenna.Solution, error) {
	s, err := a.solveInstalled(in)
	return s.Solution, err
}

func (a Antenna) solveInstalled(in Installation) (solved, error) {
	in, err := in.checked()
	if err != nil {
		return solved{}, err
	}
	return a.solved.get(in, func() (solved, error) {
		c, err := a.cut(in)
		if err != nil {
			return solved{}, err
		}
		n, err := c.network(in.FreqHz, in.DesignHz)
		if err != nil {
			return solved{}, err
		}
		return c.radiate(in, n)
	})
}

// network solves the antenna at a frequency.
func (c cut) network(freqHz, designHz float64) (*Network, error) {
	s := c.structure
	if meshHz(freqHz, designHz) != designHz {
		s = s.divided(nil)
	}
	return s.Solve(freqHz, designHz)
}

// radiate drives a network as one antenna.
func (c cut) radiate(in Installation, n *Network) (solved, error) {
	r, err := n.Excite(together(n))
	if err != nil {
		return solved{}, err
	}
	notes := append(in.notes(c.structure.Mast), n.Warnings...)
	if ports := len(c.feeds); ports > 1 {
		notes = append(notes, fmt.Sprintf("%d feeds driven in phase with equal voltages: a harness of equal lines of a multiple of a half wave", ports))
	}
	return solved{
		Solution: antenna.Solution{
			Pattern:      r.Pattern(),
			ImpedanceOhm: n.TogetherOhm(),
			Efficiency:   r.Efficiency(),
			Source:       fmt.Sprintf("solved: %d segments, power balance %.3f", n.Segments, r.Balance()),
			Notes:        append(notes, r.warnings()...),
		},
		network: n,
		balance: r.Balance(),
	}, nil
}

// together returns equal voltages for all ports.
func together(n *Network) []complex128 {
	volts := make([]complex128, len(n.AdmittanceS))
	for i := range volts {
		volts[i] = 1
	}
	return volts
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
func (a Antenna) cut(in Installation) (cut, error) {
	in.FreqHz = in.DesignHz
	return a.cuts.get(in, func() (cut, error) {
		wavelengthM := in.wavelengthM()
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

// lay lays the antenna out with a length of its main part and numbers of segments of its wires,
// and puts it on its mast.
func (a Antenna) lay(in Installation, mainM float64, segments []int) cut {
	c := cut{layout: a.blueprint.lay(in.wavelengthM(), mainM), mainM: mainM}
	c.structure = Structure{Wires: c.wires, Feeds: c.feeds, Mast: in.mast(c.layout)}.divided(segments)
	return c
}

// divided returns the structure with numbers of segments, or with the rule for nil.
func (s Structure) divided(segments []int) Structure {
	wires := make([]Wire, len(s.Wires))
	for i, w := range s.Wires {
		if w.Segments = 0; segments != nil {
			w.Segments = segments[i]
		}
		wires[i] = w
	}
	s.Wires = wires
	return s
}

// resonantM returns the length of the main part at which the antenna has no reactance at the
// design frequency, rising with the length.
func (a Antenna) resonantM(in Installation, segments []int) (float64, error) {
	wavelengthM := in.wavelengthM()
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

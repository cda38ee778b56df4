package wire

import (
	"fmt"
	"slices"

	"fellreach/antenna"
)

// An Antenna is a design of wires: it is solved like any other, and analysed beyond that. What has
// been solved in a setting is remembered, and it is safe for concurrent use.
type Antenna struct {
	antenna.Design
	blueprint blueprint
	cuts      *memo[antenna.Setting, cut]
	solved    *memo[antenna.Setting, solved]
}

func newAntenna(kind string, directional bool, b blueprint) Antenna {
	a := Antenna{
		Design:    antenna.Design{Kind: kind, Directional: directional},
		blueprint: b,
		cuts:      &memo[antenna.Setting, cut]{},
		solved:    &memo[antenna.Setting, solved]{},
	}
	a.Solve = func(s antenna.Setting) (antenna.Solution, error) {
		answer, err := a.solve(s)
		return answer.Solution, err
	}
	return a
}

// A solved antenna is a solution, and what is told of how it came about.
type solved struct {
	antenna.Solution
	segments int
	balance  float64
}

// solve solves the antenna in a setting.
//
// The solution's pattern is the directivity of the antenna with the mast, both components with
// their phase, in the frame of the antenna before the mount's roll.
func (a Antenna) solve(in antenna.Setting) (solved, error) {
	in, err := in.Checked()
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

// radiate drives a network as one antenna.
func (c cut) radiate(in antenna.Setting, n *Network) (solved, error) {
	r, err := n.Excite(together(n))
	if err != nil {
		return solved{}, err
	}
	remarks := mastRemarks(in, c.structure.Mast)
	if ports := len(c.feeds); ports > 1 {
		remarks = append(remarks, fmt.Sprintf("%d feeds driven in phase with equal voltages by a harness of equal lines of a multiple of a half wave, its junction transformed back by %d: the impedance is that at its input", ports, ports))
	}
	return solved{
		Solution: antenna.Solution{
			Pattern:      r.Pattern(),
			ImpedanceOhm: n.TogetherOhm(),
			Efficiency:   r.Efficiency(),
			Source:       fmt.Sprintf("solved: %d segments, power balance %.3f", n.Segments, r.Balance()),
			Remarks:      remarks,
			Notes:        slices.Concat(n.Warnings, r.warnings()),
		},
		segments: n.Segments,
		balance:  r.Balance(),
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

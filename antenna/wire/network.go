package wire

import (
	"errors"
	"fmt"
	"math"

	"fellreach/antenna"
)

// A Network is a solved structure at one frequency, as a network of its ports. It is not changed
// once it is made, and safe for concurrent use.
type Network struct {
	FreqHz float64
	// AdmittanceS is the symmetric admittance matrix of the ports in siemens, in the order of the
	// feeds: the currents for 1 V at one port and the others shorted.
	AdmittanceS [][]complex128
	// Segments counts those of the wires and of the mast.
	Segments int
	// ReciprocalCondition of the matrix, estimated: its decimal digits are lost to the solution.
	ReciprocalCondition float64
	// Warnings name the limits of the method that the structure touches.
	Warnings []string

	k       float64
	mesh    *mesh
	ohmPerM []complex128
	border  *border // nil without a mast
	answers [][]complex128
}

// poorCondition is where the matrix has lost so many digits that the wires must be at fault.
const poorCondition = 1e-9

// Solve computes the currents of a structure at a frequency in Hz. It is divided into segments for
// designHz, or for the frequency itself where designHz is zero or less than two thirds of it: so
// a sweep about a design frequency stays on one mesh.
//
// An error tells what is wrong with the wires, by their numbers; what is only doubtful is in the
// network's warnings.
func (s Structure) Solve(freqHz, designHz float64) (*Network, error) {
	p, err := s.prepare(freqHz, designHz)
	if err != nil {
		return nil, err
	}
	return s.solve(p, freqHz, nil)
}

// solveAfter solves a structure for which the frequency is the design frequency too. The factors of
// its mast are taken from a network that has the same mast, moved perhaps, at the same frequency;
// nil is none.
func (s Structure) solveAfter(last *Network, freqHz float64) (*Network, error) {
	p, err := s.prepare(freqHz, freqHz)
	if err != nil {
		return nil, err
	}
	return s.solve(p, freqHz, last)
}

// A prepared structure is checked and divided.
type prepared struct {
	mesh     *mesh
	mast     *mesh // nil without
	warnings []string
}

// meshHz returns the frequency for which wires are divided.
func meshHz(freqHz, designHz float64) float64 {
	const farther = 1.5
	if designHz < freqHz/farther {
		return freqHz
	}
	return designHz
}

// prepare checks a structure and divides it.
func (s Structure) prepare(freqHz, designHz float64) (prepared, error) {
	if _, err := (antenna.Setting{FreqHz: freqHz, DesignHz: designHz}).Checked(); err != nil {
		return prepared{}, err
	}
	wavelengthM := antenna.WavelengthM(meshHz(freqHz, designHz))
	warnings, err := s.check(wavelengthM)
	if err != nil {
		return prepared{}, err
	}
	p := prepared{mesh: newMesh(s, wavelengthM), warnings: warnings}
	more, err := p.mesh.check(wavelengthM)
	p.warnings = append(p.warnings, more...)
	if s.Mast.exists() {
		p.mast = s.Mast.mesh(s.Wires[s.Feeds[0].Wire-1].line().at(s.Feeds[0].At), wavelengthM)
	}
	return p, err
}

// solve fills and solves the matrix of a prepared structure.
func (s Structure) solve(p prepared, freqHz float64, last *Network) (*Network, error) {
	n := &Network{
		FreqHz:   freqHz,
		Segments: p.mesh.segments(),
		Warnings: p.warnings,
		k:        2 * math.Pi / antenna.WavelengthM(freqHz),
		mesh:     p.mesh,
	}
	for _, r := range p.mesh.runs {
		n.ohmPerM = append(n.ohmPerM, s.Wires[r.wire].Material.ImpedanceOhmPerM(freqHz, r.radiusM))
	}
	z := impedances(n.k, n.mesh, n.mesh, n.ohmPerM)
	if p.mast != nil {
		c, err := n.cage(p.mast, last)
		if err != nil {
			return nil, err
		}
		n.Segments += p.mast.segments()
		n.border = c.border(n.k, n.mesh)
		n.border.reduce(z)
	}
	if err := n.drive(z); err != nil {
		return nil, err
	}
	return n, nil
}

// cage returns the factored mast, from another network if it has the same.
func (n *Network) cage(m *mesh, last *Network) (*cage, error) {
	if last == nil || last.k != n.k || last.border == nil || !last.border.cage.like(m) {
		return newCage(n.k, m)
	}
	c := *last.border.cage
	c.mesh = m
	return &c, nil
}

// drive factors the matrix and finds the answer to each port.
func (n *Network) drive(z *matrix) error {
	f, err := factor(z)
	if err != nil {
		return err
	}
	for _, p := range n.mesh.ports {
		answer := make([]complex128, z.rows)
		for _, s := range p {
			answer[s.basis] = complex(s.sign, 0)
		}
		f.solve(answer)
		n.answers = append(n.answers, answer)
	}
	for _, p := range n.mesh.ports {
		row := make([]complex128, len(n.answers))
		for j, answer := range n.answers {
			for _, s := range p {
				row[j] += complex(s.sign, 0) * answer[s.basis]
			}
		}
		n.AdmittanceS = append(n.AdmittanceS, row)
	}
	n.ReciprocalCondition = f.reciprocalCondition()
	if n.ReciprocalCondition < poorCondition {
		return fmt.Errorf("the matrix of the wires is ill-conditioned (1/%.0e): check for wires that nearly coincide and for segments of very unequal length", 1/n.ReciprocalCondition)
	}
	return nil
}

// ImpedanceOhm returns the impedance matrix of the ports in ohm: the voltages for 1 A into one
// port and the others open. A network whose ports short each other has none.
func (n *Network) ImpedanceOhm() ([][]complex128, error) {
	ports := len(n.AdmittanceS)
	y := newMatrix(ports, ports)
	for i, row := range n.AdmittanceS {
		copy(y.row(i), row)
	}
	f, err := factor(y)
	if err != nil {
		return nil, errors.New("the ports have no impedance matrix: they short each other")
	}
	z := make([][]complex128, ports)
	for i := range z {
		z[i] = make([]complex128, ports)
		z[i][i] = 1
		f.solve(z[i])
	}
	return z, nil
}

// TogetherOhm returns the impedance that each of the ports shows if all are driven with the same
// voltage: the number of ports over the sum of their currents for 1 V. With one port it is the
// antenna's impedance. With several it is what a harness makes of them that joins them through
// equal lines of a multiple of a half wave and transforms the junction back by their number; its
// VSWR is that at the harness's input against the impedance the harness is made for.
func (n *Network) TogetherOhm() complex128 {
	var sum complex128
	for _, row := range n.AdmittanceS {
		for _, y := range row {
			sum += y
		}
	}
	return complex(float64(len(n.AdmittanceS)), 0) / sum
}

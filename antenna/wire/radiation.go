package wire

import (
	"fmt"
	"math"
	"math/cmplx"

	"fellreach/antenna"
)

// A Radiation is a structure's currents for given voltages at its ports, and what becomes of their
// power. It is not changed once it is made, and safe for concurrent use.
type Radiation struct {
	// PortA are the currents at the ports in ampere.
	PortA []complex128
	// InputW is the power into the ports, RadiatedW what the far field holds, LossW what heats
	// the conductors, in watt for peak voltages.
	InputW, RadiatedW, LossW float64
	radiator                 *radiator
}

// How far the power balance may be off: beyond the first figure the structure is doubtful, beyond
// the second the method does not hold for it.
const (
	doubtfulBalance = 0.005
	refusedBalance  = 0.02
)

// Excite returns the radiation for voltages at the ports, one for each feed, in volt. An error
// says that no power goes in, or that far more or less comes out.
func (n *Network) Excite(volts []complex128) (*Radiation, error) {
	if len(volts) != len(n.answers) {
		panic(fmt.Sprintf("wire: %d voltages for %d ports", len(volts), len(n.answers)))
	}
	amplitudes := make([]complex128, len(n.mesh.bases))
	for i, v := range volts {
		for j, a := range n.answers[i] {
			amplitudes[j] += v * a
		}
	}
	r := &Radiation{PortA: make([]complex128, len(volts))}
	for i, row := range n.AdmittanceS {
		r.PortA[i] = dot(row, volts)
		r.InputW += real(volts[i]*cmplx.Conj(r.PortA[i])) / 2
	}
	if !(r.InputW > 0) {
		return nil, fmt.Errorf("the ports take %g W: no power to radiate", r.InputW)
	}
	r.radiator = newRadiator(n.k, n.strands(amplitudes))
	for i, s := range r.radiator.strands[:len(n.mesh.runs)] {
		r.LossW += s.lossW(n.k, real(n.ohmPerM[i]))
	}
	r.RadiatedW = r.radiator.radiatedW()
	if off := math.Abs(r.Balance() - 1); off > refusedBalance {
		return nil, fmt.Errorf("power balance %.3f: radiated and lost power must be within %g %% of the input; the wires are too thick or too close to each other for the thin-wire method", r.Balance(), 100*refusedBalance)
	}
	return r, nil
}

// strands returns the currents on the wires, then those on the mast.
func (n *Network) strands(amplitudes []complex128) []strand {
	var strands []strand
	add := func(m *mesh, amplitudes []complex128) {
		for i, currents := range m.currents(amplitudes) {
			strands = append(strands, strand{m.runs[i], currents})
		}
	}
	add(n.mesh, amplitudes)
	if n.border != nil {
		add(n.border.cage.mesh, n.border.currents(amplitudes))
	}
	return strands
}

// lossW returns the power that heats the strand.
func (s *strand) lossW(k, ohmPerM float64) float64 {
	same, cross := sineIntegrals(k, s.stepM)
	sum := 0.0
	for i := range s.count {
		a, b := s.currents[i], s.currents[i+1]
		sum += same*(squared(a)+squared(b)) + 2*cross*real(a*cmplx.Conj(b))
	}
	return ohmPerM * sum / 2
}

// Balance returns radiated and lost power over the input: 1 but for the method's error.
func (r *Radiation) Balance() float64 { return (r.RadiatedW + r.LossW) / r.InputW }

// Efficiency returns radiated over accepted power, from the conductors' loss.
func (r *Radiation) Efficiency() float64 { return 1 - r.LossW/r.InputW }

// warnings say when the power balance is doubtful.
func (r *Radiation) warnings() []string {
	if math.Abs(r.Balance()-1) <= doubtfulBalance {
		return nil
	}
	return []string{fmt.Sprintf("power balance %.3f: over %g %% off, the impedance is doubtful", r.Balance(), 100*doubtfulBalance)}
}

// Field returns the far field towards a direction, scaled to the directivity: exactly, in time
// proportional to the number of segments. [Radiation.Pattern] is for many directions.
func (r *Radiation) Field(d antenna.Direction) antenna.Field {
	scale := r.scale()
	f := r.radiator.row(d.ElDeg, []float64{d.AzDeg})[0]
	return antenna.Field{Theta: f.Theta * scale, Phi: f.Phi * scale}
}

// scale returns the factor from V to the directivity's square root.
func (r *Radiation) scale() complex128 {
	return complex(math.Sqrt(4*math.Pi/(2*antenna.WaveImpedanceOhm*r.RadiatedW)), 0)
}

func squared(z complex128) float64 { return real(z)*real(z) + imag(z)*imag(z) }

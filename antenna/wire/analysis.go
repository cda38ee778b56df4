package wire

import (
	"fmt"
	"math"

	"fellreach/antenna"
)

// An Analysis is what a builder wants to know of an antenna as installed, beyond its solution.
// Lengths stay as cut throughout: only the frequency moves.
type Analysis struct {
	antenna.Solution
	FreqHz       float64
	ReferenceOhm float64
	// VSWR is that of the impedance against the reference.
	VSWR float64
	// DirectivityDBi is the largest, both polarizations together; GainDBi has the conductors' loss
	// taken off. Mismatch is in neither.
	DirectivityDBi, GainDBi float64
	// ResonantHz is where the reactance rises through zero, sought up to a quarter above and below
	// the frequency; 0 if there is no such place.
	ResonantHz float64
	// BandHz are the edges between which the VSWR is at most 2, around the frequency if it is so
	// there, else around the nearest place; both 0 if there is none within 15 %.
	BandHz [2]float64
	// HzPerMM is how the resonance moves if the fed part is made 1 mm longer: negative. It is 0
	// where there is no resonance, and for antennas of listed wires.
	HzPerMM float64
	// Cut lists the parts with their lengths and distances.
	Cut []Part
	// Segments counts those of antenna and mast. PowerBalance is radiated and lost power over the
	// input, 1 but for the method's error.
	Segments     int
	PowerBalance float64
}

// BandWidth returns the width of the band over its middle frequency, 0 if there is none.
func (a Analysis) BandWidth() float64 {
	if a.BandHz[1] == 0 {
		return 0
	}
	return 2 * (a.BandHz[1] - a.BandHz[0]) / (a.BandHz[1] + a.BandHz[0])
}

// Analyse returns what is to be known of the antenna in an installation. The VSWR is against a
// reference in ohm, above zero: that of the line, times the ratio of a transformer if there is one
// (Z/ratio against a line is Z against ratio times the line).
func (a Antenna) Analyse(in antenna.Setting, referenceOhm float64) (Analysis, error) {
	if !(referenceOhm > 0) || math.IsInf(referenceOhm, 1) {
		return Analysis{}, fmt.Errorf("reference impedance %g ohm is not allowed: it must be above 0 and finite", referenceOhm)
	}
	in, err := in.Checked()
	if err != nil {
		return Analysis{}, err
	}
	s, err := a.solve(in)
	if err != nil {
		return Analysis{}, err
	}
	c, err := a.cut(in)
	if err != nil {
		return Analysis{}, err
	}
	result := Analysis{
		Solution:       s.Solution,
		FreqHz:         in.FreqHz,
		ReferenceOhm:   referenceOhm,
		VSWR:           antenna.VSWR(s.ImpedanceOhm, referenceOhm),
		DirectivityDBi: s.Pattern.PeakDBi,
		GainDBi:        s.Pattern.PeakDBi + 10*math.Log10(s.Efficiency),
		Cut:            c.parts,
		Segments:       s.segments,
		PowerBalance:   s.balance,
	}
	sweep := sweeper{a, in, c, referenceOhm, bandVSWR}
	if err := sweep.resonance(&result); err != nil {
		return Analysis{}, err
	}
	return result, sweep.band(&result)
}

// Sweep returns the impedance in ohm at several frequencies in Hz of the antenna cut for the
// installation's design frequency: what a VSWR curve is drawn from.
func (a Antenna) Sweep(in antenna.Setting, freqsHz []float64) ([]complex128, error) {
	in, err := in.Checked()
	if err != nil {
		return nil, err
	}
	c, err := a.cut(in)
	if err != nil {
		return nil, err
	}
	s := sweeper{a: a, in: in, cut: c}
	return s.impedancesOhm(freqsHz)
}

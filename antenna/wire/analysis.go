package wire

import (
	"errors"
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

// bandVSWR is the VSWR up to which a transmitter gives its power: common practice, no source.
const bandVSWR = 2

// Analyse returns what is to be known of the antenna in an installation. The VSWR is against a
// reference in ohm, above zero: that of the line, times the ratio of a transformer if there is one
// (Z/ratio against a line is Z against ratio times the line).
func (a Antenna) Analyse(in Installation, referenceOhm float64) (Analysis, error) {
	if !(referenceOhm > 0) || math.IsInf(referenceOhm, 1) {
		return Analysis{}, fmt.Errorf("reference impedance %g ohm is not allowed: it must be above 0 and finite", referenceOhm)
	}
	in, err := in.checked()
	if err != nil {
		return Analysis{}, err
	}
	s, err := a.solveInstalled(in)
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
		Segments:       s.network.Segments,
		PowerBalance:   s.balance,
	}
	sweep := sweeper{a, in, c, referenceOhm, bandVSWR}
	if err := sweep.resonance(&result); err != nil {
		return Analysis{}, err
	}
	return result, sweep.band(&result)
}

// Sweep returns the impedance of the antenna at several frequencies, cut for the installation's
// design frequency. The installation's own frequency does not count.
func (a Antenna) Sweep(in Installation, freqsHz []float64) ([]complex128, error) {
	in, err := in.checked()
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

// A sweeper solves one cut antenna at many frequencies.
type sweeper struct {
	a            Antenna
	in           Installation
	cut          cut
	referenceOhm float64
	limit        float64 // of the VSWR, for the band
}

func (s *sweeper) impedanceOhm(freqHz float64) (complex128, error) {
	n, err := s.cut.network(freqHz, s.in.DesignHz)
	if err != nil {
		return 0, err
	}
	return n.TogetherOhm(), nil
}

func (s *sweeper) impedancesOhm(freqsHz []float64) ([]complex128, error) {
	impedances, errs := make([]complex128, len(freqsHz)), make([]error, len(freqsHz))
	parallel(len(freqsHz), func(i int) { impedances[i], errs[i] = s.impedanceOhm(freqsHz[i]) })
	return impedances, errors.Join(errs...)
}

// excess returns how far the VSWR is above its limit.
func (s *sweeper) excess(freqHz float64) (float64, error) {
	z, err := s.impedanceOhm(freqHz)
	if err != nil {
		return 0, err
	}
	if !(real(z) > 0) {
		return 0, fmt.Errorf("the resistance is %g ohm at %g Hz: it must be above 0", real(z), freqHz)
	}
	return antenna.VSWR(z, s.referenceOhm) - s.limit, nil
}

// resonance finds the resonance, and how it moves with the length of the fed part.
func (s *sweeper) resonance(result *Analysis) error {
	const reach, step = 0.25, 0.01
	f := s.in.FreqHz
	reactance := func(freqHz float64) (float64, error) {
		z, err := s.impedanceOhm(freqHz)
		return imag(z), err
	}
	resonantHz, err := risingZero((1-reach)*f, (1+reach)*f, f, step*f, reactance)
	if errors.Is(err, errNoZero) {
		return nil
	}
	if err != nil {
		return err
	}
	result.ResonantHz = resonantHz
	if !s.a.blueprint.hasMain {
		return nil
	}
	const stretchM, aside = 1e-3, 1e-3
	longer := *s
	segments := make([]int, len(s.cut.structure.Wires))
	for i, w := range s.cut.structure.Wires {
		segments[i] = w.Segments
	}
	longer.cut = s.a.lay(s.in, s.cut.mainM+stretchM, segments)
	longer.cut.structure.Mast = s.cut.structure.Mast
	stretched, err := longer.impedanceOhm(resonantHz)
	if err != nil {
		return err
	}
	around, err := s.impedancesOhm([]float64{resonantHz * (1 - aside), resonantHz, resonantHz * (1 + aside)})
	if err != nil {
		return err
	}
	slope := imag(around[2]-around[0]) / (2 * aside * resonantHz)
	result.HzPerMM = -imag(stretched-around[1]) / slope
	return nil
}

// band finds the edges of the band from the frequency, the resonance or the lowest VSWR around.
func (s *sweeper) band(result *Analysis) error {
	inside, err := s.inBand(result)
	if err != nil || inside == 0 {
		return err
	}
	const reach, step = 0.4, 0.005
	for side, sign := range []float64{-1, 1} {
		edge, err := risingZero(0, reach*inside, 0, step*inside, func(away float64) (float64, error) {
			return s.excess(inside + sign*away)
		})
		if errors.Is(err, errNoZero) {
			edge = reach * inside
			result.Notes = append(result.Notes[:len(result.Notes):len(result.Notes)], fmt.Sprintf("VSWR stays under %g as far as it was sought, to %.4g Hz", s.limit, inside+sign*edge))
		} else if err != nil {
			return err
		}
		result.BandHz[side] = inside + sign*edge
	}
	return nil
}

// inBand returns a frequency at which the VSWR is within the band's, or 0 if none is found.
func (s *sweeper) inBand(result *Analysis) (float64, error) {
	const reach, points = 0.15, 31
	candidates := []float64{result.FreqHz}
	if result.ResonantHz > 0 {
		candidates = append(candidates, result.ResonantHz)
	}
	for i := range points { // outward from the frequency, so that the nearest comes first
		away := reach * float64(i/2+1) / (points / 2)
		candidates = append(candidates, result.FreqHz*(1+away*float64(1-2*(i%2))))
	}
	for _, freqHz := range candidates {
		over, err := s.excess(freqHz)
		if err != nil {
			return 0, err
		}
		if over <= 0 {
			return freqHz, nil
		}
	}
	return 0, nil
}

// A Refinement is what becomes of an antenna when each wire has twice the segments, or as many as
// its thickness allows.
type Refinement struct {
	Segments      int
	ImpedanceOhm  complex128
	ChangeOhm     complex128 // of the impedance
	ChangeDB      float64    // of the largest directivity
	ThicknessOnly bool       // no wire could be divided further
}

// Refine checks how far the solution in an installation has converged, by solving it once more on
// twice the segments. The change is the measure of what the division leaves open; on thick rods
// it has no limit, since a gap in a tube has none.
func (a Antenna) Refine(in Installation) (Refinement, error) {
	in, err := in.checked()
	if err != nil {
		return Refinement{}, err
	}
	coarse, err := a.solveInstalled(in)
	if err != nil {
		return Refinement{}, err
	}
	c, err := a.cut(in)
	if err != nil {
		return Refinement{}, err
	}
	finer := c
	segments, divided := make([]int, len(c.wires)), false
	for i, w := range c.structure.Wires {
		most := int(w.lengthM() / (leastRadii * w.radiusM()))
		segments[i] = max(w.Segments, min(2*w.Segments, most))
		divided = divided || segments[i] > w.Segments
	}
	finer.structure = c.structure.divided(segments)
	n, err := finer.structure.Solve(in.FreqHz, in.DesignHz)
	if err != nil {
		return Refinement{}, err
	}
	fine, err := finer.radiate(in, n)
	if err != nil {
		return Refinement{}, err
	}
	return Refinement{
		Segments:      n.Segments,
		ImpedanceOhm:  fine.ImpedanceOhm,
		ChangeOhm:     fine.ImpedanceOhm - coarse.ImpedanceOhm,
		ChangeDB:      fine.Pattern.PeakDBi - coarse.Pattern.PeakDBi,
		ThicknessOnly: !divided,
	}, nil
}

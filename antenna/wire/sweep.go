package wire

import (
	"errors"
	"fmt"

	"fellreach/antenna"
)

// bandVSWR is the VSWR up to which a transmitter gives its power: common practice, no source.
const bandVSWR = 2

// A sweeper solves one cut antenna at many frequencies.
type sweeper struct {
	a            Antenna
	in           antenna.Setting
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
	resonantHz, err := risingZero((1-reach)*f, (1+reach)*f, f, step*f, func(freqHz float64) (float64, error) {
		z, err := s.impedanceOhm(freqHz)
		return imag(z), err
	})
	if errors.Is(err, errNoZero) {
		return nil
	}
	if err != nil {
		return err
	}
	result.ResonantHz = resonantHz
	if s.a.blueprint.hasMain {
		result.HzPerMM, err = s.hzPerMM(resonantHz)
	}
	return err
}

// hzPerMM returns how a resonance moves if the fed part is 1 mm longer: what that adds to the
// reactance there, over what a hertz does.
func (s *sweeper) hzPerMM(resonantHz float64) (float64, error) {
	const stretchM, aside = 1e-3, 1e-3
	longer := *s
	longer.cut = s.a.lay(s.in, s.cut.mainM+stretchM, s.cut.structure.segments())
	longer.cut.structure.Mast = s.cut.structure.Mast
	stretched, err := longer.impedanceOhm(resonantHz)
	if err != nil {
		return 0, err
	}
	around, err := s.impedancesOhm([]float64{resonantHz * (1 - aside), resonantHz, resonantHz * (1 + aside)})
	if err != nil {
		return 0, err
	}
	slope := imag(around[2]-around[0]) / (2 * aside * resonantHz)
	return -imag(stretched-around[1]) / slope, nil
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

package wire

import "fellreach/antenna"

// Dipole returns a straight rod along z, its feed at the origin. Measures and their limits are
// those of the closed forms ([antenna.Dipole]); a resonant rod is the one of no reactance at the
// design frequency, next to a half wave, as installed.
//
// The cut list has the two arms, from the middle of the feed gap.
func Dipole(spec antenna.DipoleSpec) (Antenna, error) {
	if _, err := antenna.Dipole(spec); err != nil {
		return Antenna{}, err
	}
	return newAntenna("dipole", false, blueprint{main: spec.Length, hasMain: true, lay: func(_, lengthM float64) layout {
		lowerM := spec.FeedAt * lengthM
		return layout{
			wires: []Wire{rod(vec{0, 0, -lowerM}, lengthM, spec.DiameterM, spec.Material)},
			feeds: []Feed{{1, spec.FeedAt}},
			parts: []Part{{"lower arm", lowerM}, {"upper arm", lengthM - lowerM}},
		}
	}}), nil
}

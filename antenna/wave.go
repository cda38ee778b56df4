package antenna

import "math"

// Constants of free space, from CODATA (from memory): the speed of light in m/s, the
// permeability in H/m and the wave impedance in ohm.
const (
	SpeedOfLightMPerS = 299792458
	vacuumHPerM       = 4e-7 * math.Pi
	WaveImpedanceOhm  = vacuumHPerM * SpeedOfLightMPerS // 376.73
)

// WavelengthM returns the wavelength in free space in metres of a frequency in Hz, above zero.
func WavelengthM(freqHz float64) float64 { return SpeedOfLightMPerS / freqHz }

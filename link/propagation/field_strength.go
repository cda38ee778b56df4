package propagation

import "math"

// fieldStrength returns Ep, dB(uV/m), for 1 kW effective radiated power (of a half-wave dipole) at
// f GHz behind the loss lb.
//
// Source: Rec. ITU-R P.1812-6, (70).
func fieldStrength(f, lb float64) float64 { return 199.36 + 20*math.Log10(f) - lb }

// FieldStrength returns the field strength, dB(uV/m), at freqHz behind the loss lossDB of a
// transmitter of eirpDBm, equivalent isotropically radiated power: as for 1 kW e.r.p., whose
// dipole has 2.15 dBi.
func FieldStrength(freqHz, eirpDBm, lossDB float64) float64 {
	const kilowattDBm, dipoleDBi = 60, 2.15
	return fieldStrength(freqHz/1e9, lossDB) + eirpDBm - kilowattDBm - dipoleDBi
}

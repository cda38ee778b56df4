// Package noise computes the noise at a receiver's port: thermal noise, the receiver's own, and
// that of what lies between the antenna and the receiver.
//
// External noise by Rec. ITU-R P.372 enters as the factor fa of [Chain]; 1 is an antenna in
// surroundings at the reference temperature, which adds nothing to the thermal noise.
package noise

import "math"

// Constants of thermal noise: the Boltzmann constant (SI, exact) and the reference temperature
// of noise figures (IEEE, ITU-R P.372 section 2).
const (
	boltzmannJPerK = 1.380649e-23
	ReferenceK     = 290.0
)

// ThermalDBm returns k T0 B in dBm for a noise bandwidth in Hz above zero.
//
// Source: Rec. ITU-R P.372, section 2; -174 dBm in 1 Hz.
func ThermalDBm(bandwidthHz float64) float64 {
	return 10 * math.Log10(1000*boltzmannJPerK*ReferenceK*bandwidthHz)
}

// A Stage is one thing a signal passes between the antenna and the receiver. GainDB is negative
// for a loss.
type Stage struct{ GainDB, FigureDB float64 }

// Passive is a stage of a loss in dB, not negative, at the reference temperature: its noise
// figure equals its loss.
func Passive(lossDB float64) Stage { return Stage{-lossDB, lossDB} }

// RiseDB returns by how many dB the noise at the receiver's port exceeds k T0 B fr, the noise of
// the receiver alone, when the stages lie between an antenna of external noise factor fa and a
// receiver of noise figure receiverDB. The first stage is the one at the antenna.
//
// With losses alone, of product l, it is 10 log[1 + (fa - 1)/(l fr)]: 0 when fa is 1.
//
// Source: Friis' formula for noise factors in cascade; Rec. ITU-R P.372, section 2,
// f = fa + lc lt fr - 1, referred to the receiver's port.
func RiseDB(fa float64, stages []Stage, receiverDB float64) float64 {
	noise, gain := fa-1, 1.0
	for _, s := range stages {
		noise += (ratio(s.FigureDB) - 1) / gain
		gain *= ratio(s.GainDB)
	}
	// noise + 1 is the factor up to the receiver; at the port all of it has passed the gain.
	return 10 * math.Log10(((noise+1)*gain+ratio(receiverDB)-1)/ratio(receiverDB))
}

func ratio(dB float64) float64 { return math.Pow(10, dB/10) }

// OutsideShare returns which part of all noise at the receiver's port comes from outside, 0 to 1:
// (fa - 1)/(fa - 1 + l fr) with losses alone.
func OutsideShare(fa float64, stages []Stage, receiverDB float64) float64 {
	quiet, all := ratio(RiseDB(1, stages, receiverDB)), ratio(RiseDB(fa, stages, receiverDB))
	return 1 - quiet/all
}

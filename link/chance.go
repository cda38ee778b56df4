package link

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
)

// equipmentSpreadDB stands for what powers, cables and connectors differ from their data sheets.
// Common practice, no source.
const equipmentSpreadDB = 1

// decileSigmas is how many standard deviations the decile of a normal distribution lies from its
// median.
const decileSigmas = 1.2816

// chancePct returns the chance, in percent, that a direction of a margin in dB, once built, meets
// its availability: Phi((margin + bias)/s), s the root sum square of the prediction's spread, the
// spread of the noise from outside (its decile over locations, weighed by its share of all noise)
// and the equipment's. With readings the spread is an estimate, and Student's t of their count
// takes the place of Phi.
func (c Conditions) chancePct(marginDB float64, outside heard) float64 {
	noiseDB := outside.share * outside.decileDB / decileSigmas
	s := math.Sqrt(c.SpreadDB*c.SpreadDB + noiseDB*noiseDB + equipmentSpreadDB*equipmentSpreadDB)
	x := (marginDB + c.BiasDB) / s
	if c.Readings > 1 {
		return 100 * distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(c.Readings - 1)}.CDF(x)
	}
	return 100 * distuv.UnitNormal.CDF(x)
}

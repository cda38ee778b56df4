package link

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
)

// equipmentSpreadDB stands for what powers, cables and connectors differ from their data sheets.
// Common practice, no source.
const equipmentSpreadDB = 1

// chancePct returns the chance, in percent, that a link of a margin in dB, once built, meets its
// availability: Phi((margin + bias)/s), s the root sum square of the prediction's spread and the
// equipment's.
func (c Conditions) chancePct(marginDB float64) float64 {
	s := math.Hypot(c.SpreadDB, equipmentSpreadDB)
	return 100 * distuv.UnitNormal.CDF((marginDB+c.BiasDB)/s)
}

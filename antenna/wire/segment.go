package wire

import (
	"math"
	"slices"
)

// The rule of segmentation that [Structure] states.
const (
	segmentsPerWl  = 40
	segmentsPerFed = 12
	pieceRatio     = 1.5 // longest segment over the shortest piece of its wire
	leastRadii     = 2   // shortest segment, in radii
)

// rounding is what lengths that divide evenly may miss by, so that the last bit decides nothing.
const rounding = 1e-9

// segmentsOf returns how many segments each piece of a wire has. cuts are the ascending fractions
// at which feeds divide it.
func (w Wire) segmentsOf(cuts []float64, wavelengthM float64) []int {
	lengthM := w.lengthM()
	pieces := piecesOf(cuts, lengthM)
	if w.Segments > 0 {
		return shared(w.Segments, pieces)
	}
	longest := wavelengthM / segmentsPerWl
	if len(cuts) > 0 {
		longest = min(longest, lengthM/segmentsPerFed, pieceRatio*slices.Min(pieces))
	}
	counts := make([]int, len(pieces))
	for i, pieceM := range pieces {
		count := math.Ceil(pieceM/longest - rounding)
		count = min(count, math.Floor(pieceM/(leastRadii*w.radiusM())+rounding))
		counts[i] = int(max(1, min(count, 1e6)))
	}
	return counts
}

// shared divides a number of segments among pieces, at least one to each, the next always to the
// piece whose segments are longest, the first of equals.
func shared(segments int, pieces []float64) []int {
	counts := make([]int, len(pieces))
	for i := range counts {
		counts[i] = 1
	}
	for range segments - len(pieces) {
		longest := 0
		for i, pieceM := range pieces {
			if pieceM/float64(counts[i]) > pieces[longest]/float64(counts[longest])*(1+rounding) {
				longest = i
			}
		}
		counts[longest]++
	}
	return counts
}

// piecesOf returns the lengths between the ends of a wire and its cuts, in metres.
func piecesOf(cuts []float64, lengthM float64) []float64 {
	pieces := make([]float64, 0, len(cuts)+1)
	from := 0.0
	for _, to := range append(slices.Clone(cuts), 1) {
		pieces = append(pieces, (to-from)*lengthM)
		from = to
	}
	return pieces
}

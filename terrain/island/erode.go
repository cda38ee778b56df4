package island

import "math"

const (
	maxMm     = 1_200_000 // all land is lower
	straight  = 99        // lengths of the straight and the diagonal step of a grid
	diagonal  = 140
	steepest  = 640    // of 1000: no slope stands steeper
	hillside  = 40_000 // m^2, the catchment below which slopes hardly steepen
	cliffCutM = 500    // the root of the catchment that halves a cliff
	bedMm     = 9_000  // the deepest bed that a river cuts into its valley
)

// erode gives the land the heights at which its streams, where they run now, carry away just
// what rises.
//
// This is the steady state of the stream power law with exponents m = 1/2 and n = 1: slope is
// uplift over the square root of the catchment (Howard, Water Resources Research 30, 1994, from
// memory). Where it would be steeper than ground can stand, the slope is steepest.
func (g ground) erode() {
	h := g.height
	w := drain(h, g.land)
	rootM := w.rootM(h.cellM)
	for _, i := range w.order {
		r := w.receiver[i]
		base := int64(h.v[r])
		if !g.land[r] {
			base = int64(g.cliff.v[i]) * cliffCutM / (cliffCutM + rootM[i])
		}
		stepM := h.cellM
		if oblique(int(i-r), h.cols) {
			stepM = stepM * diagonal / straight
		}
		h.v[i] = int32(base + min(int64(g.uplift.v[i])*stepM/rootM[i], steepest*stepM))
	}
}

// cutBeds lowers each stream's bed into its valley, the more the larger its catchment.
func (g ground) cutBeds() {
	w := drain(g.height, g.land)
	rootM := w.rootM(g.height.cellM)
	for _, i := range w.order {
		g.height.v[i] -= int32(min(2*rootM[i], bedMm))
	}
}

// rootM returns the square root of each cell's catchment, in metres, hillside included.
func (w water) rootM(cellM int64) []int64 {
	roots := make([]int64, len(w.levelMm))
	for i, cells := range w.catchment() {
		// IEEE 754 rounds square roots exactly: the result is the same on every processor.
		roots[i] = int64(math.Sqrt(float64(int64(cells)*cellM*cellM + hillside)))
	}
	return roots
}

// oblique tells whether a step in a grid of the given width is a diagonal one.
func oblique(step, cols int) bool {
	return step != 1 && step != -1 && step != cols && step != -cols
}

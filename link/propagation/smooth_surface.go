package propagation

import "math"

// A surfaceLine is the straight smooth surface fitted to a profile, given by its heights above
// sea level at the two ends, m.
type surfaceLine struct{ tx, rx float64 }

// fitSurface returns the least-squares line through the bare ground, weighing every stretch by its
// length: hst and hsr before any limit.
//
// Source: Rec. ITU-R P.1812-6, (85) and (86).
func fitSurface(distKm, aslM []float64) surfaceLine {
	var v1, v2 float64
	for i := 1; i < len(distKm); i++ {
		d0, d1, h0, h1 := distKm[i-1], distKm[i], aslM[i-1], aslM[i]
		v1 += (d1 - d0) * (h1 + h0)
		v2 += (d1 - d0) * (h1*(2*d1+d0) + h0*(d1+2*d0))
	}
	return lineOfSums(v1, v2, distKm[len(distKm)-1])
}

// lineOfSums returns the fitted line of a profile of d km from its sums v1 and v2.
func lineOfSums(v1, v2, d float64) surfaceLine {
	return surfaceLine{tx: (2*v1*d - v2) / (d * d), rx: (v2 - v1*d) / (d * d)}
}

// limited returns the line with its ends no higher than the ground there.
func (s surfaceLine) limited(groundTxM, groundRxM float64) surfaceLine {
	return surfaceLine{tx: min(s.tx, groundTxM), rx: min(s.rx, groundRxM)}
}

// obstructions are the heights by which bare ground stands over the straight line between the
// antennas, without the Earth's bulge: the largest, m, and the steepest as seen from either end,
// m/km. They matter where hobs is positive.
type obstructions struct{ hobs, alphaT, alphaR float64 }

// findObstructions searches the interior points, (~87) and (~88).
func findObstructions(r *ridge) obstructions {
	last := len(r.distKm) - 1
	d := r.distKm[last]
	o := obstructions{hobs: math.Inf(-1), alphaT: math.Inf(-1), alphaR: math.Inf(-1)}
	for i := 1; i < last; i++ {
		di := r.distKm[i]
		over := r.aslM[i] - (r.hts*(d-di)+r.hrs*di)/d
		o.hobs, o.alphaT, o.alphaR = max(o.hobs, over), max(o.alphaT, over/di), max(o.alphaR, over/(d-di))
	}
	return o
}

// lowered returns the line brought down under what obstructs the path: the smooth surface of the
// diffraction model before its limit at the ground, (89).
func (s surfaceLine) lowered(o obstructions) surfaceLine {
	if o.hobs <= 0 {
		return s
	}
	sum := o.alphaT + o.alphaR
	return surfaceLine{tx: s.tx - o.hobs*o.alphaT/sum, rx: s.rx - o.hobs*o.alphaR/sum}
}

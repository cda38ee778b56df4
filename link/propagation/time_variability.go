package propagation

import "math"

// interpolationFactor returns Fi, which leads from the diffraction loss at the median Earth radius
// (0, p = 50 %) to that at the radius exceeded for beta0 percent of the time (1, p <= beta0).
//
// Source: Rec. ITU-R P.1812-6, (40).
func interpolationFactor(p, beta0 float64) float64 {
	switch {
	case p >= 50:
		return 0
	case p > beta0:
		return inverseNormal(p/100) / inverseNormal(beta0/100)
	}
	return 1
}

// inverseNormal returns I(x), the value that a standard normal variable exceeds with probability
// x: positive below 0.5, negative above. It is within 4.5e-4 of the exact quantile; x is taken to
// lie between 1e-6 and 1 - 1e-6.
//
// Source: Rec. ITU-R P.1812-6, (96) and (97), a rational approximation of which the published
// results can be told from exact quantiles.
func inverseNormal(x float64) float64 {
	if x > 0.5 {
		return -inverseNormal(1 - x)
	}
	t := math.Sqrt(-2 * log(max(x, 1e-6)))
	c := ((0.010328*t+0.802853)*t + 2.515516698) / (((0.001308*t+0.189269)*t+1.432788)*t + 1)
	return t - c
}

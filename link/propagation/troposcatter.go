package propagation

import "math"

// troposcatterDB returns Lbs, dB, the loss by scattering in the troposphere not exceeded for p
// percent of the time, p <= 50: at f GHz over d km with the path angular distance theta in mrad
// and the sea-level refractivity n0 in N-units.
//
// On a line of sight theta is small or negative and taken as it is; there is no limit of distance.
//
// Source: Rec. ITU-R P.1812-6, (44) and (45).
func troposcatterDB(f, d, theta, n0, p float64) float64 {
	return scatterBasisDB(f, n0, p) + scatterPathDB(math.Log10(d), theta)
}

// scatterBasisDB is the part of the loss that all paths share.
func scatterBasisDB(f, n0, p float64) float64 {
	halved := math.Log10(f / 2)
	lf := 25*math.Log10(f) - 2.5*halved*halved
	return 190.1 + lf - 0.15*n0 - 10.125*math.Pow(math.Log10(50/p), 0.7)
}

// scatterPathDB is the part that a path adds by the logarithm of its length and its angle.
func scatterPathDB(logD, theta float64) float64 { return 20*logD + 0.573*theta }

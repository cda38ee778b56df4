package propagation

import "math"

// KnifeEdgeDB returns the diffraction loss J(nu) of a single knife edge, in dB, never negative.
//
// nu is the dimensionless Fresnel-Kirchhoff parameter: below 0 the edge is under the line of
// sight, at 0 it touches it (6.03 dB). The loss is neglected at nu <= -0.78, where the formula
// reaches zero.
//
// Source: Rec. ITU-R P.526-15, section ~4.1, (~31), which is (~12) of P.1812; within 0.15 dB
// of the Fresnel integrals for nu >= -0.5.
func KnifeEdgeDB(nu float64) float64 {
	if nu <= -0.78 {
		return 0
	}
	over := nu - 0.1
	return max(0, 6.9+20*log10(math.Sqrt(over*over+1)+over))
}

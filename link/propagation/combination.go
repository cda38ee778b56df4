package propagation

import "math"

// minimumWithDuctingDB returns Lminbap, dB, a smooth maximum of the ducting loss and the
// line-of-sight loss, (60), written so that no exponential overflows.
func minimumWithDuctingDB(lba, lb0p float64) float64 {
	return max(lba, lb0p) + 2.5*math.Log1p(math.Exp(-math.Abs(lba-lb0p)/2.5))
}

// minimumDB returns Lminb0p, dB, the notional least loss by line of sight and diffraction for p
// percent of the time, (59).
func (t *Terms) minimumDB(p float64) float64 {
	overLand := (1 - t.Omega) * t.Ldp
	if p < t.Beta0 {
		return t.Lb0p + overLand
	}
	return t.Lbd50 + (t.Lb0beta+overLand-t.Lbd50)*t.Fi
}

// withDuctingDB returns Lbda, dB: diffraction, led towards ducting where that loses less, the
// more so the longer the path of d km, (58) and (61).
func withDuctingDB(lbd, lminbap, d float64) float64 {
	if lminbap > lbd {
		return lbd
	}
	return lminbap + (lbd-lminbap)*distanceWeight(d)
}

// distanceWeight is Fk, 1 for short paths and 0 for long ones, (58).
func distanceWeight(d float64) float64 { return 1 - 0.5*(1+math.Tanh(3*0.5*(d-20)/20)) }

// angleWeight is Fj, 1 on a line of sight and 0 for large path angular distances, mrad, (57).
func angleWeight(theta float64) float64 { return 1 - 0.5*(1+math.Tanh(3*0.8*(theta-0.3)/0.3)) }

// combineDB returns Lbc, dB: troposcatter and all else added in the manner of (63), which is
// sharper than a sum of powers.
func combineDB(lbs, lbam float64) float64 {
	return min(lbs, lbam) - 5*math.Log10(1+math.Pow(10, -0.2*math.Abs(lbs-lbam)))
}

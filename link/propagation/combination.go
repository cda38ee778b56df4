package propagation

import "math"

// minimumWithDuctingDB returns Lminbap, dB, a smooth maximum of the ducting loss and the
// line-of-sight loss, (60), written so that no exponential overflows.
func minimumWithDuctingDB(lba, lb0p float64) float64 {
	return max(lba, lb0p) + 2.5*log(1+exp(-math.Abs(lba-lb0p)/2.5))
}

// minimumDB returns Lminb0p, dB, the notional least loss by line of sight and diffraction for p
// percent of the time, (59).
func (t *Terms) minimumDB(p float64) float64 {
	m := minimum{p: p, beta0: t.Beta0, lb0p: t.Lb0p, lb0beta: t.Lb0beta, lbd50: t.Lbd50, ldp: t.Ldp, overLand: (1 - t.Omega) * t.Ldp, fi: t.Fi}
	return m.lossDB()
}

// A minimum is what the notional least loss is made of; ldp is the diffraction loss for p
// percent of the time, overLand that by the share of land.
type minimum struct{ p, beta0, lb0p, lb0beta, lbd50, ldp, overLand, fi float64 }

// lbd returns Lbd, dB, diffraction for p percent of the time, (43).
func (m *minimum) lbd() float64 { return m.lb0p + m.ldp }

func (m *minimum) lossDB() float64 {
	if m.p < m.beta0 {
		return m.lb0p + m.overLand
	}
	return m.lbd50 + (m.lb0beta+m.overLand-m.lbd50)*m.fi
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
	return min(lbs, lbam) - 5/math.Ln10*log(1+exp(-0.2*math.Ln10*math.Abs(lbs-lbam)))
}

// Combined is what the mechanisms of P.1812 come to before the locations are looked at, dB: the
// loss on a line of sight, Lb0p, and all mechanisms together, Lbc.
type Combined struct{ Lb0p, Lbc float64 }

// LossDB returns the loss Lb with the location variability Lloc of [LocationDB] (0 for half of the
// locations), (69).
func (c Combined) LossDB(lloc float64) float64 { return max(c.Lb0p, c.Lbc+lloc) }

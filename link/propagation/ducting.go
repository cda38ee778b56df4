package propagation

import "math"

// A duct is a path as the model of ducting and layer reflection sees it: km, m, mrad.
type duct struct {
	band         ductBand
	d            float64
	horizons     horizons
	time         timeParameters
	smooth       surfaceLine // hst, hsr
	hts, hrs     float64     // antennas above sea level
	hte, hre, hm float64     // antennas above the smooth surface, roughness
	dct, dcr     float64     // distances to the coast
}

// A ductBand is what ducting at one frequency has in common on all paths.
type ductBand struct {
	f, rootF float64 // GHz, and the cube root of it
	basisDB  float64 // the part of Af that no path changes, (~47)
}

func newDuctBand(f float64) ductBand {
	alf := 0.0
	if f < 0.5 {
		alf = 45.375 - 137.0*f + 92.5*f*f
	}
	return ductBand{f, math.Cbrt(f), 102.45 + 20*log10(f) + alf}
}

// newDuct fits the smooth surface of the ducting model to the ground. Unlike that of the
// diffraction model it is not lowered under obstructions.
//
// Source: Rec. ITU-R P.1812-6, (85), (86) and (90) to (93).
func newDuct(p *Path, h horizons, t timeParameters) duct {
	last := len(p.DistKm) - 1
	smooth := fitSurface(p.DistKm, p.AslM).limited(p.AslM[0], p.AslM[last])
	u := duct{
		band: newDuctBand(p.FreqHz / 1e9), d: p.LengthKm(), horizons: h, time: t, smooth: smooth,
		hts: p.txAslM(), hrs: p.rxAslM(), dct: p.TxCoastKm, dcr: p.RxCoastKm,
	}
	u.hte, u.hre = u.hts-smooth.tx, u.hrs-smooth.rx // (92)
	u.hm = roughness(p, smooth, h)
	return u
}

// roughness returns hm, the largest height of the ground over the smooth surface between the
// horizons, both included, (93).
func roughness(p *Path, smooth surfaceLine, h horizons) float64 {
	m := (smooth.rx - smooth.tx) / p.LengthKm()
	hm := math.Inf(-1)
	for i := min(h.tx, h.rx); i <= max(h.tx, h.rx); i++ {
		hm = max(hm, p.AslM[i]-(smooth.tx+m*p.DistKm[i]))
	}
	return hm
}

// lossDB returns Lba, dB, the loss by ducting and layer reflection not exceeded for p percent of
// the time.
//
// Source: Rec. ITU-R P.1812-6, (46).
func (u *duct) lossDB(p float64) float64 { return u.couplingDB() + u.alongDB(p) }

// couplingDB returns Af, the fixed loss between the antennas and the anomalous structure in the
// air, (~47) to (~50).
func (u *duct) couplingDB() float64 {
	h := &u.horizons
	factorT, linearTDB := u.shielding(h.thetaT, h.dlt)
	factorR, linearRDB := u.shielding(h.thetaR, h.dlr)
	return u.band.basisDB + 20*log10((h.dlt+h.dlr)*factorT*factorR) + linearTDB + linearRDB +
		u.coastDB(u.dct, h.dlt, u.hts) + u.coastDB(u.dcr, h.dlr, u.hrs)
}

// shielding returns As, the diffraction loss by the ground that shields an antenna whose horizon
// lies at the elevation theta and the distance dl, in two parts: 20 log(factor) and what is linear
// in the angle, (~48).
func (u *duct) shielding(theta, dl float64) (factor, linearDB float64) {
	over := theta - 0.1*dl
	if over <= 0 {
		return 1, 0
	}
	return 1 + 0.361*over*math.Sqrt(u.band.f*dl), 0.264 * over * u.band.rootF
}

// coastDB returns Ac, the correction for coupling over the sea of an antenna dc km from the coast at
// hs m above sea level (from memory: not above ground): never positive, (~49).
func (u *duct) coastDB(dc, dl, hs float64) float64 {
	if u.time.omega < 0.75 || dc > dl || dc > 5 {
		return 0
	}
	return -3 * math.Exp(-0.25*dc*dc) * (1 + math.Tanh(0.07*(50-hs)))
}

// alongDB returns Ad(p), the loss along the anomalous structure by angle and time, (~51) to (~56).
func (u *duct) alongDB(p float64) float64 {
	h := &u.horizons
	return u.band.angleDB(h.ae, u.thetaPrime()) + ductTimeDB(p, u.d, u.logBeta())
}

// ductTimeDB returns A(p), the time variability of ducting over d km by the logarithm of beta, (~53)
// to (~56).
func ductTimeDB(p, d, logBeta float64) float64 {
	gamma := 1.076 * exp(-1.012*log(2.0058-logBeta)-(9.51-4.8*logBeta+0.198*logBeta*logBeta)*1e-6*exp(1.13*log(d)))
	x := log10(p) - logBeta // of p/beta
	return -12 + (1.2+3.7e-3*d)*x + 12*exp10(gamma*x)
}

// thetaPrime is the angular distance of the path along the structure, mrad, (~52).
func (u *duct) thetaPrime() float64 {
	h := &u.horizons
	return 1000*u.d/h.ae + min(h.thetaT, 0.1*h.dlt) + min(h.thetaR, 0.1*h.dlr)
}

// angleDB returns the loss over an angular distance theta, mrad, (~51).
func (b *ductBand) angleDB(ae, theta float64) float64 { return 5e-5 * ae * b.rootF * theta }

// mostCoastDB is the most that [duct.coastDB] takes off at one end.
const mostCoastDB = 6

// mostLogBeta is the logarithm of the largest beta0 at a latitude and nearer to the pole: mu1 and its
// product with mu4 are 1 at most, as are mu2 and mu3.
func mostLogBeta(latDeg float64) float64 {
	return max(1.67-0.015*math.Abs(latDeg), log10(4.17))
}

// leastDuctTimeDB is a bound of A(p) from below on paths of up to mostKm where beta is at most
// 10^logBeta. Where p is above that, A(p) falls as beta grows (tested up to 300 km), so the largest
// beta bounds it, with the lesser slope of short paths and the lesser exponent of long ones;
// elsewhere the power is positive.
func leastDuctTimeDB(p, mostKm, logBeta float64) float64 {
	x := log10(p) - logBeta
	if x < 0 || mostKm > 300 {
		return (1.2+3.7e-3*mostKm)*min(x, 0) - 12
	}
	return ductTimeDB(p, mostKm, logBeta) - 3.7e-3*mostKm*x
}

// leastDB is a bound of the loss from below that does not need the heights over the smooth surface.
// leastTime is one of A(p).
func (u *duct) leastDB(leastTime float64) float64 {
	return u.couplingDB() + u.band.angleDB(u.horizons.ae, u.thetaPrime()) + leastTime
}

// logBeta returns the logarithm of beta, beta0 with its corrections for the geometry of the path
// and the roughness of the ground. On rough paths beta itself may be too small for a number.
func (u *duct) logBeta() float64 {
	alpha := max(-0.6-3.5e-9*exp(3.1*log(u.d))*u.time.tau, -3.4)
	roots := math.Sqrt(u.hte) + math.Sqrt(u.hre)
	logMu2 := min(0, alpha*log10(500/u.horizons.ae*u.d*u.d/(roots*roots)))
	logMu3 := 0.0
	if u.hm > 10 {
		di := min(u.d-u.horizons.dlt-u.horizons.dlr, 40)
		logMu3 = -4.6e-5 * (u.hm - 10) * (43 + 6*di) / math.Ln10
	}
	return log10(u.time.beta0) + logMu2 + logMu3
}

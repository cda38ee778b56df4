package propagation

import "math"

// A SmoothEarth gives the diffraction loss of a smooth spherical Earth at one frequency and
// polarization. Make it with [NewSmoothEarth].
//
// Source: Rec. ITU-R P.526-15, section ~3, as in Rec. ITU-R P.1812-6, (~22) to (~36).
type SmoothEarth struct {
	rootF, lambda float64 // cube root of the frequency in GHz; m
	verticalShare float64
	land, sea     surface
}

// A surface is a kind of ground as the first term needs it: the normalized surface admittance K
// times the cube root of the Earth's radius, for both polarizations.
type surface struct{ horizontal, vertical float64 }

// NewSmoothEarth returns the smooth Earth at freqHz, 30e6 Hz and more, for a path whose power is
// vertically polarized to the part verticalShare, 0 to 1: the losses of the two polarizations are
// mixed linearly in dB by it. Land has a relative permittivity of 22 and 0.003 S/m, sea 80 and
// 5 S/m, as in P.1812-6.
func NewSmoothEarth(freqHz, verticalShare float64) SmoothEarth {
	f := freqHz / 1e9
	return SmoothEarth{
		rootF: math.Cbrt(f), lambda: diffractionWavelengthM(freqHz), verticalShare: verticalShare,
		land: newSurface(f, 22, 0.003), sea: newSurface(f, 80, 5),
	}
}

func newSurface(f, epsr, sigma float64) surface {
	loss := 18 * sigma / f
	kh := 0.036 / math.Cbrt(f) / math.Sqrt(math.Hypot(epsr-1, loss)) // (~29)
	return surface{horizontal: kh, vertical: kh * math.Hypot(epsr, loss)}
}

// A SmoothPath is a path over a smooth Earth.
type SmoothPath struct {
	LengthKm float64
	TxM, RxM float64 // antenna heights above the smooth Earth, > 0
	RadiusKm float64 // effective Earth radius ap
	SeaShare float64 // part of the path over sea, omega
}

// LossDB returns the diffraction loss Ldsph, dB, never negative: 0 when the path clears the smooth
// Earth, the first term of the residue series beyond the radio horizon, in between an
// interpolation.
//
// The Recommendation lets the first term fall below 0 beyond the horizon, for very low antennas
// over sea with vertical polarization, and drops it when it forms Ld. Here it is 0 already, so that
// a mixture of polarizations has no step at the horizon; Ld is the same.
//
// Source: Rec. ITU-R P.1812-6, section ~4.3.2, (~22) to (~27).
func (e SmoothEarth) LossDB(p SmoothPath) float64 {
	radiusKm, part := e.reach(p)
	if part == 0 {
		return 0
	}
	return part * e.firstTermDB(p, radiusKm)
}

// reach returns the radius for which the first term counts on a path and the part of it that does:
// 0 where the path clears the smooth Earth, 1 beyond the radio horizon. The polarization has no say
// in it.
//
// Most paths are known to clear it without looking for the place of [SmoothPath.leastClearance]. At
// (1+b)/2 of the path the clearance hse is (hte+hre)/2 (1 - c b - m (1-b^2)) and the required hreq
// is 17.456 sqrt(d lambda)/2 sqrt(1-b^2). As (1 - c b)/sqrt(1-b^2) is least where b = c, everywhere
// hse/sqrt(1-b^2) >= sqrt(hte hre) - (hte+hre)/2 m, and (hte+hre) m is 250 d^2/ap.
func (e SmoothEarth) reach(p SmoothPath) (radiusKm, part float64) {
	d, roots := p.LengthKm, math.Sqrt(p.TxM)+math.Sqrt(p.RxM)
	dlos := math.Sqrt(2*0.001*p.RadiusKm) * roots // (~22)
	if d >= dlos {
		return p.RadiusKm, 1
	}
	if 2*math.Sqrt(p.TxM*p.RxM)-250*d*d/p.RadiusKm > 17.456*math.Sqrt(d*e.lambda) {
		return 0, 0
	}
	hse, dse1, dse2 := p.leastClearance()
	hreq := 17.456 * math.Sqrt(dse1*dse2*e.lambda/d) // (~26)
	if hse > hreq {
		return 0, 0
	}
	return 500 * (d / roots) * (d / roots), 1 - hse/hreq // aem of (~27)
}

// leastClearance returns the height of the ray over the smooth Earth where it clears the least part
// of its Fresnel zone, and the distances of that place from both ends, (~23) to (~25).
func (p SmoothPath) leastClearance() (hse, dse1, dse2 float64) {
	ap, d, hte, hre := p.RadiusKm, p.LengthKm, p.TxM, p.RxM
	c := (hte - hre) / (hte + hre)
	m := 250 * d * d / (ap * (hte + hre))
	// The Recommendation's cos(pi/3 + acos(x)/3) is sin(asin(x)/3), which keeps its digits near 0.
	x := 1.5 * c * math.Sqrt(3*m/((m+1)*(m+1)*(m+1)))
	b := 2 * math.Sqrt((m+1)/(3*m)) * math.Sin(math.Asin(min(max(x, -1), 1))/3)
	dse1 = d / 2 * (1 + b)
	dse2 = d - dse1
	hse = ((hte-500*dse1*dse1/ap)*dse2 + (hre-500*dse2*dse2/ap)*dse1) / d
	return hse, dse1, dse2
}

// firstTermDB returns the first term of the residue series on an Earth of radius a km, land and
// sea mixed by their shares, then the polarizations, each at least 0, by theirs. What has no
// weight is not computed.
func (e SmoothEarth) firstTermDB(p SmoothPath, a float64) float64 {
	loss, v := 0.0, e.verticalShare
	if v > 0 {
		loss += v * max(0, e.overGroundDB(p, a, e.land.vertical, e.sea.vertical))
	}
	if v < 1 {
		loss += (1 - v) * max(0, e.overGroundDB(p, a, e.land.horizontal, e.sea.horizontal))
	}
	return loss
}

func (e SmoothEarth) overGroundDB(p SmoothPath, a, land, sea float64) float64 {
	loss, omega := 0.0, p.SeaShare
	if omega > 0 {
		loss += omega * e.residueDB(p, a, sea)
	}
	if omega < 1 {
		loss += (1 - omega) * e.residueDB(p, a, land)
	}
	return loss
}

// residueDB returns the first term Ldft over ground of the given admittance, K = admittance/a^(1/3).
// Its three parts are the loss with distance FX and the gain with either height G.
//
// Source: Rec. ITU-R P.1812-6, section 4.3.3, (~28) to (~36).
func (e SmoothEarth) residueDB(p SmoothPath, a, admittance float64) float64 {
	rootA := math.Cbrt(a)
	k := admittance / rootA
	k2 := k * k
	beta := (1 + 1.6*k2 + 0.67*k2*k2) / (1 + 4.5*k2 + 1.53*k2*k2)
	x := 21.88 * beta * e.rootF / (rootA * rootA) * p.LengthKm
	y := 0.9575 * beta * e.rootF * e.rootF / rootA // per metre of height
	return -distanceTermDB(x) - heightGainDB(beta*y*p.TxM, k) - heightGainDB(beta*y*p.RxM, k)
}

// distanceTermDB returns FX for the normalized distance x.
func distanceTermDB(x float64) float64 {
	if x >= 1.6 {
		return 11 + 10*log10(x) - 17.6*x
	}
	logX := log(x)
	return -20/math.Ln10*logX - 5.6488*exp(1.425*logX)
}

// heightGainDB returns G for b = beta Y, Y being the normalized height, which already holds beta
// once. k is the normalized surface admittance. G is at least 20 log b, so where k is below b/2 its
// floor is out of reach.
func heightGainDB(b, k float64) float64 {
	var g float64
	if b > 2 {
		g = 17.6*math.Sqrt(b-1.1) - 5*log10(b-1.1) - 8
	} else {
		g = 20 * log10(b+0.1*b*b*b)
	}
	if k < b/2 {
		return g
	}
	return max(g, 2+20*math.Log10(k))
}

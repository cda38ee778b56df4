package propagation

import "math"

// A Multipath is what multipath fading by Rec. ITU-R P.530 needs to know of a line-of-sight path.
//
// Source: Rec. ITU-R P.530-17, section ~2.3, all of it from memory; (~7) has a second witness in an
// open library of ITU-R methods. Edition 18 is believed to differ.
type Multipath struct {
	FreqHz   float64
	LengthKm float64
	// TxAslM and RxAslM are the antenna heights above sea level.
	TxAslM, RxAslM float64
	// LatDeg is the latitude of the path's centre, north positive, -90 to 90.
	LatDeg float64
	// Dn1 is the refractivity gradient of the lowest 65 m not exceeded for 1 % of an average
	// year, N-units/km: negative, inland and temperate about -100 to -300.
	Dn1 float64
	// RoughnessM is sa, the standard deviation of the ground's heights in a square of 110 km
	// around the path. At 0 it is not known, and the quick form that does without it is used.
	RoughnessM float64
}

// Applies tells whether P.530 speaks of the path: 7.5 to 185 km, 0.45 to 37 GHz and at least 15/d
// GHz (d in km), inclined by no more than 37 mrad. That the path is a line of sight is the caller's
// to know.
func (m Multipath) Applies() bool {
	f, d := m.FreqHz/1e9, m.LengthKm
	return d >= 7.5 && d <= 185 && f >= 0.45 && f <= 37 && f*d >= 15 && m.inclinationMrad() <= 37
}

// FadeDB returns the depth, dB below the level without multipath, that fades exceed for the rest of
// an average year when the link must work for availabilityPct of it. It is never negative: 0 below
// some 37 %, and 0 where [Multipath.Applies] is false, as P.530 counts no fading there. At 100 % and
// beyond it is infinite.
//
// The distribution is narrow-band and covers all percentages of time.
func (m Multipath) FadeDB(availabilityPct float64) float64 {
	switch {
	case !m.Applies():
		return 0
	case !(availabilityPct < 100): // NaN too
		return math.Inf(1)
	}
	p, fades := 100-availabilityPct, m.fades()
	if p <= fades.pt {
		return fades.at + 10*math.Log10(fades.pt/p) // 10 dB a decade, as in (~7)
	}
	return fades.shallowDB(p)
}

// inclinationMrad returns |ep|, mrad.
func (m Multipath) inclinationMrad() float64 { return math.Abs(m.RxAslM-m.TxAslM) / m.LengthKm }

// occurrencePct returns the multipath occurrence factor p0: where the deep fades of the average
// worst month, continued to 0 dB, meet the axis of time, %. It may exceed 100.
//
// Source: (~7) with the roughness sa, the quick form without.
func (m Multipath) occurrencePct() float64 {
	f, d, ep, hl := m.FreqHz/1e9, m.LengthKm, m.inclinationMrad(), min(m.TxAslM, m.RxAslM)
	if m.RoughnessM > 0 {
		k := math.Pow(10, -4.4-0.0027*m.Dn1) * math.Pow(10+m.RoughnessM, -0.46)
		return k * math.Pow(d, 3.4) * math.Pow(1+ep, -1.03) * math.Pow(f, 0.8) * math.Pow(10, -0.00076*hl)
	}
	k := math.Pow(10, -4.6-0.0027*m.Dn1)
	return k * math.Pow(d, 3.1) * math.Pow(1+ep, -1.29) * math.Pow(f, 0.8) * math.Pow(10, -0.00089*hl)
}

// yearDB returns dG: a deep fade is by that much rarer in the average year than in the average
// worst month, as 10 log of the percentages.
//
// Source: section ~2.3.4.
func (m Multipath) yearDB() float64 {
	c := math.Pow(math.Abs(math.Cos(2*m.LatDeg*math.Pi/180)), 0.7)
	if math.Abs(m.LatDeg) > 45 {
		c = -c
	}
	dg := 10.5 - 5.6*math.Log10(1.1+c) - 2.7*math.Log10(m.LengthKm) + 1.7*math.Log10(1+m.inclinationMrad())
	return min(dg, 10.8)
}

// A fadeDistribution is the distribution of fades over an average year. Beyond the transition it
// falls 10 dB a decade, before it an empirical curve leads to 63 % at no fade.
type fadeDistribution struct {
	at float64 // the fade at the transition, dB
	pt float64 // the percentage of an average year for which fades exceed it
	qt float64 // the shape of the curve before it
}

// fades returns the distribution of the path. The transition is found in the worst month, its
// percentage is converted to the average year before the curve is laid through it.
//
// Source: sections ~2.3.2 and ~2.3.4; stated for p0 below 2000 %.
func (m Multipath) fades() fadeDistribution {
	p0 := m.occurrencePct()
	at := 25 + 1.2*math.Log10(p0)
	pt := p0 * math.Pow(10, (-at-m.yearDB())/10)
	qa := -20 * math.Log10(-math.Log1p(-pt/100)) / at
	slope, offset := fadeCurve(at)
	return fadeDistribution{at: at, pt: pt, qt: (qa-2)/slope - offset}
}

// percent returns for how much of an average year fades exceed a, at least 0 and below at, in dB.
func (f fadeDistribution) percent(a float64) float64 {
	slope, offset := fadeCurve(a)
	qa := 2 + slope*(f.qt+offset)
	return -100 * math.Expm1(-math.Pow(10, -qa*a/20))
}

// fadeCurve returns the two parts of qa = 2 + slope (qt + offset) at the fade a.
func fadeCurve(a float64) (slope, offset float64) {
	r := math.Pow(10, -a/20)
	return (1 + 0.3*r) * math.Pow(10, -0.016*a), 4.3 * (r + a/800)
}

// shallowDB returns the fade exceeded for p percent, more than pt, of an average year.
func (f fadeDistribution) shallowDB(p float64) float64 {
	if p >= f.percent(0) {
		return 0
	}
	lo, hi := 0.0, f.at
	for hi-lo > 1e-9 {
		if mid := (lo + hi) / 2; f.percent(mid) > p {
			lo = mid
		} else {
			hi = mid
		}
	}
	return hi
}

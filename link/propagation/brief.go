package propagation

import "math"

// A Request asks P.1812 for the loss not exceeded for TimePct percent of an average year, up to 50,
// with or without ducting (as [P1812] or [P1812WithoutDucting]).
type Request struct {
	TimePct float64
	Ducting bool
}

// A Brief evaluates a method at one frequency for very many paths that are given as outlines of
// their ground: the formulas of [P1812], [P526] or [FreeSpace], without terms and notes. It leaves out what cannot move
// the loss by 1e-7 dB. It checks nothing; many goroutines may use it at once.
type Brief struct {
	method    string
	lambda    float64
	lbfs1     float64 // free space over 1 km
	band      ductBand
	earth     SmoothEarth
	requests  []Request
	lbs1      []float64 // for each request, troposcatter over 1 km without an angle
	leastTime []float64 // for each, a bound from below of ducting's time variability
}

// Shares answers for the part of a path's power that is vertically polarized, 0 to 1. It is asked
// only where that counts, which is where the smooth Earth reaches into the path.
type Shares interface{ VerticalShare() float64 }

// A Region bounds the paths that a [Brief] is asked for: none is longer, and the centre of none is
// nearer to the equator.
type Region struct{ MostKm, LeastLatDeg float64 }

// NewBrief prepares one of this package's methods for requests at freqHz, 30e6 to 6e9 Hz, in air of
// sea-level refractivity n0, N-units, on the paths of a region. Methods other than [P1812] know no
// time and answer all requests alike.
func NewBrief(m Model, freqHz, n0 float64, within Region, requests []Request) *Brief {
	f := freqHz / 1e9
	b := &Brief{
		method: m.Name, lambda: diffractionWavelengthM(freqHz), lbfs1: lineOfSightDB(f, 1), band: newDuctBand(f),
		earth: NewSmoothEarth(freqHz, 1), requests: requests,
	}
	if m.Name != P1812.Name {
		b.lbfs1 = FreeSpaceDB(freqHz, 1000)
	}
	for _, r := range requests {
		b.lbs1 = append(b.lbs1, scatterBasisDB(f, n0, r.TimePct))
		b.leastTime = append(b.leastTime, leastDuctTimeDB(r.TimePct, within.MostKm, mostLogBeta(within.LeastLatDeg)))
	}
	return b
}

// negligibleDB is the difference from which on the blend of [combineDB] moves its result by less
// than 1e-7 dB: 5/ln(10) 10^(-0.2 x).
const negligibleDB = 37

// A briefPath is one path on its way.
type briefPath struct {
	*Brief
	*Outline
	ground Ground
	shares Shares

	omega, theta, lbfs, ld50 float64
	smooth                   surfaceLine // of the diffraction model
	share                    float64     // of vertical polarization, asked for when needed
	shared                   bool
	time                     timeParameters // asked for when needed
	timed                    bool
	dlt, dlr                 float64 // the horizons, on a line of sight asked for when needed
}

// log10OnePlus returns log10(1 + x) for x >= 0; for the small ones of flat paths by its series, exact
// to the last digits.
func log10OnePlus(x float64) float64 {
	if x > 1e-4 {
		return log10(1 + x)
	}
	return x * (1 - x*(0.5-x*(1.0/3-x*0.25))) / math.Ln10
}

// Loss evaluates the requests on one path into out, one for each request in their order. Nearer
// than 0.25 km P.1812 is free space.
func (b *Brief) Loss(o *Outline, g Ground, shares Shares, out []Combined) {
	p := briefPath{Brief: b, Outline: o, ground: g, shares: shares, dlt: o.Dlt, dlr: o.Dlr}
	rise := (o.Hts - o.Hrs) / 1000 / o.LengthKm
	logD := log10(o.LengthKm)
	p.lbfs = b.lbfs1 + 20*logD + 10*log10OnePlus(rise*rise) // of the slant range
	switch {
	case b.method == FreeSpace.Name:
		p.sameForAll(out, Combined{math.Inf(-1), p.lbfs})
		return
	case b.method == P1812.Name && o.LengthKm < leastKm: // whatever the locations
		p.sameForAll(out, Combined{p.lbfs, math.Inf(-1)})
		return
	}
	_, _, sea := g.Zones()
	p.omega = sea / o.LengthKm
	p.theta = o.Theta()
	p.smooth = lineOfSums(o.V1, o.V2, o.LengthKm).
		lowered(obstructions{o.Hobs, o.AlphaT, o.AlphaR}).limited(o.TxGroundM, o.RxGroundM)
	p.ld50 = p.diffractionDB(o.Slopes, o.Ae)
	if b.method == P526.Name {
		p.sameForAll(out, Combined{math.Inf(-1), p.lbfs + p.ld50})
		return
	}
	for i := range b.requests {
		out[i] = p.request(i, logD)
	}
}

func (p *briefPath) sameForAll(out []Combined, c Combined) {
	for i := range out {
		out[i] = c
	}
}

// request evaluates the i-th request.
func (p *briefPath) request(i int, logD float64) Combined {
	r, lbs := p.requests[i], p.lbs1[i]+scatterPathDB(logD, p.theta)
	lb0p, lbd := p.lbfs, p.lbfs+p.ld50
	var least minimum
	if r.TimePct < 50 {
		least = p.minimum(r.TimePct)
		lb0p, lbd = least.lb0p, least.lbd()
	}
	lbda := lbd
	if r.Ducting {
		lbda = p.withDucting(i, lb0p, lbd, logD)
	}
	lbam := lbda
	switch {
	case r.TimePct < 50:
		lbam = lbda + (least.lossDB()-lbda)*angleWeight(p.theta)
	case lbda != lbd: // Lminb0p is Lbd50 at 50 %, which is Lbd
		lbam = lbda + (lbd-lbda)*angleWeight(p.theta)
	}
	if lbs > lbam+negligibleDB {
		return Combined{lb0p, lbam}
	}
	return Combined{lb0p, combineDB(lbs, lbam)}
}

// diffractionDB is the delta-Bullington loss at one Earth radius.
func (p *briefPath) diffractionDB(actual Slopes, ap float64) float64 {
	d := p.LengthKm
	lbulla := BullingtonDB(actual.Nu(d, p.lambda), d)
	txM, rxM := p.Hts-p.smooth.tx, p.Hrs-p.smooth.rx
	smooth := SmoothPath{LengthKm: d, TxM: txM, RxM: rxM, RadiusKm: ap, SeaShare: p.omega}
	radiusKm, part := p.earth.reach(smooth)
	if part == 0 {
		return lbulla
	}
	earth := p.earth
	earth.verticalShare = p.verticalShare()
	ldsph := part * earth.firstTermDB(smooth, radiusKm)
	if ldsph == 0 { // whatever Lbulls is
		return lbulla
	}
	lbulls := BullingtonDB(p.ground.LevelSlopes(ap, txM, rxM).Nu(d, p.lambda), d)
	return DeltaBullingtonDB(lbulla, lbulls, ldsph)
}

func (p *briefPath) verticalShare() float64 {
	if !p.shared {
		p.share, p.shared = p.shares.VerticalShare(), true
	}
	return p.share
}

// minimum evaluates what p below 50 % of the time needs beside the median.
func (p *briefPath) minimum(pct float64) minimum {
	p.askTime()
	p.askHorizons()
	m := minimum{p: pct, beta0: p.time.beta0, lbd50: p.lbfs + p.ld50, fi: interpolationFactor(pct, p.time.beta0)}
	m.lb0p = p.lbfs + focusingDB(p.dlt, p.dlr, pct)
	m.lb0beta = p.lbfs + focusingDB(p.dlt, p.dlr, p.time.beta0)
	ldbeta := p.diffractionDB(p.ground.SlopesBeta(), betaRadiusKm)
	m.ldp = p.ld50 + m.fi*(ldbeta-p.ld50)
	m.overLand = (1 - p.omega) * m.ldp
	return m
}

func (p *briefPath) askTime() {
	if !p.timed {
		dtm, dlm, _ := p.ground.Zones()
		p.time, p.timed = timeParametersOf(dtm, dlm, p.omega, p.ground.LatDeg()), true
	}
}

func (p *briefPath) askHorizons() {
	if p.dlt == 0 && !p.TransHorizon {
		p.dlt = p.ground.ObstacleKm()
		p.dlr = p.LengthKm - p.dlt
	}
}

// withDucting leads Lbd towards ducting. Ducting counts where Lminbap is below Lbd, and Lminbap is
// never below Lba: a bound of Lba from below that reaches Lbd settles it.
func (p *briefPath) withDucting(i int, lb0p, lbd, logD float64) float64 {
	pct, leastTime := p.requests[i].TimePct, p.leastTime[i]
	if p.leastDuctingDB(logD)+leastTime >= lbd {
		return lbd
	}
	p.askHorizons()
	u := duct{
		band: p.band, d: p.LengthKm, time: timeParameters{omega: p.omega}, hts: p.Hts, hrs: p.Hrs,
		horizons: horizons{ae: p.Ae, thetaT: p.ThetaT, thetaR: p.ThetaR, dlt: p.dlt, dlr: p.dlr},
		smooth:   lineOfSums(p.V1, p.V2, p.LengthKm).limited(p.TxGroundM, p.RxGroundM),
	}
	u.dct, u.dcr = p.ground.CoastKm()
	if u.leastDB(leastTime) >= lbd {
		return lbd
	}
	p.askTime()
	u.time = p.time
	u.hte, u.hre = u.hts-u.smooth.tx, u.hrs-u.smooth.rx
	u.hm = p.ground.RoughnessM(u.smooth.tx, u.smooth.rx)
	return withDuctingDB(lbd, minimumWithDuctingDB(u.lossDB(pct), lb0p), p.LengthKm)
}

// leastDuctingDB is a quick bound of Lba from below: without shielding, with the most that the coast
// can take off, and the least angles. On a line of sight dlt + dlr is the length of the path.
// The time variability is not in it.
func (p *briefPath) leastDuctingDB(logD float64) float64 {
	least := p.band.basisDB + 20*logD
	if p.TransHorizon {
		least = p.band.basisDB + 20*log10(p.Dlt+p.Dlr)
	}
	if p.omega >= 0.75 {
		least -= 2 * mostCoastDB
	}
	theta := 1000*p.LengthKm/p.Ae + min(p.ThetaT, 0) + min(p.ThetaR, 0)
	return least + p.band.angleDB(p.Ae, theta)
}

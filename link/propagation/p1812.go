package propagation

import "fmt"

// P1812 is the path-specific method of Rec. ITU-R P.1812 for a percentage of time and of
// locations: line of sight, diffraction, troposcatter and ducting. Nearer than 0.25 km it gives
// free space, with a note.
var P1812 = Model{Name: "p1812", Edition: "P.1812-8", MinHz: minHz, MaxHz: maxHz, Loss: p1812Loss}

// leastKm is the shortest path for which P.1812 is stated.
const leastKm = 0.25

func p1812Loss(p Path) (Loss, error) {
	e, err := newP1812(&p)
	if err != nil || e.near {
		return e.loss, err
	}
	e.addDucting(&p)
	e.combine(&p)
	return e.loss, nil
}

// P1812WithoutDucting evaluates a path like [P1812] with an infinite loss by ducting and layer
// reflection: the fall of the loss below its median for small percentages of time without the
// enhancements that no fade mirrors. Lba, Lminbap and the terms of the ducting geometry are left out.
func P1812WithoutDucting(p Path) (Loss, error) {
	e, err := newP1812(&p)
	if err != nil || e.near {
		return e.loss, err
	}
	e.loss.Terms.Lbda = e.loss.Terms.Lbd
	e.combine(&p)
	return e.loss, nil
}

// A p1812 is an evaluation on its way.
type p1812 struct {
	horizons horizons
	time     timeParameters
	loss     Loss
	near     bool // too near for the method: the loss is that of free space, and complete
}

// newP1812 checks the path and computes all mechanisms but ducting.
func newP1812(p *Path) (p1812, error) {
	if err := p.check(); err != nil {
		return p1812{}, err
	}
	if err := p.checkStatistics(); err != nil {
		return p1812{}, err
	}
	e := p1812{horizons: findHorizons(p), time: newTimeParameters(p.Profile, p.LatDeg), near: p.LengthKm() < leastKm}
	e.loss = Loss{Terms: noTerms, Notes: p.p1812Notes()}
	e.loss.setHorizons(p, e.horizons)
	t := &e.loss.Terms
	t.Dtm, t.Dlm, t.Omega, t.Beta0 = e.time.dtm, e.time.dlm, e.time.omega, e.time.beta0
	t.Lbfs = lineOfSightDB(p.FreqHz/1e9, p.slantKm())
	if e.near {
		e.setLoss(p, t.Lbfs)
		return e, nil
	}
	e.addLineOfSight(p)
	e.addDiffraction(p)
	t.Lbs = troposcatterDB(p.FreqHz/1e9, p.LengthKm(), t.Theta, p.N0, p.TimePct)
	return e, nil
}

func (e *p1812) addLineOfSight(p *Path) {
	t, h := &e.loss.Terms, &e.horizons
	t.Lb0p = t.Lbfs + focusingDB(h.dlt, h.dlr, p.TimePct)
	t.Lb0beta = t.Lbfs + focusingDB(h.dlt, h.dlr, t.Beta0)
}

// addDiffraction evaluates the diffraction model at the two Earth radii and between them, (39) to
// (43).
func (e *p1812) addDiffraction(p *Path) {
	t, m := &e.loss.Terms, newDiffraction(p, e.time.omega)
	t.Hstd, t.Hsrd = m.smooth.tx, m.smooth.rx
	t.LbullaK50, t.LbullsK50, t.LdsphK50 = m.parts(t.Ae)
	t.Ld50 = DeltaBullingtonDB(t.LbullaK50, t.LbullsK50, t.LdsphK50)
	t.Ldbeta = DeltaBullingtonDB(m.parts(betaRadiusKm))
	t.Fi = interpolationFactor(p.TimePct, t.Beta0)
	t.Ldp = t.Ld50 + t.Fi*(t.Ldbeta-t.Ld50)
	t.Lbd50 = t.Lbfs + t.Ld50
	t.Lbd = t.Lb0p + t.Ldp
}

func (e *p1812) addDucting(p *Path) {
	t, u := &e.loss.Terms, newDuct(p, e.horizons, e.time)
	t.Hst, t.Hsr, t.Hte, t.Hre, t.Hm = u.smooth.tx, u.smooth.rx, u.hte, u.hre, u.hm
	t.Lba = u.lossDB(p.TimePct)
	t.Lminbap = minimumWithDuctingDB(t.Lba, t.Lb0p)
	t.Lbda = withDuctingDB(t.Lbd, t.Lminbap, p.LengthKm())
}

// combine leads from the mechanisms to the loss, (59) to (69).
func (e *p1812) combine(p *Path) {
	t := &e.loss.Terms
	t.Lminb0p = t.minimumDB(p.TimePct)
	t.Lbam = t.Lbda + (t.Lminb0p-t.Lbda)*angleWeight(t.Theta)
	t.Lbc = combineDB(t.Lbs, t.Lbam)
	t.Lloc = LocationDB(p.LocationPct, p.LocationSpreadDB)
	e.setLoss(p, Combined{t.Lb0p, t.Lbc}.LossDB(t.Lloc))
}

func (e *p1812) setLoss(p *Path, lb float64) {
	t := &e.loss.Terms
	e.loss.DB, t.Lb, t.Ep = lb, lb, fieldStrength(p.FreqHz/1e9, lb)
}

// checkStatistics returns what is wrong with the part of a path that P.1812 alone uses.
func (p *Path) checkStatistics() error {
	for _, l := range [...]limit{
		{"N0", p.N0, 100, 600, " N-units"},
		{"the percentage of time", p.TimePct, 0.001, 50, " %"},
		{"the percentage of locations", p.LocationPct, 1, 99, " %"},
		{"the spread among locations", p.LocationSpreadDB, 0, 50, " dB"},
		{"the latitude", p.LatDeg, -90, 90, " degrees"},
		{"the transmitter's distance to the coast", p.TxCoastKm, 0, 1e6, " km"},
		{"the receiver's distance to the coast", p.RxCoastKm, 0, 1e6, " km"},
	} {
		if err := l.check(); err != nil {
			return err
		}
	}
	return nil
}

// p1812Notes tells where the path leaves the ranges for which P.1812 is stated.
func (p *Path) p1812Notes() []string {
	var notes []string
	for _, l := range [...]limit{
		{"the length of the path", p.LengthKm(), leastKm, 3000, " km"},
		{"the transmitter's height above ground", p.TxAglM, 1, 3000, " m"},
		{"the receiver's height above ground", p.RxAglM, 1, 3000, " m"},
		{"the percentage of time", p.TimePct, 1, 50, " %"},
	} {
		if !l.holds() {
			notes = append(notes, fmt.Sprintf("%s is %.6g%s, P.1812 is stated for %.6g to %.6g%s", l.name, l.value, l.unit, l.lo, l.hi, l.unit))
		}
	}
	if p.LengthKm() < leastKm {
		notes = append(notes, fmt.Sprintf("nearer than %g km the loss is that of free space, whatever stands in the way", leastKm))
	}
	return notes
}

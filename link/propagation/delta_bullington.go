package propagation

// P526 is free space with the delta-Bullington diffraction of P.526, at the median effective Earth
// radius.
var P526 = Model{Name: "p526", Edition: "P.526-15", MinHz: minHz, MaxHz: maxHz, Loss: p526Loss}

func p526Loss(p Path) (Loss, error) {
	if err := p.check(); err != nil {
		return Loss{}, err
	}
	l := Loss{Terms: noTerms}
	t := &l.Terms
	l.setHorizons(&p, findHorizons(&p))
	t.Omega = seaShare(p.Profile)
	dif := newDiffraction(&p, t.Omega)
	t.Hstd, t.Hsrd = dif.smooth.tx, dif.smooth.rx
	t.LbullaK50, t.LbullsK50, t.LdsphK50 = dif.parts(t.Ae)
	t.Ld50 = DeltaBullingtonDB(t.LbullaK50, t.LbullsK50, t.LdsphK50)
	t.Lbfs = FreeSpaceDB(p.FreqHz, 1000*p.slantKm())
	t.Lbd50 = t.Lbfs + t.Ld50
	t.Lb, l.DB = t.Lbd50, t.Lbd50
	return l, nil
}

// DeltaBullingtonDB returns the diffraction loss Ld, dB: Bullington's for the actual profile, and
// what the spherical Earth loses beyond Bullington's for the smooth profile in its place.
//
// Source: Rec. ITU-R P.526-15, section ~4.5.4; Rec. ITU-R P.1812-6, (~38).
func DeltaBullingtonDB(lbulla, lbulls, ldsph float64) float64 {
	return lbulla + max(ldsph-lbulls, 0)
}

// A diffraction is the delta-Bullington model on one path. It serves every Earth radius: the
// smooth surface does not depend on it.
type diffraction struct {
	actual, level ridge
	smooth        surfaceLine // hstd, hsrd
	earth         SmoothEarth
	lambda, omega float64
}

func newDiffraction(p *Path, omega float64) diffraction {
	hts, hrs, last := p.txAslM(), p.rxAslM(), len(p.DistKm)-1
	actual := ridge{p.DistKm, p.AslM, p.CoverM, hts, hrs}
	smooth := fitSurface(p.DistKm, p.AslM).lowered(findObstructions(&actual)).limited(p.AslM[0], p.AslM[last])
	return diffraction{
		actual: actual,
		level:  ridge{distKm: p.DistKm, hts: hts - smooth.tx, hrs: hrs - smooth.rx},
		smooth: smooth,
		earth:  NewSmoothEarth(p.FreqHz, p.VerticalShare),
		lambda: diffractionWavelengthM(p.FreqHz),
		omega:  omega,
	}
}

// parts returns the three losses of which the delta-Bullington loss is made, on an Earth of
// effective radius ap km.
func (m *diffraction) parts(ap float64) (lbulla, lbulls, ldsph float64) {
	d := m.actual.distKm[len(m.actual.distKm)-1]
	lbulla = BullingtonDB(m.actual.slopes(ap).Nu(d, m.lambda), d)
	lbulls = BullingtonDB(m.level.slopes(ap).Nu(d, m.lambda), d)
	ldsph = m.earth.LossDB(SmoothPath{LengthKm: d, TxM: m.level.hts, RxM: m.level.hrs, RadiusKm: ap, SeaShare: m.omega})
	return lbulla, lbulls, ldsph
}

// diffractionWavelengthM is the wavelength of the diffraction models, which take the speed of light
// as 2.998e8 m/s.
func diffractionWavelengthM(freqHz float64) float64 { return 2.998e8 / freqHz }

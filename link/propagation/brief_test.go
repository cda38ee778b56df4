package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

type fixedShare float64

func (s fixedShare) VerticalShare() float64 { return float64(s) }

// searched answers for the ground under a path by searching its profile.
type searched struct{ p *Path }

func (s searched) SlopesBeta() Slopes { return SlopesOf(s.p, BetaRadiusKm) }

func (s searched) LevelSlopes(radiusKm, txM, rxM float64) Slopes {
	r := ridge{distKm: s.p.DistKm, hts: txM, hrs: rxM}
	return r.slopes(radiusKm)
}

func (s searched) ObstacleKm() float64 { return findHorizons(s.p).dlt }

func (s searched) RoughnessM(txM, rxM float64) float64 {
	return roughness(s.p, surfaceLine{txM, rxM}, findHorizons(s.p))
}

func (s searched) Zones() (dtm, dlm, sea float64) {
	t := newTimeParameters(s.p.Profile, s.p.LatDeg)
	return t.dtm, t.dlm, t.omega * s.p.LengthKm()
}

func (s searched) LatDeg() float64           { return s.p.LatDeg }
func (s searched) CoastKm() (tx, rx float64) { return s.p.TxCoastKm, s.p.RxCoastKm }

// outlineOf searches a profile of three points or more for its outline.
func outlineOf(p *Path) Outline {
	h, last := findHorizons(p), len(p.DistKm)-1
	o := Outline{
		LengthKm: p.LengthKm(), TxGroundM: p.AslM[0], RxGroundM: p.AslM[last], Hts: p.txAslM(), Hrs: p.rxAslM(),
		Ae: h.ae, TransHorizon: h.trans, ThetaT: h.thetaT, ThetaR: h.thetaR, Slopes: SlopesOf(p, h.ae),
	}
	if h.trans {
		o.Dlt, o.Dlr = h.dlt, h.dlr
	}
	for i := 1; i <= last; i++ {
		d0, d1, h0, h1 := p.DistKm[i-1], p.DistKm[i], p.AslM[i-1], p.AslM[i]
		o.V1 += (d1 - d0) * (h1 + h0)
		o.V2 += (d1 - d0) * (h1*(2*d1+d0) + h0*(d1+2*d0))
	}
	r := ridge{p.DistKm, p.AslM, p.CoverM, p.txAslM(), p.rxAslM()}
	if found := findObstructions(&r); found.hobs > 0 {
		o.Hobs, o.AlphaT, o.AlphaR = found.hobs, found.alphaT, found.alphaR
	}
	return o
}

// Source: the brief form leaves out what moves the loss by less than 1e-7 dB; the full form is
// tested against the published results.
func TestBriefIsTheFullMethod(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		if len(p.DistKm) < 3 {
			t.Skip("no interior point")
		}
		p.TimePct = rapid.SampledFrom([]float64{50, 50, 30, 10, 1}).Draw(t, "time")
		p.LatDeg = rapid.Float64Range(-85, 85).Draw(t, "latitude")
		p.TxCoastKm, p.RxCoastKm = rapid.SampledFrom([]float64{0, 1, 500}).Draw(t, "coast"), rapid.SampledFrom([]float64{0, 2, 500}).Draw(t, "coast")
		p.LocationPct, p.LocationSpreadDB = rapid.SampledFrom([]float64{50, 90}).Draw(t, "locations"), 5
		full, err := P1812.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		without, err := P1812WithoutDucting(p)
		if err != nil {
			t.Fatal(err)
		}
		o, out := outlineOf(&p), make([]Combined, 2)
		b := NewBrief(P1812, p.FreqHz, p.N0, Region{MostKm: p.LengthKm(), LeastLatDeg: p.LatDeg}, []Request{{p.TimePct, true}, {p.TimePct, false}})
		b.Loss(&o, searched{&p}, fixedShare(p.VerticalShare), out)
		lloc := LocationDB(p.LocationPct, p.LocationSpreadDB)
		for i, want := range []float64{full.DB, without.DB} {
			if got := out[i].LossDB(lloc); !(math.Abs(got-want) <= 2e-7) {
				t.Errorf("request %d: brief %.10g, full %.10g dB: %+v\n%+v", i, got, want, p, full.Terms)
			}
		}
	})
}

// Source: math.Atan; the series ends at x^7, so it is within 1e-16 of it below 0.02.
func TestElevationSeries(t *testing.T) {
	for _, slope := range []float64{0, 1e-9, -3, 19.999, 20.001, -500, 4000} {
		if got, want := ElevationMrad(slope), 1000*math.Atan(slope/1000); math.Abs(got-want) > 1e-13*math.Max(1, math.Abs(want)) {
			t.Errorf("ElevationMrad(%g) = %.17g, want %.17g", slope, got, want)
		}
	}
}

// The bound by which ducting is left out, over all smaller beta: a scan, since the term is no
// simple function of it.
func TestLeastDuctTime(t *testing.T) {
	for _, p := range []float64{1, 10, 50} {
		for _, mostKm := range []float64{1, 50, 150, 300} {
			for _, latDeg := range []float64{0, 30, 47.5, 70, 89} {
				top := mostLogBeta(latDeg)
				least := leastDuctTimeDB(p, mostKm, top)
				for _, d := range []float64{0.25, mostKm / 3, mostKm} {
					for below := 0.0; below < 400; below += 0.05 + below/50 {
						if got := ductTimeDB(p, d, top-below); got < least-1e-9 {
							t.Fatalf("p %g, %g of %g km, latitude %g: A = %g at log beta %g, under the bound %g", p, d, mostKm, latDeg, got, top-below, least)
						}
					}
				}
			}
		}
	}
	for _, dtm := range []float64{0, 5, 50, 500} {
		for _, dlm := range []float64{0, 5, 50, 500} {
			for lat := -90.0; lat <= 90; lat += 7.5 {
				if u := timeParametersOf(dtm, dlm, 0, lat); math.Log10(u.beta0) > mostLogBeta(lat)+1e-12 {
					t.Errorf("dtm %g, dlm %g, latitude %g: beta0 %g is above its bound", dtm, dlm, lat, u.beta0)
				}
			}
		}
	}
}

// Source: the full forms of the other methods.
func TestBriefOtherMethods(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		if len(p.DistKm) < 3 {
			t.Skip("no interior point")
		}
		o := outlineOf(&p)
		for _, m := range []Model{FreeSpace, P526} {
			full, err := m.Loss(p)
			if err != nil {
				t.Fatal(err)
			}
			out := make([]Combined, 1)
			NewBrief(m, p.FreqHz, p.N0, Region{MostKm: p.LengthKm()}, []Request{{50, true}}).Loss(&o, searched{&p}, fixedShare(p.VerticalShare), out)
			if got := out[0].LossDB(0); !(math.Abs(got-full.DB) <= 1e-9) {
				t.Errorf("%s: brief %.12g, full %.12g dB", m.Name, got, full.DB)
			}
		}
	})
}

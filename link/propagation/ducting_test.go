package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// alongAsWritten is Ad(p) as the Recommendation writes it, (51) to (56), with beta itself in place
// of its logarithm.
func alongAsWritten(u *duct, p float64) float64 {
	h := &u.horizons
	alpha := math.Max(-0.6-3.5*1e-9*math.Pow(u.d, 3.1)*u.time.tau, -3.4)
	mu2 := math.Min(1, math.Pow(500/h.ae*u.d*u.d/math.Pow(math.Sqrt(u.hte)+math.Sqrt(u.hre), 2), alpha))
	mu3 := 1.0
	if u.hm > 10 {
		mu3 = math.Exp(-4.6e-5 * (u.hm - 10) * (43 + 6*math.Min(u.d-h.dlt-h.dlr, 40)))
	}
	beta := u.time.beta0 * mu2 * mu3
	lb := math.Log10(beta)
	gamma := 1.076 / math.Pow(2.0058-lb, 1.012) * math.Exp(-(9.51-4.8*lb+0.198*lb*lb)*1e-6*math.Pow(u.d, 1.13))
	ap := -12 + (1.2+3.7e-3*u.d)*math.Log10(p/beta) + 12*math.Pow(p/beta, gamma)
	theta := 1000*u.d/h.ae + math.Min(h.thetaT, 0.1*h.dlt) + math.Min(h.thetaR, 0.1*h.dlr)
	return 5e-5*h.ae*math.Cbrt(u.band.f)*theta + ap
}

func TestDuctingAgainstTheWrittenForm(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		u := newDuct(&p, findHorizons(&p), newTimeParameters(p.Profile, 50))
		pct := rapid.Float64Range(0.1, 50).Draw(t, "p")
		got, want := u.alongDB(pct), alongAsWritten(&u, pct)
		if math.IsInf(want, 0) || math.IsNaN(want) {
			t.Skip("beta underflows in the written form")
		}
		if math.Abs(got-want) > 1e-6*(1+math.Abs(want)) {
			t.Errorf("Ad(%g %%) = %.9f, as written %.9f", pct, got, want)
		}
	})
}

// longPath is a duct of 1000 km inland with antennas 100 m over the smooth surface.
func longPath() duct {
	return duct{
		band: newDuctBand(1), d: 1000, hte: 100, hre: 100, horizons: horizons{ae: 8500, dlt: 40, dlr: 40},
		time: timeParameters{dtm: 1000, dlm: 1000, tau: 1, beta0: 3},
	}
}

// By hand: alpha would be -0.6 - 3.5e-9 * 1000^3.1 = -7.6 and stays at -3.4. The geometry factor is
// 500/8500 * 1e6 / 400 = 147.06, so mu2 = 147.06^-3.4 and log beta = log 3 - 3.4 * 2.16749.
func TestFloorOfAlpha(t *testing.T) {
	u := longPath()
	if got, want := u.logBeta(), math.Log10(3)-3.4*2.167491; math.Abs(got-want) > 1e-5 {
		t.Errorf("log beta = %.6f, want %.6f", got, want)
	}
}

// By hand: at 10 km the geometry factor is 500/8500 * 100/400 = 0.0147, to a negative power more than 1:
// mu2 stays at 1.
func TestCapOfMu2(t *testing.T) {
	u := longPath()
	u.d = 10
	if got, want := u.logBeta(), math.Log10(3); got != want {
		t.Errorf("log beta = %g, want log 3 = %g", got, want)
	}
}

// By hand: 110 m of roughness with 40 km and more between the horizons is
// mu3 = exp(-4.6e-5 * 100 * 283) = exp(-1.3018).
func TestRoughness(t *testing.T) {
	u := longPath()
	smooth := u.logBeta()
	u.hm = 110
	if got, want := u.logBeta()-smooth, -1.3018/math.Ln10; math.Abs(got-want) > 1e-12 {
		t.Errorf("log mu3 = %g, want %g", got, want)
	}
	u.hm = 20_000 // beta would be 1e-122 and less
	if got := u.lossDB(1); math.IsNaN(got) || math.IsInf(got, 0) {
		t.Errorf("over the roughest ground: %g dB", got)
	}
}

// Coupling over the sea, which no published case reaches; from the formula by hand. At 50 m the
// height factor is 1, at 10 m 1 + tanh 2.8 = 1.99263.
func TestCoast(t *testing.T) {
	u := longPath()
	for _, tc := range []struct{ omega, dc, dl, hs, want float64 }{
		{1, 0, 20, 50, -3},
		{0.75, 0, 20, 10, -3 * 1.992632},
		{0.8, 2, 20, 50, -3 * math.Exp(-1)},
		{0.8, 5, 20, 50, -3 * math.Exp(-6.25)},
		{0.8, 5.001, 20, 50, 0}, // too far from the coast
		{0.8, 2, 1.9, 50, 0},    // the horizon lies before the coast
		{0.749, 0, 20, 50, 0},   // not a sea path
	} {
		u.time.omega = tc.omega
		if got := u.coastDB(tc.dc, tc.dl, tc.hs); math.Abs(got-tc.want) > 1e-5 {
			t.Errorf("%+v: got %.6f dB", tc, got)
		}
	}
}

// On a sea path the coast term lowers the loss by ducting of both ends, dB for dB.
func TestCoastInTheLoss(t *testing.T) {
	p := level(50, 80)
	for i := range p.Zone {
		p.Zone[i] = 1
	}
	p.TxAglM, p.RxAglM, p.TimePct = 50, 50, 1
	far, err := P1812.Loss(p)
	if err != nil {
		t.Fatal(err)
	}
	p.TxCoastKm, p.RxCoastKm = 0, 0
	coast, err := P1812.Loss(p)
	if err != nil {
		t.Fatal(err)
	}
	if got := coast.Terms.Lba - far.Terms.Lba; math.Abs(got+6) > 1e-9 {
		t.Errorf("Lba changes by %g dB, want -6", got)
	}
}

// By hand: shielding is nothing up to a horizon of 0.1 mrad per km, then
// 20 log(1 + 0.361 * 10 * sqrt(1 * 100)) + 2.64 = 34.027 dB at 1 GHz for 10 mrad over it at 100 km.
func TestShielding(t *testing.T) {
	u := longPath()
	shieldingDB := func(theta, dl float64) float64 {
		factor, linearDB := u.shielding(theta, dl)
		return 20*math.Log10(factor) + linearDB
	}
	if got := shieldingDB(10, 100); got != 0 {
		t.Errorf("at its border: %g dB, want 0", got)
	}
	if got, want := shieldingDB(20, 100), 20*math.Log10(37.1)+2.64; math.Abs(got-want) > 1e-9 {
		t.Errorf("got %.6f dB, want %.6f", got, want)
	}
}

// By hand: below 0.5 GHz the coupling loses 45.375 - 137 f + 92.5 f^2 more: 32.6 dB at 0.1 GHz,
// nothing at 0.5 GHz.
func TestLowFrequencyCoupling(t *testing.T) {
	at := func(f float64) float64 {
		u := longPath()
		u.band = newDuctBand(f)
		return u.couplingDB() - 20*math.Log10(f)
	}
	if got := at(0.1) - at(1); math.Abs(got-32.6) > 1e-9 {
		t.Errorf("Alf(0.1 GHz) = %g dB, want 32.6", got)
	}
	if got := at(math.Nextafter(0.5, 0)) - at(0.5); math.Abs(got) > 1e-9 {
		t.Errorf("a step of %g dB at 0.5 GHz", got)
	}
}

package propagation

import (
	"math"
	"testing"

	"fellreach/terrain"
	"pgregory.net/rapid"
)

// Source: ITU-R, "Validation examples for the delta Bullington diffraction prediction method":
// 20 cases over four real profiles at ap = 8500 km, over land, horizontal polarization. 0.1 dB is
// the document's own tolerance; with its speed of light (3e8 m/s, ours is 2.998e8) Bullington
// agrees to 1e-6. Heights are printed to 1e-8 m.
func TestDeltaBullingtonExamples(t *testing.T) {
	const ap = 8500
	seen := deviation{}
	for _, r := range readTable(t, "delta_bullington", "cases.csv") {
		p := Path{Profile: readProfile(t, "delta_bullington", "profiles", r.text("path")+".csv")}
		p.FreqHz, p.TxAglM, p.RxAglM = r.num("f_MHz")*1e6, r.num("htg_m"), r.num("hrg_m")
		m := newDiffraction(&p, 0)
		name := r.text("case")
		seen.check(t, name, "hts'", m.level.hts, r.num("hts_prime_m"), 1e-6)
		seen.check(t, name, "hrs'", m.level.hrs, r.num("hrs_prime_m"), 1e-6)
		lbulla, lbulls, ldsph := m.parts(ap)
		seen.check(t, name, "Ld", DeltaBullingtonDB(lbulla, lbulls, ldsph), r.num("Ld_dB"), 0.1)

		m.lambda = 3e8 / p.FreqHz
		m.earth.lambda = m.lambda
		lbulla, lbulls, ldsph = m.parts(ap)
		seen.check(t, name, "Lbulla with c = 3e8", lbulla, r.num("Lbulla_dB"), 1e-6)
		seen.check(t, name, "Lbulls with c = 3e8", lbulls, r.num("Lbulls_dB"), 1e-6)
		seen.check(t, name, "Ldsph with c = 3e8", ldsph, r.num("Ldsph_dB"), 0.005)
		seen.check(t, name, "Ld with c = 3e8", DeltaBullingtonDB(lbulla, lbulls, ldsph), r.num("Ld_dB"), 0.005)
	}
	seen.log(t)
}

// Source: validation examples of the ITU-R Study Group 3 reference implementation of P.452-18
// (Swiss OFCOM, release 18.1): profiles without cover, the columns that mean the same as in
// P.1812. The tolerance is their printed digits; ae is printed from values rounded earlier.
func TestP452Examples(t *testing.T) {
	seen := deviation{}
	for _, r := range readTable(t, "p452", "cases.csv") {
		p := level(2, 1)
		p.Profile = readProfile(t, "p452", "profiles", r.text("profile")+".csv")
		p.FreqHz, p.TxAglM, p.RxAglM = r.num("f_GHz")*1e9, r.num("htg_m"), r.num("hrg_m")
		p.VerticalShare, p.DeltaN = r.num("pol")-1, r.num("DN_Nkm")
		l, err := P526.Loss(p)
		if err != nil {
			t.Fatalf("%s: %v", r.text("case"), err)
		}
		got, name := l.Terms, r.text("case")
		if trans := r.text("path") != "Line of Sight"; l.TransHorizon != trans {
			t.Errorf("%s: trans-horizon %v, want %v", name, l.TransHorizon, trans)
		}
		for _, c := range []struct {
			column string
			got    float64
		}{
			{"ae_km", got.Ae},
			{"d_km", p.LengthKm()},
			{"hts_m", got.Hts},
			{"hrs_m", got.Hrs},
			{"theta_t_mrad", got.ThetaT},
			{"theta_r_mrad", got.ThetaR},
			{"theta_mrad", got.Theta},
			{"hstd_m", got.Hstd},
			{"hsrd_m", got.Hsrd},
			{"dlt_km", got.Dlt},
			{"dlr_km", got.Dlr},
			{"omega", got.Omega},
			{"Ldsph50_dB", got.LdsphK50},
			{"Ld50_dB", got.Ld50},
		} {
			seen.check(t, name, c.column, c.got, r.num(c.column), 1e-4)
		}
	}
	seen.log(t)
}

// The same source, typed: level land of 5 km in steps of 10 m, antennas 10 m high, vertical
// polarization, Delta N 42.531260; all digits.
func TestP452LevelLand(t *testing.T) {
	for _, tc := range []struct{ freqGHz, want float64 }{
		{2, 0},
		{0.1, 20.02432081},
		{0.25, 12.69951778},
	} {
		p := level(501, 5)
		p.FreqHz, p.DeltaN = tc.freqGHz*1e9, 42.531260
		l, err := P526.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		if got := l.Terms.Ld50; math.Abs(got-tc.want) > 1e-6 {
			t.Errorf("Ld50 at %g GHz = %.8f, want %.8f", tc.freqGHz, got, tc.want)
		}
	}
}

// The typed profile of 1.06 km: see [oneKm]. All figures are the source's.
func TestDiffractionOverOneKm(t *testing.T) {
	l, err := P526.Loss(oneKm())
	if err != nil {
		t.Fatal(err)
	}
	got := l.Terms
	seen := deviation{}
	for _, c := range []struct {
		symbol     string
		got, want  float64
		toleration float64
	}{
		{"theta_t", got.ThetaT, -177.8382637, 1e-6},
		{"theta_r", got.ThetaR, 189.2528327, 1e-6},
		{"theta", got.Theta, 11.53303013, 1e-6},
		{"dlt", got.Dlt, 0.4702, 1e-9},
		{"dlr", got.Dlr, 0.58775, 1e-9},
		{"ae", got.Ae, 8930.776786, 1e-6},
		{"hts", got.Hts, 814.4, 1e-9},
		{"hrs", got.Hrs, 617.3, 1e-9},
		{"hstd", got.Hstd, 754.4, 1e-7},
		{"hsrd", got.Hsrd, 595.082716, 1e-6},
		{"Lbulla", got.LbullaK50, 19.97432438, 1e-7},
		{"Lbulls", got.LbullsK50, 0, 0},
		{"Ldsph", got.LdsphK50, 0, 0},
		{"Ld50", got.Ld50, 19.97432438, 1e-7},
	} {
		seen.check(t, "1 km", c.symbol, c.got, c.want, c.toleration)
	}
	if !l.TransHorizon {
		t.Error("the path is trans-horizon")
	}
	if want := -177.8382637e-3 * 180 / math.Pi; math.Abs(l.TxElDeg-want) > 1e-7 {
		t.Errorf("elevation at the transmitter %g, want %g", l.TxElDeg, want)
	}
}

// oneKm is the shortest published profile and its case 3. Source: validation profiles of the ITU-R
// Study Group 3 reference implementation of P.1812-6, Swiss OFCOM, release 6.1 (a path of 1.06 km
// at 95.3 MHz, horizontal polarization, cover of 10 m).
func oneKm() Path {
	p := level(10, 1)
	p.DistKm = []float64{0, 0.11755, 0.2351, 0.35265, 0.4702, 0.58775, 0.7053, 0.82285, 0.9404, 1.05795}
	p.AslM = []float64{754.4, 754.4, 754.4, 729.9, 729.9, 685.3, 634.3, 634.3, 610.3, 610.3}
	for i := range p.CoverM {
		p.CoverM[i] = 10
	}
	p.FreqHz, p.TxAglM, p.RxAglM, p.VerticalShare = 95.3e6, 60, 7, 0
	p.DeltaN, p.N0, p.LatDeg = 45, 326.079979, 53.1856432
	return p
}

// The loss is the same from either end.
func TestReciprocity(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		there, err := P526.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		back, err := P526.Loss(fromOtherEnd(p))
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(there.DB-back.DB) > 1e-6 {
			t.Errorf("there %.9f dB, back %.9f dB", there.DB, back.DB)
		}
		if math.Abs(there.TxElDeg-back.RxElDeg) > 1e-9 || there.TransHorizon != back.TransHorizon {
			t.Errorf("there %+v, back %+v", there, back)
		}
	})
}

// Raising what stands on one point never lowers the loss, whatever else is on the path. Cover is
// raised, not ground: ground also moves the smooth surface, which may lower the loss.
func TestLossGrowsWithAnEdge(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		if len(p.DistKm) < 3 {
			t.Skip("no point between the ends")
		}
		i := rapid.IntRange(1, len(p.DistKm)-2).Draw(t, "edge")
		last := math.Inf(-1)
		for _, cover := range []float64{0, 1, 5, 20, 80, 300} {
			p.CoverM[i] = cover
			l, err := P526.Loss(p)
			if err != nil {
				t.Fatal(err)
			}
			if l.DB < last-1e-9 {
				t.Errorf("with a cover of %g m at point %d: %.9f dB, less than %.9f", cover, i, l.DB, last)
			}
			last = l.DB
		}
	})
}

// With 0.6 of the first Fresnel zone free over level ground there is no diffraction at all:
// the knife edge ends at 0.55 and the smooth Earth at 0.55 of the radius.
func TestNoDiffractionWhenClear(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := level(rapid.IntRange(3, 200).Draw(t, "points"), rapid.Float64Range(0.3, 60).Draw(t, "length"))
		p.FreqHz = rapid.Float64Range(30e6, 6e9).Draw(t, "frequency")
		p.TxAglM, p.RxAglM = rapid.Float64Range(5, 3000).Draw(t, "tx"), rapid.Float64Range(5, 3000).Draw(t, "rx")
		ae := EffectiveEarthRadiusKm(p.DeltaN)
		d := p.LengthKm()
		for x := d / 1000; x < d; x += d / 1000 { // finer than the profile: the smooth Earth has no samples
			ray := (p.TxAglM*(d-x)+p.RxAglM*x)/d - BulgeM(x, d-x, ae)
			if ray < 0.6*FresnelRadiusM(1, WavelengthM(p.FreqHz), x, d-x) {
				t.Skip("not clear")
			}
		}
		l, err := P526.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		if l.Terms.Ld50 != 0 || l.DB != l.Terms.Lbfs {
			t.Errorf("Ld50 = %g, want exactly 0", l.Terms.Ld50)
		}
	})
}

// Two points have nothing between them: the smooth Earth alone can lose.
func TestTwoPoints(t *testing.T) {
	p := level(2, 0.03)
	l, err := P526.Loss(p)
	if err != nil {
		t.Fatal(err)
	}
	if l.Terms.LbullaK50 != 0 || l.TransHorizon || l.Terms.Dlt != 0.015 || l.Terms.Dlr != 0.015 {
		t.Errorf("got %+v", l)
	}
	p = level(2, 40)
	if l, err = P526.Loss(p); err != nil || l.Terms.LbullaK50 != 0 || l.Terms.Ld50 <= 10 {
		t.Errorf("40 km over the bulge: %+v, %v", l.Terms, err)
	}
}

// Half the power in each polarization lies half-way between the two in dB.
func TestMixedPolarization(t *testing.T) {
	ldsph := func(share float64) float64 {
		p := level(100, 60)
		for i := range p.Zone {
			p.Zone[i] = terrain.Sea
		}
		p.FreqHz, p.VerticalShare = 40e6, share
		l, err := P526.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		return l.Terms.LdsphK50
	}
	h, mixed, v := ldsph(0), ldsph(0.25), ldsph(1)
	if h-v < 10 { // vertical polarization is far better over sea at low VHF (P.526-15, section 3)
		t.Errorf("horizontal %g dB, vertical %g dB: vertical must lose much less over sea", h, v)
	}
	if want := 0.75*h + 0.25*v; math.Abs(mixed-want) > 1e-9 {
		t.Errorf("a quarter vertical: %g dB, want %g", mixed, want)
	}
}

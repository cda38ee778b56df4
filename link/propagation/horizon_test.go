package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Source: the geometry columns of the published P.1812 cases (see [oneKm]), which do not depend on
// zones or time; 1e-6 are nearly all of their ten digits.
func TestPublishedHorizons(t *testing.T) {
	seen := deviation{}
	for _, r := range readTable(t, "p1812", "cases.csv") {
		p := publishedPath(t, "p1812", r)
		l, err := P526.Loss(p)
		if err != nil {
			t.Fatal(err)
		}
		got := l.Terms
		for _, c := range []struct {
			column string
			got    float64
		}{
			{"ae_km", got.Ae},
			{"hts_m", got.Hts},
			{"hrs_m", got.Hrs},
			{"dlt_km", got.Dlt},
			{"dlr_km", got.Dlr},
			{"theta_t_mrad", got.ThetaT},
			{"theta_r_mrad", got.ThetaR},
			{"theta_mrad", got.Theta},
			{"hstd_m", got.Hstd},
			{"hsrd_m", got.Hsrd},
			{"omega", got.Omega},
			{"Lbulla50_dB", got.LbullaK50},
			{"Lbulls50_dB", got.LbullsK50},
			{"Ldsph50_dB", got.LdsphK50},
			{"Ld50_dB", got.Ld50},
		} {
			seen.check(t, r.text("case"), c.column, c.got, r.num(c.column), 1e-6)
		}
	}
	seen.log(t)
}

// publishedPath returns the path of a row of one of the two P.1812 tables.
func publishedPath(t *testing.T, table string, r row) Path {
	t.Helper()
	return Path{
		Profile: readProfile(t, table, "profiles", r.text("profile")+".csv"),
		FreqHz:  r.num("f_GHz") * 1e9, TxAglM: r.num("htg_m"), RxAglM: r.num("hrg_m"), VerticalShare: r.num("pol") - 1,
		DeltaN: r.num("DN_Nkm"), N0: r.num("N0_N"), TimePct: r.num("p_pct"),
		LocationPct: r.num("pL_pct"), LocationSpreadDB: r.num("sigmaL_dB"),
		LatDeg: r.num("phi_path_deg"), TxCoastKm: r.num("dct_km"), RxCoastKm: r.num("dcr_km"),
	}
}

// Two equal peaks as seen from the transmitter, two others as seen from the receiver: the first
// counts there, the nearest here, so that the two ends see the same.
func TestEqualHorizons(t *testing.T) {
	p := level(11, 10)
	p.TxAglM, p.RxAglM = 20, 20
	ae := EffectiveEarthRadiusKm(p.DeltaN)
	place := func(i int, riseTx float64) {
		d := p.DistKm[i]
		p.AslM[i] = p.txAslM() + 1000*d*(riseTx+d/(2*ae))
	}
	place(2, 1./64)
	place(3, 1./64)
	h := findHorizons(&p)
	if s2, s3 := rise(p.txAslM(), p.AslM[2], 2, ae), rise(p.txAslM(), p.AslM[3], 3, ae); s2 != s3 {
		t.Skipf("no exact tie on this machine: %g and %g", s2, s3)
	}
	if h.tx != 2 {
		t.Errorf("horizon of the transmitter at point %d, want the first of equals, 2", h.tx)
	}
	back := fromOtherEnd(p)
	if h := findHorizons(&back); h.rx != 8 {
		t.Errorf("horizon of the receiver at point %d, want the nearest of equals, 8", h.rx)
	}
}

// Handbook figure: an antenna at height h over a smooth Earth sees its horizon at sqrt(2 ae h), under the
// horizontal by sqrt(2 h/ae): 4.12 sqrt(h) km on 4/3 of the Earth.
func TestSmoothHorizon(t *testing.T) {
	p := level(20001, 200)
	p.TxAglM, p.RxAglM, p.DeltaN = 100, 25, 157./4 // k = 4/3
	h := findHorizons(&p)
	if !h.trans {
		t.Fatal("200 km over level ground is trans-horizon")
	}
	if want := 4.1217 * math.Sqrt(100); math.Abs(h.dlt-want) > 0.02 {
		t.Errorf("horizon of 100 m at %g km, want %g", h.dlt, want)
	}
	if want := 4.1217 * math.Sqrt(25); math.Abs(h.dlr-want) > 0.02 {
		t.Errorf("horizon of 25 m at %g km, want %g", h.dlr, want)
	}
	if want := -1000 * math.Sqrt(2*100/(h.ae*1000)); math.Abs(h.thetaT-want) > 1e-3 {
		t.Errorf("elevation %g mrad, want %g", h.thetaT, want)
	}
	if want := 1000 * (200 - h.dlt - h.dlr) / h.ae; math.Abs(h.theta-want) > 0.01 {
		t.Errorf("angular distance %g mrad, want that of the arc between the horizons, %g", h.theta, want)
	}
}

// On a line of sight over level ground between equal antennas the obstacle lies in the middle, and
// both ends look down by half the bulge angle.
func TestLineOfSight(t *testing.T) {
	p := level(41, 20)
	p.TxAglM, p.RxAglM = 60, 60
	h := findHorizons(&p)
	if h.trans || h.dlt != 10 || h.dlr != 10 {
		t.Errorf("got %+v, want the middle", h)
	}
	if want := 1000 * math.Atan(-20/(2*h.ae)); h.thetaT != want || h.thetaR != want {
		t.Errorf("elevations %g and %g, want %g", h.thetaT, h.thetaR, want)
	}
	if math.Abs(h.theta) > 1e-4 {
		t.Errorf("angular distance %g mrad between equal antennas, want 0", h.theta)
	}
}

// Trans-horizon or not, the two ends agree on everything but exact ties.
func TestHorizonsFromEitherEnd(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		back := fromOtherEnd(p)
		a, b := findHorizons(&p), findHorizons(&back)
		if a.trans != b.trans || math.Abs(a.thetaT-b.thetaR) > 1e-9 || math.Abs(a.theta-b.theta) > 1e-9 {
			t.Errorf("there %+v, back %+v", a, b)
		}
		if !a.trans && math.Abs(a.dlt+a.dlr-p.LengthKm()) > 1e-9 {
			t.Errorf("line of sight: %g + %g km, want %g", a.dlt, a.dlr, p.LengthKm())
		}
	})
}

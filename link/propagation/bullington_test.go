package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// The construction as the Recommendation writes it, with the edge's distance db; the program uses
// a shorter form of the same algebra.
func bullingtonAsWritten(r *ridge, ap, lambda float64) float64 {
	n := len(r.distKm) - 1
	d, ce := r.distKm[n], 1/ap
	stim, srim, numax := math.Inf(-1), math.Inf(-1), math.Inf(-1)
	for i := 1; i < n; i++ {
		di, g := r.distKm[i], r.height(i)
		stim = math.Max(stim, (g+500*ce*di*(d-di)-r.hts)/di)
		srim = math.Max(srim, (g+500*ce*di*(d-di)-r.hrs)/(d-di))
		numax = math.Max(numax, (g+500*ce*di*(d-di)-(r.hts*(d-di)+r.hrs*di)/d)*math.Sqrt(0.002*d/(lambda*di*(d-di))))
	}
	str := (r.hrs - r.hts) / d
	nu := numax
	if stim >= str {
		db := (r.hrs - r.hts + srim*d) / (stim + srim)
		nu = (r.hts + stim*db - (r.hts*(d-db)+r.hrs*db)/d) * math.Sqrt(0.002*d/(lambda*db*(d-db)))
	}
	luc := KnifeEdgeDB(nu)
	return luc + (1-math.Exp(-luc/6))*(10+0.02*d)
}

func TestBullingtonAgainstTheWrittenForm(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		ap := rapid.SampledFrom([]float64{7000, 8500, betaRadiusKm}).Draw(t, "radius")
		lambda, d := diffractionWavelengthM(p.FreqHz), p.LengthKm()
		r := ridge{p.DistKm, p.AslM, p.CoverM, p.txAslM(), p.rxAslM()}
		got, want := BullingtonDB(r.slopes(ap).Nu(d, lambda), d), bullingtonAsWritten(&r, ap, lambda)
		if math.IsNaN(want) {
			t.Skip("0/0 of a grazing ray")
		}
		if math.Abs(got-want) > 1e-6 {
			t.Errorf("got %.9f dB, as written %.9f dB", got, want)
		}
	})
}

// One edge on a flat-Earth path: Bullington's edge is the edge itself. Closed form of geometry: an edge h
// metres over the middle of a ray of length d has nu = h sqrt(0.008/(lambda d)), d in km.
func TestSingleEdge(t *testing.T) {
	const flat, d, lambda = 1e15, 10.0, 2.0
	for _, over := range []float64{-40, -10, -1, 0, 1, 25, 200} {
		r := ridge{distKm: []float64{0, 5, 10}, aslM: []float64{0, 50 + over, 0}, coverM: make([]float64, 3), hts: 30, hrs: 70}
		got, want := r.slopes(flat).Nu(d, lambda), over*math.Sqrt(0.008/(lambda*d))
		if math.Abs(got-want) > 1e-6 {
			t.Errorf("edge %g m over the ray: nu = %.9f, want %.9f", over, got, want)
		}
	}
}

// A ray that grazes an edge exactly: the distance of the written form is 0/0 there.
func TestGrazingRay(t *testing.T) {
	s := Slopes{Stim: 4, Str: 4, Srim: -4}
	if got := s.Nu(10, 2); got != 0 || !s.Blocked() {
		t.Errorf("nu = %g, blocked %v, want 0 and true", got, s.Blocked())
	}
	s.Srim = math.Nextafter(-4, -5) // a hair under the ray by rounding
	if got := s.Nu(10, 2); got != 0 {
		t.Errorf("nu = %g, want 0", got)
	}
}

// Bullington's loss grows with nu, and is zero where the knife edge is.
func TestBullingtonDBShape(t *testing.T) {
	if got := BullingtonDB(math.Inf(-1), 30); got != 0 {
		t.Errorf("without an obstacle: %g dB, want 0", got)
	}
	// J(0) = 6.0329 dB makes 6.0329 + (1 - exp(-1.00548)) (10 + 0.6) = 12.7545 dB by hand for 30 km.
	if got := BullingtonDB(0, 30); math.Abs(got-12.7545) > 1e-3 {
		t.Errorf("grazing at 30 km: %.4f dB, want 12.7545", got)
	}
	rapid.Check(t, func(t *rapid.T) {
		nu := rapid.Float64Range(-2, 50).Draw(t, "nu")
		if a, b := BullingtonDB(nu, 20), BullingtonDB(nu+0.1, 20); b < a {
			t.Errorf("nu %g: %g dB, nu %g: %g dB", nu, a, nu+0.1, b)
		}
	})
}

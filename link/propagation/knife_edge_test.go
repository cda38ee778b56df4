package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Source: J(nu) by Rec. ITU-R P.526-15 (31), and by the exact Fresnel integrals, both computed
// apart from this program; 1e-6 are the digits typed.
func TestKnifeEdgeDB(t *testing.T) {
	for _, tc := range []struct{ nu, want, exact float64 }{
		{-3, 0, -0.443943},
		{-1, 0, -1.001046},
		{-0.5, 1.959250, 1.858624},
		{-0.25, 3.918815, 3.870143},
		{0, 6.032852, 6.020600},
		{0.25, 8.198046, 8.174260},
		{0.5, 10.287804, 10.233830},
		{1, 13.925729, 13.864105},
		{2, 19.042860, 19.090962},
		{5, 26.813581, 26.936198},
		{10, 32.855375, 32.953517},
	} {
		got := KnifeEdgeDB(tc.nu)
		if math.Abs(got-tc.want) > 1e-6 {
			t.Errorf("KnifeEdgeDB(%g) = %.6f, want %.6f", tc.nu, got, tc.want)
		}
		if tc.nu >= -0.5 && math.Abs(got-tc.exact) > 0.15 {
			t.Errorf("KnifeEdgeDB(%g) = %.6f, over 0.15 dB from exact %.6f", tc.nu, got, tc.exact)
		}
		if exact := fresnelLossDB(tc.nu); math.Abs(exact-tc.exact) > 1e-6 {
			t.Errorf("the Fresnel integrals at %g give %.6f, the table %.6f", tc.nu, exact, tc.exact)
		}
	}
}

func TestKnifeEdgeTable(t *testing.T) {
	seen := deviation{}
	for _, r := range readTable(t, "tables", "p526_knife_edge.csv") {
		seen.check(t, "nu "+r.text("nu"), "J", KnifeEdgeDB(r.num("nu")), r.num("J_approx_dB"), 1e-6)
		seen.check(t, "nu "+r.text("nu"), "J exact", fresnelLossDB(r.num("nu")), r.num("J_exact_dB"), 1e-6)
	}
	seen.log(t)
}

// The approximation against the Fresnel integrals where the Recommendation claims it.
func TestKnifeEdgeAgainstFresnelIntegrals(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		nu := rapid.Float64Range(-0.5, 12).Draw(t, "nu")
		if got, exact := KnifeEdgeDB(nu), fresnelLossDB(nu); math.Abs(got-exact) > 0.15 {
			t.Errorf("KnifeEdgeDB(%g) = %.4f, exact %.4f", nu, got, exact)
		}
	})
}

// fresnelLossDB is the exact diffraction loss of a knife edge,
// -20 log |(1+j)/2 * integral from nu to infinity of exp(-j pi t^2/2) dt|.
func fresnelLossDB(nu float64) float64 {
	c, s := fresnel(nu)
	return -20 * math.Log10(math.Hypot(1-c-s, c-s)/2)
}

// fresnel returns the Fresnel integrals C and S from 0 to x by Simpson's rule, in steps far
// shorter than the integrand's period at x.
func fresnel(x float64) (c, s float64) {
	n := 2 * (200 + int(400*x*x))
	h := x / float64(n)
	for i := range n + 1 {
		weight := 2.0
		if i%2 == 1 {
			weight = 4
		}
		if i == 0 || i == n {
			weight = 1
		}
		u := h * float64(i)
		sin, cos := math.Sincos(math.Pi / 2 * u * u)
		c += weight * cos
		s += weight * sin
	}
	return c * h / 3, s * h / 3
}

// The formula reaches zero where the Recommendation cuts it off; a larger parameter never loses less.
func TestKnifeEdgeShape(t *testing.T) {
	if got := KnifeEdgeDB(-0.78); got != 0 {
		t.Errorf("KnifeEdgeDB(-0.78) = %g, want 0", got)
	}
	if got := KnifeEdgeDB(math.Nextafter(-0.78, 0)); got < 0 || got > 0.01 {
		t.Errorf("just above -0.78: %g, want nearly 0", got)
	}
	rapid.Check(t, func(t *rapid.T) {
		nu := rapid.Float64Range(-3, 100).Draw(t, "nu")
		more := nu + rapid.Float64Range(0, 10).Draw(t, "more")
		if KnifeEdgeDB(more) < KnifeEdgeDB(nu) {
			t.Errorf("J(%g) = %g, J(%g) = %g", nu, KnifeEdgeDB(nu), more, KnifeEdgeDB(more))
		}
	})
}

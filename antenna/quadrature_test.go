package antenna

import (
	"math"
	"math/cmplx"
	"testing"
)

// Source: Gauss-Legendre with n points is exact for powers below 2n.
func TestGaussRule(t *testing.T) {
	for n := 1; n <= 200; n++ {
		rule := newGaussRule(n)
		if len(rule.x) < n || len(rule.x)%8 != 0 {
			t.Errorf("rule for %d points has %d", n, len(rule.x))
		}
		for power := 0; power < min(2*n, 60); power += 2 {
			got := rule.mean(func(x float64) float64 { return math.Pow(x, float64(power)) })
			near(t, "mean of an even power", got, 1/float64(power+1), 1e-13)
		}
	}
}

func TestGaussRuleIntegral(t *testing.T) {
	// INTEGRAL exp(jx) from 1 to 4 = (exp(4j) - exp(j))/j.
	got := newGaussRule(16).integral(1, 4, func(x float64) complex128 { return cmplx.Rect(1, x) })
	want := (cmplx.Rect(1, 4) - cmplx.Rect(1, 1)) / 1i
	if cmplx.Abs(got-want) > 1e-13 {
		t.Errorf("integral of exp(jx) = %v, want %v", got, want)
	}
}

func TestBisect(t *testing.T) {
	square := func(x float64) float64 { return x*x - 2 }
	near(t, "rising", bisect(0, 2, square), math.Sqrt2, 1e-13)
	near(t, "falling", bisect(0, 2, func(x float64) float64 { return -square(x) }), math.Sqrt2, 1e-13)
	near(t, "from above", bisect(2, 0, square), math.Sqrt2, 1e-13)
}

func TestLargest(t *testing.T) {
	lobes := func(x float64) float64 { return math.Exp(-(x-1.234)*(x-1.234)) + 0.9*math.Exp(-(x+2)*(x+2)) }
	near(t, "inside", largest(-5, 5, 50, lobes), lobes(1.234), 1e-6)
	near(t, "at an end", largest(-5, 1, 50, lobes), lobes(1), 1e-9)
	near(t, "flat", largest(0, 1, 10, func(float64) float64 { return 7 }), 7, 0)
}

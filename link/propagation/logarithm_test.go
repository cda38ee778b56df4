package propagation

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Source: the standard library. Rounding of the sum of step and series allows 2^-52 of the result
// and of 1, twice over.
func TestLogIsTheLogarithm(t *testing.T) {
	const tolerance = 4.5e-16
	check := func(t interface{ Errorf(string, ...any) }, x float64) {
		got, want := log(x), math.Log(x)
		if !(math.Abs(got-want) <= tolerance*max(1, math.Abs(want))) && got != want && !(math.IsNaN(got) && math.IsNaN(want)) {
			t.Errorf("log(%g) = %.17g, want %.17g", x, got, want)
		}
	}
	for _, x := range []float64{0, 1, math.Nextafter(1, 0), math.Nextafter(1, 2), 2, 10, 5e-324, 1e-310, 0x1p-1022, math.MaxFloat64, math.Inf(1), -1, math.Inf(-1), math.NaN()} {
		check(t, x)
	}
	for i := range 4 * steps { // both ends and the middle of every step
		check(t, 1+float64(i)/(4*steps))
		check(t, math.Nextafter(1+float64(i)/(4*steps), 0))
	}
	rapid.Check(t, func(t *rapid.T) { check(t, math.Exp(rapid.Float64Range(-740, 709).Draw(t, "log"))) })
}

// The logarithm never falls as its argument grows by more than rounding.
func TestLogGrows(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(0.5, 4).Draw(t, "x")
		if more := x * (1 + 1e-15); log(more) < log(x)-2.3e-16 {
			t.Errorf("log(%.17g) = %.17g, log(%.17g) = %.17g", x, log(x), more, log(more))
		}
	})
}

// Source: the standard library; the last digits of power, series and product are 2^-53 each.
func TestExpIsTheExponential(t *testing.T) {
	const tolerance = 4.5e-16
	check := func(t interface{ Errorf(string, ...any) }, x float64) {
		got, want := exp(x), math.Exp(x)
		if !(math.Abs(got-want) <= tolerance*want) && got != want && !(math.IsNaN(got) && math.IsNaN(want)) {
			t.Errorf("exp(%g) = %.17g, want %.17g", x, got, want)
		}
	}
	for _, x := range []float64{0, 1, -1, 1e-300, -1e-17, 699.9, -699.9, 700, -700, 709.7, 710, -745, -1000, math.Inf(1), math.Inf(-1), math.NaN()} {
		check(t, x)
	}
	for i := range 4 * steps { // the borders of every step, and between
		check(t, float64(i)*math.Ln2/(2*steps))
	}
	rapid.Check(t, func(t *rapid.T) { check(t, rapid.Float64Range(-745, 709).Draw(t, "x")) })
}

func BenchmarkLog(b *testing.B) {
	x, sum := 1.0, 0.0
	for b.Loop() {
		x += 0.37
		sum += log(x)
	}
	_ = sum
}

func BenchmarkExp(b *testing.B) {
	x, sum := -30.0, 0.0
	for b.Loop() {
		x += 1e-7
		sum += exp(x)
	}
	_ = sum
}

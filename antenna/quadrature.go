package antenna

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
)

// A gaussRule holds the points and weights of Gauss-Legendre on -1 to 1.
type gaussRule struct{ x, weight []float64 }

// newGaussRule returns a rule of n points or a few more: a multiple of 8, because the 26 points
// of gonum v0.17.0 are wrong (the sum of their weights is 1 % off; all others to 600 are right).
func newGaussRule(n int) gaussRule {
	n = (n + 7) / 8 * 8
	g := gaussRule{make([]float64, n), make([]float64, n)}
	quad.Legendre{}.FixedLocations(g.x, g.weight, -1, 1)
	return g
}

// mean returns the mean of a function from -1 to 1.
func (g gaussRule) mean(f func(float64) float64) float64 {
	sum := 0.0
	for i, x := range g.x {
		sum += g.weight[i] * f(x)
	}
	return sum / 2
}

// integral returns the integral of a complex function from lo to hi.
func (g gaussRule) integral(lo, hi float64, f func(float64) complex128) complex128 {
	middle, half := (lo+hi)/2, (hi-lo)/2
	var sum complex128
	for i, x := range g.x {
		sum += complex(g.weight[i]*half, 0) * f(middle+half*x)
	}
	return sum
}

// bisect returns where f changes sign between a and b, at which its signs differ.
func bisect(a, b float64, f func(float64) float64) float64 {
	negative := f(a) < 0
	for range 48 {
		middle := (a + b) / 2
		if f(middle) < 0 == negative {
			a = middle
		} else {
			b = middle
		}
	}
	return (a + b) / 2
}

// largest returns the largest value of f between lo and hi: the best of n+1 equally spaced
// points, refined by dropping the lower outer third of the interval about it.
func largest(lo, hi float64, n int, f func(float64) float64) float64 {
	step := (hi - lo) / float64(n)
	at, best := lo, math.Inf(-1)
	for i := range n + 1 {
		x := lo + float64(i)*step
		if y := f(x); y > best {
			at, best = x, y
		}
	}
	a, b := max(lo, at-step), min(hi, at+step)
	for b-a > 1e-6*step {
		third := (b - a) / 3
		if f(a+third) < f(b-third) {
			a += third
		} else {
			b -= third
		}
	}
	return max(best, f((a+b)/2))
}

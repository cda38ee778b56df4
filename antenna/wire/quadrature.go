package wire

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
)

// A rule holds the points and weights of an integral over 0 to 1.
type rule struct{ x, weight []float64 }

// gauss returns the Gauss-Legendre rule of n points.
func gauss(n int) rule {
	r := rule{make([]float64, n), make([]float64, n)}
	quad.Legendre{}.FixedLocations(r.x, r.weight, 0, 1)
	return r
}

// bent returns the rule under the substitution x = to(t), dx = slope(t) dt.
func (r rule) bent(to, slope func(t float64) float64) rule {
	b := rule{make([]float64, len(r.x)), make([]float64, len(r.x))}
	for i, t := range r.x {
		b.x[i], b.weight[i] = to(t), r.weight[i]*slope(t)
	}
	return b
}

// The rules for pairs of segments that are near each other; see [interaction.near]. They leave
// about 1e-3 ohm of an input impedance open.
var (
	// outerRule runs along the segment of observation, dense at both ends.
	outerRule = gauss(14).bent(
		func(t float64) float64 { return t * t * (3 - 2*t) },
		func(t float64) float64 { return 6 * t * (1 - t) })
	innerRule = gauss(12)
	// roundRule averages over half the circumference, dense where the surfaces touch.
	roundRule = gauss(10).bent(
		func(t float64) float64 { return t * t * t },
		func(t float64) float64 { return 3 * t * t })
	// farRules are for pairs that are far: by the number of points on each.
	farRules = [5]rule{2: gauss(2), 3: gauss(3), 4: gauss(4)}
)

// farPoints returns how many points on each of two segments leave less than about 1e-6 of their
// interaction open, from the distance of their centres over the mean of their lengths. The limits
// lie between whole numbers, on which equal segments of one line stand: rounding must not decide.
func farPoints(distance float64) int {
	switch {
	case distance > 15.5:
		return 2
	case distance > 6.5:
		return 3
	}
	return 4
}

// sinh and cosh together, from one exponential.
func sinhCosh(u float64) (sinh, cosh float64) {
	up := math.Exp(u)
	down := 1 / up
	return (up - down) / 2, (up + down) / 2
}

package wire

import (
	"math"
	"math/cmplx"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

// shapeAt returns the current of a basis function at a place along one of its two segments, and the
// slope of it, in the segment's direction.
func shapeAt(k float64, m *mesh, s share, at float64) (current, slope float64) {
	d := m.runs[s.run].stepM
	if s.side == 1 {
		return s.sign * math.Sin(k*at) / math.Sin(k*d), s.sign * k * math.Cos(k*at) / math.Sin(k*d)
	}
	return s.sign * math.Sin(k*(d-at)) / math.Sin(k*d), -s.sign * k * math.Cos(k*(d-at)) / math.Sin(k*d)
}

// byDefinition returns an element of the matrix as its definition has it: the double integral of the
// mixed potentials of two basis functions that are apart, by Gauss with many points.
func byDefinition(k float64, m *mesh, a, b basis) complex128 {
	points := gauss(24)
	var sum complex128
	for _, p := range a {
		for _, q := range b {
			u, v := &m.runs[p.run], &m.runs[q.run]
			squares := (u.radiusM*u.radiusM + v.radiusM*v.radiusM) / 2
			if u.along.cross(v.along).length() < 1e-9 {
				squares = 0
			}
			for i, x := range points.x {
				from := u.place(p.segment).plus(u.along.times(u.stepM * x))
				w, dw := shapeAt(k, m, p, u.stepM*x)
				for j, y := range points.x {
					to := v.place(q.segment).plus(v.along.times(v.stepM * y))
					f, df := shapeAt(k, m, q, v.stepM*y)
					r := math.Sqrt(from.to(to).dot(from.to(to)) + squares)
					weight := points.weight[i] * points.weight[j] * u.stepM * v.stepM
					sum += complex(weight*(u.along.dot(v.along)*w*f-dw*df/(k*k))/r, 0) * cmplx.Rect(1, -k*r)
				}
			}
		}
	}
	return complex(0, k*antenna.WaveImpedanceOhm/(4*math.Pi)) * sum
}

// Source: the definition of the matrix, for two rods in any position half a segment and more apart, one
// of them bent. Tolerance: that of the quadratures.
func TestMatrixIsItsDefinition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		const k = 2 * math.Pi
		number := func(lo, hi float64, what string) float64 { return rapid.Float64Range(lo, hi).Draw(t, what) }
		rod := Wire{To: [3]float64{0, 0, 0.1}, DiameterM: 2 * number(1e-5, 1e-3, "radius"), Material: antenna.Ideal, Segments: 4}
		bent := rod
		bent.From = [3]float64{number(0.015, 0.3, "x"), number(-0.1, 0.1, "y"), number(-0.2, 0.2, "z")}
		bent.To = vec(bent.From).plus(vec{number(0, 0.1, "dx"), number(-0.1, 0.1, "dy"), 0.05})
		more := bent
		more.From, more.To = bent.To, vec(bent.To).plus(vec{0.1, 0, number(-0.05, 0.1, "dz")})
		one := meshOf(Structure{Wires: []Wire{rod}, Feeds: middleFeed()})
		other := meshOf(Structure{Wires: []Wire{bent, more}, Feeds: []Feed{{1, 1}}})
		z := impedances(k, one, other, nil)
		both := &mesh{runs: append(append([]run{}, one.runs...), other.runs...)}
		for i, a := range one.bases {
			for j, b := range other.bases {
				for n := range b {
					b[n].run += len(one.runs)
				}
				want := byDefinition(k, both, a, b)
				if d := cmplx.Abs(z.row(i)[j] - want); d > 2e-4*cmplx.Abs(want)+2e-4 {
					t.Errorf("element %d, %d: %v, by definition %v", i, j, z.row(i)[j], want)
				}
			}
		}
	})
}

// Source: the columns of the reference tables at twice the segments, and more: the same formulation in
// another code on the same division. Tolerance: their digits, and the quadratures.
func TestReferenceRefinements(t *testing.T) {
	c := tally{t: t}
	for _, table := range []string{"dipole_impedance.csv", "offset_feed.csv"} {
		for _, row := range referenceRows(t, table) {
			if row["model"] == "emf" || row["model"] == "published_fit" {
				continue
			}
			w := upright(number(t, row, "length_wl"), number(t, row, "radius_wl"))
			at := 0.5
			if row["feed_fraction"] != "" {
				at = number(t, row, "feed_fraction")
			}
			w.Segments = int(number(t, row, "segments_fine"))
			z := network(t, Structure{Wires: []Wire{w}, Feeds: []Feed{{1, at}}}).TogetherOhm()
			want := complex(number(t, row, "R_fine_ohm"), number(t, row, "X_fine_ohm"))
			c.check(row, table+" Z", cmplx.Abs(z-want), 0, 0.003*cmplx.Abs(want)+0.1)
		}
	}
	c.done()
}

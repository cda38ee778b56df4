package wire

import (
	"math"
	"math/cmplx"
	"testing"

	"fellreach/antenna"
	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// A trianglePath is a thin wire along a chain of nodes, solved by another method than the package's:
// triangular currents with pulses of charge, the reduced kernel with its 1/R integrated in closed
// form, plain Gauss elsewhere, and gonum's LU of the real form. Nothing of the solver is used.
//
// Source: Harrington, Field Computation by Moment Methods (from memory).
type trianglePath struct {
	k, radiusM float64
	nodes      []vec
}

// pair holds the integrals over two segments: of the products of rising and falling triangles (by
// 0 for falling, 1 for rising), and of 1.
type trianglePair struct {
	moments [2][2]complex128
	one     complex128
}

func (p trianglePath) pair(i, j int) trianglePair {
	const points = 8
	x, w := make([]float64, points), make([]float64, points)
	quad.Legendre{}.FixedLocations(x, w, 0, 1)
	a, b := p.nodes[i], p.nodes[j]
	u, v := a.to(p.nodes[i+1]), b.to(p.nodes[j+1])
	du, dv := u.length(), v.length()
	along := v.unit()
	var sum trianglePair
	for m := range points {
		at := a.plus(u.times(x[m]))
		z := b.to(at).dot(along)
		h := math.Sqrt(b.to(at).across(along).dot(b.to(at)) + p.radiusM*p.radiusM)
		zeroth := complex(math.Asinh((dv-z)/h)+math.Asinh(z/h), 0)
		first := complex(z, 0)*zeroth + complex(math.Hypot(h, dv-z)-math.Hypot(h, z), 0)
		for n := range points {
			r := math.Hypot(h, dv*x[n]-z)
			smooth := (cmplx.Rect(1, -p.k*r) - 1) / complex(r, 0) * complex(dv*w[n], 0)
			zeroth += smooth
			first += smooth * complex(dv*x[n], 0)
		}
		rising := first / complex(dv, 0)
		shapes := [2]complex128{zeroth - rising, rising}
		weights := [2]float64{du * w[m] * (1 - x[m]), du * w[m] * x[m]}
		for s := range 2 {
			for q := range 2 {
				sum.moments[s][q] += complex(weights[s], 0) * shapes[q]
			}
		}
		sum.one += complex(du*w[m], 0) * zeroth
	}
	return sum
}

// impedanceOhm returns the impedance at a gap at a node.
func (p trianglePath) impedanceOhm(t *rapid.T, fed int) complex128 {
	segments := len(p.nodes) - 1
	n := segments - 1
	z := mat.NewDense(2*n, 2*n, nil)
	add := func(m, q int, v complex128) {
		if m < 0 || m >= n || q < 0 || q >= n {
			return
		}
		for _, part := range []struct {
			i, j int
			v    float64
		}{{m, q, real(v)}, {m + n, q + n, real(v)}, {m, q + n, -imag(v)}, {m + n, q, imag(v)}} {
			z.Set(part.i, part.j, z.At(part.i, part.j)+part.v)
		}
	}
	scale := complex(0, p.k*antenna.WaveImpedanceOhm/(4*math.Pi))
	for i := range segments {
		for j := range segments {
			u, v := p.nodes[i].to(p.nodes[i+1]), p.nodes[j].to(p.nodes[j+1])
			cosine := complex(u.unit().dot(v.unit()), 0)
			pair := p.pair(i, j)
			for s := range 2 {
				for q := range 2 { // node i-1+s falls on segment i for s = 0 and rises for s = 1
					sign := complex(float64((2*s-1)*(2*q-1)), 0)
					charge := sign * pair.one / complex(p.k*p.k*u.length()*v.length(), 0)
					add(i-1+s, j-1+q, scale*(cosine*pair.moments[s][q]-charge))
				}
			}
		}
	}
	var right, current mat.VecDense
	right.CloneFromVec(mat.NewVecDense(2*n, nil))
	right.SetVec(fed-1, 1)
	if err := current.SolveVec(z, &right); err != nil {
		t.Fatal(err)
	}
	return 1 / complex(current.AtVec(fed-1), current.AtVec(fed-1+n))
}

// Bent wires of one radius, fed at a bend, by two methods. Tolerance: as between the methods of the
// reference tables: 3 % of the impedance's size, for segments of a fiftieth of a wavelength with
// triangles, and 4 ohm.
func TestAgainstTriangles(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		legs := rapid.IntRange(2, 4).Draw(t, "legs")
		corners := []vec{{}}
		for range legs {
			azimuth, elevation := rapid.Float64Range(-0.8, 0.8).Draw(t, "az"), rapid.Float64Range(-0.8, 0.8).Draw(t, "el")
			step := vec{math.Cos(elevation) * math.Cos(azimuth), math.Cos(elevation) * math.Sin(azimuth), math.Sin(elevation)}
			corners = append(corners, corners[len(corners)-1].plus(step.times(rapid.Float64Range(0.1, 0.3).Draw(t, "length"))))
		}
		radiusM := rapid.Float64Range(1e-5, 5e-4).Draw(t, "radius")
		s := Structure{Feeds: []Feed{{1, 1}}}
		path := trianglePath{k: 2 * math.Pi / testWavelengthM, radiusM: radiusM, nodes: corners[:1]}
		fed := 0
		for i := range legs {
			leg := line{corners[i], corners[i+1]}
			s.Wires = append(s.Wires, Wire{From: leg.from, To: leg.to, DiameterM: 2 * radiusM, Material: antenna.Ideal})
			count := int(math.Ceil(50 * leg.along().length()))
			for n := 1; n <= count; n++ {
				path.nodes = append(path.nodes[:len(path.nodes):len(path.nodes)], leg.at(float64(n)/float64(count)))
			}
			if i == 0 {
				fed = len(path.nodes) - 1
			}
		}
		n, err := s.Solve(testHz, 0)
		if err != nil {
			t.Skip(err)
		}
		got, want := n.TogetherOhm(), path.impedanceOhm(t, fed)
		if cmplx.Abs(got-want) > 0.03*cmplx.Abs(want)+4 {
			t.Errorf("%.2f ohm, by triangles %.2f", got, want)
		}
	})
}

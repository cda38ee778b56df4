package wire

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// randomMatrix returns a symmetric matrix with a diagonal of some weight, or none.
func randomMatrix(n int, diagonal float64, seed uint64) *matrix {
	random := rand.New(rand.NewPCG(seed, 1))
	m := newMatrix(n, n)
	for i := range n {
		for j := range i + 1 {
			v := complex(random.NormFloat64(), random.NormFloat64())
			if i == j {
				v *= complex(diagonal, 0)
			}
			m.data[i*n+j], m.data[j*n+i] = v, v
		}
	}
	return m
}

// realForm returns the matrix of twice the size that does to real and imaginary parts what the
// complex one does, for gonum.
func realForm(m *matrix) *mat.Dense {
	n := m.rows
	d := mat.NewDense(2*n, 2*n, nil)
	for i := range n {
		for j := range n {
			v := m.row(i)[j]
			d.Set(i, j, real(v))
			d.Set(i+n, j+n, real(v))
			d.Set(i, j+n, -imag(v))
			d.Set(i+n, j, imag(v))
		}
	}
	return d
}

// Source: gonum's real LU of the real form. Sizes on both sides of a panel, and matrices that need
// pivots.
func TestSolveAgainstGonum(t *testing.T) {
	for _, n := range []int{1, 2, 31, 32, 33, 65, 130} {
		for _, diagonal := range []float64{0, 3} {
			if n == 1 && diagonal == 0 {
				continue
			}
			m := randomMatrix(n, diagonal, uint64(n))
			b, stacked := make([]complex128, n), mat.NewVecDense(2*n, nil)
			for i := range b {
				b[i] = complex(math.Sin(float64(i)), math.Cos(3*float64(i)))
				stacked.SetVec(i, real(b[i]))
				stacked.SetVec(i+n, imag(b[i]))
			}
			var want mat.VecDense
			if err := want.SolveVec(realForm(m), stacked); err != nil {
				t.Fatal(err)
			}
			f, err := factor(m)
			if err != nil {
				t.Fatal(err)
			}
			f.solve(b)
			for i, v := range b {
				if w := complex(want.AtVec(i), want.AtVec(i+n)); cmplx.Abs(v-w) > 1e-9*(1+cmplx.Abs(w)) {
					t.Fatalf("n = %d: x[%d] = %v, want %v", n, i, v, w)
				}
			}
		}
	}
}

// Source: gonum's inverse of the real form, whose 1-norm is within a factor of 2 of the complex one.
// An estimate from a few solutions is never above the true inverse's norm, and seldom far below.
func TestReciprocalCondition(t *testing.T) {
	for _, tc := range []struct {
		n     int
		scale float64
	}{{5, 1}, {40, 1}, {40, 1e-6}} {
		m := randomMatrix(tc.n, 2, 7)
		for j := range tc.n { // one row and column small: a poor condition
			m.row(0)[j] *= complex(tc.scale, 0)
			m.row(j)[0] *= complex(tc.scale, 0)
		}
		var inverse mat.Dense
		d := realForm(m)
		if err := inverse.Inverse(d); err != nil {
			if _, poor := err.(mat.Condition); !poor {
				t.Fatal(err)
			}
		}
		want := 1 / (mat.Norm(d, 1) * mat.Norm(&inverse, 1))
		f, err := factor(m)
		if err != nil {
			t.Fatal(err)
		}
		if got := f.reciprocalCondition(); got < want/1.01 || got > 6*want {
			t.Errorf("n = %d: reciprocal condition %.3g, that of the real form is %.3g", tc.n, got, want)
		}
	}
}

func TestFactorRefuses(t *testing.T) {
	singular := newMatrix(3, 3)
	copy(singular.data, []complex128{1, 2, 3, 2, 4, 6, 1i, 0, 1})
	if _, err := factor(singular); err == nil {
		t.Error("a singular matrix was factored")
	}
	bad := newMatrix(2, 2)
	bad.data[0], bad.data[3] = complex(math.NaN(), 0), 1
	if _, err := factor(bad); err == nil {
		t.Error("a matrix with NaN was factored")
	}
}

package wire

import (
	"errors"
	"math"
	"math/cmplx"
)

// An lu is a square matrix factored into lower and upper triangle with partial pivoting, in place
// of the matrix. gonum v0.17 has none for complex numbers.
type lu struct {
	*matrix
	pivots []int   // the row exchanged with each
	norm   float64 // largest column sum of the matrix, before it was factored
}

// panelColumns is how many columns are eliminated at a time: their part of the rows above stays
// in the cache while the rest of the matrix is brought up to date, row by row on all cores.
const panelColumns = 32

var errSingular = errors.New("the matrix of the wires is singular: no current answers the feeds")

// factor overwrites a square matrix with its factors. A matrix with NaN is an error too.
func factor(a *matrix) (*lu, error) {
	f := &lu{a, make([]int, a.rows), a.norm()}
	if math.IsNaN(f.norm) || math.IsInf(f.norm, 0) {
		return nil, errors.New("the matrix of the wires is not finite")
	}
	for from := 0; from < a.rows; from += panelColumns {
		to := min(from+panelColumns, a.rows)
		for k := from; k < to; k++ {
			if err := f.eliminate(k, to); err != nil {
				return nil, err
			}
		}
		f.update(from, to)
	}
	return f, nil
}

// eliminate brings the largest element of column k on the diagonal and clears the column below
// it, in the columns up to to.
func (f *lu) eliminate(k, to int) error {
	best, size := k, 0.0
	for i := k; i < f.rows; i++ {
		if s := size1(f.data[i*f.columns+k]); s > size {
			best, size = i, s
		}
	}
	if size == 0 {
		return errSingular
	}
	f.pivots[k] = best
	if best != k {
		above, below := f.row(k), f.row(best)
		for j := range above {
			above[j], below[j] = below[j], above[j]
		}
	}
	pivot := f.row(k)[k:to]
	inverse := 1 / pivot[0]
	for i := k + 1; i < f.rows; i++ {
		row := f.row(i)[k:to]
		row[0] *= inverse
		subtract(row[1:], row[0], pivot[1:])
	}
	return nil
}

// update brings the columns behind a panel up to date.
func (f *lu) update(from, to int) {
	for k := from; k < to; k++ {
		for i := k + 1; i < to; i++ {
			subtract(f.row(i)[to:], f.row(i)[k], f.row(k)[to:])
		}
	}
	parallel(f.rows-to, func(i int) {
		row := f.row(to + i)
		for k := from; k < to; k++ {
			subtract(row[to:], row[k], f.row(k)[to:])
		}
	})
}

// solve overwrites the right-hand side with the solution.
func (f *lu) solve(b []complex128) {
	for k, best := range f.pivots {
		b[k], b[best] = b[best], b[k]
	}
	for i := range b {
		b[i] -= dot(f.row(i)[:i], b)
	}
	for i := len(b) - 1; i >= 0; i-- {
		row := f.row(i)
		b[i] = (b[i] - dot(row[i+1:], b[i+1:])) / row[i]
	}
}

// reciprocalCondition estimates 1/(|A| |A^-1|) in the 1-norm, for a symmetric matrix: 1 at best;
// its digits are lost to the solution. Source: Hager's method as improved by Higham (from
// memory); by symmetry it needs no solution with the conjugate transpose.
func (f *lu) reciprocalCondition() float64 {
	n := f.rows
	x := make([]complex128, n)
	for i := range x {
		x[i] = complex(1/float64(n), 0)
	}
	inverse := 0.0
	for range 5 {
		f.solve(x)
		sum := 0.0
		for i, v := range x {
			sum += cmplx.Abs(v)
			if v == 0 {
				v = 1
			}
			x[i] = cmplx.Conj(v) / complex(cmplx.Abs(v), 0)
		}
		if sum <= inverse {
			break
		}
		inverse = sum
		f.solve(x) // A^-H of the signs is the conjugate of A^-1 of their conjugates
		largest := 0
		for i, v := range x {
			if cmplx.Abs(v) > cmplx.Abs(x[largest]) {
				largest = i
			}
		}
		clear(x)
		x[largest] = 1
	}
	return 1 / (f.norm * inverse)
}

// norm returns the largest sum of the sizes in a row, which by symmetry is that of a column.
func (m *matrix) norm() float64 {
	largest := 0.0
	for i := range m.rows {
		sum := 0.0
		for _, v := range m.row(i) {
			sum += cmplx.Abs(v)
		}
		if !(sum <= largest) { // NaN stays
			largest = sum
		}
	}
	return largest
}

func size1(z complex128) float64 { return math.Abs(real(z)) + math.Abs(imag(z)) }

package wire

import "gonum.org/v1/gonum/blas/gonum"

// blas has the products of rows of complex numbers in assembly where the machine has it; they take
// half the time of plain loops.
var blas gonum.Implementation

// A matrix is stored by rows.
type matrix struct {
	rows, columns int
	data          []complex128
}

func newMatrix(rows, columns int) *matrix {
	return &matrix{rows, columns, make([]complex128, rows*columns)}
}

func (m *matrix) row(i int) []complex128 { return m.data[i*m.columns : (i+1)*m.columns] }

// dot returns the sum of the products of two rows of equal length, without conjugation.
func dot(a, b []complex128) complex128 { return blas.Zdotu(len(a), a, 1, b[:len(a)], 1) }

// subtract takes a multiple of one row from another of equal length.
func subtract(row []complex128, factor complex128, other []complex128) {
	blas.Zaxpy(len(other), -factor, other, 1, row[:len(other)], 1)
}

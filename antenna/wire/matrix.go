package wire

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
func dot(a, b []complex128) complex128 {
	var sum complex128
	for i, v := range a {
		sum += v * b[i]
	}
	return sum
}

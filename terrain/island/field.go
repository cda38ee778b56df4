package island

// A field is a raster of whole numbers over the island's rectangle, row by row from the
// north-west. The unit is its owner's; cells are cellM metres wide.
type field struct {
	cols, rows int
	cellM      int64
	v          []int32
}

// coarsestM is the cell of the first, roughest stage: three halvings give CellM.
const coarsestM = 8 * CellM

// sample makes a field on the coarsest cells from a function of the place.
func sample(value func(xM, yM int64) int64) field {
	f := field{Cols * CellM / coarsestM, Rows * CellM / coarsestM, coarsestM, nil}
	f.v = make([]int32, f.cols*f.rows)
	for i := range f.v {
		f.v[i] = int32(value(f.place(i)))
	}
	return f
}

// place returns the middle of a cell, in metres east and south of the north-west corner.
func (f field) place(i int) (xM, yM int64) {
	return int64(i%f.cols)*f.cellM + f.cellM/2, int64(i/f.cols)*f.cellM + f.cellM/2
}

// around holds the steps from a cell to its eight neighbours, the four straight ones first.
func (f field) around() [8]int {
	n := f.cols
	return [8]int{1, -1, n, -n, n + 1, n - 1, 1 - n, -1 - n}
}

// at returns the value at a place, bilinearly between the middles of four cells.
func (f field) at(xM, yM int64) int32 {
	x := min(max(xM-f.cellM/2, 0), int64(f.cols-1)*f.cellM-1)
	y := min(max(yM-f.cellM/2, 0), int64(f.rows-1)*f.cellM-1)
	col, row := x/f.cellM, y/f.cellM
	x, y = x-col*f.cellM, y-row*f.cellM
	i := int(row)*f.cols + int(col)
	upper := int64(f.v[i])*(f.cellM-x) + int64(f.v[i+1])*x
	lower := int64(f.v[i+f.cols])*(f.cellM-x) + int64(f.v[i+f.cols+1])*x
	return int32((upper*(f.cellM-y) + lower*y) / (f.cellM * f.cellM))
}

// finer returns the field on cells of half the size. Each value takes 9, 3, 3 and 1 sixteenths of
// the four nearest: the subdivision of a quadratic B-spline, whose limit has no creases.
func (f field) finer() field {
	g := field{2 * f.cols, 2 * f.rows, f.cellM / 2, make([]int32, 4*len(f.v))}
	for row := range g.rows {
		near := f.v[row/2*f.cols:][:f.cols]
		far := f.v[beside(row, f.rows)*f.cols:][:f.cols]
		to := g.v[row*g.cols:][:g.cols]
		for col := range to {
			p, q := col/2, beside(col, f.cols)
			to[col] = (9*near[p] + 3*(near[q]+far[p]) + far[q] + 8) >> 4
		}
	}
	return g
}

// beside returns which of n coarse rows (or columns) is the second nearest to a fine one.
func beside(fine, n int) int { return min(max((fine-1)/2+fine&1, 0), n-1) }

// smooth returns the field with each value drawn towards its neighbours, by the weights 1, 2, 1
// in both directions. The frame stays.
func (f field) smooth() field {
	g := field{f.cols, f.rows, f.cellM, make([]int32, len(f.v))}
	copy(g.v, f.v)
	n := f.cols
	for i := n + 1; i < len(f.v)-n-1; i++ {
		a, b, c := f.v[i-n-1:][:3], f.v[i-1:][:3], f.v[i+n-1:][:3]
		g.v[i] = (a[0] + 2*a[1] + a[2] + 2*(b[0]+2*b[1]+b[2]) + c[0] + 2*c[1] + c[2] + 8) >> 4
	}
	return g
}

// roughen adds noise of about the given amplitude.
func (f field) roughen(amplitude, wavelengthM, seed int64) {
	for i := range f.v {
		x, y := f.place(i)
		f.v[i] += int32(amplitude * noise(x, y, wavelengthM, seed) / 1000)
	}
}

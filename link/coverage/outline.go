package coverage

import "slices"

// A corner is a place on the lattice of cell corners: column and row, counted from the first
// cell's outer corner.
type corner struct{ col, row int32 }

// A patch is a connected part of one class: its outer ring, then its holes. Rings are closed, their
// first corner is not repeated, and they turn only at their corners.
type patch struct {
	class uint8
	rings [][]corner
}

// A mosaic is a map of classes being turned into patches. Cells are neighbours by their sides.
type mosaic struct {
	cols, rows int
	classes    []uint8
	labels     []int32 // of the patch each cell belongs to
	sizes      []int   // of each patch, cells
	first      []int32 // cell of each patch
}

// patchesOf outlines the classes above 0 of a map, after parts of fewer than leastCells cells have
// been given to what lies beside them.
func patchesOf(classes []uint8, cols, rows, leastCells int) []patch {
	m := &mosaic{cols: cols, rows: rows, classes: slices.Clone(classes), labels: make([]int32, len(classes))}
	m.label()
	if m.absorb(leastCells) {
		m.label()
	}
	return m.trace()
}

// label finds the connected parts by joining the cells of each row with those beside and above.
func (m *mosaic) label() {
	parent := []int32{}
	find := func(i int32) int32 {
		for parent[i] != i {
			parent[i] = parent[parent[i]]
			i = parent[i]
		}
		return i
	}
	for i, class := range m.classes {
		left, above := i%m.cols > 0 && m.classes[i-1] == class, i >= m.cols && m.classes[i-m.cols] == class
		switch {
		case left && above:
			a, b := find(m.labels[i-1]), find(m.labels[i-m.cols])
			parent[max(a, b)] = min(a, b)
			m.labels[i] = min(a, b)
		case left:
			m.labels[i] = m.labels[i-1]
		case above:
			m.labels[i] = m.labels[i-m.cols]
		default:
			m.labels[i] = int32(len(parent))
			parent = append(parent, m.labels[i])
		}
	}
	number := make([]int32, len(parent))
	m.sizes, m.first = m.sizes[:0], m.first[:0]
	for i := range m.labels {
		root := find(m.labels[i])
		if number[root] == 0 {
			m.sizes, m.first = append(m.sizes, 0), append(m.first, int32(i))
			number[root] = int32(len(m.sizes))
		}
		m.labels[i] = number[root] - 1
		m.sizes[m.labels[i]]++
	}
}

// absorb gives small parts to the part at the left of their first cell (above it, at the edge), in
// the order of the map, so that a chain of small parts goes to the large one it begins at.
func (m *mosaic) absorb(leastCells int) (changed bool) {
	became := make([]uint8, len(m.sizes))
	for label, size := range m.sizes {
		first := int(m.first[label])
		became[label] = m.classes[first]
		if size >= leastCells {
			continue
		}
		switch {
		case first%m.cols > 0:
			became[label] = became[m.labels[first-1]]
		case first >= m.cols:
			became[label] = became[m.labels[first-m.cols]]
		}
		changed = changed || became[label] != m.classes[first]
	}
	for i, label := range m.labels {
		m.classes[i] = became[label]
	}
	return changed
}

// Directions of the sides of cells, walked with the part on the left hand.
const (
	south = iota
	east
	north
	west
)

// trace walks the borders of all parts above class 0. Each border side of a cell is walked once; the
// sides that are walked southwards start the rings, so that a part's outer ring, which holds its
// first cell's left side, comes before its holes.
func (m *mosaic) trace() []patch {
	walked := make([]bool, len(m.classes)) // the cell's left side
	index := make([]int32, len(m.sizes))   // of the part's patch, from 1 on
	var patches []patch
	for i, class := range m.classes {
		if class == 0 || walked[i] || i%m.cols > 0 && m.labels[i-1] == m.labels[i] {
			continue
		}
		label := m.labels[i]
		if index[label] == 0 {
			patches = append(patches, patch{class: class})
			index[label] = int32(len(patches))
		}
		p := &patches[index[label]-1]
		p.rings = append(p.rings, m.ring(i, walked))
	}
	return patches
}

// in says whether a cell belongs to a part.
func (m *mosaic) in(col, row int, label int32) bool {
	return col >= 0 && row >= 0 && col < m.cols && row < m.rows && m.labels[row*m.cols+col] == label
}

// ring walks the ring that begins with the left side of a cell, southwards.
func (m *mosaic) ring(start int, walked []bool) (ring []corner) {
	label := m.labels[start]
	col, row, heading := start%m.cols, start/m.cols, south // the corner, and where to
	ring = append(ring, corner{int32(col), int32(row)})
	for {
		switch heading {
		case south:
			walked[row*m.cols+col] = true
			row++
		case east:
			col++
		case north:
			row--
		case west:
			col--
		}
		next := m.turn(col, row, heading, label)
		if next == south && col == start%m.cols && row == start/m.cols {
			return ring
		}
		if next != heading {
			ring = append(ring, corner{int32(col), int32(row)})
		}
		heading = next
	}
}

// turn returns the heading after a corner. Where two cells of the part touch by the corner alone it
// keeps to the one it came along, so that parts are joined by sides only.
func (m *mosaic) turn(col, row, heading int, label int32) int {
	nw, ne := m.in(col-1, row-1, label), m.in(col, row-1, label)
	sw, se := m.in(col-1, row, label), m.in(col, row, label)
	var left, right bool // the cells ahead, at both hands; the one behind at the left is of the part
	switch heading {
	case south:
		left, right = se, sw
	case east:
		left, right = ne, se
	case north:
		left, right = nw, ne
	case west:
		left, right = sw, nw
	}
	switch {
	case !left:
		return (heading + 1) % 4
	case right:
		return (heading + 3) % 4
	}
	return heading
}

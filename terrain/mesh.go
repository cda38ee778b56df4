package terrain

import (
	"math"

	"github.com/paulmach/orb"
)

// A Mesh holds a smooth map of the plane to the plane by its values on a square lattice of nodes,
// and interpolates between them, linearly along both axes.
type Mesh struct {
	west, south float64
	perUnit     float64 // nodes
	cols, rows  int
	nodes       []orb.Point
}

// NewMesh lays nodes over an area, at least 2 by 2 and no farther apart than spacing, and fills
// them: fill gets the positions of all nodes and puts the map's values in their place.
func NewMesh(area orb.Bound, spacing float64, fill func([]orb.Point) error) (*Mesh, error) {
	m := &Mesh{west: area.Min[0], south: area.Min[1], perUnit: 1 / spacing}
	m.cols = int(math.Ceil((area.Max[0]-area.Min[0])/spacing)) + 1
	m.rows = int(math.Ceil((area.Max[1]-area.Min[1])/spacing)) + 1
	m.cols, m.rows = max(m.cols, 2), max(m.rows, 2)
	m.nodes = make([]orb.Point, 0, m.cols*m.rows)
	for row := range m.rows {
		for col := range m.cols {
			m.nodes = append(m.nodes, orb.Point{m.west + float64(col)*spacing, m.south + float64(row)*spacing})
		}
	}
	return m, fill(m.nodes)
}

// Nodes returns the values at the nodes.
func (m *Mesh) Nodes() []orb.Point { return m.nodes }

// At returns the map's value at a position. Outside the area the outermost nodes are prolonged.
func (m *Mesh) At(x, y float64) (float64, float64) {
	u, v := (x-m.west)*m.perUnit, (y-m.south)*m.perUnit
	col := min(max(int(u), 0), m.cols-2)
	row := min(max(int(v), 0), m.rows-2)
	u -= float64(col)
	v -= float64(row)
	i := row*m.cols + col
	lower, upper := m.nodes[i:i+2:i+2], m.nodes[i+m.cols:i+m.cols+2:i+m.cols+2]
	a0, a1 := lower[0][0]+u*(lower[1][0]-lower[0][0]), lower[0][1]+u*(lower[1][1]-lower[0][1])
	b0, b1 := upper[0][0]+u*(upper[1][0]-upper[0][0]), upper[0][1]+u*(upper[1][1]-upper[0][1])
	return a0 + v*(b0-a0), a1 + v*(b1-a1)
}

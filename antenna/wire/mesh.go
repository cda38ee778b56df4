package wire

import (
	"math"
	"slices"
)

// A run is a straight row of equal segments of one wire.
type run struct {
	wire    int // index of the wire
	start   vec
	along   vec // of length 1
	stepM   float64
	count   int
	radiusM float64
}

// place returns where the nth node of the run lies.
func (r *run) place(n int) vec { return r.start.plus(r.along.times(float64(n) * r.stepM)) }

// An end is a segment's start (side 0) or its end (side 1).
type end struct{ run, segment, side int }

// A share is the part of a basis function on one segment: it rises as a sine to the given end,
// where it is 1 in the segment's direction, or -1.
type share struct {
	end
	sign float64
}

// A basis is a basis function of the current, through a node from one segment to another.
type basis [2]share

// A port is a feed's part in each basis function that flows through it.
type port []portShare

type portShare struct {
	basis int
	sign  float64
}

// A mesh is wires divided into segments, and the basis functions of their currents.
type mesh struct {
	runs  []run
	bases []basis
	ports []port
}

// segments returns the number of segments.
func (m *mesh) segments() int {
	sum := 0
	for _, r := range m.runs {
		sum += r.count
	}
	return sum
}

// segmentsOfWires returns the number of segments of each wire.
func (m *mesh) segmentsOfWires(wires int) []int {
	counts := make([]int, wires)
	for _, r := range m.runs {
		counts[r.wire] += r.count
	}
	return counts
}

// newMesh divides a structure that has been checked, but for its mast. At a node of n segment ends
// n-1 basis functions lead from the first to each other one, so that charge is conserved; an open
// end has none. Ends closer than joinM are one node.
func newMesh(s Structure, wavelengthM float64) *mesh {
	m := &mesh{}
	feedEnds := make([]end, len(s.Feeds))
	for i, w := range s.Wires {
		cuts := w.cuts(i, s.Feeds)
		ends := m.divide(i, w, cuts, wavelengthM)
		for j, feed := range s.Feeds {
			if feed.Wire == i+1 {
				feedEnds[j] = ends[slices.Index(slices.Concat([]float64{0}, cuts, []float64{1}), feed.At)]
			}
		}
	}
	m.join(wavelengthM)
	for _, e := range feedEnds {
		m.ports = append(m.ports, m.portAt(e))
	}
	return m
}

// divide adds the runs of a wire, one for each piece between cuts, or one for several pieces in
// equal segments. It returns the segment ends at the wire's start, at its cuts and at its end.
func (m *mesh) divide(index int, w Wire, cuts []float64, wavelengthM float64) []end {
	counts := w.segmentsOf(cuts, wavelengthM)
	ends := []end{{len(m.runs), 0, 0}}
	r := run{wire: index, start: w.From, along: w.line().along().unit(), radiusM: w.radiusM()}
	for i, pieceM := range piecesOf(cuts, w.lengthM()) {
		stepM := pieceM / float64(counts[i])
		if i > 0 && math.Abs(stepM-r.stepM) > 1e-9*stepM {
			m.runs = append(m.runs, r)
			r.start, r.count = r.place(r.count), 0
		}
		r.stepM = stepM
		r.count += counts[i]
		ends = append(ends, end{len(m.runs), r.count - 1, 1})
	}
	m.runs = append(m.runs, r)
	return ends
}

// cuts returns the ascending fractions at which feeds divide a wire, its ends left out.
func (w Wire) cuts(index int, feeds []Feed) []float64 {
	var cuts []float64
	for _, feed := range feeds {
		if feed.Wire == index+1 && feed.At > 0 && feed.At < 1 {
			cuts = append(cuts, feed.At)
		}
	}
	slices.Sort(cuts)
	return slices.Compact(cuts)
}

// join makes the basis functions: those within the runs, then those at the nodes where runs meet.
func (m *mesh) join(wavelengthM float64) {
	type node struct {
		place vec
		ends  []end
	}
	var nodes []node
	for i := range m.runs {
		r := &m.runs[i]
		for n := 1; n < r.count; n++ {
			m.bases = append(m.bases, basis{{end{i, n - 1, 1}, 1}, {end{i, n, 0}, 1}})
		}
		for _, e := range []end{{i, 0, 0}, {i, r.count - 1, 1}} {
			place := r.place(e.segment + e.side)
			at := slices.IndexFunc(nodes, func(n node) bool {
				return n.place.apart(place) < joinM(r.radiusM, m.runs[n.ends[0].run].radiusM, wavelengthM)
			})
			if at < 0 {
				nodes = append(nodes, node{place: place})
				at = len(nodes) - 1
			}
			nodes[at].ends = append(nodes[at].ends, e)
		}
	}
	for _, n := range nodes {
		for _, other := range n.ends[1:] {
			sign := 1.0
			if other.side == n.ends[0].side {
				sign = -1
			}
			m.bases = append(m.bases, basis{{n.ends[0], 1}, {other, sign}})
		}
	}
}

// joinM returns the distance below which the ends of two wires are one node.
func joinM(radiusM, otherRadiusM, wavelengthM float64) float64 {
	return max(1e-6*wavelengthM, 0.1*min(radiusM, otherRadiusM))
}

// portAt returns the port of a gap at a segment's end, in series with that segment.
func (m *mesh) portAt(e end) port {
	var p port
	for i, b := range m.bases {
		for _, s := range b {
			if s.end == e {
				p = append(p, portShare{i, s.sign})
			}
		}
	}
	return p
}

// currents returns the current at each node of each run, in the run's direction, from the
// amplitudes of the basis functions.
func (m *mesh) currents(amplitudes []complex128) [][]complex128 {
	nodes := make([][]complex128, len(m.runs))
	for i, r := range m.runs {
		nodes[i] = make([]complex128, r.count+1)
	}
	for i, b := range m.bases {
		for s, one := range b {
			if s == 1 && one.run == b[0].run && one.segment == b[0].segment+1 && one.side == 0 {
				continue // the same node within a run, counted already
			}
			nodes[one.run][one.segment+one.side] += complex(one.sign, 0) * amplitudes[i]
		}
	}
	return nodes
}

package wire

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"
)

// How a mast is modelled, by its radius in wavelengths: as one wire on its axis if it is thin, else
// as a cage of parallel wires on its surface, each of the radius that gives them together the
// pole's surface. More wires than these change nothing; one wire on the axis of a pole of 0.015 wl
// is off by 0.25 dB and 4 % of the resistance close by, since the current does not flow evenly
// around it. Cages are within 0.1 dB of the series of modes of an infinite cylinder away from the
// mast and beside it, and within 1 dB in its shadow down to -20 dBi, over all radii allowed; the
// tests repeat the comparison.
const (
	oneWireRadiusWl = 0.003
	sixWireRadiusWl = 0.05
	cageSpacingWl   = 0.095 // between the wires of thicker cages, around the pole
	thickestMastWl  = 1.0   // radius
	mastSegmentWl   = 0.05
)

func (m Mast) exists() bool     { return m.DiameterM != 0 }
func (m Mast) radiusM() float64 { return m.DiameterM / 2 }
func (m Mast) line() line       { return line{m.From, m.To} }
func (m Mast) lengthM() float64 { return m.line().along().length() }

// gapM returns the distance of a line from the mast's surface, negative inside: from its end for a
// line wholly above or below it, else sideways.
func (m Mast) gapM(l line) float64 {
	up := m.line().along().unit()
	from, to := vec(m.From).to(l.from).dot(up), vec(m.From).to(l.to).dot(up)
	if beyond := max(min(from, to)-m.lengthM(), -max(from, to)); beyond > 0 {
		return beyond
	}
	return l.apart(m.line()) - m.radiusM()
}

// wireCount returns the number of wires for the mast.
func (m Mast) wireCount(wavelengthM float64) int {
	radiusWl := m.radiusM() / wavelengthM
	switch {
	case radiusWl <= oneWireRadiusWl:
		return 1
	case radiusWl <= sixWireRadiusWl:
		return 6
	}
	return max(8, 2*int(math.Ceil(math.Pi*radiusWl/cageSpacingWl)))
}

func (m Mast) check(wavelengthM float64) error {
	if !m.exists() {
		return nil
	}
	if !vec(m.From).finite() || !vec(m.To).finite() {
		return errors.New("mast: its ends must be finite")
	}
	if !(m.DiameterM > 0) || m.radiusM() > thickestMastWl*wavelengthM {
		return fmt.Errorf("mast diameter %g m is out of range: above 0 and up to %.3g m (%g wl) is allowed", m.DiameterM, 2*thickestMastWl*wavelengthM, 2*thickestMastWl)
	}
	if m.lengthM() < 2*mastSegmentWl*wavelengthM {
		return fmt.Errorf("mast: %.3g m is too short: at least %g wl is needed", m.lengthM(), 2*mastSegmentWl)
	}
	return nil
}

// mesh returns the mast's wires in the order around it, the first two astride the direction to a
// place, with their inner nodes as basis functions, wire by wire.
func (m Mast) mesh(toward vec, wavelengthM float64) *mesh {
	wires := m.wireCount(wavelengthM)
	out := m.sideways(toward)
	left := m.line().along().unit().cross(out)
	count := int(math.Ceil(m.lengthM() / (mastSegmentWl * wavelengthM)))
	around := &mesh{}
	for w := range wires {
		r := run{start: m.From, along: m.line().along().unit(), stepM: m.lengthM() / float64(count), count: count, radiusM: m.radiusM() / float64(wires)}
		if wires > 1 {
			sin, cos := math.Sincos(2 * math.Pi * (float64(w) - 0.5) / float64(wires))
			r.start = r.start.plus(out.times(m.radiusM() * cos)).plus(left.times(m.radiusM() * sin))
		}
		around.runs = append(around.runs, r)
		for n := 1; n < count; n++ {
			around.bases = append(around.bases, basis{{end{w, n - 1, 1}, 1}, {end{w, n, 0}, 1}})
		}
	}
	return around
}

// sideways returns the unit vector square to the mast towards a place, or any if it is in line.
func (m Mast) sideways(place vec) vec {
	up := m.line().along().unit()
	for _, to := range []vec{vec(m.From).to(place), {1, 0, 0}, {0, 1, 0}} {
		if out := to.across(up); out.length() > 1e-6*to.length() {
			return out.unit()
		}
	}
	panic("wire: a mast without a direction")
}

// A cage is the impedance matrix of a mast, factored. All its wires being alike and equally spaced
// around it, currents of different harmonics around the mast have nothing to do with each other:
// the matrix falls into one block of a single wire's size for each, and harmonics h and -h share
// one. That makes it cheaper to factor than to fill.
type cage struct {
	*mesh
	wires, nodes int
	harmonics    []*lu // 0 to half the number of wires
}

// newCage fills and factors the matrix of a mast's mesh.
func newCage(k float64, m *mesh) (*cage, error) {
	wires := len(m.runs)
	nodes := m.runs[0].count - 1
	c := &cage{m, wires, nodes, make([]*lu, wires/2+1)}
	first := &mesh{runs: m.runs[:1], bases: m.bases[:nodes]}
	apart := make([]*matrix, wires/2+1) // the first wire with each up to that across
	parallel(len(apart), func(w int) {
		other := first
		if w > 0 {
			other = &mesh{runs: m.runs[w : w+1], bases: m.bases[:nodes]}
		}
		apart[w] = impedances(k, first, other, nil)
	})
	errs := make([]error, len(apart))
	parallel(len(c.harmonics), func(h int) {
		sum := newMatrix(nodes, nodes)
		for w := range wires {
			z := apart[min(w, wires-w)]
			turn := complex(math.Cos(2*math.Pi*float64(h*w)/float64(wires)), 0)
			for i, v := range z.data {
				sum.data[i] += turn * v
			}
		}
		c.harmonics[h], errs[h] = factor(sum)
	})
	return c, errors.Join(errs...)
}

// like tells whether a mesh of a mast has the same matrix.
func (c *cage) like(m *mesh) bool {
	a, b := c.runs[0], m.runs[0]
	across := c.runs[len(c.runs)/2].start.apart(a.start) - m.runs[len(m.runs)/2].start.apart(b.start)
	return len(c.runs) == len(m.runs) && a.count == b.count && math.Abs(a.stepM-b.stepM) < 1e-9*a.stepM && a.radiusM == b.radiusM && math.Abs(across) < 1e-9*a.stepM
}

// solve overwrites a right-hand side, wire by wire, with the currents on the cage.
func (c *cage) solve(b []complex128) {
	turns := make([]complex128, c.wires)
	for w := range turns {
		turns[w] = cmplx.Rect(1, -2*math.Pi*float64(w)/float64(c.wires))
	}
	harmonics := make([]complex128, len(b))
	for h := range c.wires {
		part := harmonics[h*c.nodes : (h+1)*c.nodes]
		for w := range c.wires {
			turn := turns[h*w%c.wires] / complex(float64(c.wires), 0)
			for i := range part {
				part[i] += turn * b[w*c.nodes+i]
			}
		}
		c.harmonics[min(h, c.wires-h)].solve(part)
	}
	clear(b)
	for h := range c.wires {
		for w := range c.wires {
			turn := cmplx.Conj(turns[h*w%c.wires])
			for i := range c.nodes {
				b[w*c.nodes+i] += turn * harmonics[h*c.nodes+i]
			}
		}
	}
}

// A border is the cage's part in an antenna's currents: what couples them, and what the cage's
// currents answer to each of the antenna's basis functions, both by rows of the antenna.
type border struct {
	cage              *cage
	coupling, answers *matrix
}

// border couples an antenna to the cage.
func (c *cage) border(k float64, antenna *mesh) *border {
	b := &border{cage: c, coupling: impedances(k, antenna, c.mesh, nil)}
	b.answers = newMatrix(b.coupling.rows, b.coupling.columns)
	parallel(b.answers.rows, func(i int) {
		copy(b.answers.row(i), b.coupling.row(i))
		c.solve(b.answers.row(i))
	})
	return b
}

// reduce takes from the antenna's symmetric matrix what the cage answers (its Schur complement).
func (b *border) reduce(z *matrix) {
	parallel(z.rows, func(i int) {
		row := z.row(i)
		for j := i; j < z.columns; j++ {
			row[j] -= dot(b.coupling.row(i), b.answers.row(j))
			z.data[j*z.columns+i] = row[j]
		}
	})
}

// currents returns the amplitudes on the cage for those on the antenna.
func (b *border) currents(antenna []complex128) []complex128 {
	sum := make([]complex128, b.answers.columns)
	for i, a := range antenna {
		for j, v := range b.answers.row(i) {
			sum[j] -= a * v
		}
	}
	return sum
}

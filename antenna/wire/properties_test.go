package wire

import (
	"math"
	"math/cmplx"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

// drawnStructure returns a star of two to four wires of different radii from one node, most of them
// bent at their ends, and a separate rod beside it, fed at the node: every kernel of the solver is
// in it.
func drawnStructure(t *rapid.T) Structure {
	metre := func(lo, hi float64, what string) float64 { return rapid.Float64Range(lo, hi).Draw(t, what) }
	arms := rapid.IntRange(2, 4).Draw(t, "arms")
	s := Structure{Feeds: []Feed{{1, 0}}}
	add := func(from, to vec, radiusM float64) {
		s.Wires = append(s.Wires, Wire{From: from, To: to, DiameterM: 2 * radiusM, Material: antenna.Materials()[rapid.IntRange(0, 5).Draw(t, "metal")]})
	}
	turn := metre(0, 1, "turn")
	for i := range arms {
		sin, cos := math.Sincos(turn + 2*math.Pi*float64(i)/float64(arms))
		sinEl, cosEl := math.Sincos(metre(-0.5, 0.5, "elevation"))
		tip := vec{cos * cosEl, sin * cosEl, sinEl}.times(metre(0.1, 0.4, "length"))
		radiusM := metre(1e-4, 3e-3, "radius")
		add(vec{}, tip, radiusM)
		add(tip, tip.plus(vec{0, 0, metre(0.05, 0.2, "bend")}), radiusM*metre(0.5, 2, "step"))
	}
	add(vec{1, metre(-0.3, 0.3, "y"), -0.2}, vec{1.1, 0.1, 0.3}, 1e-3)
	return s
}

// excitedDrawn solves a drawn structure, leaving out those that break a rule of the method.
func excitedDrawn(t *rapid.T, s Structure) (*Network, *Radiation) {
	n, err := s.Solve(testHz, 0)
	if err != nil {
		t.Skip(err)
	}
	r, err := n.Excite([]complex128{1})
	if err != nil {
		t.Fatal(err)
	}
	return n, r
}

// Source: reciprocity: the matrix is symmetric. Here all of it is filled, each half with the roles of
// observation and source exchanged. Tolerance: that of the two quadratures.
func TestMatrixIsSymmetric(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := newMesh(drawnStructure(t), testWavelengthM)
		same := *m
		z := impedances(2*math.Pi, m, &same, nil)
		largest, off := 0.0, 0.0
		for i := range z.rows {
			for j := range i {
				largest = max(largest, cmplx.Abs(z.row(i)[j]))
				off = max(off, cmplx.Abs(z.row(i)[j]-z.row(j)[i]))
			}
		}
		if off > 1e-4*largest {
			t.Errorf("matrix differs from its transpose by %.2g of its largest element", off/largest)
		}
	})
}

// Source: conservation of energy: what goes in is radiated or lost; and the directivity's mean over
// the sphere is 1, the gain's the efficiency. Two independent integrals, of the exact far field and
// of the interpolated one.
func TestPowerBalances(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		_, r := excitedDrawn(t, drawnStructure(t))
		if abs(r.Balance()-1) > 0.005 {
			t.Errorf("power balance %.4f, want 1 within 0.5 %%", r.Balance())
		}
		p := r.Pattern()
		if mean := p.MeanGain(); abs(mean-1) > 1e-3 {
			t.Errorf("mean directivity %.5f, want 1", mean)
		}
		if lossy := (r.InputW - r.LossW) / r.InputW; abs(lossy-r.Efficiency()) > 1e-12 {
			t.Errorf("efficiency %.6f, want %.6f", r.Efficiency(), lossy)
		}
	})
}

// turned returns a structure rotated about an axis and moved.
func (s Structure) turned(axis vec, angle float64, by vec) Structure {
	sin, cos := math.Sincos(angle)
	turn := func(p vec) vec {
		return p.times(cos).plus(axis.cross(p).times(sin)).plus(axis.times(axis.dot(p) * (1 - cos))).plus(by)
	}
	wires := make([]Wire, len(s.Wires))
	for i, w := range s.Wires {
		w.From, w.To = turn(w.From), turn(w.To)
		wires[i] = w
	}
	s.Wires = wires
	return s
}

// Source: space has no preferred place or direction. Tolerance: rounding, through a matrix of some
// thousands of condition.
func TestImpedanceIsInvariant(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawnStructure(t)
		n, r := excitedDrawn(t, s)
		coordinate := rapid.Float64Range(-1, 1)
		axis := vec{coordinate.Draw(t, "x"), coordinate.Draw(t, "y"), 1}.unit()
		moved := s.turned(axis, rapid.Float64Range(0, 6).Draw(t, "angle"), vec{3 * coordinate.Draw(t, "by x"), 7, -2})
		m, q := excitedDrawn(t, moved)
		if d := cmplx.Abs(m.TogetherOhm()/n.TogetherOhm() - 1); d > 1e-6 {
			t.Errorf("impedance %.6f ohm turns to %.6f", n.TogetherOhm(), m.TogetherOhm())
		}
		if abs(q.Pattern().PeakDBi-r.Pattern().PeakDBi) > 0.01 {
			t.Errorf("directivity %.4f dBi turns to %.4f", r.Pattern().PeakDBi, q.Pattern().PeakDBi)
		}
	})
}

// Source: a structure and its mirror image in the plane y = 0 have one impedance, and patterns that
// are each other's image: theta at the opposite azimuth, phi with its sign changed.
func TestMirrorImage(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawnStructure(t)
		n, r := excitedDrawn(t, s)
		mirrored := Structure{Feeds: s.Feeds}
		for _, w := range s.Wires {
			w.From[1], w.To[1] = -w.From[1], -w.To[1]
			mirrored.Wires = append(mirrored.Wires, w)
		}
		m, q := excitedDrawn(t, mirrored)
		if d := cmplx.Abs(m.TogetherOhm()/n.TogetherOhm() - 1); d > 1e-9 {
			t.Errorf("impedance %.6f ohm, its image %.6f", n.TogetherOhm(), m.TogetherOhm())
		}
		az, el := rapid.Float64Range(0, 360).Draw(t, "az"), rapid.Float64Range(-90, 90).Draw(t, "el")
		f, g := r.Field(antenna.Direction{AzDeg: az, ElDeg: el}), q.Field(antenna.Direction{AzDeg: -az, ElDeg: el})
		if cmplx.Abs(f.Theta-g.Theta)+cmplx.Abs(f.Phi+g.Phi) > 1e-6 {
			t.Errorf("field %v at azimuth %g, its image %v", f, az, g)
		}
	})
}

// Source: reciprocity of the ports, whatever lies between them.
func TestPortsAreReciprocal(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawnStructure(t)
		s.Feeds = []Feed{{1, 0}, {3, 0.4}, {len(s.Wires), 0.5}}
		n, err := s.Solve(testHz, 0)
		if err != nil {
			t.Skip(err)
		}
		z, err := n.ImpedanceOhm()
		if err != nil {
			t.Fatal(err)
		}
		for i := range z {
			for j := range i {
				if cmplx.Abs(z[i][j]-z[j][i]) > 1e-6*cmplx.Abs(z[i][i]) {
					t.Errorf("Z[%d][%d] = %.6f ohm, Z[%d][%d] = %.6f", i, j, z[i][j], j, i, z[j][i])
				}
			}
		}
		if real(z[0][0]) <= 0 {
			t.Errorf("resistance %.3g ohm of a passive port", real(z[0][0]))
		}
	})
}

// Source: scale invariance of lossless metal: all lengths twice, half the frequency.
func TestScale(t *testing.T) {
	s := Structure{Wires: []Wire{upright(0.48, 0.002), upright(0.5, 0.001).moved(vec{-0.2, 0, 0.05})}, Feeds: []Feed{{1, 0.3}}}
	double := s
	double.Wires = nil
	for _, w := range s.Wires {
		w.From, w.To, w.DiameterM = vec(w.From).times(2), vec(w.To).times(2), 2*w.DiameterM
		double.Wires = append(double.Wires, w)
	}
	n := network(t, s)
	m, err := double.Solve(testHz/2, 0)
	if err != nil {
		t.Fatal(err)
	}
	if cmplx.Abs(n.TogetherOhm()-m.TogetherOhm()) > 1e-6 {
		t.Errorf("impedance %.6f ohm, at half the frequency and twice the size %.6f", n.TogetherOhm(), m.TogetherOhm())
	}
}

// Each doubling of the segments of a thin wire changes less than the one before.
func TestConvergence(t *testing.T) {
	w := upright(0.47, 1e-4)
	z := func(segments int) complex128 {
		w.Segments = segments
		return network(t, Structure{Wires: []Wire{w}, Feeds: []Feed{{1, 0.5}}}).TogetherOhm()
	}
	first, second, third := z(10), z(20), z(40)
	if cmplx.Abs(third-second) > 0.7*cmplx.Abs(second-first) {
		t.Errorf("10, 20, 40 segments: %.3f, %.3f, %.3f ohm do not converge", first, second, third)
	}
	a := rodOf(t, 0.47, 1e-4, 0.5)
	refined, err := a.Refine(clearOfMasts())
	if err != nil {
		t.Fatal(err)
	}
	if refined.Segments != 40 || cmplx.Abs(refined.ImpedanceOhm-third) > 1e-9 || cmplx.Abs(refined.ChangeOhm-(third-second)) > 1e-9 {
		t.Errorf("refined to %+v, want 40 segments, %.4f ohm, changed by %.4f", refined, third, third-second)
	}
	thick := rodOf(t, 0.47, 0.0125, 0.5)
	if refined, err = thick.Refine(clearOfMasts()); err != nil || refined.Segments != 18 || refined.ChangeOhm != 0 {
		t.Errorf("a thick rod was refined: %+v, %v", refined, err)
	}
}

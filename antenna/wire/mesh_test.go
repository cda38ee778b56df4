package wire

import (
	"math"
	"math/cmplx"
	"slices"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

func meshOf(s Structure) *mesh { return newMesh(s, testWavelengthM) }

// star returns wires of radius 1 mm and length 0.2 wl from the origin, one along each unit vector;
// those of an odd index lead towards it.
func star(directions ...vec) Structure {
	s := Structure{Feeds: []Feed{{1, 0}}}
	for i, d := range directions {
		w := Wire{To: d.times(0.2), DiameterM: 0.002, Material: antenna.Ideal}
		if i%2 == 1 {
			w.From, w.To = w.To, w.From
		}
		s.Wires = append(s.Wires, w)
	}
	return s
}

// Source: topology: a node of n segment ends has n-1 basis functions, an open end none.
func TestBasisFunctionsAreCounted(t *testing.T) {
	x, y, z := vec{1, 0, 0}, vec{0, 1, 0}, vec{0, 0, 1}
	for _, tc := range []struct {
		name string
		s    Structure
		want int
	}{
		{"rod", Structure{Wires: []Wire{upright(0.5, 0.001)}, Feeds: middleFeed()}, 19},
		{"rod fed off its middle", Structure{Wires: []Wire{upright(0.5, 0.001)}, Feeds: []Feed{{1, 0.3}}}, 19},
		{"two arms", star(x, y), 2*7 + 1},
		{"three arms", star(x, y, z), 3*7 + 2},
		{"five arms", star(x, y, z, x.times(-1), y.times(-1)), 5*7 + 4},
		{"loop", looped(0.4, 0.1, 0.001, 0.001), 16 + 16 + 4 + 4},
		{"apart", Structure{Wires: []Wire{upright(0.5, 0.001), upright(0.5, 0.001).moved(x)}, Feeds: middleFeed()}, 38},
	} {
		if got := len(meshOf(tc.s).bases); got != tc.want {
			t.Errorf("%s: %d basis functions, want %d", tc.name, got, tc.want)
		}
	}
}

// Source: Kirchhoff: whatever the amplitudes, the currents into each node add to zero, and none flows
// at an open end.
func TestCurrentsAreConserved(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawnStructure(t)
		m := meshOf(s)
		amplitudes := make([]complex128, len(m.bases))
		for i := range amplitudes {
			amplitudes[i] = complex(rapid.Float64Range(-1, 1).Draw(t, "re"), math.Sin(float64(i)))
		}
		var places []vec
		var sums []complex128
		for i, currents := range m.currents(amplitudes) {
			r := &m.runs[i]
			for node, sign := range map[int]complex128{0: -1, r.count: 1} {
				at := slices.IndexFunc(places, func(p vec) bool { return p.apart(r.place(node)) < 1e-5 })
				if at < 0 {
					places, sums = append(places, r.place(node)), append(sums, 0)
					at = len(places) - 1
				}
				sums[at] += sign * currents[node]
			}
		}
		for i, sum := range sums {
			if cmplx.Abs(sum) > 1e-12 {
				t.Errorf("%v flows into the node at %v", sum, places[i])
			}
		}
	})
}

// A basis function alone is a current of one at its node, in the direction of its first segment.
func TestCurrentOfABasisFunction(t *testing.T) {
	m := meshOf(star(vec{1, 0, 0}, vec{0, 1, 0}, vec{0, 0, 1}))
	for i, b := range m.bases {
		amplitudes := make([]complex128, len(m.bases))
		amplitudes[i] = 1
		currents, sum := m.currents(amplitudes), 0.0
		for _, s := range b {
			if got := currents[s.run][s.segment+s.side]; got != complex(s.sign, 0) {
				t.Errorf("basis %d: current %v at %+v", i, got, s)
			}
		}
		for _, run := range currents {
			for _, c := range run {
				sum += cmplx.Abs(c)
			}
		}
		if within := b[0].run == b[1].run; (within && sum != 1) || (!within && sum != 2) {
			t.Errorf("basis %d: currents add to %g", i, sum)
		}
	}
}

// A gap at the end of a wire is in series with that wire, and all current through it counts: one in
// a star of three is in both basis functions if it is the first wire, else in one.
func TestPorts(t *testing.T) {
	s := star(vec{1, 0, 0}, vec{0, 1, 0}, vec{0, 0, 1})
	s.Feeds = []Feed{{1, 0}, {2, 1}, {3, 0.25}}
	m := meshOf(s)
	for i, want := range []int{2, 1, 1} {
		if len(m.ports[i]) != want {
			t.Errorf("port %d flows through %d basis functions, want %d", i+1, len(m.ports[i]), want)
		}
	}
	n := network(t, s)
	for i := range 3 {
		alone := Structure{Wires: s.Wires, Feeds: s.Feeds[i : i+1]}
		alone.Wires = Structure{Wires: s.Wires}.divided(m.segmentsOfWires(3)).Wires
		if y := network(t, alone).AdmittanceS[0][0]; i < 2 && cmplx.Abs(y-n.AdmittanceS[i][i]) > 0.05*cmplx.Abs(y) {
			t.Errorf("port %d: %.5f S among others shorted, alone %.5f", i+1, n.AdmittanceS[i][i], y)
		}
	}
}

// The feed's place does not depend on the order of the wires, nor on which way they lead, but for
// the sign of the current.
func TestOrderAndDirectionOfWires(t *testing.T) {
	s := star(vec{1, 0, 0}, vec{0, 1, 0}, vec{0, 0, 1}, vec{-0.6, -0.8, 0})
	want := network(t, s).TogetherOhm()
	reversed := Structure{}
	for i := len(s.Wires) - 1; i >= 0; i-- {
		w := s.Wires[i]
		w.From, w.To = w.To, w.From
		reversed.Wires = append(reversed.Wires, w)
	}
	reversed.Feeds = []Feed{{len(s.Wires), 1}}
	if got := network(t, reversed).TogetherOhm(); cmplx.Abs(got-want) > 1e-6*cmplx.Abs(want) {
		t.Errorf("%.6f ohm, with the wires the other way round %.6f", want, got)
	}
}

// Two pieces of wire in line are one wire: the feed at their joint, or inside.
func TestWireInTwoPieces(t *testing.T) {
	half := func(from, to float64) Wire {
		return Wire{From: [3]float64{0, 0, from}, To: [3]float64{0, 0, to}, DiameterM: 0.004, Material: antenna.Ideal, Segments: 10}
	}
	whole := dipoleImpedanceOhm(t, 0.47, 0.002, 0.5)
	for name, s := range map[string]Structure{
		"joint":         {Wires: []Wire{half(-0.235, 0), half(0, 0.235)}, Feeds: []Feed{{1, 1}}},
		"other side":    {Wires: []Wire{half(-0.235, 0), half(0, 0.235)}, Feeds: []Feed{{2, 0}}},
		"back to back":  {Wires: []Wire{half(0, -0.235), half(0, 0.235)}, Feeds: []Feed{{1, 0}}},
		"head to head":  {Wires: []Wire{half(-0.235, 0), half(0.235, 0)}, Feeds: []Feed{{2, 1}}},
		"upside down":   {Wires: []Wire{half(0.235, 0), half(0, -0.235)}, Feeds: []Feed{{1, 1}}},
		"nearly joined": {Wires: []Wire{half(-0.235, -5e-7), half(0, 0.235)}, Feeds: []Feed{{1, 1}}},
	} {
		if z := network(t, s).TogetherOhm(); cmplx.Abs(z-whole) > 0.01 {
			t.Errorf("%s: %.4f ohm, whole %.4f", name, z, whole)
		}
	}
}

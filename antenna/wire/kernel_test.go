package wire

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

func runOf(start, along vec, stepM, radiusM float64) *run {
	return &run{start: start, along: along.unit(), stepM: stepM, count: 1, radiusM: radiusM}
}

// Source: the near and the far quadrature are two ways to one integral, which must meet where the
// solver goes over from one to the other. Tolerance: the radius of wires in line is averaged in the
// near one
// and squared in the far one, which differs by the fourth power of radius over distance.
func TestNearAndFarMeet(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		angle := rapid.Float64Range(0, math.Pi).Draw(t, "angle")
		radiusM := rapid.Float64Range(1e-5, 5e-3).Draw(t, "radius")
		along := vec{math.Sin(angle), 0, math.Cos(angle)}
		if rapid.Bool().Draw(t, "in line") {
			along = vec{0, 0, 1}
		}
		toward := vec{rapid.Float64Range(-1, 1).Draw(t, "x"), rapid.Float64Range(-1, 1).Draw(t, "y"), 1}
		if along == (vec{0, 0, 1}) {
			toward = along
		}
		p := runOf(vec{}, vec{0, 0, 1}, 0.025, radiusM)
		q := runOf(toward.unit().times(0.066), along, 0.02, radiusM)
		x := newInteraction(2*math.Pi, p, q)
		offset := p.start.to(q.start)
		near, far := x.near(offset), x.far(offset, 4)
		for i := range near {
			for j := range near[i] {
				if d := cmplx.Abs(near[i][j] - far[i][j]); d > 5e-4*cmplx.Abs(near[i][j]) {
					t.Errorf("block[%d][%d]: near %v, far %v", i, j, near[i][j], far[i][j])
				}
			}
		}
	})
}

// Source: far blocks with fewer points against four.
func TestFarPoints(t *testing.T) {
	p, direction := runOf(vec{}, vec{0, 0, 1}, 0.05, 0.001), vec{1, 2, 0.5}.unit()
	for _, segments := range []float64{6.1, 9, 15.1, 40} {
		q := runOf(direction.times(0.05*segments), vec{1, 0, 1}, 0.05, 0.001)
		x := newInteraction(2*math.Pi, p, q)
		offset := p.start.to(q.start)
		fewer, four := x.far(offset, farPoints(segments)), x.far(offset, 4)
		for i := range four {
			for j := range four[i] {
				if d := cmplx.Abs(fewer[i][j] - four[i][j]); d > 2e-5*cmplx.Abs(four[i][j]) {
					t.Errorf("%g segments away: %d points give %v, 4 give %v", segments, farPoints(segments), fewer[i][j], four[i][j])
				}
			}
		}
	}
}

// Source: the inner integral by brute force: the midpoint rule with 200000 points.
func TestInnerIntegral(t *testing.T) {
	const k, d = 2 * math.Pi, 0.05
	x := newInteraction(k, runOf(vec{}, vec{0, 0, 1}, d, 1e-3), runOf(vec{}, vec{0, 0, 1}, d, 1e-3))
	for _, tc := range []struct{ z, h float64 }{{0.01, 1e-3}, {-0.02, 1e-4}, {0.05, 5e-4}, {0.07, 0.02}} {
		jc, js := x.inner(tc.z, tc.h)
		var wantC, wantS complex128
		const points = 200000
		for i := range points {
			s := d * (float64(i) + 0.5) / points
			r := math.Hypot(s-tc.z, tc.h)
			g := cmplx.Rect(d/points/r, -k*r)
			wantC += g * complex(math.Cos(k*s), 0)
			wantS += g * complex(math.Sin(k*s), 0)
		}
		if cmplx.Abs(jc-wantC) > 1e-6*cmplx.Abs(wantC) || cmplx.Abs(js-wantS) > 1e-6*cmplx.Abs(wantC) {
			t.Errorf("z = %g, h = %g: %v and %v, want %v and %v", tc.z, tc.h, jc, js, wantC, wantS)
		}
	}
}

// Source: the same integrals by the midpoint rule; both forms, for small kd and else, where they meet.
func TestSineIntegrals(t *testing.T) {
	for _, kd := range []float64{1e-4, 0.0199, 0.0201, 0.3, 1.2} {
		const k = 2 * math.Pi
		d := kd / k
		same, cross := sineIntegrals(k, d)
		wantSame, wantCross := 0.0, 0.0
		const points = 20000
		for i := range points {
			s := d * (float64(i) + 0.5) / points
			w0, w1 := math.Sin(k*(d-s))/math.Sin(kd), math.Sin(k*s)/math.Sin(kd)
			wantSame += w0 * w0 * d / points
			wantCross += w0 * w1 * d / points
		}
		near(t, "same, over d, kd "+format(kd), same/d, wantSame/d, 1e-7)
		near(t, "cross, over d, kd "+format(kd), cross/d, wantCross/d, 1e-7)
	}
}

// Runs in like positions share a table, others do not; and a table by offsets holds the blocks that
// each pair of segments would get.
func TestTables(t *testing.T) {
	wires := []Wire{upright(0.5, 0.001), upright(0.5, 0.001).moved(vec{0.2, 0, 0}), upright(0.5, 0.001).moved(vec{0.2, 0.2, 0}), upright(0.4, 0.001).moved(vec{0.4, 0.2, 0.1})}
	m := newMesh(Structure{Wires: wires, Feeds: []Feed{{1, 0.5}}}, testWavelengthM)
	all := tables(2*math.Pi, m, m)
	if all[0][1] != all[1][2] {
		t.Error("two pairs 0.2 wl apart have two tables")
	}
	if all[0][1] == all[0][2] || all[0][3] == all[2][3] || all[0][0] == all[0][1] {
		t.Error("pairs in different positions share a table")
	}
	for i := range m.runs {
		for j := i; j < len(m.runs); j++ {
			p, q := &m.runs[i], &m.runs[j]
			x := newInteraction(2*math.Pi, p, q)
			for a := range p.count {
				for b := range q.count {
					got, want := all[i][j].at(a, b), x.block(a, b)
					for n := range 4 {
						if d := cmplx.Abs(got[n/2][n%2] - want[n/2][n%2]); d > 1e-5*cmplx.Abs(want[n/2][n%2]) {
							t.Fatalf("runs %d and %d, segments %d and %d: %v, want %v", i, j, a, b, *got, want)
						}
					}
				}
			}
		}
	}
}

package wire

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func drawnVec(t *rapid.T, what string) vec {
	coordinate := rapid.Float64Range(-2, 2)
	return vec{coordinate.Draw(t, what+" x"), coordinate.Draw(t, what+" y"), coordinate.Draw(t, what+" z")}
}

// Source: the definition: no two points of the lines are nearer, and some are as near. The points are
// tried on a grid.
func TestLinesApart(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := line{drawnVec(t, "l from"), drawnVec(t, "l to")}
		m := line{drawnVec(t, "m from"), drawnVec(t, "m to")}
		if l.along().length() < 0.01 || m.along().length() < 0.01 {
			t.Skip("too short")
		}
		least := math.Inf(1)
		const steps = 200
		for i := range steps + 1 {
			p := l.at(float64(i) / steps)
			least = min(least, p.apart(m.at(m.nearest(p))))
		}
		got := l.apart(m)
		if got > least+1e-12 || got < least-l.along().length()/steps {
			t.Errorf("%v and %v are %g apart, the nearest points tried %g", l, m, got, least)
		}
		if back := m.apart(l); math.Abs(back-got) > 1e-9 {
			t.Errorf("%g one way, %g the other", got, back)
		}
	})
}

func TestLinesApartByHand(t *testing.T) {
	z := line{vec{0, 0, -1}, vec{0, 0, 1}}
	for _, tc := range []struct {
		name string
		m    line
		want float64
	}{
		{"crossing", line{vec{-1, 0, 0.3}, vec{1, 0, 0.3}}, 0},
		{"passing", line{vec{-1, 0.2, 0.3}, vec{1, 0.2, 0.3}}, 0.2},
		{"parallel", line{vec{0.5, 0, 0.2}, vec{0.5, 0, 3}}, 0.5},
		{"in line", line{vec{0, 0, 1.25}, vec{0, 0, 3}}, 0.25},
		{"overlapping", line{vec{0, 0, 0.5}, vec{0, 0, 3}}, 0},
		{"beyond the end", line{vec{-1, 0, 2}, vec{1, 0, 2}}, 1},
		{"end to end", line{vec{3, 0, 5}, vec{3, 4, 5}}, 5},
	} {
		near(t, tc.name, z.apart(tc.m), tc.want, 1e-12)
	}
}

func TestVectors(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b := drawnVec(t, "a"), drawnVec(t, "b")
		if b.length() < 0.1 {
			t.Skip("too short")
		}
		u := b.unit()
		c := a.cross(b)
		for what, zero := range map[string]float64{
			"unit":   u.length() - 1,
			"cross":  math.Abs(c.dot(a)) + math.Abs(c.dot(b)),
			"across": a.across(u).dot(u),
			"split":  a.across(u).plus(u.times(a.dot(u))).apart(a),
			"to":     a.plus(a.to(b)).apart(b),
		} {
			if math.Abs(zero) > 1e-12 {
				t.Errorf("%s: off by %g for %v and %v", what, zero, a, b)
			}
		}
	})
	for _, bad := range []vec{{math.NaN(), 0, 0}, {0, math.Inf(1), 0}, {0, 0, math.Inf(-1)}} {
		if bad.finite() {
			t.Errorf("%v is called finite", bad)
		}
	}
}

// The distance from a mast's surface, by hand: sideways, and from its end.
func TestMastGap(t *testing.T) {
	m := Mast{From: [3]float64{0, 0, -1}, To: [3]float64{0, 0, 1}, DiameterM: 0.4}
	for _, tc := range []struct {
		name string
		l    line
		want float64
	}{
		{"beside", line{vec{0.5, 0, -0.2}, vec{0.5, 0, 0.2}}, 0.3},
		{"inside", line{vec{0.1, 0, -0.2}, vec{0.1, 0, 0.2}}, -0.1},
		{"above", line{vec{0, 0, 1.05}, vec{0, 0, 2}}, 0.05},
		{"below", line{vec{0.1, 0, -1.3}, vec{-0.1, 0, -1.1}}, 0.1},
		{"through", line{vec{-1, 0, 0}, vec{1, 0, 0}}, -0.2},
		{"past the top", line{vec{0.5, 0, 0.9}, vec{0.5, 0, 1.9}}, 0.3},
	} {
		near(t, tc.name, m.gapM(tc.l), tc.want, 1e-12)
	}
}

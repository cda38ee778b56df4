package wire

import "math"

// A vec is a place in metres or a direction, along x (facing), y (left) and z (up).
type vec [3]float64

func (a vec) plus(b vec) vec      { return vec{a[0] + b[0], a[1] + b[1], a[2] + b[2]} }
func (a vec) minus(b vec) vec     { return vec{a[0] - b[0], a[1] - b[1], a[2] - b[2]} }
func (a vec) times(f float64) vec { return vec{f * a[0], f * a[1], f * a[2]} }
func (a vec) dot(b vec) float64   { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }
func (a vec) length() float64     { return math.Sqrt(a.dot(a)) }
func (a vec) unit() vec           { return a.times(1 / a.length()) }
func (a vec) to(b vec) vec        { return b.minus(a) }
func (a vec) across(unit vec) vec { return a.minus(unit.times(a.dot(unit))) }
func (a vec) apart(b vec) float64 { return a.to(b).length() }
func (a vec) finite() bool        { return !math.IsNaN(a.dot(a)) && !math.IsInf(a.dot(a), 0) }
func (a vec) cross(b vec) vec {
	return vec{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
}

// A line is a straight piece between two places.
type line struct{ from, to vec }

// at returns the place at a fraction of the line.
func (l line) at(fraction float64) vec { return l.from.plus(l.from.to(l.to).times(fraction)) }

func (l line) along() vec { return l.from.to(l.to) }

// nearest returns the fraction of the line at which it comes nearest to a place.
func (l line) nearest(p vec) float64 {
	along := l.along()
	return min(1, max(0, l.from.to(p).dot(along)/along.dot(along)))
}

// apart returns the shortest distance between two lines: that between their infinite extensions
// where it falls within both, else the least from an end of one to the other.
func (l line) apart(m line) float64 {
	least := math.Inf(1)
	for _, end := range []vec{l.from, l.to} {
		least = min(least, end.apart(m.at(m.nearest(end))))
	}
	for _, end := range []vec{m.from, m.to} {
		least = min(least, end.apart(l.at(l.nearest(end))))
	}
	u, v, w := l.along(), m.along(), m.from.to(l.from)
	a, b, c := u.dot(u), u.dot(v), v.dot(v)
	if det := a*c - b*b; det > 1e-12*a*c {
		s := (b*v.dot(w) - c*u.dot(w)) / det
		t := (a*v.dot(w) - b*u.dot(w)) / det
		if s >= 0 && s <= 1 && t >= 0 && t <= 1 {
			least = min(least, l.at(s).apart(m.at(t)))
		}
	}
	return least
}

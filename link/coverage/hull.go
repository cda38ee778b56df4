package coverage

import "math"

// A vertex is a point of a hull: distance, km, height, m, and the slope of the edge that leads to
// it from the vertex before, m/km.
type vertex struct{ d, y, slope float64 }

// A hull is the upper convex hull of points that come with growing distance: the slopes of its
// edges fall strictly.
type hull []vertex

// push adds a point. A vertex on the straight line between its neighbours is dropped.
func (h hull) push(d, y float64) hull {
	n := len(h)
	slope := math.Inf(1)
	for n > 0 {
		last := &h[n-1]
		slope = (y - last.y) / (d - last.d)
		if slope < last.slope {
			break
		}
		n--
	}
	return append(h[:n], vertex{d, y, slope})
}

// tangent returns the largest slope (y - q)/(at - d) of all points as seen from height q at the
// distance at beyond them, and the distance of the last point that has it; -Inf without points.
//
// An edge prolonged to the viewer passes him above or at q up to the vertex that he touches, and
// below from there on. Viewers next to each other touch nearly the same vertex, near the end.
func (h hull) tangent(at, q float64) (slope, touchKm float64) {
	n := len(h)
	if n == 0 {
		return math.Inf(-1), 0
	}
	above := func(k int) bool { return h[k].y+h[k].slope*(at-h[k].d) >= q }
	lo, hi := 0, n // above(lo), and not above(hi): true of the first vertex, whose slope is +Inf
	for stride := 1; ; stride *= 2 {
		k := n - stride
		if k <= 0 {
			break
		}
		if above(k) {
			lo = k
			break
		}
		hi = k
	}
	for hi-lo > 1 {
		if mid := (lo + hi) / 2; above(mid) {
			lo = mid
		} else {
			hi = mid
		}
	}
	v := &h[lo]
	return (v.y - q) / (at - v.d), v.d
}

// extreme returns the largest height of a point over a line through (0, y0) that rises by slope.
func (h hull) extreme(y0, slope float64) float64 {
	if len(h) == 0 {
		return math.Inf(-1)
	}
	lo, hi := 0, len(h) // edges up to lo rise over the line, from hi on they fall under it
	for hi-lo > 1 {
		if mid := (lo + hi) / 2; h[mid].slope > slope {
			lo = mid
		} else {
			hi = mid
		}
	}
	return h[lo].y - (y0 + slope*h[lo].d)
}

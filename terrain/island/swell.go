package island

// A point lies xM metres east and yM metres south of the grid's north-west corner.
type point struct{ xM, yM int64 }

// A swell is a smooth bump along a line: height on the line, nothing from reachM on.
type swell struct {
	height int64
	reachM int64
	line   []point
}

// sum adds up what the swells amount to at a place.
func sum(swells []swell, p point) int64 {
	total := int64(0)
	for _, s := range swells {
		total += s.at(p)
	}
	return total
}

// at returns height (1 - (d/reach)^2)^2, d being the distance to the line.
func (s swell) at(p point) int64 {
	nearest := s.reachM * s.reachM
	for i := range len(s.line) - 1 {
		nearest = min(nearest, squareTo(p, s.line[i], s.line[i+1]))
	}
	rest := 1024 - nearest<<10/(s.reachM*s.reachM)
	return s.height * rest * rest >> 20
}

// squareTo returns the squared distance in m^2 from p to the straight line between a and b.
func squareTo(p, a, b point) int64 {
	abx, aby, apx, apy := b.xM-a.xM, b.yM-a.yM, p.xM-a.xM, p.yM-a.yM
	t := min(max((abx*apx+aby*apy)<<10/(abx*abx+aby*aby), 0), 1024)
	dx, dy := apx-abx*t>>10, apy-aby*t>>10
	return dx*dx + dy*dy
}

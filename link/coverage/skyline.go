package coverage

import (
	"math"

	"fellreach/link/propagation"
)

// A sample is a point of a profile between its ends: distance, km, bare ground and ground with
// cover, m above sea level.
type sample struct{ d, bare, clad float64 }

// A skyline is what the points of a walk look like from the site and from beyond, on an Earth of
// one effective radius.
type skyline struct {
	drop float64 // 500 over the effective radius: m/km^2
	from float64 // height of the site's antenna, m above sea level

	steepest   float64 // the steepest sight line from the site, lifted, m/km
	steepestKm float64 // the first point on it
	hull       hull
	records    records
	guess      int // the record that was the tightest last time
}

func (s *skyline) start(radiusKm, fromM float64) {
	*s = skyline{drop: 500 / radiusKm, from: fromM, steepest: math.Inf(-1), hull: s.hull[:0], records: s.records[:0], guess: -1}
}

// lift lowers a height by the fall of the Earth under the tangent at the site.
func (s *skyline) lift(d, heightM float64) float64 { return heightM - s.drop*d*d }

func (s *skyline) push(d, heightM float64) {
	y := s.lift(d, heightM)
	if slope := (y - s.from) / d; slope > s.steepest {
		s.steepest, s.steepestKm = slope, d
		s.records = append(s.records, record{d, slope})
	}
	s.hull = s.hull.push(d, y)
}

func (s *skyline) copyFrom(o *skyline) {
	h, r := append(s.hull[:0], o.hull...), append(s.records[:0], o.records...)
	*s = *o
	s.hull, s.records = h, r
}

// height is that of the ground, or with what stands on it.
func (p *sample) height(clad bool) float64 {
	if clad {
		return p.clad
	}
	return p.bare
}

// ray is the slope of the line to an antenna, lifted, m/km.
func (s *skyline) ray(d, antennaM float64) float64 { return (s.lift(d, antennaM) - s.from) / d }

// fromSite returns the steepest sight line from the site, lifted, and the first point on it, with
// points beyond the walk added.
func (s *skyline) fromSite(own []sample, clad bool) (slope, km float64) {
	slope, km = s.steepest, s.steepestKm
	for i := range own {
		p := &own[i]
		if to := (s.lift(p.d, p.height(clad)) - s.from) / p.d; to > slope {
			slope, km = to, p.d
		}
	}
	return slope, km
}

// fromCell returns the steepest sight line from an antenna at d, lifted, and the last point on it.
func (s *skyline) fromCell(d, antennaM float64, own []sample, clad bool) (slope, km float64) {
	q := s.lift(d, antennaM)
	slope, km = s.hull.tangent(d, q)
	for i := range own {
		p := &own[i]
		if to := (s.lift(p.d, p.height(clad)) - q) / (d - p.d); to >= slope {
			slope, km = to, p.d
		}
	}
	return slope, km
}

// tightest returns the least [tightness] of all points under a free ray to the distance d, if below
// limit, and the point's distance.
func (s *skyline) tightest(ray, d, limit float64, own []sample, clad bool) (value, km float64) {
	value, index := s.records.tightest(ray, d, limit, s.guess)
	if index >= 0 {
		s.guess, km = index, s.records[index].d
	}
	for i := range own {
		p := &own[i]
		slope := (s.lift(p.d, p.height(clad)) - s.from) / p.d
		if f := tightness(p.d, slope, ray, d); f < value {
			value, km = f, p.d
		}
	}
	return value, km
}

// A sight is what both ends of a path see of a skyline: the steepest sight lines, lifted, and the
// points on them. That from the cell is only known where the ray is touched.
type sight struct {
	ray              float64
	fromSite, siteKm float64
	fromCell, cellKm float64
	touched          bool
}

// sight looks to and from an antenna at d.
func (s *skyline) sight(d, antennaM float64, own []sample, clad bool) (v sight) {
	v.ray = s.ray(d, antennaM)
	v.fromSite, v.siteKm = s.fromSite(own, clad)
	// Either form of the same comparison, whatever rounding makes of it.
	if v.touched = v.fromSite >= v.ray || v.fromSite+s.drop*d >= (antennaM-s.from)/d; v.touched {
		v.fromCell, v.cellKm = s.fromCell(d, antennaM, own, clad)
	}
	return v
}

// slopes returns Bullington's slopes for a sight to an antenna at d. On a free path tightnesses of
// limit and more count as endless clearance.
func (s *skyline) slopes(v sight, d, antennaM, limit float64, own []sample, clad bool) propagation.Slopes {
	rise := s.drop * d // what lifting takes off the slopes from the site, and adds to those from the cell
	out := propagation.Slopes{
		Stim: v.fromSite + rise, Str: (antennaM - s.from) / d, Srim: math.Inf(-1), Height: math.Inf(-1),
	}
	if out.Blocked() {
		out.Srim = v.fromCell - rise
		return out
	}
	if value, _ := s.tightest(v.ray, d, limit, own, clad); value < limit {
		out.Height = -math.Sqrt(value * d)
	}
	return out
}

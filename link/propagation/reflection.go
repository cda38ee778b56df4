package propagation

import (
	"math"
	"slices"

	"fellreach/terrain"
)

// A Reflection is where a clear path is mirrored by water or flat ground, and what that does to it:
// moved up or down, an antenna passes through nulls of the direct and the reflected ray.
type Reflection struct {
	// AtKm is the distance of the mirroring place from the first point of the path. Sea tells that
	// it is sea; other water counts as land.
	AtKm float64
	Sea  bool
	// NullDB is the depth of a null below the direct ray alone, dB, positive, up to 40: for antennas
	// that favour neither ray.
	NullDB float64
	// SpacingTxM and SpacingRxM are the heights from one null to the next for the antenna at
	// either end, while the other stays.
	SpacingTxM, SpacingRxM float64
}

// deepestNullDB is where scatter fills a null: common practice, no source.
const deepestNullDB = 40

// FindReflection returns the strongest reflection of a path, false when it has none or when a
// method would refuse the path. It is for a warning; no method counts it as loss.
//
// A reflection needs a line of sight that clears ground and cover by more than the first Fresnel
// radius. Around each point of the profile a straight line is fitted to the bare ground of the
// first Fresnel zone's footprint and bent to the median effective Earth radius; where it throws one
// antenna's ray into the other it is a mirror, when it is smooth by Rayleigh's criterion, cover
// counting as roughness, and both rays are free. The place is sought between the inner points of
// the profile, of which it takes two.
//
// Source: geometry, Fresnel's coefficients, Rayleigh's criterion, Ament's loss by roughness and
// the divergence of a sphere, as in Rec. ITU-R P.530-17, section ~6.1 (from memory). Fitting the
// footprint is this project's way.
func FindReflection(p Path) (Reflection, bool) {
	clearance, err := Clearance(p)
	if err != nil || clearance.WorstRatio <= 1 || len(p.DistKm) < 4 {
		return Reflection{}, false
	}
	var deepest Reflection
	m := newMirrors(&p)
	before := m.at(p.DistKm[1], p.AslM[1])
	for i := 2; i < len(p.DistKm)-1; i++ {
		here := m.at(p.DistKm[i], p.AslM[i])
		if (before.excess > 0) != (here.excess > 0) {
			t := before.excess / (before.excess - here.excess)
			x := before.x + t*(here.x-before.x)
			if r, ok := m.reflection(m.at(x, before.fitted+t*(here.fitted-before.fitted))); ok && r.NullDB > deepest.NullDB {
				deepest = r
			}
		}
		before = here
	}
	return deepest, deepest.NullDB > 0
}

// mirrors judges places of a path as mirrors. Distances are km, heights m above sea level or, where
// the Earth's bulge is added, above the chord; slopes are m/km.
type mirrors struct {
	*Path
	d, ae, lambda, hts, hrs float64
	sums                    []moments
}

// moments are the sums that a straight line is fitted by, over the points before one.
type moments struct{ x, y, xx, xy float64 }

func newMirrors(p *Path) mirrors {
	m := mirrors{
		Path: p, d: p.LengthKm(), ae: EffectiveEarthRadiusKm(p.DeltaN), lambda: WavelengthM(p.FreqHz),
		hts: p.txAslM(), hrs: p.rxAslM(), sums: make([]moments, len(p.DistKm)+1),
	}
	for i, x := range p.DistKm {
		s, y := m.sums[i], p.AslM[i]
		m.sums[i+1] = moments{s.x + x, s.y + y, s.xx + x*x, s.xy + x*y}
	}
	return m
}

// A mirror is a place of the path as a mirror.
type mirror struct {
	x           float64 // its distance
	fitted      float64 // height of the fitted surface there, above sea level
	slope       float64 // of the fitted line, before it is bent to the Earth
	excess      float64 // slope of the surface over that which would throw one ray into the other
	first, last int     // points of the footprint
}

// at fits the surface around x, where the ground is groundM high.
func (m *mirrors) at(x, groundM float64) mirror {
	r := mirror{x: x}
	r.first, r.last = m.footprint(x, groundM)
	r.fitted, r.slope = m.line(r.first, r.last, x)
	toTx, toRx := m.rises(x, r.fitted)
	r.excess = r.slope + 500*(m.d-2*x)/m.ae - (toRx-toTx)/2
	return r
}

// rises returns the slopes at which the antennas are seen from a height above sea level at x.
func (m *mirrors) rises(x, aslM float64) (toTx, toRx float64) {
	z := aslM + BulgeM(x, m.d-x, m.ae)
	return (m.hts - z) / x, (m.hrs - z) / (m.d - x)
}

// footprint returns the first and the last of the points, three at least, around x from which a
// mirror of the height groundM sends a ray by less than half a wavelength behind the reflected one.
//
// The antennas stand h1 and h2 above the plane that mirrors at x, whatever its tilt.
func (m *mirrors) footprint(x, groundM float64) (first, last int) {
	toTx, toRx := m.rises(x, groundM)
	d, psi := 1000*m.d, (toTx+toRx)/2000
	h1, h2 := psi*1000*x, psi*(d-1000*x)
	// h1^2/s + h2^2/(d-s) - (h1+h2)^2/d <= lambda, a parabola in s.
	c := m.lambda + psi*psi*d
	b := c*d + h1*h1 - h2*h2
	root := math.Sqrt(max(0, b*b-4*c*h1*h1*d))
	first, _ = slices.BinarySearch(m.DistKm, (b-root)/(2*c)/1000)
	last, _ = slices.BinarySearch(m.DistKm, (b+root)/(2*c)/1000)
	after, on := slices.BinarySearch(m.DistKm, x)
	before := after
	if !on {
		before--
	}
	return max(0, min(first, before-1)), min(len(m.DistKm)-1, max(last-1, after+1))
}

// line fits a straight line to the bare ground from point first to last and returns its height at x
// and its slope.
func (m *mirrors) line(first, last int, x float64) (height, slope float64) {
	a, b, n := m.sums[first], m.sums[last+1], float64(last+1-first)
	meanX, meanY := (b.x-a.x)/n, (b.y-a.y)/n
	slope = ((b.xy - a.xy) - n*meanX*meanY) / ((b.xx - a.xx) - n*meanX*meanX)
	return meanY + slope*(x-meanX), slope
}

// reflection returns what a mirror does, false when it is too rough or a ray is blocked.
func (m *mirrors) reflection(r mirror) (Reflection, bool) {
	toTx, toRx := m.rises(r.x, r.fitted)
	d, psi := 1000*m.d, (toTx+toRx)/2000
	sin := psi / math.Hypot(1, psi)
	sigma := m.roughnessM(r)
	if psi <= 0 || sigma > m.lambda/(8*sin) || !m.free(r) {
		return Reflection{}, false
	}
	h1, h2 := psi*1000*r.x, psi*(d-1000*r.x)
	sea := m.Zone[m.nearest(r.x)] == terrain.Sea
	direct, mirrored := math.Hypot(d, h1-h2), math.Hypot(d, h1+h2)
	g := 4 * math.Pi * sigma * sin / m.lambda
	strength := groundReflection(m.FreqHz, m.VerticalShare, sea, sin) *
		math.Exp(-g*g/2) / // Ament
		math.Sqrt(1+2*r.x*(m.d-r.x)/(m.ae*m.d*psi)) * // divergence
		direct / mirrored // the longer way
	return Reflection{
		AtKm: r.x, Sea: sea, NullDB: min(deepestNullDB, -20*math.Log10(1-strength)),
		SpacingTxM: m.lambda / ((h1+h2)/mirrored + (h2-h1)/direct), // lambda d/(2 h2) for flat rays
		SpacingRxM: m.lambda / ((h1+h2)/mirrored + (h1-h2)/direct),
	}, true
}

// roughnessM returns the standard deviation of ground and cover from the fitted surface over the
// footprint.
func (m *mirrors) roughnessM(r mirror) float64 {
	var sum float64
	for i := r.first; i <= r.last; i++ {
		off := m.AslM[i] + m.CoverM[i] - (r.fitted + r.slope*(m.DistKm[i]-r.x))
		sum += off * off
	}
	return math.Sqrt(sum / float64(r.last+1-r.first))
}

// free tells whether ground and cover outside the footprint leave both rays of a mirror free.
func (m *mirrors) free(r mirror) bool {
	toTx, toRx := m.rises(r.x, r.fitted)
	z := r.fitted + BulgeM(r.x, m.d-r.x, m.ae)
	for i := 1; i < len(m.DistKm)-1; i++ {
		if i >= r.first && i <= r.last {
			continue
		}
		x, rise := m.DistKm[i], toRx
		if x < r.x {
			rise = toTx
		}
		if m.AslM[i]+m.CoverM[i]+BulgeM(x, m.d-x, m.ae) > z+rise*math.Abs(x-r.x) {
			return false
		}
	}
	return true
}

// nearest returns the point of the profile nearest to x.
func (m *mirrors) nearest(x float64) int {
	i, _ := slices.BinarySearch(m.DistKm, x)
	if i > 0 && x-m.DistKm[i-1] < m.DistKm[i]-x {
		return i - 1
	}
	return i
}

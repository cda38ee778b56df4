package coverage

import (
	"math"

	"fellreach/link/propagation"
	"fellreach/terrain"
)

// statedProfile lays out the profile of a cell as the package defines it, point by point; ok is
// false where it is not known. It shares with the sweep where the ground is sampled and nothing
// else.
func (w *walk) statedProfile(index int) (p terrain.Profile, latDeg float64, ok bool) {
	s := w.sweep
	east, north := s.frame.Plane.At(float64(index%s.frame.Cols), float64(index/s.frame.Cols))
	if math.Hypot(east, north) < nearestM {
		east, north = 0, nearestM
	}
	distM := math.Hypot(east, north)
	n := interiorPoints(distM, s.stepM)
	p = terrain.Profile{DistKm: make([]float64, n+2), AslM: make([]float64, n+2), CoverM: make([]float64, n+2), Zone: make([]terrain.Zone, n+2)}
	w.start(s.radialOf(east, north))
	copy(p.AslM[:n+1], w.aslM)
	copy(p.CoverM[:n+1], w.coverM)
	copy(p.Zone[:n+1], w.zones)
	for i := range p.DistKm {
		p.DistKm[i] = float64(i) * s.stepKm
	}
	for i := w.known + 1; i <= n; i++ {
		p.AslM[i] = math.NaN()
	}
	own := min(s.ownPoints, n)
	first := n - own + 1
	aslM := make([]float64, own+1)
	s.disc.Sample(s.ownRay(own, distM, east/distM, north/distM), aslM, p.CoverM[first:], p.Zone[first:])
	p.DistKm[n+1], p.AslM[n+1] = distM/1000, aslM[own]
	for i, h := range aslM[:own] {
		p.DistKm[first+i] = distM/1000 - float64(own-i)*s.stepKm
		if at := s.index(p.DistKm[first+i]); math.IsNaN(h) && at <= w.known {
			h = w.aslM[at]
		}
		p.AslM[first+i] = h
	}
	for _, h := range p.AslM {
		if math.IsNaN(h) {
			return p, 0, false
		}
	}
	_, latDeg = s.disc.Places.At(east/2, north/2)
	return p.Cleared(s.ClearingM, 0), latDeg, true
}

// ownProfile lays out the profile of a cell as a link would take it: equal intervals of at most the
// step, on the cell's own bearing; ok is false where it is not known.
func (s *sweep) ownProfile(index int) (p terrain.Profile, latDeg float64, ok bool) {
	east, north := s.frame.Plane.At(float64(index%s.frame.Cols), float64(index/s.frame.Cols))
	distM := max(math.Hypot(east, north), nearestM)
	n := int(math.Ceil(distM / s.stepM))
	p = terrain.Profile{DistKm: make([]float64, n+1), AslM: make([]float64, n+1), CoverM: make([]float64, n+1), Zone: make([]terrain.Zone, n+1)}
	s.disc.Sample(terrain.Ray{StepEast: east / float64(n), StepNorth: north / float64(n)}, p.AslM, p.CoverM, p.Zone)
	p.AslM[0], p.Zone[0] = s.site.groundM, s.site.zone
	for i := range p.DistKm {
		p.DistKm[i] = distM / 1000 * float64(i) / float64(n)
	}
	if _, err := terrain.Bridge(p.DistKm, p.AslM, nil, nil, s.BridgeM); err != nil {
		return p, 0, false
	}
	_, latDeg = s.disc.Places.At(east/2, north/2)
	return p.Cleared(s.ClearingM, 0), latDeg, true
}

// path is the path over a profile, at the median of time and locations.
func (s *sweep) path(p terrain.Profile, latDeg, freqHz, verticalShare, n0 float64) propagation.Path {
	path := propagation.Path{
		Profile: p, FreqHz: freqHz, TxAglM: s.AglM, RxAglM: s.FarAglM, VerticalShare: verticalShare,
		DeltaN: s.DeltaN, N0: n0, TimePct: 50, LocationPct: 50, LatDeg: latDeg, TxCoastKm: noCoastKm, RxCoastKm: noCoastKm,
	}
	if first, last, ok := p.CoastKm(); ok {
		path.TxCoastKm, path.RxCoastKm = first, last
	}
	return path
}

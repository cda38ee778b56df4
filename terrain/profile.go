package terrain

import (
	"slices"

	"github.com/paulmach/orb"
)

// Zone is the radio-climatic zone of a profile point, by the codes of
// Rec. ITU-R P.1812: 1 sea, 3 coastal land, 4 inland.
type Zone uint8

// The zones of Rec. ITU-R P.1812.
const (
	Sea     Zone = 1
	Coastal Zone = 3
	Inland  Zone = 4
)

// A Profile is the ground under the geodesic between two places, first to last point.
//
// The slices are of equal length, at least 2; DistKm starts at 0 and increases strictly.
// AslM holds bare ground heights in metres above sea level, CoverM the height in metres of
// what stands on it, Zone the radio-climatic zone. Points (lon, lat in degrees, WGS 84) is nil
// for profiles that have no place on Earth, such as those read from a table.
type Profile struct {
	DistKm []float64
	AslM   []float64
	CoverM []float64
	Zone   []Zone
	Points []orb.Point

	// AzDeg is the azimuth of the geodesic at the first point towards the last, BackAzDeg that
	// at the last point towards the first, both clockwise from true north in [0, 360).
	AzDeg, BackAzDeg float64

	// Notes say what a reader of a result must know: bridged voids, unknown cover.
	Notes []string
}

// LengthKm returns the length of the profile.
func (p Profile) LengthKm() float64 { return p.DistKm[len(p.DistKm)-1] }

// Reversed returns the same profile seen from its other end.
func (p Profile) Reversed() Profile {
	r := p
	r.AslM, r.CoverM, r.Zone, r.Points = slices.Clone(p.AslM), slices.Clone(p.CoverM), slices.Clone(p.Zone), slices.Clone(p.Points)
	slices.Reverse(r.AslM)
	slices.Reverse(r.CoverM)
	slices.Reverse(r.Zone)
	slices.Reverse(r.Points)
	n, d := len(p.DistKm), p.LengthKm()
	r.DistKm = make([]float64, n)
	for i := range r.DistKm {
		r.DistKm[i] = d - p.DistKm[n-1-i]
	}
	r.DistKm[0], r.DistKm[n-1] = 0, d
	r.AzDeg, r.BackAzDeg = p.BackAzDeg, p.AzDeg
	return r
}

// Cleared returns the profile without cover nearer than firstM metres to its first point or
// lastM metres to its last. The end points never carry cover.
func (p Profile) Cleared(firstM, lastM float64) Profile {
	r := p
	r.CoverM = slices.Clone(p.CoverM)
	last := len(r.CoverM) - 1
	for i := range r.CoverM {
		if i == 0 || i == last || p.DistKm[i]*1000 < firstM || (p.LengthKm()-p.DistKm[i])*1000 < lastM {
			r.CoverM[i] = 0
		}
	}
	return r
}

// CoastKm returns the distances over land from the first and from the last point to the nearest
// sea along the profile, in km; ok is false where there is no sea.
func (p Profile) CoastKm() (first, last float64, ok bool) {
	for i := range p.Zone {
		if p.Zone[i] == Sea {
			if !ok {
				first = p.DistKm[i]
			}
			last, ok = p.LengthKm()-p.DistKm[i], true
		}
	}
	return first, last, ok
}

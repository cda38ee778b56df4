package link

import (
	"fellreach/link/propagation"
	"fellreach/terrain"
)

// A Section is the path of a link as a picture of the ground: from From to To, heights in metres
// above sea level in the frame of the chord.
type Section struct {
	Link    *Link
	Profile terrain.Profile // cover nearer than the ends' clearing left out
	// FromAglM and ToAglM are the heights above ground from which the path is seen: the antennas', or
	// the roofs' where buildings around an end are higher.
	FromAglM, ToAglM float64
	// RayM is the straight line between the antennas, BulgeM the rise of the Earth over the chord
	// at the median effective radius, Fresnel1M the radius of the first Fresnel zone, for each
	// point of the profile.
	RayM, BulgeM, Fresnel1M []float64
	Clearance               propagation.FresnelClearance
	Horizon                 Horizon
	FreqHz                  float64
	RadiusKm                float64 // median effective Earth radius
}

// A Horizon tells where the path leaves both ends: towards each other, or to the radio horizons.
type Horizon struct {
	TransHorizon               bool
	DepartureDeg, ArrivalDeg   float64 // elevation at From and at To
	FromHorizonKm, ToHorizonKm float64 // distance from each end of its horizon, or of the nearest obstacle
}

// Trace works out the section of a link over the ground p, given as to [Compute], at the mean of
// the channel's frequencies.
func Trace(l *Link, p terrain.Profile, c Conditions) (*Section, error) {
	w, err := newWay(l, p, c)
	if err != nil {
		return nil, err
	}
	path := w.path(l.Channel.CentreHz(), 1)
	found, err := propagation.FreeSpace.Loss(path)
	if err != nil {
		return nil, err
	}
	s := &Section{Link: l, FromAglM: l.From.pathAglM(), ToAglM: l.To.pathAglM(), FreqHz: path.FreqHz, RadiusKm: found.Terms.Ae}
	s.Profile, s.Clearance, err = w.seenFromFrom()
	if err != nil {
		return nil, err
	}
	s.Horizon = Horizon{found.TransHorizon, found.TxElDeg, found.RxElDeg, found.Terms.Dlt, found.Terms.Dlr}
	if w.first != l.From {
		s.Horizon = Horizon{found.TransHorizon, found.RxElDeg, found.TxElDeg, found.Terms.Dlr, found.Terms.Dlt}
	}
	s.draw()
	return s, nil
}

// draw fills in the lines of the picture.
func (s *Section) draw() {
	n, d := len(s.Profile.DistKm), s.Profile.LengthKm()
	s.RayM, s.BulgeM, s.Fresnel1M = make([]float64, n), make([]float64, n), make([]float64, n)
	from, to := s.Profile.AslM[0]+s.FromAglM, s.Profile.AslM[n-1]+s.ToAglM
	lambdaM := propagation.WavelengthM(s.FreqHz)
	for i, di := range s.Profile.DistKm {
		s.RayM[i] = (from*(d-di) + to*di) / d
		s.BulgeM[i] = propagation.BulgeM(di, d-di, s.RadiusKm)
		s.Fresnel1M[i] = propagation.FresnelRadiusM(1, lambdaM, di, d-di)
	}
}

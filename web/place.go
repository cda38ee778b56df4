package web

import (
	"context"
	"math"

	"fellreach/link/plan"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/danielgtaylor/huma/v2"
	"github.com/paulmach/orb"
)

// A placeInput names a place by its longitude and latitude, or as people write it.
type placeInput struct {
	Versioned
	Lon float64 `query:"lon" minimum:"-180" maximum:"180"`
	Lat float64 `query:"lat" minimum:"-90" maximum:"90"`
	At  string  `query:"at" maxLength:"200" doc:"the place in one of the notations of a plan, in place of lon and lat" example:"UTM 27N 591350 5250250"`
}

// A PlaceAnswer is a place in the three notations, with its ground.
type PlaceAnswer struct {
	PlaceText
	GroundM *float64 `json:"ground_m" doc:"above sea level; null where there is no height"`
	CoverM  *float64 `json:"cover_m" doc:"height of what stands there; null where the cover is not known"`
}

// A measureInput names two places.
type measureInput struct {
	FromLon float64 `query:"from_lon" required:"true" minimum:"-180" maximum:"180" example:"-20.1"`
	FromLat float64 `query:"from_lat" required:"true" minimum:"-90" maximum:"90" example:"47.5"`
	ToLon   float64 `query:"to_lon" required:"true" minimum:"-180" maximum:"180" example:"-20"`
	ToLat   float64 `query:"to_lat" required:"true" minimum:"-90" maximum:"90" example:"47.6"`
}

// A Measured way is the geodesic between two places.
type Measured struct {
	DistanceKm float64 `json:"distance_km"`
	AzimuthDeg float64 `json:"azimuth_deg" doc:"from true north, at the first place; 0 where both are the same"`
	BackAzDeg  float64 `json:"back_azimuth_deg"`
}

func (s *Server) registerPlace(api huma.API) {
	answer(api, readOperation("readPlace", "/api/place", "A place in the three notations, and its ground"), s.readPlace)
	answer(api, readOperation("measure", "/api/measure", "Distance and bearings between two places"), func(_ context.Context, in *measureInput) (Measured, error) {
		distM, azDeg, backAzDeg := raster.Inverse(orb.Point{in.FromLon, in.FromLat}, orb.Point{in.ToLon, in.ToLat})
		if distM == 0 {
			azDeg, backAzDeg = 0, 0
		}
		return Measured{distM / 1000, azDeg, backAzDeg}, nil
	})
}

func (s *Server) readPlace(_ context.Context, in *placeInput) (PlaceAnswer, error) {
	at := orb.Point{in.Lon, in.Lat}
	if in.At != "" {
		written, err := terrain.ParseCoordinates(in.At)
		if err != nil {
			return PlaceAnswer{}, err
		}
		if at, err = raster.Locate(written); err != nil {
			return PlaceAnswer{}, err
		}
	}
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return PlaceAnswer{}, err
	}
	defer s.shelf.release(v)
	return placeOn(v.network, at), nil
}

func placeOn(n *plan.Network, at orb.Point) PlaceAnswer {
	out := PlaceAnswer{PlaceText: placeText(at)}
	if level, err := n.Ground.HeightAslM(at); err == nil && !math.IsNaN(level) {
		out.GroundM = &level
	}
	if class, known, err := n.Ground.CoverAt(at); err == nil && known {
		out.CoverM = &class.HeightM
	}
	return out
}

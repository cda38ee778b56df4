package web

import (
	"context"
	"errors"

	"fellreach/antenna"
	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
)

// An AntennaInput asks for an antenna: of a station as it hangs there, or by itself.
type AntennaInput struct {
	Versioned
	Station      string  `query:"station" maxLength:"500" doc:"the antenna of this station, as installed" example:"Gauge 3"`
	Antenna      string  `query:"antenna" maxLength:"200" doc:"an antenna by its name in the plan, in place of a station"`
	Mast         bool    `query:"mast" default:"true" doc:"false leaves the station's mast out, to see what it does"`
	Channel      string  `query:"channel" maxLength:"200" doc:"a channel; that of the station's first link, or the plan's only one, when left out"`
	FrequencyHz  float64 `query:"frequency_hz" minimum:"0" maximum:"6e9" doc:"in place of the channel's"`
	OnMastM      float64 `query:"on_mast_m" minimum:"0" maximum:"10" doc:"diameter of a mast to put an antenna by its name beside"`
	StandoffM    float64 `query:"standoff_m" minimum:"0" maximum:"100" doc:"between the axes of that mast and the antenna"`
	SlantDeg     float64 `query:"slant_deg" minimum:"-180" maximum:"180" doc:"from upright, of an antenna by its name"`
	Curve        bool    `query:"curve" doc:"also find the VSWR over frequency"`
	AzimuthDeg   float64 `query:"azimuth_deg" minimum:"-360" maximum:"360" doc:"with toward=true: a direction to give the gain in"`
	ElevationDeg float64 `query:"elevation_deg" minimum:"-90" maximum:"90" doc:"with toward=true"`
	Toward       bool    `query:"toward" doc:"also give the gain towards azimuth_deg and elevation_deg"`
}

// An AntennaAnswer is what antenna --format json prints, and more. The azimuths of a station's
// antenna are true; those of an antenna by its name count from its facing.
type AntennaAnswer struct {
	report.Antenna
	Mount   MountAnswer `json:"mount"`
	Channel *[2]float64 `json:"channel_hz" doc:"the channel's edges; null where only a frequency is asked"`
	Curve   []VSWRPoint `json:"curve,omitempty" doc:"VSWR over frequency against the same reference, lengths fixed"`
}

// A MountAnswer is how the antenna is turned.
type MountAnswer struct {
	FacingDeg float64 `json:"facing_deg"`
	TiltDeg   float64 `json:"tilt_deg"`
	SlantDeg  float64 `json:"slant_deg"`
}

// A VSWRPoint is one of a curve.
type VSWRPoint struct {
	FrequencyHz float64 `json:"frequency_hz"`
	VSWR        float64 `json:"vswr"`
}

func (s *Server) registerAntenna(api huma.API) {
	answer(api, readOperation("readAntenna", "/api/antenna", "An antenna as installed: pattern, impedance, band, cut list"), func(_ context.Context, in *AntennaInput) (AntennaAnswer, error) {
		found, err := s.antenna(in)
		if err != nil {
			return AntennaAnswer{}, err
		}
		out := AntennaAnswer{Antenna: report.AntennaOf(found), Mount: MountAnswer{found.Mount.FacingDeg, found.Mount.TiltDeg, found.Mount.RollDeg}}
		if found.Channel[1] > 0 {
			out.Channel = &found.Channel
		}
		for _, p := range found.Curve {
			out.Curve = append(out.Curve, VSWRPoint{p.FreqHz, p.VSWR})
		}
		return out, nil
	})
}

func (s *Server) antenna(in *AntennaInput) (found *plan.AntennaResult, err error) {
	if (in.Station == "") == (in.Antenna == "") {
		return nil, errors.New("name a station or an antenna, one of the two")
	}
	if err := finite(in); err != nil {
		return nil, err
	}
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return nil, err
	}
	defer s.shelf.release(v)
	q := plan.AntennaQuery{
		Name: in.Antenna, Channel: in.Channel, FreqHz: in.FrequencyHz, MastDiameterM: in.OnMastM, StandoffM: in.StandoffM, SlantDeg: in.SlantDeg, Sweep: in.Curve,
	}
	if in.Station == "" {
		found, err = v.plan.Antenna(q)
	} else {
		var network *plan.Network
		if network, err = v.alone(); err == nil {
			q.Bare = !in.Mast
			found, err = network.InstalledAntenna(in.Station, q)
		}
	}
	if err == nil && in.Toward {
		found.Toward = &antenna.Direction{AzDeg: in.AzimuthDeg, ElDeg: in.ElevationDeg}
	}
	return found, err
}

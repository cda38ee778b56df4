package report

import (
	"encoding/csv"
	"encoding/json"
	"fmt"
	"io"

	"fellreach/link"

	"github.com/jedib0t/go-pretty/v6/table"
	"github.com/paulmach/orb"
	"github.com/paulmach/orb/geojson"
)

// Section is a path as JSON holds it: in full precision, horizon distances counted from each end,
// zones by the codes of Rec. ITU-R P.1812.
type Section struct {
	From       string             `json:"from"`
	To         string             `json:"to"`
	DistanceKm float64            `json:"distance_km"`
	AzimuthDeg float64            `json:"azimuth_deg"`
	BackAzDeg  float64            `json:"back_azimuth_deg"`
	StepM      float64            `json:"step_m"`
	Frequency  float64            `json:"frequency_hz"`
	RadiusKm   float64            `json:"effective_radius_km"`
	Points     []sectionPointJSON `json:"points"`
	Clearance  clearanceJSON      `json:"clearance"`
	Horizon    horizonJSON        `json:"horizon"`
	Warnings   []string           `json:"warnings"`
}

type sectionPointJSON struct {
	DKm       float64 `json:"d_km"`
	Lon       float64 `json:"lon"`
	Lat       float64 `json:"lat"`
	GroundM   float64 `json:"ground_m"`
	CoverM    float64 `json:"cover_m"`
	Zone      int     `json:"zone"`
	RayM      float64 `json:"ray_m"`
	BulgeM    float64 `json:"bulge_m"`
	Fresnel1M float64 `json:"fresnel1_m"`
}

type horizonJSON struct {
	TransHorizon bool    `json:"trans_horizon"`
	DepartureDeg float64 `json:"departure_deg"`
	ArrivalDeg   float64 `json:"arrival_deg"`
	FromKm       float64 `json:"from_km"`
	ToKm         float64 `json:"to_km"`
}

// SectionJSON writes a section as [SectionOf] gives it.
func SectionJSON(w io.Writer, s *link.Section) error { return indented(w, SectionOf(s)) }

// SectionOf returns a section as JSON holds it.
func SectionOf(s *link.Section) Section {
	p := s.Profile
	out := Section{
		From: s.Link.From.Name, To: s.Link.To.Name, DistanceKm: p.LengthKm(), AzimuthDeg: p.AzDeg, BackAzDeg: p.BackAzDeg, StepM: stepM(s),
		Frequency: s.FreqHz, RadiusKm: s.RadiusKm,
		Clearance: clearanceJSON{s.Clearance.WorstRatio, s.Clearance.AtKm, s.Clearance.NeededRatio},
		Horizon:   horizonJSON{s.Horizon.TransHorizon, s.Horizon.DepartureDeg, s.Horizon.ArrivalDeg, s.Horizon.FromHorizonKm, s.Horizon.ToHorizonKm},
		Warnings:  append([]string{}, p.Notes...),
	}
	for i := range p.DistKm {
		out.Points = append(out.Points, sectionPointJSON{p.DistKm[i], p.Points[i].Lon(), p.Points[i].Lat(), p.AslM[i], p.CoverM[i], int(p.Zone[i]), s.RayM[i], s.BulgeM[i], s.Fresnel1M[i]})
	}
	return out
}

func stepM(s *link.Section) float64 {
	return s.Profile.LengthKm() * 1000 / float64(len(s.Profile.DistKm)-1)
}

// SectionCSV writes the points of a section; its first four columns by themselves are a profile that the
// loss command reads.
func SectionCSV(w io.Writer, s *link.Section) error {
	out := csv.NewWriter(w)
	out.Write([]string{"d_km", "h_m", "R_m", "zone", "lon", "lat", "ray_m", "bulge_m", "fresnel1_m"})
	p := s.Profile
	for i := range p.DistKm {
		out.Write([]string{
			decimals(p.DistKm[i], 6), decimals(p.AslM[i], 3), decimals(p.CoverM[i], 2), fmt.Sprint(p.Zone[i]), decimals(p.Points[i].Lon(), 7), decimals(p.Points[i].Lat(), 7),
			decimals(s.RayM[i], 2), decimals(s.BulgeM[i], 2), decimals(s.Fresnel1M[i], 2),
		})
	}
	out.Flush()
	return out.Error()
}

// SectionGeoJSON writes the path as a line, its ends, its worst point and its horizons as points.
func SectionGeoJSON(w io.Writer, s *link.Section) error {
	all := geojson.NewFeatureCollection()
	add := func(g orb.Geometry, properties geojson.Properties) {
		f := geojson.NewFeature(g)
		f.Properties = properties
		all.Append(f)
	}
	p, last := s.Profile, len(s.Profile.Points)-1
	add(geodesicLine(p.Points), geojson.Properties{"kind": "path", "from": s.Link.From.Name, "to": s.Link.To.Name, "distance_km": decimal(p.LengthKm(), 3)})
	add(rounded(p.Points[0]), geojson.Properties{"kind": "end", "name": s.Link.From.Name, "ground_m": decimal(p.AslM[0], 1)})
	add(rounded(p.Points[last]), geojson.Properties{"kind": "end", "name": s.Link.To.Name, "ground_m": decimal(p.AslM[last], 1)})
	if i := s.Clearance.Index; i >= 0 {
		add(rounded(p.Points[i]), geojson.Properties{"kind": "worst point", "clearance_ratio": decimal(s.Clearance.WorstRatio, 3), "d_km": decimal(s.Clearance.AtKm, 3), "ground_m": decimal(p.AslM[i], 1)})
	}
	text, err := json.Marshal(all)
	if err != nil {
		return err
	}
	_, err = w.Write(append(text, '\n'))
	return err
}

// sectionRows is about how many points of a section a table for people shows.
const sectionRows = 24

// SectionTable writes what a person wants to know of a path, and some of its points: evenly
// spaced ones and the worst.
func SectionTable(w io.Writer, s *link.Section) error {
	p, last := s.Profile, len(s.Profile.DistKm)-1
	t := newTable("km", "ground m", "cover m", "bulge m", "ray m", "0.6 F1 m", "room m", "")
	every := max(1, last/sectionRows)
	for i := range p.DistKm {
		if i%every != 0 && i != last && i != s.Clearance.Index {
			continue
		}
		mark := ""
		if i == s.Clearance.Index {
			mark = "← worst"
		}
		room := s.RayM[i] - p.AslM[i] - p.CoverM[i] - s.BulgeM[i]
		t.AppendRow(table.Row{
			decimals(p.DistKm[i], 2), decimals(p.AslM[i], 1), decimals(p.CoverM[i], 0), decimals(s.BulgeM[i], 1), decimals(s.RayM[i], 1),
			decimals(0.6*s.Fresnel1M[i], 1), signed(room, 1), mark,
		})
	}
	t.right("km", "ground m", "cover m", "bulge m", "ray m", "0.6 F1 m", "room m")
	_, err := fmt.Fprintf(w, "%s\n\n%s\n", SectionSummary(s), t.Render())
	return err
}

// roofWords says where the path is seen from the roofs around an end rather than from its antenna.
func roofWords(s *link.Station, pathAglM float64) string {
	if pathAglM == s.AglM {
		return ""
	}
	return fmt.Sprintf("%s: the path is seen from the roofs around it, %s m above ground\n", s.Name, decimals(pathAglM, 1))
}

// SectionSummary says in a few lines how a path lies.
func SectionSummary(s *link.Section) string {
	p, last := s.Profile, len(s.Profile.DistKm)-1
	text := fmt.Sprintf("%s → %s: %s km at %s°, back %s°, %s MHz\n", s.Link.From.Name, s.Link.To.Name, decimals(p.LengthKm(), 2), azimuth(p.AzDeg), azimuth(p.BackAzDeg), decimals(s.FreqHz/1e6, 3))
	text += fmt.Sprintf("antennas at %s m and %s m above sea level, %s m and %s m above ground\n",
		decimals(p.AslM[0]+s.Link.From.AglM, 1), decimals(p.AslM[last]+s.Link.To.AglM, 1), decimals(s.Link.From.AglM, 1), decimals(s.Link.To.AglM, 1))
	text += roofWords(s.Link.From, s.FromAglM) + roofWords(s.Link.To, s.ToAglM)
	text += fmt.Sprintf("worst clearance %s of the first Fresnel radius at %s km (0.6 is wanted)\n", signed(s.Clearance.WorstRatio, 2), decimals(s.Clearance.AtKm, 2))
	if s.Horizon.TransHorizon {
		text += fmt.Sprintf("beyond the horizon: the path leaves at %s° over %s km, arrives at %s° over %s km", signed(s.Horizon.DepartureDeg, 2), decimals(s.Horizon.FromHorizonKm, 2), signed(s.Horizon.ArrivalDeg, 2), decimals(s.Horizon.ToHorizonKm, 2))
	} else {
		text += fmt.Sprintf("line of sight: the path leaves at %s° and arrives at %s°", signed(s.Horizon.DepartureDeg, 2), signed(s.Horizon.ArrivalDeg, 2))
	}
	for _, note := range p.Notes {
		text += "\nwarning: " + note
	}
	return text
}

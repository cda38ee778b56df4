package report

import (
	"encoding/json"
	"io"
	"math"
	"slices"

	"fellreach/link"
	"fellreach/link/plan"

	"github.com/paulmach/orb"
	"github.com/paulmach/orb/geojson"
)

// LinksGeoJSON writes links as geodesic lines and stations as points, by RFC 7946.
func LinksGeoJSON(w io.Writer, r *plan.Result) error {
	all := geojson.NewFeatureCollection()
	for _, s := range r.Stations {
		f := geojson.NewFeature(rounded(s.At))
		f.Properties = geojson.Properties{"kind": "station", "name": s.Name, "antenna": s.Antenna.Name, "above_ground_m": s.AglM}
		all.Append(f)
	}
	for _, l := range r.Links {
		all.Append(linkFeature(l))
	}
	text, err := json.Marshal(all)
	if err != nil {
		return err
	}
	_, err = w.Write(append(text, '\n'))
	return err
}

func linkFeature(l *link.Result) *geojson.Feature {
	f := geojson.NewFeature(geodesicLine(l.Profile.Points))
	f.Properties = geojson.Properties{
		"kind": "link", "name": l.Link.Title(), "from": l.Link.From.Name, "to": l.Link.To.Name, "channel": l.Link.Channel.Name,
		"verdict": string(l.Verdict), "margin_db": decimal(l.MarginDB, 2), "chance": decimal(l.ChancePct/100, 4), "distance_km": decimal(l.Profile.LengthKm(), 3),
		"azimuth_deg": decimal(l.Profile.AzDeg, 2), "back_azimuth_deg": decimal(l.Profile.BackAzDeg, 2),
	}
	return f
}

// A line of this many points follows a geodesic of some 100 km to well under a metre.
const linePoints = 33

// geodesicLine thins the points of a profile and cuts the line where it crosses the
// antimeridian, as RFC 7946 section 3.1.9 asks.
func geodesicLine(points []orb.Point) orb.Geometry {
	n := min(linePoints, len(points))
	lines, before := orb.MultiLineString{{}}, rounded(points[0])
	for i := range n {
		p := rounded(points[i*(len(points)-1)/(n-1)])
		if math.Abs(p.Lon()-before.Lon()) > 180 {
			here, there := crossing(before, p)
			lines[len(lines)-1] = append(lines[len(lines)-1], here)
			lines = append(lines, orb.LineString{there})
		}
		lines[len(lines)-1] = append(lines[len(lines)-1], p)
		before = p
	}
	for i := range lines { // a point on the antimeridian stands where the line is cut
		lines[i] = slices.Compact(lines[i])
	}
	lines = slices.DeleteFunc(lines, func(l orb.LineString) bool { return len(l) < 2 })
	if len(lines) == 1 {
		return lines[0]
	}
	return lines
}

// crossing returns where the line between two points on either side of the antimeridian meets it,
// as a point of each side.
func crossing(a, b orb.Point) (here, there orb.Point) {
	side := math.Copysign(180, a.Lon())
	span := 360 - math.Abs(b.Lon()-a.Lon())
	lat := a.Lat()
	if span > 0 {
		lat += (b.Lat() - a.Lat()) * (180 - math.Abs(a.Lon())) / span
	}
	return rounded(orb.Point{side, lat}), rounded(orb.Point{-side, lat})
}

// rounded gives a place seven decimals, a centimetre.
func rounded(p orb.Point) orb.Point { return orb.Point{decimal(p.Lon(), 7), decimal(p.Lat(), 7)} }

func decimal(x float64, count int) float64 {
	scale := math.Pow10(count)
	return math.Round(x*scale) / scale
}

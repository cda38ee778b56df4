package coverage

import (
	"encoding/json"
	"encoding/xml"
	"errors"
	"fmt"
	"math"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
	"github.com/paulmach/orb/geojson"
)

// A Track is a route: one or several lines of places, in degrees on WGS 84.
type Track []orb.LineString

// Limits of a track.
const (
	maxTrackBytes  = 64 << 20
	maxTrackPlaces = 50_000
)

// ParseTrack reads a route from GeoJSON (line strings, as geometries or features) or GPX (tracks and
// routes). Text that holds no line of at least two places, and places that are none on Earth, are
// errors.
func ParseTrack(data []byte) (Track, error) {
	if len(data) > maxTrackBytes {
		return nil, fmt.Errorf("the track has %d MB, at most %d are taken", len(data)>>20, maxTrackBytes>>20)
	}
	var track Track
	var err error
	if isJSON(data) {
		track, err = parseTrackJSON(data)
	} else {
		track, err = parseGPX(data)
	}
	if err != nil {
		return nil, err
	}
	return track.checked()
}

func isJSON(data []byte) bool {
	for _, b := range data {
		switch b {
		case ' ', '\t', '\r', '\n', 0xef, 0xbb, 0xbf:
		default:
			return b == '{'
		}
	}
	return false
}

// checked leaves out lines of fewer than two places.
func (t Track) checked() (Track, error) {
	var lines Track
	for _, line := range t {
		for i, p := range line {
			if !(math.Abs(p.Lat()) <= 90 && math.Abs(p.Lon()) <= 180) {
				return nil, fmt.Errorf("place %d of the track, longitude %g, latitude %g, is none on Earth", i+1, p.Lon(), p.Lat())
			}
		}
		if len(line) >= 2 {
			lines = append(lines, line)
		}
	}
	if len(lines) == 0 {
		return nil, errors.New("the track holds no line: a GeoJSON LineString or a GPX track or route of two places or more is needed")
	}
	return lines, nil
}

func parseTrackJSON(data []byte) (Track, error) {
	var head struct {
		Type string `json:"type"`
	}
	if err := json.Unmarshal(data, &head); err != nil {
		return nil, fmt.Errorf("the track is no GeoJSON: %w", err)
	}
	var geometries []orb.Geometry
	switch head.Type {
	case "FeatureCollection":
		all, err := geojson.UnmarshalFeatureCollection(data)
		if err != nil {
			return nil, fmt.Errorf("the track is no GeoJSON: %w", err)
		}
		for _, f := range all.Features {
			geometries = append(geometries, f.Geometry)
		}
	case "Feature":
		f, err := geojson.UnmarshalFeature(data)
		if err != nil {
			return nil, fmt.Errorf("the track is no GeoJSON: %w", err)
		}
		geometries = append(geometries, f.Geometry)
	default:
		g, err := geojson.UnmarshalGeometry(data)
		if err != nil {
			return nil, fmt.Errorf("the track is no GeoJSON: %w", err)
		}
		geometries = append(geometries, g.Geometry())
	}
	return linesOf(geometries), nil
}

func linesOf(geometries []orb.Geometry) (t Track) {
	for _, g := range geometries {
		switch g := g.(type) {
		case orb.LineString:
			t = append(t, g)
		case orb.MultiLineString:
			t = append(t, g...)
		case orb.Collection:
			t = append(t, linesOf(g)...)
		}
	}
	return t
}

type gpxPlace struct {
	Lat float64 `xml:"lat,attr"`
	Lon float64 `xml:"lon,attr"`
}

func parseGPX(data []byte) (Track, error) {
	var file struct {
		XMLName  xml.Name `xml:"gpx"`
		Segments []struct {
			Places []gpxPlace `xml:"trkpt"`
		} `xml:"trk>trkseg"`
		Routes []struct {
			Places []gpxPlace `xml:"rtept"`
		} `xml:"rte"`
	}
	if err := xml.Unmarshal(data, &file); err != nil {
		return nil, fmt.Errorf("the track is neither GeoJSON nor GPX: %w", err)
	}
	var t Track
	line := func(places []gpxPlace) {
		var l orb.LineString
		for _, p := range places {
			l = append(l, orb.Point{p.Lon, p.Lat})
		}
		t = append(t, l)
	}
	for _, s := range file.Segments {
		line(s.Places)
	}
	for _, r := range file.Routes {
		line(r.Places)
	}
	return t, nil
}

// A Stop is a place on a track.
type Stop struct {
	At    orb.Point
	DistM float64 // along the track; gaps between its lines count nothing
	First bool    // a line begins here
}

// Stops walks the track along geodesics and stops every stepM metres, and at the ends of its lines.
func (t Track) Stops(stepM float64) ([]Stop, error) {
	var stops []Stop
	travelled := 0.0
	for _, line := range t {
		stops = append(stops, Stop{line[0], travelled, true})
		toNext := stepM
		for i := 1; i < len(line); i++ {
			legM, azDeg, _ := raster.Inverse(line[i-1], line[i])
			for toNext <= legM {
				stops = append(stops, Stop{raster.Direct(line[i-1], azDeg, toNext), travelled + toNext, false})
				if len(stops) > maxTrackPlaces {
					return nil, fmt.Errorf("steps of %g m make more than %d places of the track: take longer ones", stepM, maxTrackPlaces)
				}
				toNext += stepM
			}
			travelled, toNext = travelled+legM, toNext-legM
		}
		if last := stops[len(stops)-1]; travelled-last.DistM > 1 {
			stops = append(stops, Stop{line[len(line)-1], travelled, false})
		}
	}
	return stops, nil
}

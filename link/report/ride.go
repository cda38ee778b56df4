package report

import (
	"encoding/csv"
	"encoding/json"
	"fmt"
	"html"
	"io"
	"math"
	"strings"

	"fellreach/link/coverage"

	"github.com/paulmach/orb/geojson"
)

// RideCSV writes one row for each stop of a track; a margin that is not known is empty.
func RideCSV(w io.Writer, r *coverage.Ride) error {
	out := csv.NewWriter(w)
	head := []string{"distance_m", "lon", "lat", "best_margin_db"}
	for _, name := range r.Sites {
		head = append(head, "margin_db "+name)
	}
	out.Write(head)
	for i, s := range r.Stops {
		row := []string{decimals(s.DistM, 1), decimals(s.At.Lon(), 7), decimals(s.At.Lat(), 7), known(r.BestDB[i])}
		for k := range r.Sites {
			row = append(row, known(r.MarginDB[k][i]))
		}
		out.Write(row)
	}
	out.Flush()
	return out.Error()
}

func known(marginDB float64) string {
	if math.IsNaN(marginDB) {
		return ""
	}
	return decimals(marginDB, 2)
}

// RideGeoJSON writes the stops of a track as points, by RFC 7946; a margin that is not known is
// null.
func RideGeoJSON(w io.Writer, r *coverage.Ride) error {
	all := geojson.NewFeatureCollection()
	for i, s := range r.Stops {
		f := geojson.NewFeature(rounded(s.At))
		f.Properties = geojson.Properties{"distance_m": decimal(s.DistM, 1), "margin_db": nil, "closes": r.BestDB[i] >= r.AimDB}
		if !math.IsNaN(r.BestDB[i]) {
			f.Properties["margin_db"] = decimal(r.BestDB[i], 2)
		}
		all.Append(f)
	}
	text, err := json.Marshal(all)
	if err != nil {
		return err
	}
	_, err = w.Write(append(text, '\n'))
	return err
}

// RideSummary says in one line how a track is served.
func RideSummary(r *coverage.Ride) string {
	gapM, fromM := r.LongestGapM()
	text := fmt.Sprintf("%s of %s km closes with %g dB", percent(100*r.ClosesShare()), decimals(r.Stops[len(r.Stops)-1].DistM/1000, 2), r.AimDB)
	if gapM > 0 {
		text += fmt.Sprintf("; longest gap %s km, from %s km on", decimals(gapM/1000, 2), decimals(fromM/1000, 2))
	}
	return text
}

// RideSVG draws the best margin along a track with the aim: solid where it closes, dots where it
// does not.
func RideSVG(w io.Writer, r *coverage.Ride) error {
	d := newRideDrawing(r)
	d.frame()
	d.margins()
	d.f("</svg>\n")
	_, err := io.WriteString(w, d.String())
	return err
}

type rideDrawing struct {
	strings.Builder
	*coverage.Ride
	lowDB, highDB, lengthKm float64
}

func (d *rideDrawing) f(format string, args ...any) { fmt.Fprintf(&d.Builder, format, args...) }

func newRideDrawing(r *coverage.Ride) *rideDrawing {
	d := &rideDrawing{Ride: r, lowDB: min(0, r.AimDB), highDB: max(10, r.AimDB+10), lengthKm: r.Stops[len(r.Stops)-1].DistM / 1000}
	for _, m := range r.BestDB {
		if !math.IsNaN(m) {
			d.lowDB, d.highDB = min(d.lowDB, m), max(d.highDB, m)
		}
	}
	step := tickStep(d.highDB - d.lowDB)
	d.lowDB, d.highDB = math.Floor(d.lowDB/step)*step, math.Ceil(d.highDB/step)*step
	return d
}

func (d *rideDrawing) x(km float64) float64 { return svgLeft + plotWidth*km/max(d.lengthKm, 1e-9) }
func (d *rideDrawing) y(dB float64) float64 {
	return svgTop + plotHeight*(d.highDB-dB)/(d.highDB-d.lowDB)
}

func (d *rideDrawing) frame() {
	d.f(`<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 %d %d" font-family="system-ui, 'DejaVu Sans', sans-serif" font-size="13" role="img">`+"\n", svgWidth, svgHeight)
	title, summary := "Margin along the track: "+strings.Join(d.Sites, ", "), RideSummary(d.Ride)
	d.f("<title>%s</title>\n<desc>%s</desc>\n", html.EscapeString(title), html.EscapeString(summary))
	d.f(`<rect width="%d" height="%d" fill="#ffffff"/>`+"\n", svgWidth, svgHeight)
	d.f(`<text x="%d" y="22" font-size="16" font-weight="600" fill="%s">%s</text>`+"\n", svgLeft, inkText, html.EscapeString(title))
	d.f(`<text x="%d" y="41" fill="%s">%s</text>`+"\n", svgLeft, inkQuiet, html.EscapeString(summary))
	for _, dB := range ticks(d.lowDB, d.highDB) {
		d.f(`<path d="M%d %.1fH%d" stroke="%s"/><text x="%d" y="%.1f" text-anchor="end" fill="%s">%g</text>`+"\n", svgLeft, d.y(dB), svgWidth-svgRight, inkGrid, svgLeft-8, d.y(dB)+4, inkQuiet, dB)
	}
	for _, km := range ticks(0, d.lengthKm) {
		d.f(`<text x="%.1f" y="%d" text-anchor="middle" fill="%s">%g</text>`+"\n", d.x(km), svgHeight-svgBottom+18, inkQuiet, km)
	}
	d.f(`<path d="M%d %.1fH%d" stroke="%s" stroke-dasharray="8 5"/><text x="%d" y="%.1f" text-anchor="end" fill="%s">aim</text>`+"\n", svgLeft, d.y(d.AimDB), svgWidth-svgRight, inkZone, svgWidth-svgRight, d.y(d.AimDB)-5, inkQuiet)
	d.f(`<text x="%d" y="%d" fill="%s">dB</text>`+"\n", svgLeft-22, svgTop-8, inkQuiet)
	d.f(`<text x="%d" y="%d" text-anchor="end" fill="%s">km</text>`+"\n", svgWidth-svgRight, svgHeight-10, inkQuiet)
}

// margins draws the track in runs of stretches that close, from stop to stop, and that do not.
func (d *rideDrawing) margins() {
	var path string
	var last stretch
	end := func() {
		stroke := fmt.Sprintf(`stroke="%s" stroke-width="2"`, inkRay)
		if last == failing {
			stroke = fmt.Sprintf(`stroke="%s" stroke-width="2" stroke-dasharray="2 4"`, bad)
		}
		if last != unknown {
			d.f(`<path d="%s" fill="none" %s/>`+"\n", path, stroke)
		}
	}
	for i := 1; i < len(d.Stops); i++ {
		now := d.stretch(i)
		if now != last {
			end()
			path, last = fmt.Sprintf("M%.1f %.1f", d.x(d.Stops[i-1].DistM/1000), d.y(d.BestDB[i-1])), now
		}
		path += fmt.Sprintf("L%.1f %.1f", d.x(d.Stops[i].DistM/1000), d.y(d.BestDB[i]))
	}
	end()
}

// A stretch is what the way between two stops is like.
type stretch int

const (
	unknown stretch = iota
	closing
	failing
)

// stretch is that before a stop.
func (d *rideDrawing) stretch(i int) stretch {
	a, b := d.BestDB[i-1], d.BestDB[i]
	switch {
	case d.Stops[i].First || math.IsNaN(a) || math.IsNaN(b):
		return unknown
	case a >= d.AimDB && b >= d.AimDB:
		return closing
	}
	return failing
}

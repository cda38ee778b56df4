package report

import (
	"fmt"
	"html"
	"io"
	"math"
	"strings"

	"fellreach/antenna"
	"fellreach/link/plan"
)

// The polar picture shows gain down to rangeDB below the outer ring.
const (
	polarRadius = 190.0
	rangeDB     = 40.0
)

// PatternSVG draws two cuts of an antenna as installed: around the horizon, and in the vertical
// plane through its facing. Both polarizations are drawn, the vertical one as a solid line.
func PatternSVG(w io.Writer, a *plan.AntennaResult) error {
	var b strings.Builder
	outer := 5 * math.Ceil(a.GainDBi/5)
	fmt.Fprintf(&b, `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 960 520" font-family="system-ui, 'DejaVu Sans', sans-serif" font-size="13" role="img">`+"\n")
	fmt.Fprintf(&b, "<title>%s at %s MHz</title>\n<rect width=\"960\" height=\"520\" fill=\"#ffffff\"/>\n", html.EscapeString(a.Name), decimals(a.FreqHz/1e6, 3))
	fmt.Fprintf(&b, `<text x="30" y="30" font-size="16" font-weight="600" fill="%s">%s at %s MHz%s</text>`+"\n", inkText, html.EscapeString(a.Name), decimals(a.FreqHz/1e6, 3), html.EscapeString(a.Where))
	horizon := polar{&b, 250, 280, outer, a}
	horizon.draw("around the horizon, 0° is the facing", func(deg float64) antenna.Direction { return antenna.Direction{AzDeg: deg} }, compassPoint)
	upright := polar{&b, 710, 280, outer, a}
	upright.draw("upright through the facing", func(deg float64) antenna.Direction { return overhead(deg) }, risingPoint)
	fmt.Fprintf(&b, `<g fill="%s"><path d="M30 502h26" stroke="%s" stroke-width="2"/><text x="62" y="506">vertical</text>`, inkQuiet, inkRay)
	fmt.Fprintf(&b, `<path d="M140 502h26" stroke="%s" stroke-width="2" stroke-dasharray="6 3"/><text x="172" y="506">horizontal</text><text x="930" y="506" text-anchor="end">gain in dBi, conductor loss included, no mismatch</text></g>`+"\n</svg>\n", inkZone)
	_, err := io.WriteString(w, b.String())
	return err
}

// overhead runs from the facing (0) over the zenith (90) to the back (180) and on below.
func overhead(deg float64) antenna.Direction {
	if el := math.Mod(deg+360, 360); el <= 90 {
		return antenna.Direction{ElDeg: el}
	} else if el < 270 {
		return antenna.Direction{AzDeg: 180, ElDeg: 180 - el}
	} else {
		return antenna.Direction{ElDeg: el - 360}
	}
}

// compassPoint puts 0 at the top and goes clockwise; risingPoint puts 0 at the right and goes up.
func compassPoint(deg, r float64) (x, y float64) {
	sin, cos := math.Sincos(deg * math.Pi / 180)
	return r * sin, -r * cos
}

func risingPoint(deg, r float64) (x, y float64) {
	sin, cos := math.Sincos(deg * math.Pi / 180)
	return r * cos, -r * sin
}

type polar struct {
	b       *strings.Builder
	x, y    float64 // of the centre
	outer   float64 // dBi of the outer ring
	antenna *plan.AntennaResult
}

func (p polar) draw(title string, direction func(deg float64) antenna.Direction, place func(deg, r float64) (x, y float64)) {
	fmt.Fprintf(p.b, `<g transform="translate(%.0f,%.0f)"><text y="%.0f" text-anchor="middle" fill="%s">%s</text>`+"\n", p.x, p.y, -polarRadius-28, inkQuiet, title)
	for down := 0.0; down < rangeDB; down += 10 {
		r := p.radius(p.outer - down)
		fmt.Fprintf(p.b, `<circle r="%.1f" fill="none" stroke="%s"/><text x="3" y="%.1f" font-size="11" fill="%s">%g</text>`+"\n", r, inkGrid, -r+12, inkQuiet, p.outer-down)
	}
	for deg := 0.0; deg < 360; deg += 30 {
		x, y := place(deg, polarRadius)
		tx, ty := place(deg, polarRadius+13)
		fmt.Fprintf(p.b, `<path d="M0 0L%.1f %.1f" stroke="%s"/><text x="%.1f" y="%.1f" text-anchor="middle" font-size="11" fill="%s">%g</text>`+"\n", x, y, inkGrid, tx, ty+4, inkQuiet, deg)
	}
	p.curve(direction, place, func(g gains) float64 { return g.h }, `stroke="`+inkZone+`" stroke-dasharray="6 3"`)
	p.curve(direction, place, func(g gains) float64 { return g.v }, `stroke="`+inkRay+`"`)
	p.b.WriteString("</g>\n")
}

func (p polar) radius(dBi float64) float64 {
	return polarRadius * max(0, 1+(dBi-p.outer)/rangeDB)
}

func (p polar) curve(direction func(deg float64) antenna.Direction, place func(deg, r float64) (x, y float64), of func(gains) float64, stroke string) {
	var d strings.Builder
	for deg := 0; deg < 360; deg++ {
		x, y := place(float64(deg), p.radius(of(gainsOf(p.antenna, direction(float64(deg))))))
		command := "L"
		if deg == 0 {
			command = "M"
		}
		fmt.Fprintf(&d, "%s%.1f %.1f", command, x, y)
	}
	fmt.Fprintf(p.b, `<path d="%sZ" fill="none" stroke-width="2" %s/>`+"\n", d.String(), stroke)
}

package report

import (
	"fmt"
	"html"
	"io"
	"math"
	"strings"

	"fellreach/link"
	"fellreach/terrain"
)

// The picture of a section: the ground stands on the Earth's bulge, so that the ray is straight.
const (
	svgWidth, svgHeight             = 1000, 380
	svgLeft, svgRight               = 62, 24
	svgTop, svgBottom               = 58, 46
	plotWidth                       = svgWidth - svgLeft - svgRight
	plotHeight                      = svgHeight - svgTop - svgBottom
	inkGround, inkCover, inkSea     = "#b8a88a", "#7d9471", "#7ba6bd"
	inkBulge, inkRay, inkZone       = "#8a8378", "#1d3a4f", "#c98a2b"
	inkText, inkQuiet, inkGrid, bad = "#222222", "#5c5c5c", "#dddad2", "#a3302a"
)

// SectionSVG draws a section: ground on the Earth's bulge, cover, the ray, 0.6 of the first
// Fresnel zone around it and the worst point.
func SectionSVG(w io.Writer, s *link.Section) error {
	d := newDrawing(s)
	d.frame()
	d.ground()
	d.ray()
	d.ends()
	d.worst()
	d.f("</svg>\n")
	_, err := io.WriteString(w, d.String())
	return err
}

type drawing struct {
	strings.Builder
	*link.Section
	lowM, highM float64 // of the picture
}

func (d *drawing) f(format string, args ...any) { fmt.Fprintf(&d.Builder, format, args...) }

func newDrawing(s *link.Section) *drawing {
	d := &drawing{Section: s, lowM: math.Inf(1), highM: math.Inf(-1)}
	for i := range s.RayM {
		d.lowM = min(d.lowM, s.Profile.AslM[i]+s.BulgeM[i])
		d.highM = max(d.highM, d.top(i), s.RayM[i]+0.6*s.Fresnel1M[i])
	}
	// The bottom is sea level where the ground is near it, a round height elsewhere.
	if d.lowM < 0.25*d.highM {
		d.lowM = min(d.lowM, 0)
	}
	step := tickStep(d.highM - d.lowM)
	d.lowM = math.Floor(d.lowM/step) * step
	d.highM += 0.06 * (d.highM - d.lowM)
	return d
}

// top is the height of ground and cover in the picture.
func (d *drawing) top(i int) float64 {
	return d.Profile.AslM[i] + d.Profile.CoverM[i] + d.BulgeM[i]
}

func (d *drawing) x(km float64) float64 { return svgLeft + plotWidth*km/d.Profile.LengthKm() }
func (d *drawing) y(m float64) float64 {
	return svgTop + plotHeight*(d.highM-m)/(d.highM-d.lowM)
}

// frame writes the head, title, axes and grid.
func (d *drawing) frame() {
	d.f(`<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 %d %d" font-family="system-ui, 'DejaVu Sans', sans-serif" font-size="13" role="img">`+"\n", svgWidth, svgHeight)
	title := fmt.Sprintf("%s → %s", d.Link.From.Name, d.Link.To.Name)
	d.f("<title>%s</title>\n<desc>%s</desc>\n", html.EscapeString(title), html.EscapeString(SectionSummary(d.Section)))
	d.f(`<rect width="%d" height="%d" fill="#ffffff"/>`+"\n", svgWidth, svgHeight)
	d.f(`<clipPath id="plot"><rect x="%d" y="%d" width="%d" height="%d"/></clipPath>`+"\n", svgLeft, svgTop, plotWidth, plotHeight)
	d.f(`<text x="%d" y="22" font-size="16" font-weight="600" fill="%s">%s</text>`+"\n", svgLeft, inkText, html.EscapeString(title))
	d.f(`<text x="%d" y="41" fill="%s">%s</text>`+"\n", svgLeft, inkQuiet, html.EscapeString(d.subtitle()))
	for _, m := range ticks(d.lowM, d.highM) {
		d.f(`<path d="M%d %.1fH%d" stroke="%s"/><text x="%d" y="%.1f" text-anchor="end" fill="%s">%g</text>`+"\n", svgLeft, d.y(m), svgWidth-svgRight, inkGrid, svgLeft-8, d.y(m)+4, inkQuiet, m)
	}
	for _, km := range ticks(0, d.Profile.LengthKm()) {
		d.f(`<text x="%.1f" y="%d" text-anchor="middle" fill="%s">%g</text>`+"\n", d.x(km), svgHeight-svgBottom+18, inkQuiet, km)
	}
	d.f(`<text x="%d" y="%d" fill="%s">m</text>`+"\n", svgLeft-22, svgTop-8, inkQuiet)
	d.f(`<text x="%d" y="%d" text-anchor="end" fill="%s">km</text>`+"\n", svgWidth-svgRight, svgHeight-10, inkQuiet)
}

func (d *drawing) subtitle() string {
	return fmt.Sprintf("%s km at %s°, %s MHz; worst clearance %s of the first Fresnel radius at %s km; Earth radius %s km",
		decimals(d.Profile.LengthKm(), 2), azimuth(d.Profile.AzDeg), decimals(d.FreqHz/1e6, 3), signed(d.Clearance.WorstRatio, 2), decimals(d.Clearance.AtKm, 2), decimals(d.RadiusKm, 0))
}

// ground draws cover behind ground, the bulge as a line, and the sea as a band on it.
func (d *drawing) ground() {
	base := fmt.Sprintf("V%.1fH%.1fZ", d.y(d.lowM), d.x(0))
	d.f(`<path d="%s%s" fill="%s"/>`+"\n", d.outline(d.top), base, inkCover)
	d.f(`<path d="%s%s" fill="%s"/>`+"\n", d.outline(func(i int) float64 { return d.Profile.AslM[i] + d.BulgeM[i] }), base, inkGround)
	d.f(`<path d="%s" fill="none" stroke="%s" stroke-dasharray="2 4" clip-path="url(#plot)"/>`+"\n", d.outline(func(i int) float64 { return d.BulgeM[i] }), inkBulge)
	for i := 0; i < len(d.Profile.Zone); i++ {
		first := i
		for i+1 < len(d.Profile.Zone) && d.Profile.Zone[i+1] == d.Profile.Zone[first] {
			i++
		}
		if d.Profile.Zone[first] == terrain.Sea && i > first {
			d.f(`<path d="%s" fill="none" stroke="%s" stroke-width="4"/>`+"\n", d.part(first, i, func(j int) float64 { return d.Profile.AslM[j] + d.BulgeM[j] }), inkSea)
		}
	}
}

func (d *drawing) ray() {
	last := len(d.RayM) - 1
	upper := d.outline(func(i int) float64 { return d.RayM[i] + 0.6*d.Fresnel1M[i] })
	lower := d.outline(func(i int) float64 { return d.RayM[i] - 0.6*d.Fresnel1M[i] })
	d.f(`<path d="%s%s" fill="none" stroke="%s" stroke-width="1.3" stroke-dasharray="6 3" clip-path="url(#plot)"/>`+"\n", upper, lower, inkZone)
	d.f(`<path d="M%.1f %.1fL%.1f %.1f" stroke="%s" stroke-width="1.8"/>`+"\n", d.x(0), d.y(d.RayM[0]), d.x(d.Profile.LengthKm()), d.y(d.RayM[last]), inkRay)
	d.f(`<g transform="translate(%d,%d)" fill="%s"><path d="M0 -4h26" stroke="%s" stroke-width="1.8"/><text x="32">ray</text>`, svgLeft, svgHeight-10, inkQuiet, inkRay)
	d.f(`<path d="M74 -4h26" stroke="%s" stroke-width="1.3" stroke-dasharray="6 3"/><text x="106">0.6 of the first Fresnel radius</text>`, inkZone)
	d.f(`<path d="M312 -4h26" stroke="%s" stroke-dasharray="2 4"/><text x="344">sea level on the Earth’s bulge</text>`, inkBulge)
	d.f(`<rect x="572" y="-11" width="14" height="11" fill="%s"/><text x="592">cover</text>`, inkCover)
	d.f(`<path d="M650 -4h26" stroke="%s" stroke-width="4"/><text x="682">sea</text></g>`+"\n", inkSea)
}

// ends draws the masts and writes the antennas' heights above ground.
func (d *drawing) ends() {
	last := len(d.RayM) - 1
	for _, end := range []struct {
		i      int
		aglM   float64
		anchor string
		shift  float64
	}{{0, d.FromAglM, "start", 7}, {last, d.ToAglM, "end", -7}} {
		i, x := end.i, d.x(d.Profile.DistKm[end.i])
		d.f(`<text x="%.1f" y="%.1f" text-anchor="%s" fill="%s" paint-order="stroke" stroke="#ffffff" stroke-width="3">%g m</text>`+"\n", x+end.shift, d.y(d.RayM[i])-7, end.anchor, inkText, end.aglM)
		d.f(`<path d="M%.1f %.1fV%.1f" stroke="%s" stroke-width="2.5"/><circle cx="%.1f" cy="%.1f" r="3.5" fill="%s"/>`+"\n",
			x, d.y(d.Profile.AslM[i]+d.BulgeM[i]), d.y(d.RayM[i]), inkText, x, d.y(d.RayM[i]), inkText)
	}
}

// worst marks the worst point with a sign and words.
func (d *drawing) worst() {
	i := d.Clearance.Index
	if i < 0 {
		return
	}
	x, top, ray := d.x(d.Profile.DistKm[i]), d.y(d.top(i)), d.y(d.RayM[i])
	ink, words := inkRay, fmt.Sprintf("%s m free", decimals(d.RayM[i]-d.top(i), 0))
	if d.Clearance.WorstRatio < 0 {
		ink, words = bad, fmt.Sprintf("%s m in the way", decimals(d.top(i)-d.RayM[i], 0))
	}
	anchor, shift := "start", 8.0
	if x > svgLeft+0.8*plotWidth {
		anchor, shift = "end", -8
	}
	d.f(`<path d="M%.1f %.1fV%.1f" stroke="%s" stroke-width="1.5"/><path d="M%.1f %.1fl-5 -9h10z" fill="%s"/>`+"\n", x, ray, top, ink, x, min(top, ray), ink)
	d.f(`<text x="%.1f" y="%.1f" text-anchor="%s" fill="%s" font-weight="600" paint-order="stroke" stroke="#ffffff" stroke-width="3">%s</text>`+"\n", x+shift, min(top, ray)-10, anchor, ink, words)
}

// outline is the path of a line of heights over the whole section.
func (d *drawing) outline(heightM func(i int) float64) string {
	return d.part(0, len(d.RayM)-1, heightM)
}

func (d *drawing) part(first, last int, heightM func(i int) float64) string {
	var b strings.Builder
	for i := first; i <= last; i++ {
		command := "L"
		if i == first {
			command = "M"
		}
		fmt.Fprintf(&b, "%s%.1f %.1f", command, d.x(d.Profile.DistKm[i]), d.y(heightM(i)))
	}
	return b.String()
}

// tickStep is a round step that gives four to ten ticks over a span.
func tickStep(span float64) float64 {
	step := math.Pow10(int(math.Floor(math.Log10(span))))
	switch {
	case span/step >= 5:
		return step
	case span/step >= 2:
		return step / 2
	}
	return step / 5
}

func ticks(low, high float64) []float64 {
	step := tickStep(high - low)
	var list []float64
	for k := math.Ceil(low / step); k*step <= high+1e-9*step; k++ {
		list = append(list, math.Round(k*step*1e6)/1e6)
	}
	return list
}

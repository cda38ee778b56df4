package coverage

import (
	"image"
	"image/color"
	"image/png"
	"io"
	"math"
)

// mostPixels bounds the sides of a picture.
const mostPixels = 1600

// bandColours go from blue to yellow over green, told apart by lightness too.
var bandColours = [...]color.RGBA{{68, 1, 84, 255}, {59, 82, 139, 255}, {33, 145, 140, 255}, {94, 201, 98, 255}, {253, 231, 37, 255}}

// colourOf spreads the colours over count bands.
func colourOf(band, count int) color.RGBA {
	last := len(bandColours) - 1
	if count < 2 {
		return bandColours[last/2+1]
	}
	return bandColours[band*last/(count-1)]
}

// picture draws the bands of the margin over shaded relief, with a legend.
func (m *Map) picture(w io.Writer, fromDB []float64) error {
	cells := (max(m.Frame.Cols, m.Frame.Rows) + mostPixels - 1) / mostPixels // of a pixel's side
	width, height := (m.Frame.Cols+cells-1)/cells, (m.Frame.Rows+cells-1)/cells
	img := image.NewRGBA(image.Rect(0, 0, width, height))
	for y := range height {
		for x := range width {
			col, row := min(x*cells+cells/2, m.Frame.Cols-1), min(y*cells+cells/2, m.Frame.Rows-1)
			img.SetRGBA(x, y, m.pixel(col, row, cells, fromDB))
		}
	}
	drawLegend(img, fromDB)
	return png.Encode(w, img)
}

// pixel is the colour of a cell: grey relief, tinted where a band is reached.
func (m *Map) pixel(col, row, cells int, fromDB []float64) color.RGBA {
	shade := m.shade(float64(col), float64(row), float64(cells))
	ground := color.RGBA{uint8(255 * shade), uint8(255 * shade), uint8(255 * shade), 255}
	margin := float64(m.MarginDB[row*m.Frame.Cols+col])
	for k := len(fromDB) - 1; k >= 0; k-- {
		if margin >= fromDB[k] {
			return blend(ground, colourOf(k, len(fromDB)))
		}
	}
	return ground
}

func blend(ground, tint color.RGBA) color.RGBA {
	const share = 0.55 // of the tint
	mix := func(a, b uint8) uint8 { return uint8((1-share)*float64(a) + share*float64(b)) }
	return color.RGBA{mix(ground.R, tint.R), mix(ground.G, tint.G), mix(ground.B, tint.B), 255}
}

// shade is the lightness of the ground, 0 to 1, lit from the north-west at 45 degrees; unknown
// ground is white.
func (m *Map) shade(col, row, cells float64) float64 {
	at := func(dCol, dRow float64) float64 {
		h, _ := m.disc.Height(m.Frame.Plane.At(col+dCol*cells, row+dRow*cells))
		return h
	}
	const exaggeration = 2
	run := 2 * cells * m.Frame.CellM / exaggeration
	toEast, toNorth := (at(1, 0)-at(-1, 0))/run, (at(0, -1)-at(0, 1))/run
	light := (1 - (toNorth-toEast)/math.Sqrt2) / math.Sqrt2 / math.Sqrt(1+toEast*toEast+toNorth*toNorth)
	if math.IsNaN(light) {
		return 1
	}
	return min(max(0.25+0.75*light, 0), 1)
}

package coverage

import (
	"fmt"
	"image"
	"image/color"
	"image/draw"
)

// glyphs are the letters of a legend, five columns by seven rows, a bit for each dot.
var glyphs = map[rune][7]uint8{
	'0': {14, 17, 19, 21, 25, 17, 14}, '1': {4, 12, 4, 4, 4, 4, 14}, '2': {14, 17, 1, 2, 4, 8, 31}, '3': {31, 2, 4, 2, 1, 17, 14},
	'4': {2, 6, 10, 18, 31, 2, 2}, '5': {31, 16, 30, 1, 1, 17, 14}, '6': {6, 8, 16, 30, 17, 17, 14}, '7': {31, 1, 2, 4, 8, 8, 8},
	'8': {14, 17, 17, 14, 17, 17, 14}, '9': {14, 17, 17, 15, 1, 2, 12}, '-': {0, 0, 0, 31, 0, 0, 0}, '.': {0, 0, 0, 0, 0, 12, 12},
	'd': {1, 1, 13, 19, 17, 17, 15}, 'B': {30, 17, 17, 30, 17, 17, 30}, '>': {8, 4, 2, 1, 2, 4, 8}, '=': {0, 0, 31, 0, 31, 0, 0},
}

const (
	dot        = 2 // pixels
	glyphWide  = 6 * dot
	rowHigh    = 10 * dot
	swatchWide = 16 * dot
)

// drawLegend names the bands in the upper left corner, the highest first.
func drawLegend(img *image.RGBA, fromDB []float64) {
	labels, widest := make([]string, len(fromDB)), 0
	for k, from := range fromDB {
		labels[k] = fmt.Sprintf(">= %g dB", from)
		widest = max(widest, len(labels[k]))
	}
	const edge = 4 * dot
	box := image.Rect(0, 0, 3*edge+swatchWide+widest*glyphWide, 2*edge+len(fromDB)*rowHigh)
	draw.Draw(img, box, image.White, image.Point{}, draw.Src)
	for k := range fromDB {
		top := edge + (len(fromDB)-1-k)*rowHigh
		grey := color.RGBA{200, 200, 200, 255}
		swatch := image.Rect(edge, top, edge+swatchWide, top+8*dot)
		draw.Draw(img, swatch, image.NewUniform(blend(grey, colourOf(k, len(fromDB)))), image.Point{}, draw.Src)
		drawText(img, 2*edge+swatchWide, top, labels[k])
	}
}

func drawText(img *image.RGBA, left, top int, text string) {
	for i, r := range text {
		for y, row := range glyphs[r] {
			for x := range 5 {
				if row>>(4-x)&1 == 1 {
					at := image.Rect(0, 0, dot, dot).Add(image.Pt(left+i*glyphWide+x*dot, top+y*dot))
					draw.Draw(img, at, image.Black, image.Point{}, draw.Src)
				}
			}
		}
	}
}

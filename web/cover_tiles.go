package web

import (
	"bytes"
	"fmt"
	"image"
	"image/color"
	"image/png"
	"math"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// marginStepDB is the width of a margin's colour; margins below 0 have none.
const marginStepDB = 5

type marginColor struct{ r, g, b uint8 }

func (c marginColor) hex() string { return fmt.Sprintf("#%02x%02x%02x", c.r, c.g, c.b) }

// marginColors are nine even steps of cividis, a ramp whose lightness grows evenly and that looks alike
// to all kinds of colour vision: J. R. Nunez, C. R. Anderton, R. S. Renslow, PLoS ONE 13 (2018).
var marginColors = [...]marginColor{
	{0x00, 0x20, 0x51}, {0x11, 0x36, 0x6c}, {0x3c, 0x4d, 0x6e}, {0x62, 0x64, 0x6f}, {0x7f, 0x7c, 0x75}, {0x9a, 0x94, 0x78}, {0xbb, 0xaf, 0x71}, {0xe2, 0xcb, 0x5c}, {0xfd, 0xea, 0x45},
}

// drawCoverTile cuts a tile from a coverage map: a cell is a cell, with hard edges.
func (s *Server) drawCoverTile(a tileAddress) ([]byte, error) {
	r, err := s.resultOf(a.source)
	if err != nil {
		return nil, err
	}
	cells, err := r.frame.Cells(a.picture(r.bounds.Center().Lat()))
	if err != nil {
		return nil, err
	}
	picture := image.NewPaletted(image.Rect(0, 0, tilePixels, tilePixels), marginPalette())
	for i := range picture.Pix {
		if at, ok := r.cell(cells.At(float64(i%tilePixels), float64(i/tilePixels))); ok {
			picture.Pix[i] = marginClass(float64(r.marginDB[at]))
		}
	}
	var b bytes.Buffer
	encoder := png.Encoder{CompressionLevel: png.BestSpeed}
	err = encoder.Encode(&b, picture)
	return b.Bytes(), err
}

// marginClass is the place of a margin's colour in the palette; 0 is clear.
func marginClass(marginDB float64) uint8 {
	if !(marginDB >= 0) {
		return 0
	}
	return uint8(min(math.Floor(marginDB/marginStepDB), float64(len(marginColors)-1))) + 1
}

func marginPalette() color.Palette {
	palette := color.Palette{color.NRGBA{}}
	for _, c := range marginColors {
		palette = append(palette, color.NRGBA{c.r, c.g, c.b, 255})
	}
	return palette
}

// picture is the tile as a lattice of places.
func (a tileAddress) picture(middleLat float64) raster.Picture {
	size := math.Exp2(float64(a.z))
	return raster.Picture{
		Cols: tilePixels, Rows: tilePixels, PixelM: pixelSizeM(a.z, middleLat),
		Place: func(col, row float64) orb.Point {
			return tilePlace((float64(a.x)+(col+0.5)/tilePixels)/size, (float64(a.y)+(row+0.5)/tilePixels)/size)
		},
	}
}

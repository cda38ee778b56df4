package web

import (
	"bytes"
	"context"
	"fmt"
	"image"
	"image/png"
	"math"
	"net/http"
	"slices"
	"strconv"

	"fellreach/terrain"

	"github.com/danielgtaylor/huma/v2"
	"github.com/go-chi/chi/v5"
	"github.com/paulmach/orb"
)

// Map tiles are those of the web: the Mercator projection on the sphere, cut into 2^z by 2^z squares.
const (
	tilePixels = 256
	maxZoom    = 18
	equatorM   = 2 * math.Pi * 6378137
	// tileVersion is part of every tile's address: it changes when the tiles do.
	tileVersion = "1"
)

// A GroundAnswer tells a map how to draw the ground.
type GroundAnswer struct {
	Tiles   string  `json:"tiles" doc:"address of the elevation tiles: PNG, height = red*256 + green + blue/256 - 32768 m, black where there is none"`
	Filled  string  `json:"filled" doc:"the same without holes, for a view in three dimensions: the least height where there is none"`
	MinZoom int     `json:"min_zoom"`
	MaxZoom int     `json:"max_zoom" doc:"the zoom at which pixels are about as large as cells; greater ones show no more"`
	West    float64 `json:"west" doc:"bounds of the rasters"`
	South   float64 `json:"south"`
	East    float64 `json:"east"`
	North   float64 `json:"north"`
	MinM    float64 `json:"min_m" doc:"least height, as far as a coarse look tells"`
	MaxM    float64 `json:"max_m"`
	Beyond  string  `json:"beyond" enum:"void,sea" doc:"what lies outside the rasters"`
}

func (s *Server) registerGround(api huma.API) {
	answer(api, readOperation("readGround", "/api/ground", "The ground as map tiles"), func(_ context.Context, in *struct{ Versioned }) (GroundAnswer, error) {
		v, err := s.shelf.take(in.Version)
		if err != nil {
			return GroundAnswer{}, err
		}
		defer s.shelf.release(v)
		return groundOf(v)
	})
}

func groundOf(v *version) (GroundAnswer, error) {
	minM, maxM, err := v.ground.relief()
	if err != nil {
		return GroundAnswer{}, err
	}
	address := func(kind string) string { return "/tiles/" + kind + "/" + v.ground.id + "/{z}/{x}/{y}.png" }
	out := GroundAnswer{Tiles: address("ground"), Filled: address("filled"), MinM: minM, MaxM: maxM, Beyond: v.plan.Ground.Beyond}
	out.MinZoom, out.MaxZoom = v.ground.zooms()
	bounds, _ := v.ground.bounds()
	out.West, out.South, out.East, out.North = bounds.Left(), bounds.Bottom(), bounds.Right(), bounds.Top()
	return out, nil
}

// pixelSizeM is the size of a tile's pixel on the ground at a latitude.
func pixelSizeM(z int, lat float64) float64 {
	return equatorM / tilePixels / math.Exp2(float64(z)) * math.Cos(lat*math.Pi/180)
}

// tilePlace returns the place of a position in a tile's plane, whose unit is the whole map.
func tilePlace(x, y float64) orb.Point {
	return orb.Point{360*x - 180, math.Atan(math.Sinh(math.Pi*(1-2*y))) * 180 / math.Pi}
}

// A tileAddress names a tile. Its source is the hash of the ground, or the number of the job, that it
// shows, so that it never changes.
type tileAddress struct {
	kind, source string
	z, x, y      int
}

func addressOf(r *http.Request) (tileAddress, error) {
	a := tileAddress{kind: chi.URLParam(r, "kind"), source: chi.URLParam(r, "source")}
	for name, to := range map[string]*int{"z": &a.z, "x": &a.x, "y": &a.y} {
		number, err := strconv.Atoi(chi.URLParam(r, name))
		if err != nil {
			return a, problem(http.StatusNotFound, fmt.Sprintf("%s of a tile is a whole number", name))
		}
		*to = number
	}
	if !slices.Contains([]string{"ground", "filled", "coverage"}, a.kind) || a.z < 0 || a.z > maxZoom || a.x < 0 || a.y < 0 || a.x >= 1<<a.z || a.y >= 1<<a.z {
		return a, problem(http.StatusNotFound, fmt.Sprintf("there is no such tile: they are /tiles/ground/…, /tiles/filled/… and /tiles/coverage/… with z from 0 to %d", maxZoom))
	}
	return a, nil
}

// serveTile answers with a tile of the ground or of a coverage map.
func (s *Server) serveTile(w http.ResponseWriter, r *http.Request) {
	address, err := addressOf(r)
	if err == nil {
		var tile []byte
		if tile, err = s.tiles.get(address, func() ([]byte, error) { return s.drawTile(address) }); err == nil {
			h := w.Header()
			h.Set("Content-Type", "image/png")
			h.Set("Cache-Control", "max-age=31536000, immutable")
			h.Set("ETag", fmt.Sprintf(`"%s-%s-%d-%d-%d"`, address.kind, address.source, address.z, address.x, address.y))
			serveBytes(w, r, tile)
			return
		}
	}
	p := asProblem(err).(*Problem)
	refuse(w, p.Status, p.Detail)
}

func (s *Server) drawTile(a tileAddress) ([]byte, error) {
	if a.kind == "coverage" {
		return s.drawCoverTile(a)
	}
	return s.drawGroundTile(a)
}

// drawGroundTile cuts a tile from the ground.
func (s *Server) drawGroundTile(a tileAddress) ([]byte, error) {
	v, err := s.shelf.takeGround(a.source)
	if err != nil {
		return nil, err
	}
	defer s.shelf.release(v)
	if least, _ := v.ground.zooms(); a.z < least {
		return nil, problem(http.StatusNotFound, fmt.Sprintf("tiles of this large raster begin at zoom %d; make overviews, for instance with gdaladdo, to see all of it", least))
	}
	hole := math.NaN()
	if a.kind == "filled" {
		if hole, _, err = v.ground.relief(); err != nil {
			return nil, err
		}
	}
	bounds, _ := v.ground.bounds()
	grid, err := v.network.Ground.Heights(a.picture(bounds.Center().Lat()))
	if err != nil {
		return nil, problem(http.StatusInternalServerError, err.Error())
	}
	return encodeTile(grid, hole)
}

// encodeTile writes heights as colours, in steps of 1/256 m; a hole's height takes the place of none.
func encodeTile(grid *terrain.Grid, hole float64) ([]byte, error) {
	picture := image.NewNRGBA(image.Rect(0, 0, grid.Cols, grid.Rows))
	for i, v := range grid.Cells {
		h := float64(v)
		if math.IsNaN(h) {
			h = hole
		}
		var steps uint32
		if !math.IsNaN(h) {
			steps = uint32(math.Round((h + 32768) * 256))
		}
		pixel := picture.Pix[4*i : 4*i+4 : 4*i+4]
		pixel[0], pixel[1], pixel[2], pixel[3] = uint8(steps>>16), uint8(steps>>8), uint8(steps), 255
	}
	var b bytes.Buffer
	encoder := png.Encoder{CompressionLevel: png.BestSpeed}
	err := encoder.Encode(&b, picture)
	return b.Bytes(), err
}

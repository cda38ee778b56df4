package raster

import (
	"fmt"
	"math"

	"github.com/lukeroth/gdal"
	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A Frame is the place of a map on Earth: square cells, north up, in a projected reference system.
type Frame struct {
	Cols, Rows   int
	CellM        float64
	GeoTransform [6]float64 // as in [Info]
	WKT          string
	// Plane leads from cell-centre coordinates to the plane of geodesics from the site that the
	// frame was made for, see [terrain.Disc].
	Plane *terrain.Mesh
}

// Frame lays out a map of cells of cellM metres that holds all places within radiusM of a site: in
// the reference system of the first elevation raster where that is projected in metres, with cell
// borders counted from the raster's corner, else in the site's UTM zone.
func (g *Ground) Frame(site orb.Point, radiusM, cellM float64) (*Frame, error) {
	if err := checkPlace(site); err != nil {
		return nil, err
	}
	system, origin := "", orb.Point{}
	first := g.elevation[0]
	if horizontal, _ := parseWKT(first.info.wkt).split(); horizontal.isInMetres() {
		system = horizontal.text
		if t := first.info.GeoTransform; t[2] == 0 && t[4] == 0 {
			origin = orb.Point{t[0], t[3]}
		}
	} else {
		var err error
		if system, err = utmWKT(site); err != nil {
			return nil, err
		}
	}
	crs, err := transformTo(system)
	if err != nil {
		return nil, err
	}
	f := &Frame{CellM: cellM, WKT: system}
	if err := f.enclose(crs, site, radiusM, origin); err != nil {
		return nil, err
	}
	return f, f.meshPlane(crs, site, radiusM)
}

// rimPoints is how many places of the rim of a frame's circle are looked at for its bounds.
const rimPoints = 720

// enclose fits whole cells around the circle.
func (f *Frame) enclose(crs *transform, site orb.Point, radiusM float64, origin orb.Point) error {
	rim := make([]orb.Point, rimPoints)
	for i := range rim {
		rim[i] = Direct(site, float64(i)*360/rimPoints, radiusM)
	}
	if err := crs.forward(rim); err != nil {
		return err
	}
	for _, p := range rim {
		if !finite(p) {
			return fmt.Errorf("the reference system of the map cannot hold all places within %g km of %s", radiusM/1000, terrain.FormatDecimal(site))
		}
	}
	bound := orb.MultiPoint(rim).Bound()
	cells := func(at float64) float64 { return at / f.CellM }
	west, east := math.Floor(cells(bound.Min[0]-origin[0])), math.Ceil(cells(bound.Max[0]-origin[0]))
	south, north := math.Floor(cells(bound.Min[1]-origin[1])), math.Ceil(cells(bound.Max[1]-origin[1]))
	if (east-west)*(north-south) > math.MaxInt32 {
		return fmt.Errorf("a range of %g km in cells of %g m makes %.0f million cells: take larger cells or a shorter range", radiusM/1000, f.CellM, (east-west)*(north-south)/1e6)
	}
	f.Cols, f.Rows = int(east-west), int(north-south)
	f.GeoTransform = [6]float64{origin[0] + west*f.CellM, f.CellM, 0, origin[1] + north*f.CellM, 0, -f.CellM}
	return nil
}

// meshPlane relates the cells to the plane of geodesics.
func (f *Frame) meshPlane(crs *transform, site orb.Point, radiusM float64) (err error) {
	area := orb.Bound{Max: orb.Point{float64(f.Cols - 1), float64(f.Rows - 1)}}
	toSystem := affine(f.GeoTransform)
	f.Plane, err = terrain.NewMesh(area, nodeSpacingM(radiusM)/f.CellM, func(nodes []orb.Point) error {
		for i, p := range nodes {
			nodes[i] = toSystem.apply(p[0]+0.5, p[1]+0.5)
		}
		if err := crs.inverse(nodes); err != nil {
			return err
		}
		for i, p := range nodes {
			if !finite(p) {
				return fmt.Errorf("the reference system of the map cannot hold all places within %g km of %s", radiusM/1000, terrain.FormatDecimal(site))
			}
			distM, azDeg, _ := Inverse(site, p)
			sin, cos := math.Sincos(azDeg * math.Pi / 180)
			nodes[i] = orb.Point{distM * sin, distM * cos}
		}
		return nil
	})
	return err
}

// isInMetres says whether a horizontal system is projected and counts in metres.
func (w wkt) isInMetres() bool {
	if w.keyword != "PROJCS" && w.keyword != "PROJCRS" {
		return false
	}
	return w.unitM() == 1
}

// utmWKT returns the reference system of a place's UTM zone.
func utmWKT(p orb.Point) (string, error) {
	if p.Lat() > 84 || p.Lat() < -80 {
		return "", fmt.Errorf("%s lies outside UTM (80 S to 84 N): list first an elevation raster in a system projected in metres", terrain.FormatDecimal(p))
	}
	code := 32600 + utmZone(p)
	if p.Lat() < 0 {
		code += 100
	}
	system := gdal.CreateSpatialReference("")
	defer system.Destroy()
	var text string
	err := call(func() error {
		err := system.FromEPSG(code)
		if err == nil {
			text, err = system.ToWKT()
		}
		return err
	})
	return text, err
}

// Places turns corners of cells, columns and rows counted from the first cell's outer corner, into
// places on WGS 84, in place.
func (f *Frame) Places(corners []orb.Point) error {
	crs, err := transformTo(f.WKT)
	if err != nil {
		return err
	}
	toSystem := affine(f.GeoTransform)
	for i, p := range corners {
		corners[i] = toSystem.apply(p[0], p[1])
	}
	return crs.inverse(corners)
}

// Centre returns the place in the middle of the frame.
func (f *Frame) Centre() (orb.Point, error) {
	at := []orb.Point{{float64(f.Cols) / 2, float64(f.Rows) / 2}}
	err := f.Places(at)
	return at[0], err
}

// SetPlane relates the cells to the plane of geodesics from a place, as a frame made for a site is
// from the beginning.
func (f *Frame) SetPlane(from orb.Point) error {
	crs, err := transformTo(f.WKT)
	if err != nil {
		return err
	}
	return f.meshPlane(crs, from, math.Hypot(float64(f.Cols), float64(f.Rows))*f.CellM/2)
}

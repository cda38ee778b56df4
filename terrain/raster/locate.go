package raster

import (
	"fmt"
	"math"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// areaSlackDeg is how far outside a reference system's area a place may lie: people work in one
// UTM zone or national grid somewhat beyond its border, but a swapped easting and northing lands
// farther off.
const areaSlackDeg = 3

// Locate returns the place of coordinates, in degrees on WGS 84. Coordinates in a system of the
// EPSG register are an error where PROJ does not know the system, where it cannot hold them, and
// more than 3 degrees outside the area it is meant for.
func Locate(c terrain.Coordinates) (orb.Point, error) {
	if c.EPSG == 0 {
		place := orb.Point{c.Lon, c.Lat}
		return place, checkPlace(place)
	}
	place, err := locateEPSG(c)
	if err != nil {
		return orb.Point{}, fmt.Errorf("understood as %s: %w", c, err)
	}
	return place, nil
}

func locateEPSG(c terrain.Coordinates) (orb.Point, error) {
	code := fmt.Sprintf("EPSG:%d", c.EPSG)
	crs, err := transformTo(code)
	if err != nil {
		return orb.Point{}, fmt.Errorf("%s: %w", code, err)
	}
	given := orb.Point{c.Easting, c.Northing}
	place := []orb.Point{given}
	if err := crs.inverse(place); err != nil {
		return orb.Point{}, err
	}
	back := []orb.Point{place[0]}
	if err := crs.forward(back); err != nil {
		return orb.Point{}, err
	}
	if !finite(place[0]) || checkPlace(place[0]) != nil || !near(back[0], given) {
		return orb.Point{}, fmt.Errorf("%s has no such place; is it easting before northing?", code)
	}
	if area, known := crs.area(); known && !area.holds(place[0], areaSlackDeg) {
		return orb.Point{}, fmt.Errorf("that is %s, outside the area of %s: longitude %.2f to %.2f, latitude %.2f to %.2f; is it easting before northing, and the right system?",
			terrain.FormatDecimal(place[0]), code, area.west, area.east, area.south, area.north)
	}
	return place[0], nil
}

// near says whether two positions in a reference system agree but for rounding.
func near(a, b orb.Point) bool {
	slack := 1e-8 * (1 + math.Abs(b[0]) + math.Abs(b[1])) // 5 cm in a UTM zone
	return math.Abs(a[0]-b[0]) <= slack && math.Abs(a[1]-b[1]) <= slack
}

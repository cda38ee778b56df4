package raster

import (
	"fmt"
	"math"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// UTM writes a place in UTM on WGS 84 to a metre: "UTM 27N 441250 5263420". UTM ends at 84
// degrees north and 80 south; for a place beyond it says so.
func UTM(p orb.Point) string {
	if err := checkPlace(p); err != nil {
		return err.Error()
	}
	if p.Lat() > 84 || p.Lat() < -80 {
		return "outside UTM (80 S to 84 N)"
	}
	c := terrain.Coordinates{EPSG: 32600 + utmZone(p)}
	if p.Lat() < 0 {
		c.EPSG += 100
	}
	at := []orb.Point{p}
	crs, err := transformTo(fmt.Sprintf("EPSG:%d", c.EPSG))
	if err == nil {
		err = crs.forward(at)
	}
	if err != nil {
		return "UTM is not available: " + err.Error()
	}
	c.Easting, c.Northing = at[0][0], at[0][1]
	return c.String()
}

// utmZone returns the zone of a place: 6 degrees of longitude wide, but for the south-west of
// Norway and for Svalbard (the borders there from memory, checked against GeographicLib).
func utmZone(p orb.Point) int {
	lon, lat := p.Lon(), p.Lat()
	zone := int(math.Floor((lon+180)/6))%60 + 1
	switch {
	case lat >= 56 && lat < 64 && lon >= 3 && lon < 12:
		return 32
	case lat >= 72 && lon >= 0 && lon < 42:
		return 31 + 2*int((lon+3)/12) // 9, 21 and 33 degrees east divide zones 31, 33, 35, 37
	}
	return zone
}

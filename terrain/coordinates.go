package terrain

import (
	"fmt"
	"math"

	"github.com/paulmach/orb"
)

// Coordinates are a place as it was written: longitude and latitude on WGS 84, or easting and
// northing in a coordinate reference system of the EPSG register.
type Coordinates struct {
	Lon, Lat          float64 // degrees, east and north positive; used where EPSG is 0
	EPSG              int     // code of the reference system, 0 for longitude and latitude
	Easting, Northing float64 // in the unit of that system, metres for UTM
}

// String writes the coordinates in one of the notations that [ParseCoordinates] reads, or, for a
// reference system other than UTM, with its code.
func (c Coordinates) String() string {
	switch zone := c.EPSG % 100; {
	case c.EPSG == 0:
		return FormatDecimal(orb.Point{c.Lon, c.Lat})
	case c.EPSG/100 == utmNorth/100 && zone >= 1 && zone <= 60:
		return fmt.Sprintf("UTM %dN %.0f %.0f", zone, c.Easting, c.Northing)
	case c.EPSG/100 == utmSouth/100 && zone >= 1 && zone <= 60:
		return fmt.Sprintf("UTM %dS %.0f %.0f", zone, c.Easting, c.Northing)
	}
	return fmt.Sprintf("EPSG:%d easting %.2f, northing %.2f", c.EPSG, c.Easting, c.Northing)
}

// FormatDecimal writes a place in decimal degrees to five places (1.1 m): "47.52310 N, 20.11800 W".
func FormatDecimal(p orb.Point) string {
	return fmt.Sprintf("%.5f %s, %.5f %s", math.Abs(p.Lat()), side(p.Lat(), "N", "S"), math.Abs(p.Lon()), side(p.Lon(), "E", "W"))
}

// FormatDMS writes a place in degrees, minutes and seconds to 0.1 second (3 m):
// 47°31'23.2"N 20°07'04.8"W.
func FormatDMS(p orb.Point) string {
	return dms(p.Lat()) + side(p.Lat(), "N", "S") + " " + dms(p.Lon()) + side(p.Lon(), "E", "W")
}

// dms writes the size of an angle; it rounds once, so that 59.96" becomes a minute.
func dms(deg float64) string {
	tenths := int(math.Round(math.Abs(deg) * 36000))
	return fmt.Sprintf(`%d°%02d'%04.1f"`, tenths/36000, tenths/600%60, float64(tenths%600)/10)
}

// side names the hemisphere of an angle.
func side(deg float64, positive, negative string) string {
	if deg < 0 {
		return negative
	}
	return positive
}

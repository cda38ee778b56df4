package raster

// #include <stdlib.h>
// #include <proj.h>
//
// // areaOfUse reads where on Earth a reference system is meant for; 0 where PROJ does not know
// // the system or its area.
// static int areaOfUse(const char *crs, double *west, double *south, double *east, double *north) {
//   PJ_CONTEXT *context = proj_context_create();
//   proj_log_level(context, PJ_LOG_NONE);
//   PJ *system = proj_create(context, crs);
//   int known = system != NULL && proj_get_area_of_use(context, system, west, south, east, north, NULL);
//   proj_destroy(system);
//   proj_context_destroy(context);
//   return known && *west > -1000;
// }
import "C"

import (
	"fmt"
	"math"
	"unsafe"

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
	crs, err := newTransform(code)
	if err != nil {
		return orb.Point{}, fmt.Errorf("%s: %w", code, err)
	}
	place := []orb.Point{{c.Easting, c.Northing}}
	if err := crs.inverse(place); err != nil {
		return orb.Point{}, err
	}
	back := []orb.Point{place[0]}
	if err := crs.forward(back); err != nil {
		return orb.Point{}, err
	}
	if !finite(place[0]) || checkPlace(place[0]) != nil || !near(back[0], orb.Point{c.Easting, c.Northing}) {
		return orb.Point{}, fmt.Errorf("%s has no such place; is it easting before northing?", code)
	}
	return place[0], inArea(code, place[0])
}

// near says whether two positions in a reference system agree but for rounding.
func near(a, b orb.Point) bool {
	slack := 1e-8 * (1 + math.Abs(b[0]) + math.Abs(b[1])) // 5 cm in a UTM zone
	return math.Abs(a[0]-b[0]) <= slack && math.Abs(a[1]-b[1]) <= slack
}

// inArea checks a place against the area that a reference system is meant for.
func inArea(code string, place orb.Point) error {
	text := C.CString(code)
	defer C.free(unsafe.Pointer(text))
	var w, s, e, n C.double
	if C.areaOfUse(text, &w, &s, &e, &n) == 0 {
		return nil
	}
	west, south, east, north := float64(w), float64(s), float64(e), float64(n)
	width := math.Mod(east-west+360, 360) // the area may cross the date line
	if width == 0 {
		width = 360
	}
	fromWest := math.Mod(place.Lon()-west+areaSlackDeg+720, 360)
	if fromWest <= width+2*areaSlackDeg && place.Lat() >= south-areaSlackDeg && place.Lat() <= north+areaSlackDeg {
		return nil
	}
	return fmt.Errorf("that is %s, outside the area of %s: longitude %.2f to %.2f, latitude %.2f to %.2f; is it easting before northing, and the right system?",
		terrain.FormatDecimal(place), code, west, east, south, north)
}

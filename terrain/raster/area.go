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
//   return known && *west > -1000; // PROJ's mark for an area without bounds
// }
import "C"

import (
	"math"
	"unsafe"

	"github.com/paulmach/orb"
)

// An area is what a reference system is meant for, in degrees; west is the greater of the
// longitudes where the area crosses the date line.
type area struct{ west, south, east, north float64 }

// areaOfUse asks PROJ for the area of a reference system.
func areaOfUse(crs string) (a area, known bool) {
	text := C.CString(crs)
	defer C.free(unsafe.Pointer(text))
	var w, s, e, n C.double
	known = C.areaOfUse(text, &w, &s, &e, &n) != 0
	return area{float64(w), float64(s), float64(e), float64(n)}, known
}

// holds says whether a place lies in the area or at most slackDeg degrees outside.
func (a area) holds(place orb.Point, slackDeg float64) bool {
	width := math.Mod(a.east-a.west+360, 360)
	if width == 0 {
		width = 360
	}
	fromWest := math.Mod(place.Lon()-a.west+slackDeg+720, 360)
	return fromWest <= width+2*slackDeg && place.Lat() >= a.south-slackDeg && place.Lat() <= a.north+slackDeg
}

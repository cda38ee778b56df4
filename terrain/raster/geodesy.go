package raster

// #cgo pkg-config: proj
// #include <geodesic.h>
//
// // The WGS 84 ellipsoid, NIMA TR8350.2 (from memory).
// static void wgs84(struct geod_geodesic *g) { geod_init(g, 6378137, 1/298.257223563); }
//
// static void inverse(double lat1, double lon1, double lat2, double lon2, double *s, double *azi1, double *azi2) {
//   struct geod_geodesic g;
//   wgs84(&g);
//   geod_inverse(&g, lat1, lon1, lat2, lon2, s, azi1, azi2);
// }
//
// // along writes count places as lon, lat pairs, stepM apart, the first at startM.
// static void along(double lat1, double lon1, double azi1, double startM, double stepM, int count, double *lonlat) {
//   struct geod_geodesic g;
//   struct geod_geodesicline l;
//   wgs84(&g);
//   geod_lineinit(&l, &g, lat1, lon1, azi1, GEOD_LATITUDE | GEOD_LONGITUDE | GEOD_DISTANCE_IN);
//   for (int i = 0; i < count; i++)
//     geod_position(&l, startM + i*stepM, &lonlat[2*i+1], &lonlat[2*i], 0);
// }
import "C"

import (
	"math"
	"unsafe"

	"github.com/paulmach/orb"
)

// Inverse returns the geodesic between two places (degrees, latitudes -90 to 90) on the WGS 84
// ellipsoid: its length in metres, its azimuth at a towards b and that at b back towards a, both
// clockwise from true north in [0, 360). For equal places the length is 0 and the azimuths mean
// nothing.
//
// It is exact to nanometres; C. F. F. Karney, "Algorithms for geodesics", J. Geodesy 87 (2013),
// as it comes with PROJ.
func Inverse(a, b orb.Point) (distM, azDeg, backAzDeg float64) {
	var s, azi1, azi2 C.double
	C.inverse(C.double(a.Lat()), C.double(a.Lon()), C.double(b.Lat()), C.double(b.Lon()), &s, &azi1, &azi2)
	return float64(s), compass(float64(azi1)), compass(float64(azi2) + 180)
}

// Direct returns the place distM metres from a along the geodesic that leaves it at azimuth
// azDeg, with its longitude in [-180, 180].
func Direct(a orb.Point, azDeg, distM float64) orb.Point {
	var b orb.Point
	along(a, azDeg, distM, 0, unsafe.Slice(&b, 1))
	return b
}

// Line fills points with places along the geodesic that leaves a at azimuth azDeg: the first is
// a itself, the others follow at equal distances of stepM metres.
func Line(a orb.Point, azDeg, stepM float64, points []orb.Point) {
	along(a, azDeg, 0, stepM, points)
}

// along fills points from startM on, stepM apart. An orb.Point is laid out as the C side's pair.
func along(a orb.Point, azDeg, startM, stepM float64, points []orb.Point) {
	if len(points) == 0 {
		return
	}
	C.along(C.double(a.Lat()), C.double(a.Lon()), C.double(azDeg), C.double(startM), C.double(stepM),
		C.int(len(points)), (*C.double)(unsafe.Pointer(unsafe.SliceData(points))))
}

// compass brings an azimuth into [0, 360).
func compass(deg float64) float64 {
	deg = math.Mod(deg, 360)
	if deg < 0 {
		deg += 360
	}
	if deg >= 360 { // a tiny negative angle rounds up to it
		return 0
	}
	return deg
}

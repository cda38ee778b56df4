package raster

// #cgo pkg-config: gdal proj
// #include <gdal.h>
// #include <proj.h>
// static const char *gdal_release(void) { return GDALVersionInfo("RELEASE_NAME"); }
// static const char *proj_release(void) { return proj_info().version; }
import "C"

// Versions returns the versions of the C libraries the program runs with.
func Versions() (gdalVersion, projVersion string) {
	return C.GoString(C.gdal_release()), C.GoString(C.proj_release())
}

// Package raster reads the ground from the rasters of elevation and land cover that people have,
// through GDAL, and places on it through PROJ; it writes GeoTIFF. It is the only package that
// calls C.
//
// [Open] joins rasters in any coordinate reference system into a [Ground], which answers for the
// height of a place and the [terrain.Profile] between two. Each raster is sampled in its own
// grid; none is reprojected. Heights count as above mean sea level, as the files state them: no
// geoid is applied. Geodesics run on the WGS 84 ellipsoid.
package raster

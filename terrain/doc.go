// Package terrain holds the ground in plain Go: grids of heights and land cover, the profile
// of the ground between two places, voids, and coordinates as people write them.
//
// Files and projections are read by package terrain/raster, the only one that calls C; what it
// hands over are the plain values of this package.
package terrain

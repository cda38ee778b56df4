// Package coverage evaluates a path method in every cell of a map around a site, at a cost per cell
// that does not grow with the distance.
//
// # The profile of a cell
//
// Radials are geodesics that leave the site at equal steps of azimuth. Each is walked outward once,
// and structures that grow with it (running maxima, upper convex hulls, prefix sums) answer for
// every cell beside it what P.1812 asks about the profile between site and cell: exactly, not by an
// approximation of the profile.
//
// The profile of a cell at the distance d and the step s is fixed so. Its first point is the site.
// The last K interior points (4, or 8 in fine quality) lie on the cell's own bearing, at 1 to K steps
// before the cell, as those of a link do: what stands right before the far end matters most. The
// others lie at the multiples of s up to half a step before those, on the radial nearest in azimuth.
// The last point is the cell's centre, with its own distance and height. Cover is left out within the
// site's clearing. Where a void is bridged it is the radial's; a place on the own bearing that is not
// known takes the height of the radial's nearest point.
//
// # Why it is exact
//
// Heights are lifted: y = h - 500 d^2/a. Then rays are straight, and the bulge has left the
// formulas.
//
//   - The steepest sight line from the site is a running maximum.
//   - That from the cell touches the upper convex hull of the points before it, whose vertices are a
//     stack, since points come with growing distance.
//   - The largest diffraction parameter of a free path lies at one of the records of the running
//     maximum: an earlier point that rises as steeply as a later one has less clearance relative to
//     its Fresnel zone. (It need not lie on the hull.)
//   - The extreme height over the line between the antennas lies on the hull of the heights as they
//     are.
//   - Sums over the profile are differences of running sums; Bullington's construction over level
//     ground has its extremes next to known places.
package coverage

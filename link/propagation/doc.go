// Package propagation gives the basic transmission loss of a path: a profile of the ground, two
// antenna heights, a frequency and the air go in; the loss comes out with every intermediate term
// that the Recommendation names. It knows no antenna, no radio and no map.
//
// A method is a value of type [Model]:
//
//   - [FreeSpace]: Rec. ITU-R P.525-4, free space on the straight line between the antennas.
//   - [P526]: free space with the delta-Bullington diffraction of Rec. ITU-R P.526-15, section
//     ~4.5.4, in the form in which Rec. ITU-R P.1812 uses it at the median Earth radius: cover on
//     the ground enters the Bullington construction of the actual profile and nothing else.
//   - [P1812]: Rec. ITU-R P.1812-8, for a percentage of time and of locations.
//
// # Conventions
//
// Distances are km along the path, heights m, elevations degrees and up positive, losses dB and
// positive. Inside the files that transcribe a Recommendation the locals carry its symbols in
// ASCII (hts, dlt, nu), frequencies are GHz, angles mrad, Earth radii km. Equation numbers are
// those of P.1812-6 where nothing else is said; numbers of equations and sections marked with a
// tilde are from memory. The published results for -6 and -8 are the same.
//
// Bad input is an error that names the value and its allowed range. A path that a method can
// evaluate but is not stated for gives its result with an entry in [Loss].Notes. Slices of
// different length are a bug of the caller and panic.
//
// All functions are pure and safe for concurrent use. Evaluating a method allocates nothing unless
// it returns an error or a note.
//
// # Departures from the texts
//
// None of these moves a published result in its tenth digit.
//
//   - Some equations stand in an equal form that neither overflows nor cancels: Bullington's edge
//     ([Slopes.Nu]), the place of least clearance, beta of the ducting model, the blends (60) and
//     (63). Tests compare them with the printed forms.
//   - A power share between the two polarizations mixes their losses over the smooth Earth linearly
//     in dB. The Recommendations know the pure ones only.
//   - A negative loss of the spherical Earth counts as 0 one step before the Recommendation drops it.
//   - A profile of two points has no horizon point; its middle takes that part.
//   - On a line of sight the first of points with equal diffraction parameters is the horizon.
//   - Nearer than 0.25 km [P1812] gives free space.
//   - Building entry loss is not part of the methods.
package propagation

// Package propagation gives the basic transmission loss of a path: a profile of the ground, two
// antenna heights, a frequency and the air go in; the loss comes out with every intermediate term
// that the Recommendation names. It knows no antenna, no radio and no map.
//
// A method is a value of type [Model]:
//
//   - [FreeSpace]: Rec. ITU-R P.525, free space on the straight line between the antennas.
//   - [P526]: free space with the delta-Bullington diffraction of Rec. ITU-R P.526-15, section
//     4.5.4, in the form in which Rec. ITU-R P.1812 uses it: cover on the ground enters the
//     Bullington construction of the actual profile and nothing else.
//
// Conventions. Distances are km along the path, heights m, elevations degrees and up positive,
// losses dB and positive. Inside the files that transcribe a Recommendation the locals carry its
// symbols in ASCII (hts, dlt, nu), frequencies in GHz, angles in mrad, Earth radii in km. Equation
// numbers are those of P.1812-6 where nothing else is said; numbers marked with a tilde are from
// memory.
//
// Bad input is an error that names the value and its allowed range. A path that a method can
// evaluate but was not made for gives its result with an entry in [Loss].Notes.
//
// All functions are pure and safe for concurrent use. None allocates unless it returns an error
// or a note.
package propagation

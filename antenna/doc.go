// Package antenna knows antennas as installed: what they radiate towards a direction, their
// impedance, their losses, and what feeder and match make of that at the radio's port.
//
// A [Design] is an antenna as a plan describes it; a function makes one for each kind. Solved in
// a [Setting] it gives a [Solution]: a [Pattern], an impedance, an efficiency. A [Mount] turns
// the pattern to where the antenna faces, and a [Match] and a [Run] of [Feeder] bring its
// impedance to the radio, decibel by decibel in a [Transfer].
//
// # Kinds
//
//	Dipole      straight rod of any length, fed anywhere: sinusoidal current, closed forms
//	Isotropic   equal in all directions
//	Omni        reference pattern of Rec. ITU-R F.1336-5, recommends 2.1
//	Datasheet   gain, widths and front-to-back ratio, joined by a parabolic main lobe
//	Cuts        horizontal and vertical cut from a maker, joined over the sphere
//	Table       gain over the whole sphere from a file
//
// A package with a better method, such as a solver for wires, makes a Design of its own.
//
// # Frames
//
// In the antenna's frame x is its facing, y to the left of it and z up. At a site x is north, y
// west and z up. In both, azimuth counts clockwise seen from above and elevation up from the
// horizontal, in degrees; of a far field's components theta points down and phi towards growing
// azimuth. Time goes as exp(+jwt).
//
// # Scope
//
// Antennas stand in free space: the ground, the terrain and the air belong to the propagation
// method, and would be counted twice here. Conductor loss, the match and the feeder are owned
// here and nowhere else. Closed forms and makers' figures leave out the mast; the Solution's
// notes say so where there is one.
//
// Known deviations: the dipole's current is taken as sinusoidal, which makes the resistance of a
// real rod near a half wave 4 to 25 % too low, more so the thicker it is, and its impedance far
// from a current maximum a rough estimate (noted, or refused); F.1336 patterns are envelopes for
// sharing studies and start at 400 MHz.
package antenna

// Package wire solves antennas of thin wires by the method of moments: what flows in straight round
// wires of any direction, joined at their ends, fed at any place, beside a mast.
//
// [Dipole], [FoldedDipole], [Yagi], [Stack] and [Wires] each make an [Antenna], which is an
// [antenna.Design] like any other and can be analysed beyond that: resonance, band, cut list. Under
// them is a [Structure] of wires, feeds and a mast, which solved at a frequency is a [Network] of
// its ports, and excited there a [Radiation].
//
// # Method
//
// Galerkin's method with piecewise-sinusoidal currents and mixed potentials, the charge explicit,
// so that steps of radius and junctions need no special treatment; the kernel averaged exactly
// around wires on one line; a voltage across an infinitely small gap. Blocks of segments in like
// positions are computed once, and the matrix is filled on all cores. The theory is in every
// handbook of antennas (Harrington, Balanis); the formulation is described where it is written,
// at interaction, mesh and cage.
//
// A mast is one wire, or a cage of parallel wires if it is not thin. A cage is the same all around,
// which its matrix shares: taken apart into harmonics around the mast it is factored in the time of
// a few single wires. The antenna's matrix is bordered with it.
//
// # Scope
//
// Wires are in free space: the ground, and what it does to pattern and impedance, belongs to the
// propagation method. Of nearby metal only the mast is solved. Booms, insulators, feed hardware and
// currents on the outside of the feeder (no balun) are not modelled. The mast is without loss and
// tubes with walls of three skin depths count as solid.
//
// # Accuracy
//
// For wires thinner than a hundredth of a wavelength: gain 0.2 dB, twice that for long Yagis tuned
// to their limit; resistance 5 %, reactance 3 ohm near resonance; resonance 0.5 %; efficiency 2 %
// of the loss. The impedance at a gap has no limit as segments shrink, most visibly on thick rods
// and near a full wave: the rule of segmentation ([Structure]) is part of the result.
package wire

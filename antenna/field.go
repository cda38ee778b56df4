package antenna

import "math"

// A Field is the far field of an antenna towards a direction: its component along theta (down)
// and along phi (towards growing azimuth), scaled so that [Field.Power] is the gain or
// directivity over an isotropic antenna.
type Field struct{ Theta, Phi complex128 }

// Power returns |Theta|^2 + |Phi|^2, both polarizations together, as a power ratio.
func (f Field) Power() float64 { return squared(f.Theta) + squared(f.Phi) }

// GainDBi returns the power in dBi; an exact null gives -Inf.
func (f Field) GainDBi() float64 { return decibels(f.Power()) }

// VerticalShare returns the part of the power that is in the vertical component, 0 to 1, by
// which a propagation method weighs its results for the two polarizations. A field of no power
// gives one half.
func (f Field) VerticalShare() float64 {
	power := f.Power()
	if power == 0 {
		return 0.5
	}
	return squared(f.Theta) / power
}

// scaled returns the field with both components times an amplitude factor.
func (f Field) scaled(factor float64) Field {
	return Field{f.Theta * complex(factor, 0), f.Phi * complex(factor, 0)}
}

// turned returns the components along axes turned by an angle from theta towards phi, given by
// its cosine and sine.
func (f Field) turned(cos, sin float64) Field {
	c, s := complex(cos, 0), complex(sin, 0)
	return Field{Theta: c*f.Theta + s*f.Phi, Phi: c*f.Phi - s*f.Theta}
}

// PolarizationMatchDB returns the loss between the polarizations of two antennas in dB, from 0
// (alike) to floorDB (positive), the most that crossing them costs on a real path, where
// scattering turns part of the field. Each field is the one towards the other antenna, in the
// frame of its own site (see [Mount.Field]).
//
// The power received is in proportion to |Et_theta Er_theta - Et_phi Er_phi|^2: no conjugate,
// since the antennas look at each other, and a minus because growing azimuth at one is the
// opposite way at the other. So antennas slanted alike by 45 degrees and facing each other are
// crossed, and alike helices of one hand are matched. A field of no power gives floorDB.
//
// Source: reciprocity and the definition of effective length; the same in every handbook.
func PolarizationMatchDB(transmitted, received Field, floorDB float64) float64 {
	power := transmitted.Power() * received.Power()
	if power == 0 {
		return floorDB
	}
	match := squared(transmitted.Theta*received.Theta-transmitted.Phi*received.Phi) / power
	return math.Min(math.Max(0, -decibels(match)), floorDB)
}

// squared returns |z|^2 without the square root of cmplx.Abs.
func squared(z complex128) float64 { return real(z)*real(z) + imag(z)*imag(z) }

// decibels returns 10 log10 of a power ratio.
func decibels(ratio float64) float64 { return 10 * math.Log10(ratio) }

// powerRatio returns the power ratio of a level in dB.
func powerRatio(dB float64) float64 { return math.Pow(10, dB/10) }

package antenna

import "math"

// NullFloorDB is how far below its peak a pattern's gain is taken to fall at most, in dB. On a
// site, reflections from the ground, the mast and whatever stands around fill deeper nulls.
// Common practice, no source.
const NullFloorDB = 25

// A Pattern is what an antenna radiates at one frequency, in the antenna's own frame: azimuth 0
// is its facing, elevation 90 the zenith when it is mounted upright.
type Pattern struct {
	// Field returns the far field towards a direction, scaled so that its power is the gain or
	// directivity. A pattern without phase returns real components, not negative.
	Field func(Direction) Field
	// PeakDBi is the largest gain over all directions, both polarizations together.
	PeakDBi float64
	// Phased says that the phase between the components is known. Without it, the phase is
	// taken as zero.
	Phased bool
	// GainOnly says that nothing but the gain is known, as makers state it, for the antenna as
	// it is mounted. Field returns all of it in Theta, and a [Mount] turns the polarization with
	// its roll, never the pattern.
	GainOnly bool
}

// GainDBi returns the gain (or directivity, see [Solution]) towards a direction of the antenna's
// own frame in dBi, at most [NullFloorDB] below the peak.
func (p Pattern) GainDBi(toward Direction) float64 { return p.Filled(p.Field(toward)).GainDBi() }

// Filled returns a field of this pattern with the floor applied under its nulls: the one place
// for it. Power below the floor is raised to the floor, the polarization stays. Where the field
// is null to within rounding (under -120 dB from the peak) there is no polarization to keep, and
// the power is divided evenly between the components, in quadrature: 3 dB to any linear antenna.
func (p Pattern) Filled(f Field) Field {
	floor, null := p.floors()
	return filled(f, floor, null)
}

// floors returns the power under which a field is raised, and that under which it is null.
func (p Pattern) floors() (floor, null float64) {
	return powerRatio(p.PeakDBi - NullFloorDB), powerRatio(p.PeakDBi - 120)
}

func filled(f Field, floor, null float64) Field {
	power := f.Power()
	switch {
	case power >= floor:
		return f
	case power <= null:
		each := math.Sqrt(floor / 2)
		return Field{complex(each, 0), complex(0, each)}
	}
	return f.scaled(math.Sqrt(floor / power))
}

// MeanGain returns the mean of the power over the sphere as a ratio: 1 for a directivity, the
// efficiency for a gain that holds the losses. Gauss-Legendre over the sine of the elevation and
// equal steps of azimuth: 0.5 % for smooth lobes 2 degrees wide, far better for wider ones.
func (p Pattern) MeanGain() float64 {
	const azimuths = 240
	return newGaussRule(160).mean(func(sinEl float64) float64 {
		elDeg := degrees(math.Asin(sinEl))
		sum := 0.0
		for i := range azimuths {
			sum += p.Field(Direction{AzDeg: float64(i) * 360 / azimuths, ElDeg: elDeg}).Power()
		}
		return sum / azimuths
	})
}

// gainPattern returns the pattern of an antenna of which only the gain is known: peakDBi less
// the attenuation in dB (not negative, 0 somewhere) towards each direction.
func gainPattern(peakDBi float64, attenuationDB func(Direction) float64) Pattern {
	return Pattern{
		Field: func(d Direction) Field {
			return Field{Theta: complex(amplitude(peakDBi-attenuationDB(d)), 0)}
		},
		PeakDBi:  peakDBi,
		GainOnly: true,
	}
}

// amplitude returns the field amplitude of a gain in dBi.
func amplitude(gainDBi float64) float64 { return math.Sqrt(powerRatio(gainDBi)) }

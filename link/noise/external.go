package noise

import (
	"fmt"
	"math"
)

// An Environment is the kind of surroundings by which Rec. ITU-R P.372 classes man-made noise.
type Environment string

// The environments of Rec. ITU-R P.372.
const (
	City        Environment = "city"
	Residential Environment = "residential"
	Rural       Environment = "rural"
	QuietRural  Environment = "quiet rural"
)

// Outside is the noise that a lossless antenna picks up.
type Outside struct {
	// Factor is fa, the noise over that of the reference temperature, at least 1.
	Factor float64
	// ManMadeShare is the part of Factor that is man-made, DecileDB the location decile of that
	// part: a tenth of the places of this kind have more than the median by it. Both are 0 where
	// no man-made noise is counted.
	ManMadeShare, DecileDB float64
	// Source says what was counted, Note what was not; Note is "" when nothing is missing.
	Source, Note string
}

// A fit is a median noise figure Fam = c - d log f, f in MHz, stated from loMHz to hiMHz.
type fit struct{ c, d, loMHz, hiMHz, decileDB float64 }

// manMade returns the fit for an environment.
//
// Source: Rec. ITU-R P.372-17, section ~5, coefficients as in P.372-10. Ranges and the deciles of
// location are from memory; quiet rural takes the decile of rural.
func (e Environment) manMade() fit {
	switch e {
	case City:
		return fit{76.8, 27.7, 0.3, 250, 8.4}
	case Residential:
		return fit{72.5, 27.7, 0.3, 250, 5.8}
	case Rural:
		return fit{67.2, 27.7, 0.3, 250, 6.8}
	case QuietRural:
		return fit{53.6, 28.6, 0.3, 30, 6.8}
	}
	panic(fmt.Sprintf("noise: no environment is called %q", string(e)))
}

// galactic is the noise of the Milky Way, averaged over the sky. P.372 states it up to about 100 MHz
// (from memory); the sky goes on with nearly the same slope, and from 183 MHz on it lies below the
// reference temperature.
//
// Source: Rec. ITU-R P.372-17, section ~6, coefficients as in P.372-10.
var galactic = fit{c: 52, d: 23}

func (f fit) figureDB(freqMHz float64) float64 { return f.c - f.d*math.Log10(freqMHz) }

// External returns the median external noise of an environment at freqHz, 30 MHz and more: the
// factors of man-made and galactic noise added. Beyond the range of the man-made fit, 250 MHz and
// for [QuietRural] 30 MHz, galactic noise stands alone and a note says so. Other environments than
// the four panic.
//
// The sum is at least 1, which is this project's choice: an antenna near the ground sees ground and
// obstacles at the reference temperature, and a cold sky is not promised to a link.
//
// Source: Rec. ITU-R P.372-17, sections ~2, ~5 and ~6.
func External(e Environment, freqHz float64) Outside {
	f, m := freqHz/1e6, e.manMade()
	sky := ratio(galactic.figureDB(f))
	if f < m.loMHz || f > m.hiMHz {
		return Outside{
			Factor: max(1, sky),
			Source: "P.372, galactic noise",
			Note:   fmt.Sprintf("man-made noise is not counted: P.372 states it for %q from %g to %g MHz, not for %g MHz", string(e), m.loMHz, m.hiMHz, f),
		}
	}
	made := ratio(m.figureDB(f))
	return Outside{
		Factor:       made + sky, // above 1 at every frequency of the fits
		ManMadeShare: made / (made + sky),
		DecileDB:     m.decileDB,
		Source:       fmt.Sprintf("P.372, %s man-made and galactic noise", string(e)),
	}
}

// MeasuredRiseDB returns by how many dB noise measured at the receiver's port raises the receiver's
// own: 10 log[1 + n/(k T0 B fr)]. levelDBm is n, what arrives at the port in bandwidthHz without the
// receiver's share, receiverFigureDB the noise figure of the receiver. The result is never negative.
//
// Source: definition of the noise figure (IEEE).
func MeasuredRiseDB(levelDBm, bandwidthHz, receiverFigureDB float64) float64 {
	return 10 * math.Log10(1+ratio(levelDBm-ThermalDBm(bandwidthHz)-receiverFigureDB))
}

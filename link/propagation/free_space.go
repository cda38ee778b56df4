package propagation

import "math"

// lightMPerS is the speed of light in vacuum, exact by definition of the metre.
const lightMPerS = 299_792_458

// WavelengthM returns the wavelength in vacuum, m, at freqHz > 0.
func WavelengthM(freqHz float64) float64 { return lightMPerS / freqHz }

// FreeSpaceDB returns the free-space basic transmission loss Lbf = 20 log(4 pi d / lambda), dB,
// for a distance distM > 0 at freqHz > 0. It holds in the far field; nearer than a wavelength or
// so it is a mere number.
//
// Source: Rec. ITU-R P.525-4, (~3), exact: without the rounded constant 32.4 of (~4).
func FreeSpaceDB(freqHz, distM float64) float64 {
	return 20 * math.Log10(4*math.Pi*distM/WavelengthM(freqHz))
}

// FreeSpace is Rec. ITU-R P.525: the loss on the straight line between the antennas, whatever
// stands in it. The terrain decides the elevations and [Loss].TransHorizon alone.
var FreeSpace = Model{Name: "free-space", Edition: "P.525-4", MinHz: minHz, MaxHz: maxHz, Loss: freeSpaceLoss}

func freeSpaceLoss(p Path) (Loss, error) {
	if err := p.check(); err != nil {
		return Loss{}, err
	}
	h := findHorizons(&p)
	l := Loss{Terms: noTerms}
	l.setHorizons(&p, h)
	l.DB = FreeSpaceDB(p.FreqHz, 1000*p.slantKm())
	l.Terms.Lbfs, l.Terms.Lb = l.DB, l.DB
	return l, nil
}

// slantKm returns the length of the straight line between the antennas as P.1812 takes it: path
// length and difference of heights at right angles.
func (p *Path) slantKm() float64 {
	return math.Hypot(p.LengthKm(), (p.txAslM()-p.rxAslM())/1000)
}

package wire

import (
	"fmt"
	"math"

	"fellreach/antenna"
)

// How much of the mast is solved with the antenna, in wavelengths.
const (
	mastReachWl      = 2    // beside an antenna, past its metal
	mastBelowWl      = 0.25 // from an antenna on top down to the conductor
	mastBelowReachWl = 0.5  // of the conductor there
)

// designWavelengthM is the wavelength that lengths are cut for.
func designWavelengthM(in antenna.Setting) float64 { return antenna.WavelengthM(in.DesignHz) }

// mastOf returns the conductor to be solved with a layout: none, the pole beside the antenna, or
// that below it. All its measures are of the design frequency, so that it stays the same over a
// sweep.
//
// Beside an antenna it reaches two wavelengths past the antenna's metal, or up to its real top,
// and then on to a whole number of wavelengths: a pole cut between those, near 4.4 or 5.4,
// resonates as a whole and puts up to 0.3 dB of its own into the pattern, three times as much as
// one of 4 or 5. Below an antenna on top it begins a quarter wave under the lowest metal and is
// half a wave long.
func mastOf(in antenna.Setting, l layout) Mast {
	if in.MastDiameterM == 0 {
		return Mast{}
	}
	wavelengthM := designWavelengthM(in)
	sin, cos := math.Sincos(in.RollDeg * math.Pi / 180)
	up := vec{0, sin, cos} // as the rolled antenna sees it
	lowest, highest := l.extent(up)
	foot, bottom, top := vec{l.boomMiddleM, 0, 0}, 0.0, 0.0
	if in.StandoffM == 0 {
		top = lowest - mastBelowWl*wavelengthM
		bottom = top - mastBelowReachWl*wavelengthM
	} else {
		foot = vec{-in.StandoffM, 0, 0}
		top = min(highest+mastReachWl*wavelengthM, in.MastAboveM)
		bottom = min(lowest, top) - mastReachWl*wavelengthM
		whole := math.Ceil((top-bottom)/wavelengthM) * wavelengthM
		if top < in.MastAboveM {
			top += min((whole-(top-bottom))/2, in.MastAboveM-top)
		}
		bottom = top - whole
	}
	return Mast{From: foot.plus(up.times(bottom)), To: foot.plus(up.times(top)), DiameterM: in.MastDiameterM}
}

// mastRemarks says how the mast was taken.
func mastRemarks(in antenna.Setting, m Mast) []string {
	if !m.exists() {
		return nil
	}
	wavelengthM := designWavelengthM(in)
	if in.StandoffM == 0 {
		return []string{fmt.Sprintf("on top: solved as standing clear on an insulating stub, the mast's conductor beginning %g wl below the lowest metal, %g wl of it included", mastBelowWl, mastBelowReachWl)}
	}
	model := "one wire on its axis"
	if wires := m.wireCount(wavelengthM); wires > 1 {
		model = fmt.Sprintf("a cage of %d wires", wires)
	}
	return []string{fmt.Sprintf("mast of %.0f mm at %.3g m: %.3g wl of it solved as %s", 1000*m.DiameterM, in.StandoffM, m.lengthM()/wavelengthM, model)}
}

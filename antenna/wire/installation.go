package wire

import (
	"errors"
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

// An Installation is how and where an antenna is used: a setting, with its roll and the height of
// its mast, which count here and not in the setting inside.
type Installation struct {
	antenna.Setting
	// RollDeg is how far the mount rolls the antenna about its facing ([antenna.Mount]). The mast
	// stands upright all the same, so in the antenna's frame, in which wires and pattern are
	// given, it leans the other way.
	RollDeg float64
	// MastAboveM is how far a mast beside the antenna goes on above its origin (the feed of a
	// dipole, the centre of a stack), in metres: positive infinity if it goes on and on, negative
	// if the antenna stands higher. It says nothing where there is no standoff.
	MastAboveM float64
}

// installed returns the installation that a setting describes.
func installed(s antenna.Setting) Installation {
	return Installation{Setting: s, RollDeg: s.RollDeg, MastAboveM: s.MastAboveM}
}

// checked returns the installation with its defaults filled in, or an error.
func (in Installation) checked() (Installation, error) {
	setting, err := in.Setting.Checked()
	in.Setting = setting
	if !(math.Abs(in.RollDeg) <= 360) {
		err = errors.Join(err, fmt.Errorf("roll %g deg is out of range: -360 to 360 is allowed", in.RollDeg))
	}
	if math.IsNaN(in.MastAboveM) {
		err = errors.Join(err, errors.New("the mast's height above the antenna is not a number"))
	}
	return in, err
}

func (in Installation) wavelengthM() float64 { return antenna.WavelengthM(in.DesignHz) }

// mast returns the conductor to be solved with a layout: none, the pole beside the antenna, or
// that below it. All its measures are of the design frequency, so that it stays the same over a
// sweep.
//
// Beside an antenna it reaches two wavelengths past the antenna's metal, or up to its real top,
// and then on to a whole number of wavelengths: a pole cut between those, near 4.4 or 5.4,
// resonates as a whole and puts up to 0.3 dB of its own into the pattern, three times as much as
// one of 4 or 5. Below an antenna on top it begins a quarter wave under the lowest metal and is
// half a wave long.
func (in Installation) mast(l layout) Mast {
	if in.MastDiameterM == 0 {
		return Mast{}
	}
	wavelengthM := in.wavelengthM()
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

// notes says how the mast was taken.
func (in Installation) notes(m Mast) []string {
	if !m.exists() {
		return nil
	}
	wavelengthM := in.wavelengthM()
	if in.StandoffM == 0 {
		return []string{fmt.Sprintf("on top: solved as standing clear on an insulating stub, the mast's conductor beginning %g wl below the lowest metal, %g wl of it included", mastBelowWl, mastBelowReachWl)}
	}
	model := "one wire on its axis"
	if wires := m.wireCount(wavelengthM); wires > 1 {
		model = fmt.Sprintf("a cage of %d wires", wires)
	}
	return []string{fmt.Sprintf("mast of %.0f mm at %.3g m: %.3g wl of it solved as %s", 1000*m.DiameterM, in.StandoffM, m.lengthM()/wavelengthM, model)}
}

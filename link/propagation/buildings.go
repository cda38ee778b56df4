package propagation

import (
	"fmt"
	"math"
)

// BuiltLossDB returns the loss Ah, dB and never negative, of a terminal antennaAglM metres above a
// street among buildings or trees that stand clutterM high: from an antenna at their height down to
// this one. It is 0 when the antenna is at their height or above.
//
// streetM is the width ws of the street, 27 m where it is not known. The method is stated for 0.03
// to 3 GHz; outside, the result comes with a note.
//
// Source: Rec. ITU-R P.2108-1, section 3.1, the form for suburban and urban surroundings and woods.
func BuiltLossDB(freqHz, antennaAglM, clutterM, streetM float64) (lossDB float64, note string) {
	hdif := clutterM - antennaAglM
	if !(hdif > 0) {
		return 0, ""
	}
	f := freqHz / 1e9
	if f < 0.03 || f > 3 {
		note = fmt.Sprintf("the loss among buildings by P.2108 is stated for 30 to 3000 MHz, not for %g MHz", freqHz/1e6)
	}
	thetaClut := math.Atan2(hdif, streetM) * 180 / math.Pi
	nu := 0.342 * math.Sqrt(f*hdif*thetaClut)
	return max(0, KnifeEdgeDB(nu)-6.03), note
}

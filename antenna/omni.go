package antenna

import (
	"errors"
	"fmt"
	"math"
)

// f1336LowestHz is where Rec. ITU-R F.1336 begins.
const f1336LowestHz = 400e6

// Omni returns an antenna of a stated gain in dBi that is the same in all azimuths, with the
// reference pattern of Rec. ITU-R F.1336-5 in elevation. The polarization is that of its mount.
func Omni(gainDBi float64, port Port) (Design, error) {
	port, err := port.checked()
	if err := errors.Join(checkGain(gainDBi), err); err != nil {
		return Design{}, err
	}
	antenna := stated{
		pattern: gainPattern(gainDBi, func(d Direction) float64 { return omniAttenuationDB(gainDBi, d.ElDeg) }),
		port:    port,
		source:  fmt.Sprintf("%g dBi as stated, ITU-R F.1336-5 recommends 2.1, k = 0.7: an envelope, kind to a wanted link off the main lobe", gainDBi),
		notesAt: func(s Setting) []string {
			if s.FreqHz >= f1336LowestHz {
				return nil
			}
			return []string{"ITU-R F.1336 begins at 400 MHz: its pattern is used below that"}
		},
	}
	return Design{Kind: "omni", Solve: antenna.solve}, nil
}

// omniAttenuationDB returns how far the reference pattern of an omnidirectional antenna lies
// below its gain G0 in dBi, in dB, at an elevation within -90 to 90 degrees.
//
// Source: Rec. ITU-R F.1336-5, recommends 2.1 (peak side lobes), with k = 0.7 for typical
// antennas; from memory.
func omniAttenuationDB(g0, elDeg float64) float64 {
	const k = 0.7
	theta := math.Abs(elDeg)
	theta3 := 107.6 * math.Pow(10, -0.1*g0)
	theta4 := theta3 * math.Sqrt(1-math.Log10(k+1)/1.2)
	switch {
	case theta < theta4:
		return 12 * (theta / theta3) * (theta / theta3)
	case theta < theta3:
		return 12 - decibels(k+1)
	}
	return 12 - decibels(math.Pow(theta/theta3, -1.5)+k)
}

package antenna

import (
	"fmt"
	"math"
)

// within returns an error that names the value and its range unless lo <= value <= hi. NaN and
// infinities are never within.
func within(name string, value, lo, hi float64, unit string) error {
	if value >= lo && value <= hi {
		return nil
	}
	if unit != "" {
		unit = " " + unit
	}
	return fmt.Errorf("%s %g%s is out of range: %g to %g%s is allowed", name, value, unit, lo, hi, unit)
}

// positive returns an error that names the value unless it is above zero and finite.
func positive(name string, value float64, unit string) error {
	if value > 0 && !math.IsInf(value, 1) {
		return nil
	}
	return fmt.Errorf("%s %g %s is not allowed: it must be above 0 and finite", name, value, unit)
}

// checkGain returns an error unless a stated gain is one that antennas have.
func checkGain(gainDBi float64) error { return within("gain", gainDBi, -20, 40, "dBi") }

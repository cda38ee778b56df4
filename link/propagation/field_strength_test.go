package propagation

import (
	"math"
	"testing"
)

// Source: P.525: 1 kW e.r.p. of a half-wave dipole makes 106.92 dB(uV/m) at 1 km. P.1812's constants
// for the loss (92.4, exact 92.448) and the field make 106.96.
func TestFieldStrengthInFreeSpace(t *testing.T) {
	for _, f := range []float64{0.03, 0.15, 0.9, 6} {
		if got := fieldStrength(f, lineOfSightDB(f, 1)); math.Abs(got-106.96) > 1e-9 {
			t.Errorf("at %g GHz %.6f dB(uV/m), want 106.96", f, got)
		}
		if got := fieldStrength(f, FreeSpaceDB(f*1e9, 1000)); math.Abs(got-106.92) > 0.01 {
			t.Errorf("at %g GHz behind the exact loss %.6f dB(uV/m), want 106.92", f, got)
		}
	}
}

package antenna

import (
	"math"
	"strings"
	"testing"
)

// near reports a figure that lies further than the tolerance from the one wanted.
func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s = %.6g, want %.6g within %.2g", what, got, want, tolerance)
	}
}

// wantError reports an error that is missing or does not say what it should.
func wantError(t *testing.T, what string, err error, says string) {
	t.Helper()
	if err == nil || !strings.Contains(err.Error(), says) {
		t.Errorf("%s: error %v, want one that says %q", what, err, says)
	}
}

// solved returns the solution of a design that must have one.
func solved(t testing.TB, d Design, err error, s Setting) Solution {
	t.Helper()
	if err != nil {
		t.Fatal(err)
	}
	solution, err := d.Solve(s)
	if err != nil {
		t.Fatal(err)
	}
	return solution
}

// dipoleOf returns a lossless dipole at 300 MHz, lengths in wavelengths.
func dipoleOf(t testing.TB, lengthWl, radiusWl, feedAt float64) Solution {
	t.Helper()
	d, err := Dipole(DipoleSpec{
		Length:    Length{Wavelengths: lengthWl},
		FeedAt:    feedAt,
		DiameterM: 2 * radiusWl * WavelengthM(300e6),
		Material:  Ideal,
	})
	return solved(t, d, err, Setting{FreqHz: 300e6})
}

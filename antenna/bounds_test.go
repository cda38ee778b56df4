package antenna

import (
	"math"
	"testing"
)

func TestWithin(t *testing.T) {
	for _, value := range []float64{-20, 0, 40} {
		if err := checkGain(value); err != nil {
			t.Errorf("%g: %v", value, err)
		}
	}
	for _, tc := range []struct {
		value float64
		says  string
	}{
		{40.1, "gain 40.1 dBi is out of range: -20 to 40 dBi is allowed"},
		{math.NaN(), "gain NaN dBi is out of range"},
		{math.Inf(-1), "gain -Inf dBi is out of range"},
	} {
		wantError(t, "gain", checkGain(tc.value), tc.says)
	}
	wantError(t, "without a unit", within("vswr", 0.5, 1, 20, ""), "vswr 0.5 is out of range: 1 to 20 is allowed")
}

func TestPositive(t *testing.T) {
	for _, value := range []float64{1e-300, 1, math.MaxFloat64} {
		if err := positive("length", value, "m"); err != nil {
			t.Errorf("%g: %v", value, err)
		}
	}
	for _, value := range []float64{0, -1, math.NaN(), math.Inf(1), math.Inf(-1)} {
		wantError(t, "length", positive("length", value, "m"), "must be above 0 and finite")
	}
}

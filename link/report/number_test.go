package report

import (
	"math"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

func TestNumbers(t *testing.T) {
	for _, tc := range []struct{ got, want string }{
		{decimals(12.345, 2), "12.35"},
		{decimals(-0.04, 1), "0.0"},
		{decimals(-0.06, 1), "-0.1"},
		{decimals(-10, 0), "-10"},
		{decimals(0, 0), "0"},
		{signed(3.14159, 1), "+3.1"},
		{signed(-3.14159, 1), "-3.1"},
		{signed(0.04, 1), "0.0"},
		{signed(-0.04, 1), "0.0"},
		{azimuth(359.94), "359.9"},
		{azimuth(359.96), "0.0"},
		{azimuth(0), "0.0"},
		{percent(99.95), "> 99.9 %"},
		{percent(99.55), "99.5 %"},
		{percent(98.7), "99 %"},
		{percent(50.4), "50 %"},
		{percent(0.44), "0.4 %"},
		{percent(0.04), "< 0.1 %"},
		{counted(1, "link", "links"), "1 link"},
		{counted(0, "link", "links"), "0 links"},
	} {
		if tc.got != tc.want {
			t.Errorf("got %q, want %q", tc.got, tc.want)
		}
	}
}

// A written number reads back within half its last digit, and never as minus zero.
func TestNumbersReadBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x, count := rapid.Float64Range(-1e6, 1e6).Draw(t, "x"), rapid.IntRange(0, 6).Draw(t, "decimals")
		for _, text := range []string{decimals(x, count), signed(x, count)} {
			back, err := strconv.ParseFloat(text, 64)
			if err != nil || math.Abs(back-x) > 0.5*math.Pow10(-count)+1e-9 || (back == 0 && math.Signbit(back)) {
				t.Fatalf("%g is written %q", x, text)
			}
		}
	})
}

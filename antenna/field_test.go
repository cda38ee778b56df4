package antenna

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestField(t *testing.T) {
	for _, tc := range []struct {
		f                    Field
		power, dBi, vertical float64
	}{
		{Field{Theta: 1}, 1, 0, 1},
		{Field{Phi: 2i}, 4, 6.0206, 0},
		{Field{Theta: 3, Phi: -4}, 25, 13.9794, 0.36},
		{Field{Theta: complex(1, 1), Phi: complex(1, -1)}, 4, 6.0206, 0.5},
	} {
		if got := tc.f.Power(); got != tc.power {
			t.Errorf("power of %v = %g, want %g", tc.f, got, tc.power)
		}
		near(t, "gain", tc.f.GainDBi(), tc.dBi, 1e-4)
		near(t, "vertical share", tc.f.VerticalShare(), tc.vertical, 1e-15)
	}
	if got := (Field{}).VerticalShare(); got != 0.5 {
		t.Errorf("vertical share of nothing = %g, want 0.5", got)
	}
	if got := (Field{}).GainDBi(); !math.IsInf(got, -1) {
		t.Errorf("gain of nothing = %g dBi, want -Inf", got)
	}
}

// Source: Malus's law, and the handedness of two helices that look at each other.
func TestPolarizationMatchDB(t *testing.T) {
	vertical, horizontal := Field{Theta: 1}, Field{Phi: 1}
	slant := Field{Theta: 1, Phi: -1} // +45 degrees: up and towards growing azimuth
	across := Field{Theta: 1, Phi: 1}
	right, left := Field{Theta: 1, Phi: 1i}, Field{Theta: 1, Phi: -1i}
	for _, tc := range []struct {
		name string
		a, b Field
		want float64
	}{
		{"vertical alike", vertical, vertical, 0},
		{"horizontal alike", horizontal, Field{Phi: 5i}, 0},
		{"vertical and horizontal", vertical, horizontal, 16},
		{"slanted alike, facing", slant, slant, 16},
		{"slanted to mirror each other", slant, across, 0},
		{"slanted and vertical", slant, vertical, 3.0103},
		{"30 degrees off", vertical, Field{Theta: complex(math.Sqrt(3), 0), Phi: 1}, 1.2494},
		{"circular alike", right, right, 0},
		{"circular of both hands", right, left, 16},
		{"circular and linear", right, horizontal, 3.0103},
		{"no field", vertical, Field{}, 16},
	} {
		near(t, tc.name, PolarizationMatchDB(tc.a, tc.b, 16), tc.want, 1e-4)
		near(t, tc.name+", back", PolarizationMatchDB(tc.b, tc.a, 16), tc.want, 1e-4)
	}
}

func anyField(t *rapid.T, label string) Field {
	part := rapid.Float64Range(-10, 10)
	return Field{
		complex(part.Draw(t, label), part.Draw(t, label)),
		complex(part.Draw(t, label), part.Draw(t, label)),
	}
}

func TestPolarizationMatchProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b := anyField(t, "a"), anyField(t, "b")
		loss := PolarizationMatchDB(a, b, 20)
		if !(loss >= 0 && loss <= 20) {
			t.Fatalf("match of %v and %v = %g dB, want 0 to 20", a, b, loss)
		}
		if back := PolarizationMatchDB(b, a, 20); math.Abs(back-loss) > 1e-9 {
			t.Fatalf("match of %v and %v = %g dB, back %g dB", a, b, loss, back)
		}
		sin, cos := math.Sincos(rapid.Float64Range(0, 7).Draw(t, "roll"))
		turned := PolarizationMatchDB(a.turned(cos, sin), b.turned(cos, -sin), 20)
		if math.Abs(turned-loss) > 1e-6 {
			t.Fatalf("match of %v and %v = %g dB, %g dB with both turned about the path", a, b, loss, turned)
		}
	})
}

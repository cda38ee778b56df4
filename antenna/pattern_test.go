package antenna

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestGainIsFlooredUnderNulls(t *testing.T) {
	p := dipoleOf(t, 0.5, 1e-3, 0.5).Pattern
	near(t, "broadside", p.GainDBi(Direction{77, 0}), 2.151, 1e-3)
	near(t, "along the rod", p.GainDBi(Direction{0, 90}), 2.151-NullFloorDB, 1e-3)
	near(t, "near its end", p.GainDBi(Direction{0, 89.9}), 2.151-NullFloorDB, 1e-3)
	near(t, "60 degrees up", p.GainDBi(Direction{0, 60}), 2.151+decibels(math.Pow(math.Cos(math.Pi/2*math.Sqrt(3)/2)*2, 2)), 1e-3)
}

func TestFilledKeepsPolarization(t *testing.T) {
	p := Pattern{PeakDBi: 10}
	for _, tc := range []struct {
		name      string
		f         Field
		dBi       float64
		vertical  float64
		unchanged bool
	}{
		{"above the floor", Field{Theta: 0.3i}, 20 * math.Log10(0.3), 1, true},
		{"below", Field{Theta: 3e-3, Phi: -4e-3}, -15, 0.36, false},
		{"far below", Field{Phi: 1e-5i}, -15, 0, false},
		{"nothing", Field{}, -15, 0.5, false},
		{"rounding", Field{Phi: 1e-9}, -15, 0.5, false},
	} {
		got := p.Filled(tc.f)
		near(t, tc.name+": gain", got.GainDBi(), tc.dBi, 1e-9)
		near(t, tc.name+": vertical share", got.VerticalShare(), tc.vertical, 1e-12)
		if (got == tc.f) != tc.unchanged {
			t.Errorf("%s: filled %v to %v", tc.name, tc.f, got)
		}
	}
	// Power without a polarization of its own: half of it reaches any linear antenna.
	near(t, "match of a filled null", PolarizationMatchDB(p.Filled(Field{}), Field{Theta: 1, Phi: 2}, 16), 3.0103, 1e-4)
}

// Source: conservation of energy; closed forms of the mean of cos^2 (2/3) and of a constant.
func TestMeanGain(t *testing.T) {
	constant := gainPattern(3, func(Direction) float64 { return 0 })
	near(t, "constant", constant.MeanGain(), powerRatio(3), 1e-9)
	short := Pattern{Field: func(d Direction) Field {
		return Field{Theta: complex(math.Cos(radians(d.ElDeg)), 0)}
	}}
	near(t, "short dipole", short.MeanGain(), 2.0/3, 1e-12)
	// A Gaussian lobe 2 degrees wide holds pi w^2/(4 ln 2) of solid angle.
	narrow := gainPattern(0, func(d Direction) float64 {
		az := math.Remainder(d.AzDeg, 360)
		return 12.0412 * (az*az + d.ElDeg*d.ElDeg) / 4
	})
	width := radians(2)
	near(t, "narrow lobe", narrow.MeanGain()/(math.Pi*width*width/(4*math.Ln2)/(4*math.Pi)), 1, 5e-3)
}

func TestLosslessDipolesRadiateWhatTheyAccept(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d, err := Dipole(DipoleSpec{
			Length:    Length{Wavelengths: rapid.Float64Range(0.02, 3).Draw(t, "length")},
			FeedAt:    rapid.Float64Range(0.05, 0.95).Draw(t, "feed"),
			DiameterM: 1e-4,
			Material:  Ideal,
		})
		if err != nil {
			t.Fatal(err)
		}
		s, err := d.Solve(Setting{FreqHz: 300e6})
		if err != nil {
			t.Skip(err)
		}
		if mean := s.Pattern.MeanGain(); math.Abs(mean-1) > 1e-9 {
			t.Fatalf("mean directivity %.12f, want 1", mean)
		}
	})
}

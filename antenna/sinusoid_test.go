package antenna

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// centreFed returns the sinusoidal current on a lossless wire one wavelength long per unit length.
func centreFed(t *testing.T, lengthWl, radiusWl float64) sinusoid {
	t.Helper()
	s, err := newSinusoid(sinusoid{wavelengthM: 1, radiusM: radiusWl, lowerM: lengthWl / 2, upperM: lengthWl / 2})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

const euler = 0.57721566490153286

// sineIntegral and cosineIntegral sum the power series of Si and Ci, good to 1e-9 up to x = 20.
// Source: Abramowitz and Stegun (5.2.14) and (5.2.16).
func sineIntegral(x float64) float64 {
	sum, term := 0.0, x
	for n := 1.0; n < 120; n += 2 {
		sum += term / n
		term *= -x * x / ((n + 1) * (n + 2))
	}
	return sum
}

func cosineIntegral(x float64) float64 {
	sum, term := euler+math.Log(x), -x*x/2
	for n := 2.0; n < 120; n += 2 {
		sum += term / n
		term *= -x * x / ((n + 1) * (n + 2))
	}
	return sum
}

// emfByIntegrals is the impedance of a centre-fed dipole of length l and radius a, in wavelengths.
// Source: Balanis, Antenna Theory, (8-60a), (8-60b) and (8-61), from memory.
func emfByIntegrals(l, a float64) complex128 {
	const eta, k = 376.730313668, 2 * math.Pi
	kl := k * l
	sin, cos := math.Sincos(kl)
	rm := eta / (2 * math.Pi) * (euler + math.Log(kl) - cosineIntegral(kl) +
		sin/2*(sineIntegral(2*kl)-2*sineIntegral(kl)) +
		cos/2*(euler+math.Log(kl/2)+cosineIntegral(2*kl)-2*cosineIntegral(kl)))
	xm := eta / (4 * math.Pi) * (2*sineIntegral(kl) +
		cos*(2*sineIntegral(kl)-sineIntegral(2*kl)) -
		sin*(2*cosineIntegral(kl)-cosineIntegral(2*kl)-cosineIntegral(2*k*a*a/l)))
	feed := math.Sin(kl / 2)
	return complex(rm, xm) / complex(feed*feed, 0)
}

func TestImpedanceAgainstSineAndCosineIntegrals(t *testing.T) {
	// Si(1), Si(10), Ci(1), Ci(10) of Abramowitz and Stegun, table 5.1: the check is checked.
	near(t, "Si(1)", sineIntegral(1), 0.946083, 1e-6)
	near(t, "Si(10)", sineIntegral(10), 1.658348, 1e-6)
	near(t, "Ci(1)", cosineIntegral(1), 0.337404, 1e-6)
	near(t, "Ci(10)", cosineIntegral(10), -0.045456, 1e-6)
	for _, l := range []float64{0.01, 0.1, 0.25, 0.4, 0.47, 0.5, 0.6, 0.75, 0.9, 1.1, 1.25, 1.45} {
		for _, a := range []float64{1e-6, 1e-4, 1e-3} {
			if a > l/20 {
				continue
			}
			got, err := centreFed(t, l, a).impedanceOhm()
			if err != nil {
				t.Errorf("%g wl: %v", l, err)
				continue
			}
			want := emfByIntegrals(l, a)
			// What remains is the square of radius over length.
			if cmplx.Abs(got-want) > (1e-7+4*a*a/(l*l))*cmplx.Abs(want) {
				t.Errorf("impedance at %g wl, radius %g wl = %v, by Si and Ci %v", l, a, got, want)
			}
		}
	}
}

// Source: Balanis and Kraus, from memory: 73.1 + j42.5 ohm for a thin half wave, and about
// 105.5 ohm at the current maximum of 1.5 wavelengths.
func TestPublishedImpedances(t *testing.T) {
	halfWave, err := centreFed(t, 0.5, 1e-5).impedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "R of a half wave", real(halfWave), 73.1, 0.1) // eta = 120 pi gives 73.13
	near(t, "X of a half wave", imag(halfWave), 42.5, 0.1)
	long, err := centreFed(t, 1.5, 1e-5).impedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "R of 1.5 wavelengths", real(long), 105.5, 0.2)
	// Short dipole: 20 pi^2 (l/wl)^2 for a triangular current, Balanis (4-37).
	short, err := centreFed(t, 0.02, 1e-5).impedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	near(t, "R of a short dipole", real(short)/(20*math.Pi*math.Pi*4e-4), 1, 0.002)
}

func TestEmfRowsOfReference(t *testing.T) {
	for _, row := range referenceRows(t, "dipole_impedance.csv") {
		if row["model"] != "emf" {
			continue
		}
		got := dipoleOf(t, number(t, row, "length_wl"), number(t, row, "radius_wl"), 0.5).ImpedanceOhm
		near(t, row["id"]+": R", real(got), number(t, row, "R_ohm"), number(t, row, "tol_R_ohm"))
		near(t, row["id"]+": X", imag(got), number(t, row, "X_ohm"), number(t, row, "tol_X_ohm"))
	}
}

// A real rod of radius 0.00001 to 0.005 wl near its half wave, by a moment method: how far the
// closed forms lie from it, as the package's documentation says.
func TestClosedFormsAgainstRealRods(t *testing.T) {
	for _, row := range referenceRows(t, "dipole_impedance.csv") {
		length, radius := number(t, row, "length_wl"), number(t, row, "radius_wl")
		if row["model"] != "mom" || length < 0.44 || length > 0.5 || radius > 0.005 {
			continue
		}
		got := dipoleOf(t, length, radius, 0.5).ImpedanceOhm
		low := 1 - real(got)/number(t, row, "R_ohm")
		if low < 0.03 || low > 0.25 {
			t.Errorf("%s: resistance %.1f ohm is %.0f %% under that of a rod, want 3 to 25 %%", row["id"], real(got), 100*low)
		}
		near(t, row["id"]+": X", imag(got), number(t, row, "X_ohm"), 12)
	}
}

// Source: Balanis and Kraus, from memory: 1.76, 2.15 and 3.82 dBi broadside; 1.5 wavelengths
// throw 3.5 dBi at 42.6 degrees from the wire.
func TestPublishedPatterns(t *testing.T) {
	for _, tc := range []struct{ length, dBi, fromAxisDeg float64 }{
		{0.002, 1.761, 90}, {0.02, 1.761, 90}, {0.5, 2.151, 90}, {1, 3.82, 90}, {1.25, 5.16, 90}, {1.5, 3.5, 42.6},
	} {
		p := centreFed(t, tc.length, 1e-5).pattern()
		near(t, "peak", p.PeakDBi, tc.dBi, 0.03)
		at := p.Field(Direction{0, 90 - tc.fromAxisDeg})
		near(t, "gain at the published angle", at.GainDBi(), p.PeakDBi, 0.005)
	}
}

// A full wave in its middle is refused as an antenna, but its pattern has an answer; it is
// reached from either side.
func TestFullWavePatternIsALimit(t *testing.T) {
	at := centreFed(t, 1, 1e-5).pattern()
	for _, l := range []float64{1 - 1e-7, 1 + 1e-7, 1 - 1e-12} {
		near(t, "peak", centreFed(t, l, 1e-5).pattern().PeakDBi, at.PeakDBi, 1e-5)
	}
	near(t, "three waves", centreFed(t, 3, 1e-5).pattern().MeanGain(), 1, 1e-9)
}

func TestSinusoidalRowsOfReference(t *testing.T) {
	for _, row := range referenceRows(t, "dipole_pattern.csv") {
		if row["model"] != "sinusoidal" {
			continue
		}
		p := centreFed(t, number(t, row, "length_wl"), 1e-5).pattern()
		tol := number(t, row, "tol_dB")
		near(t, row["id"]+": directivity", p.PeakDBi, number(t, row, "directivity_dBi"), tol)
		elDeg := 90 - number(t, row, "max_angle_from_axis_deg")
		near(t, row["id"]+": at the angle of the maximum", p.Field(Direction{0, elDeg}).GainDBi(), p.PeakDBi, tol)
		broadside := p.Field(Direction{}).GainDBi()
		if want := number(t, row, "broadside_dBi"); want > -20 {
			near(t, row["id"]+": broadside", broadside, want, tol)
		} else if broadside > -60 {
			t.Errorf("%s: broadside %.1f dBi, want a null", row["id"], broadside)
		}
		if row["null_angles_deg"] != "" {
			null := p.Field(Direction{0, 90 - number(t, row, "null_angles_deg")}).GainDBi()
			if null > p.PeakDBi-40 {
				t.Errorf("%s: %.1f dBi at its null", row["id"], null)
			}
		}
	}
}

// A half wave has one sinusoid wherever it is fed, and so one pattern and one power.
// Source: cosine rule, R = R0/sin^2 of the feed's distance from the end.
func TestHalfWaveFedAnywhere(t *testing.T) {
	middle := dipoleOf(t, 0.5, 1e-4, 0.5)
	for _, feed := range []float64{0.1, 0.25, 0.4, 0.7, 0.9} {
		off := dipoleOf(t, 0.5, 1e-4, feed)
		sin := math.Sin(math.Pi * feed)
		near(t, "R", real(off.ImpedanceOhm)*sin*sin, real(middle.ImpedanceOhm), 1e-3)
		near(t, "peak", off.Pattern.PeakDBi, middle.Pattern.PeakDBi, 1e-6)
	}
}

// The resistance by induced EMF must be that of the power in the far field: another integral of
// the same current, over the sphere and not along the wire.
func TestEmfResistanceIsRadiatedPower(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		length := rapid.Float64Range(0.02, 4).Draw(t, "length")
		feed := rapid.Float64Range(0.03, 0.97).Draw(t, "feed")
		s, err := newSinusoid(sinusoid{wavelengthM: 1, radiusM: 1e-5, lowerM: feed * length, upperM: (1 - feed) * length})
		if err != nil {
			t.Skip(err)
		}
		// U = eta/(32 pi^2)|F|^2 for F = SUM dI exp()/cosEl; P = 4 pi mean(U) = I^2 R/2.
		mean := newGaussRule(120).mean(func(sinEl float64) float64 {
			return squared(s.farField(sinEl, math.Sqrt(1-sinEl*sinEl)))
		})
		want := WaveImpedanceOhm / (4 * math.Pi) * mean
		if got := real(s.emf()); math.Abs(got-want) > 1e-6*want {
			t.Fatalf("EMF resistance %.9g ohm, by the far field %.9g", got, want)
		}
	})
}

// The field at the wire with the radius everywhere, integrated by plain steps in the logarithm of
// the distance: what the thin-wire form leaves out is of the order of the radius.
func TestEmfAgainstFieldAtTheSurface(t *testing.T) {
	for _, tc := range []struct{ length, feed float64 }{{0.3, 0.5}, {0.47, 0.2}, {0.72, 0.35}, {0.97, 0.25}, {1.6, 0.4}} {
		const radius = 1e-6
		s, err := newSinusoid(sinusoid{wavelengthM: 1, radiusM: radius, lowerM: tc.feed * tc.length, upperM: (1 - tc.feed) * tc.length})
		if err != nil {
			t.Fatal(err)
		}
		const steps = 40000
		var sum complex128
		for i, kink := range s.kinks {
			from, to := math.Asinh((-s.lowerM-kink)/radius), math.Asinh((s.upperM-kink)/radius)
			du := (to - from) / steps
			for n := range steps {
				u := from + (float64(n)+0.5)*du
				z := kink + radius*math.Sinh(u)
				sum += complex(s.steps[i]*s.current(z)*du, 0) * cmplx.Rect(1, -2*math.Pi*radius*math.Cosh(u))
			}
		}
		want := complex(0, WaveImpedanceOhm/(4*math.Pi)) * sum
		if got := s.emf(); cmplx.Abs(got-want) > 2e-3+1e-5*cmplx.Abs(want) {
			t.Errorf("%g wl fed at %g: emf %v ohm, by the field at the surface %v", tc.length, tc.feed, got, want)
		}
	}
}

func TestCurrentIsContinuousAndEndsAtZero(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		arm := rapid.Float64Range(0.01, 2)
		s, err := newSinusoid(sinusoid{wavelengthM: 1, radiusM: 1e-5, lowerM: arm.Draw(t, "lower"), upperM: arm.Draw(t, "upper")})
		if err != nil {
			t.Skip(err)
		}
		const tiny = 1e-9
		if step := s.current(tiny) - s.current(-tiny); math.Abs(step) > 1e-6 {
			t.Fatalf("current steps by %g at the feed", step)
		}
		if ends := math.Abs(s.current(s.upperM)) + math.Abs(s.current(-s.lowerM)); ends > 1e-12 {
			t.Fatalf("current %g at the ends", ends)
		}
		crest := math.Abs(s.current(0)) // a bend, which equal steps miss
		for i := range 4001 {
			z := -s.lowerM + (s.lowerM+s.upperM)*float64(i)/4000
			crest = max(crest, math.Abs(s.current(z)))
		}
		if math.Abs(crest-s.crestA()) > 1e-4 {
			t.Fatalf("largest current %g, crestA says %g", crest, s.crestA())
		}
	})
}

func TestArmsOfHalfWaves(t *testing.T) {
	_, err := newSinusoid(sinusoid{wavelengthM: 1, radiusM: 1e-4, lowerM: 0.5, upperM: 1})
	wantError(t, "arms of a half and a full wave", err, "both multiples of a half wave")
	// One arm alone: no current can enter it, the other's pattern stands, the impedance does not.
	s, err := newSinusoid(sinusoid{wavelengthM: 1, radiusM: 1e-4, lowerM: 0.5, upperM: 0.2})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "current in the other arm", s.upperA, 0, 1e-12)
	near(t, "directivity", s.pattern().PeakDBi, 2.151, 1e-3)
	_, err = s.impedanceOhm()
	wantError(t, "impedance", err, "too small at the feed")
}

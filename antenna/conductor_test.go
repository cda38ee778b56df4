package antenna

import (
	"math"
	"math/cmplx"
	"testing"
)

func TestImpedanceOfWiresAgainstReference(t *testing.T) {
	for _, row := range referenceRows(t, "conductor_loss.csv") {
		m := Material{row["material"], number(t, row, "conductivity_S_m"), number(t, row, "relative_permeability")}
		got := m.ImpedanceOhmPerM(1e6*number(t, row, "frequency_MHz"), 1e-3*number(t, row, "radius_mm"))
		// The table has six digits; the stated tolerance leaves room for other methods.
		near(t, row["id"]+": R over reference", real(got)/number(t, row, "internal_R_ohm_per_m"), 1, 1e-5)
		near(t, row["id"]+": X over reference", imag(got)/number(t, row, "internal_X_ohm_per_m"), 1, 1e-5)
	}
}

// Source: skin depth of copper 66 um at 1 MHz (handbooks); a wire much thicker than that has the
// resistance of a layer of one skin depth, and the same reactance.
func TestImpedanceOfThickWire(t *testing.T) {
	const radiusM = 5e-3
	z := Materials()[0].ImpedanceOhmPerM(1e6, radiusM)
	want := 1 / (5.8e7 * 2 * math.Pi * radiusM * 66.09e-6)
	near(t, "R", real(z)/want, 1, 0.01) // the layer is curved: half a skin depth over the radius
	near(t, "X", imag(z)/want, 1, 0.01)
}

// Source: the limits of a wire much thinner than the skin depth: R of the whole section, and the
// internal inductance of mu/8pi.
func TestImpedanceOfThinWire(t *testing.T) {
	const radiusM, freqHz = 1e-5, 1e5
	z := Materials()[0].ImpedanceOhmPerM(freqHz, radiusM)
	near(t, "R", real(z)/(1/(5.8e7*math.Pi*radiusM*radiusM)), 1, 1e-4)
	near(t, "X", imag(z)/(2*math.Pi*freqHz*vacuumHPerM/(8*math.Pi)), 1, 1e-4)
}

func TestIdealWireHasNoImpedance(t *testing.T) {
	if z := Ideal.ImpedanceOhmPerM(150e6, 1e-3); z != 0 {
		t.Errorf("ideal conductor has %v ohm/m", z)
	}
}

// besselBySeries sums the ascending series of I0 and I1, good for |z| up to about 12.
func besselBySeries(z complex128) complex128 {
	var i0, i1 complex128
	term := complex(1, 0)
	for k := 1.0; k < 200; k++ {
		i0 += term
		i1 += term / complex(k, 0)
		term *= z * z / complex(4*k*k, 0)
	}
	return i0 / (i1 * z / 2)
}

func TestBesselRatio(t *testing.T) {
	for _, size := range []float64{1e-3, 0.1, 1, 3, 7, 12} {
		z := cmplx.Rect(size, math.Pi/4)
		near(t, "ratio over its series", cmplx.Abs(besselRatio(z)/besselBySeries(z)), 1, 1e-11)
	}
	// Abramowitz and Stegun, table 9.8 (from memory): I0(1) = 1.266066, I1(1) = 0.565159.
	near(t, "I0(1)/I1(1)", real(besselRatio(1)), 1.266066/0.565159, 3e-6)
	below, above := besselRatio(cmplx.Rect(29.9999, math.Pi/4)), besselRatio(cmplx.Rect(30.0001, math.Pi/4))
	near(t, "step at the seam", cmplx.Abs(above-below), 0, 3e-6)
}

func BenchmarkImpedanceOhmPerM(b *testing.B) {
	steel := Materials()[4]
	b.ReportAllocs()
	for b.Loop() {
		steel.ImpedanceOhmPerM(151.5e6, 1e-4)
	}
}

package wire

import (
	"math"
	"testing"

	"fellreach/antenna"
)

// built returns an antenna that must have no error.
func built(t testing.TB, a Antenna, err error) Antenna {
	t.Helper()
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// rodOf returns a lossless dipole, fed at a fraction of its length; a zero length is resonant.
func rodOf(t testing.TB, lengthM, radiusM, at float64) Antenna {
	t.Helper()
	a, err := Dipole(antenna.DipoleSpec{Length: antenna.Length{M: lengthM}, FeedAt: at, DiameterM: 2 * radiusM, Material: antenna.Ideal})
	return built(t, a, err)
}

// endless is the installation of a setting whose mast goes on and on above the antenna.
func endless(s antenna.Setting) antenna.Setting {
	s.MastAboveM = math.Inf(1)
	return s
}

// clearOfMasts is an installation without a mast at the tests' wavelength of 1 m.
func clearOfMasts() antenna.Setting { return endless(antenna.Setting{FreqHz: testHz}) }

func cutM(t testing.TB, a Antenna) float64 {
	t.Helper()
	in, err := clearOfMasts().Checked()
	if err != nil {
		t.Fatal(err)
	}
	c, err := a.cut(in)
	if err != nil {
		t.Fatal(err)
	}
	return c.mainM
}

func TestReferenceResonances(t *testing.T) {
	c := tally{t: t}
	for _, row := range referenceRows(t, "resonance.csv") {
		a := rodOf(t, 0, number(t, row, "radius_wl"), 0.5)
		c.check(row, "resonant length", cutM(t, a), number(t, row, "resonant_length_wl"), number(t, row, "tol_length_wl"))
		if row["R_ohm"] != "" {
			s, err := a.Solve(clearOfMasts())
			if err != nil {
				t.Fatal(err)
			}
			c.check(row, "R", real(s.ImpedanceOhm), number(t, row, "R_ohm"), number(t, row, "tol_R_ohm"))
			if abs(imag(s.ImpedanceOhm)) > 0.01 {
				t.Errorf("row %s: a resonant rod has %g ohm of reactance", row["id"], imag(s.ImpedanceOhm))
			}
		}
	}
	c.done()
}

func TestReferenceBands(t *testing.T) {
	c := tally{t: t}
	for _, row := range referenceRows(t, "bandwidth.csv") {
		lengthM := 0.476 // the row of common practice gives no length
		if row["resonant_length_wl"] != "" {
			lengthM = number(t, row, "resonant_length_wl")
		}
		a := rodOf(t, 0, lengthM/number(t, row, "L_over_d")/2, 0.5)
		low, high, least := bandOf(t, a, number(t, row, "z0_ohm"), number(t, row, "vswr_limit"))
		c.check(row, "width", 100*(high-low), number(t, row, "bandwidth_pct"), number(t, row, "tol_bandwidth_pct"))
		if row["f_low_rel"] != "" {
			c.check(row, "low edge", low, number(t, row, "f_low_rel"), number(t, row, "tol_edge_rel"))
			c.check(row, "high edge", high, number(t, row, "f_high_rel"), number(t, row, "tol_edge_rel"))
			c.check(row, "lowest VSWR", least, number(t, row, "min_vswr"), number(t, row, "tol_min_vswr"))
		}
	}
	c.done()
}

// bandOf returns the edges of the band of a resonant antenna over its resonance, and the lowest
// VSWR in it.
func bandOf(t *testing.T, a Antenna, referenceOhm, limit float64) (low, high, least float64) {
	t.Helper()
	in, err := clearOfMasts().Checked()
	if err != nil {
		t.Fatal(err)
	}
	cut, err := a.cut(in)
	if err != nil {
		t.Fatal(err)
	}
	s := sweeper{a, in, cut, referenceOhm, limit}
	result := Analysis{FreqHz: in.FreqHz, ResonantHz: in.FreqHz}
	if err := s.band(&result); err != nil {
		t.Fatal(err)
	}
	least = math.Inf(1)
	for i := range 41 {
		over, err := s.excess(result.BandHz[0] + float64(i)/40*(result.BandHz[1]-result.BandHz[0]))
		if err != nil {
			t.Fatal(err)
		}
		least = min(least, over+limit)
	}
	return result.BandHz[0] / in.FreqHz, result.BandHz[1] / in.FreqHz, least
}

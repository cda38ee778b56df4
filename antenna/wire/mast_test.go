package wire

import (
	"math"
	"math/cmplx"
	"testing"
)

// besideMast returns a dipole of 0.47 wl, radius 0.003 wl, beside a mast.
func besideMast(spacingM, radiusM, heightM, lengthM float64) Structure {
	return Structure{
		Wires: []Wire{upright(0.47, 0.003).moved(vec{spacingM, 0, heightM})},
		Feeds: []Feed{{1, 0.5}},
		Mast:  Mast{From: [3]float64{0, 0, -lengthM / 2}, To: [3]float64{0, 0, lengthM / 2}, DiameterM: 2 * radiusM},
	}
}

func TestReferenceMasts(t *testing.T) {
	c := tally{t: t}
	for _, row := range referenceRows(t, "mast_effect.csv") {
		n, r := excited(t, besideMast(number(t, row, "spacing_wl"), number(t, row, "mast_radius_wl"), number(t, row, "dipole_height_wl"), number(t, row, "mast_length_wl")))
		for _, side := range []struct {
			name string
			to   vec
		}{{"away", vec{1, 0, 0}}, {"side", vec{0, 1, 0}}, {"toward", vec{-1, 0, 0}}} {
			c.checkGain(row, "gain_"+side.name+"_dBi", r.gainDBi(side.to), number(t, row, "tol_"+side.name+"_dB"))
			if column := "gain_" + side.name + "_series_dBi"; row[column] != "" {
				c.checkGain(row, column, r.gainDBi(side.to), number(t, row, "tol_"+side.name+"_dB"))
			}
		}
		c.check(row, "R", real(n.TogetherOhm()), number(t, row, "R_ohm"), number(t, row, "tol_R_ohm"))
		c.check(row, "X", imag(n.TogetherOhm()), number(t, row, "X_ohm"), number(t, row, "tol_X_ohm"))
	}
	c.done()
}

// besideCylinderDBi returns the directivity in the horizontal plane of a vertical half-wave
// dipole of sinusoidal current at a distance from an infinite conducting cylinder's axis, azimuths
// from the side away from it.
//
// Source: the series of modes of Carter (1943), from memory: the field of a line of current at
// distance b from a cylinder of radius r, q = k cos(el),
// F = SUM e_n j^n cos(n phi) [J_n(qb) - J_n(qr)/H_n(qr) H_n(qb)], times the dipole's own.
func besideCylinderDBi(spacingM, radiusM float64, azRad []float64) []float64 {
	k := 2 * math.Pi / testWavelengthM
	power := func(el, az float64) float64 {
		q := k * math.Cos(el)
		dipole := math.Cos(math.Pi/2*math.Sin(el)) / math.Cos(el)
		var sum complex128
		turn := complex(1, 0)
		for n := range 12 + int(2*q*spacingM) {
			hankel := func(x float64) complex128 { return complex(math.Jn(n, x), -math.Yn(n, x)) }
			e := 2.0
			if n == 0 {
				e = 1
			}
			wave := complex(math.Jn(n, q*spacingM), 0) - complex(math.Jn(n, q*radiusM), 0)/hankel(q*radiusM)*hankel(q*spacingM)
			sum += complex(e*math.Cos(float64(n)*az), 0) * turn * wave
			turn *= 1i
		}
		return dipole * dipole * cmplx.Abs(sum) * cmplx.Abs(sum)
	}
	mean := 0.0
	elevations := gauss(32)
	const azimuths = 64
	for i, x := range elevations.x {
		for j := range azimuths {
			mean += elevations.weight[i] * power(math.Asin(2*x-1), 2*math.Pi*float64(j)/azimuths) / azimuths
		}
	}
	var gains []float64
	for _, az := range azRad {
		gains = append(gains, 10*math.Log10(power(0, az)/mean))
	}
	return gains
}

func TestCageAgainstCylinderSeries(t *testing.T) {
	for _, tc := range []struct{ spacingM, radiusM float64 }{
		{0.25, 0.01}, {0.25, 0.03}, {0.25, 0.05}, {0.4, 0.08}, {0.35, 0.12},
		{0.5, 0.15}, {0.5, 0.2}, {0.6, 0.25}, {0.6, 0.3}, {0.75, 0.3}, {1, 0.2},
	} {
		_, r := excited(t, besideMast(tc.spacingM, tc.radiusM, 0, 4.5))
		want := besideCylinderDBi(tc.spacingM, tc.radiusM, []float64{0, math.Pi / 4, math.Pi / 2, 3 * math.Pi / 4, math.Pi})
		got := []float64{r.gainDBi(vec{1, 0, 0}), r.gainDBi(vec{1, 1, 0}), r.gainDBi(vec{0, 1, 0}), r.gainDBi(vec{-1, 1, 0}), r.gainDBi(vec{-1, 0, 0})}
		t.Logf("%v: got %.2f want %.2f", tc, got, want)
	}
}

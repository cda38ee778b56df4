package propagation

import (
	"math"
	"testing"

	"fellreach/terrain"
)

// Borders lie half-way between points of different zones: lengths by hand.
func TestStretches(t *testing.T) {
	const s, c, i = terrain.Sea, terrain.Coastal, terrain.Inland
	for _, tc := range []struct {
		zones           []terrain.Zone
		dtm, dlm, omega float64
	}{
		{[]terrain.Zone{i, i, i, i, i}, 10, 10, 0},
		{[]terrain.Zone{c, c, c, c, c}, 10, 0, 0},
		{[]terrain.Zone{s, s, s, s, s}, 0, 0, 1},
		{[]terrain.Zone{s, i, i, i, i}, 9.5, 9.5, 0.05}, // the border at 0.5 km
		{[]terrain.Zone{i, i, s, c, c}, 4, 2.5, 0.35},   // sea from 2.5 to 6
		{[]terrain.Zone{s, s, c, i, s}, 6.5, 3, 0.35},   // sea to 2.5 and from 9, inland from 6
		{[]terrain.Zone{i, c, i, s, i}, 6, 3.5, 0.3},    // inland to 0.5, from 2.5 to 6 and from 9
		{[]terrain.Zone{s, s, s, s, c}, 1, 0, 0.9},
	} {
		got := newTimeParameters(terrain.Profile{DistKm: []float64{0, 1, 4, 8, 10}, Zone: tc.zones}, 50)
		if math.Abs(got.dtm-tc.dtm) > 1e-12 || math.Abs(got.dlm-tc.dlm) > 1e-12 || math.Abs(got.omega-tc.omega) > 1e-12 {
			t.Errorf("zones %v: dtm %g, dlm %g, omega %g, want %g, %g, %g", tc.zones, got.dtm, got.dlm, got.omega, tc.dtm, tc.dlm, tc.omega)
		}
	}
}

// Source: beta0 of the published P.1812 cases (see [oneKm]), ten digits.
func TestAnomalousTime(t *testing.T) {
	for _, tc := range []struct{ dtm, dlm, latDeg, want float64 }{
		{17.5, 12.5, 53.68658428, 4.26330636},
		{10, 10, 53.20515067, 5.523157665},
		{1, 1, 53.18551669, 7.244912027},
		{1.05795, 1.05795, -53.1856432, 7.232830417}, // the southern hemisphere is no different
	} {
		tau := 1 - math.Exp(-4.12e-4*math.Pow(tc.dlm, 2.41))
		if got := anomalousTimePct(tc.dtm, tau, math.Abs(tc.latDeg)); math.Abs(got-tc.want) > 1e-8 {
			t.Errorf("beta0 for dtm %g, dlm %g at %g degrees = %.9f, want %.9f", tc.dtm, tc.dlm, tc.latDeg, got, tc.want)
		}
	}
}

// Beyond 70 degrees, by hand: over sea mu1 = 1 and beta0 = 4.17 %. Over 100 km inland tau = 1 and
// mu1 = 10^-0.85 but for 3e-7, so beta0 = 4.17 * 10^-1.105 = 0.32745. At 70 degrees the two formulas
// meet to 0.03 % over sea and 0.6 % over land, which is the Recommendation's own step.
func TestAnomalousTimeAtThePoles(t *testing.T) {
	if got := anomalousTimePct(0, 0, 90); got != 4.17 {
		t.Errorf("over sea: %g, want 4.17", got)
	}
	if got := anomalousTimePct(100, 1, 71); math.Abs(got-0.32745) > 1e-5 {
		t.Errorf("over land: %g, want 0.32745", got)
	}
	for _, tc := range []struct{ dtm, tau, step float64 }{{0, 0, 0.0004}, {100, 1, 0.007}} {
		at, beyond := anomalousTimePct(tc.dtm, tc.tau, 70), anomalousTimePct(tc.dtm, tc.tau, math.Nextafter(70, 71))
		if math.Abs(beyond/at-1) > tc.step {
			t.Errorf("dtm %g: %g at 70 degrees, %g beyond", tc.dtm, at, beyond)
		}
	}
	p := level(30, 60)
	for _, lat := range []float64{-90, -70.1, 70.1, 90} {
		p.LatDeg, p.TimePct = lat, 1
		if l, err := P1812.Loss(p); err != nil || math.IsNaN(l.DB) {
			t.Errorf("latitude %g: %g dB, %v", lat, l.DB, err)
		}
	}
}

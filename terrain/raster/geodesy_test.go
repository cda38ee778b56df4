package raster

import (
	"math"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"
)

// Source: GeodSolve of GeographicLib 2.1.2 with -E, which works by elliptic integrals where PROJ
// works by series; -i for the inverse problem. Printed to 1e-6 m and 1e-11 degrees.
var geodesics = []struct {
	name             string
	a, b             orb.Point
	azDeg, backAzDeg float64
	distM            float64
}{
	{"island", orb.Point{-20.1180, 47.5231}, orb.Point{-19.8843, 47.6012}, 63.63668271641, 180 + 63.80915573980, 19613.817755},
	{"2 m", orb.Point{-20.1180, 47.5231}, orb.Point{-20.11799, 47.52312}, 18.71041911551, 180 + 18.71042649101, 2.347692},
	{"ocean", orb.Point{-73.77861, 40.64083}, orb.Point{-0.46139, 51.4775}, 51.37367657428, 180 + 107.97226237215, 5554248.965660},
	{"date line", orb.Point{179.9, -16.5}, orb.Point{-179.6, -17.25}, 147.37592403056, 180 + 147.23077772173, 98628.885484},
	{"equator", orb.Point{0, 0}, orb.Point{1, 0}, 90, 270, 111319.490793},
	{"meridian", orb.Point{-20, 0}, orb.Point{-20, 10}, 0, 180, 1105854.833234},
	{"over the pole", orb.Point{10, 89.9}, orb.Point{-170, 89.95}, 0, 0, 16754.096805},
	{"from the north pole", orb.Point{0, 90}, orb.Point{45, 80}, 135, 0, 1116825.857376},
	{"from the south pole", orb.Point{0, -90}, orb.Point{45, -80}, 45, 180, 1116825.857376},
	{"other side", orb.Point{151.21, -33.86}, orb.Point{-0.12, 51.5}, 360 - 40.71507065384, 180 - 119.62855634766, 16988534.459735},
	{"nearly opposite", orb.Point{0, 0}, orb.Point{179.5, 0.5}, 25.67187286829, 180 + 154.32708546994, 19936288.578965},
	{"60 north", orb.Point{25, 60}, orb.Point{26, 60}, 89.56698454550, 180 + 90.43301545450, 55799.470393},
}

// The project promises 1 mm and 1e-7 degrees; the figures allow for less.
const (
	distTolM   = 2e-6
	angleTolDg = 1e-9
)

func TestInverseByElliptic(t *testing.T) {
	for _, tc := range geodesics {
		distM, azDeg, backAzDeg := Inverse(tc.a, tc.b)
		if math.Abs(distM-tc.distM) > distTolM {
			t.Errorf("%s: distance %.7f m, want %.6f", tc.name, distM, tc.distM)
		}
		if angleApart(azDeg, tc.azDeg) > azimuthTolDeg(distM) || angleApart(backAzDeg, tc.backAzDeg) > azimuthTolDeg(distM) {
			t.Errorf("%s: azimuths %.11f and %.11f, want %.11f and %.11f", tc.name, azDeg, backAzDeg, tc.azDeg, tc.backAzDeg)
		}
		if azDeg < 0 || azDeg >= 360 || backAzDeg < 0 || backAzDeg >= 360 {
			t.Errorf("%s: azimuths %g and %g are not in [0, 360)", tc.name, azDeg, backAzDeg)
		}
	}
}

// azimuthTolDeg allows for the rounding of coordinates to about 1e-9 m, which turns a short line.
func azimuthTolDeg(distM float64) float64 { return angleTolDg + 1e-7/distM }

func angleApart(a, b float64) float64 { return math.Abs(math.Remainder(a-b, 360)) }

// Source: GeodSolve as above, direct problem.
func TestDirectByElliptic(t *testing.T) {
	for _, tc := range []struct {
		a            orb.Point
		azDeg, distM float64
		want         orb.Point
	}{
		{orb.Point{-20.1180, 47.5231}, 63.4, 25000, orb.Point{-19.82060961508, 47.62339649642}},
		{orb.Point{179.9, -16.5}, 120, 100000, orb.Point{-179.28694281242, -16.95021777737}},
		{orb.Point{10, 89.9}, 0, 30000, orb.Point{-170, 89.83140897314}},
		{orb.Point{151.21, -33.86}, 300, 17000000, orb.Point{4.03302972400, 43.23249342649}},
		{orb.Point{0, 0}, 90, 1000000, orb.Point{8.98315284120, 0}},
	} {
		got := Direct(tc.a, tc.azDeg, tc.distM)
		if angleApart(got.Lon(), tc.want.Lon()) > 2e-11 || math.Abs(got.Lat()-tc.want.Lat()) > 2e-11 {
			t.Errorf("Direct(%v, %g, %g) = %.11f, want %.11f", tc.a, tc.azDeg, tc.distM, got, tc.want)
		}
	}
}

func place(t *rapid.T, name string) orb.Point {
	return orb.Point{
		rapid.Float64Range(-180, 180).Draw(t, name+" lon"),
		rapid.Float64Range(-90, 90).Draw(t, name+" lat"),
	}
}

// Going out by the inverse solution arrives within 1 mm, and both ends see the same line.
func TestInverseThenDirect(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b := place(t, "a"), place(t, "b")
		distM, azDeg, backAzDeg := Inverse(a, b)
		missM, _, _ := Inverse(Direct(a, azDeg, distM), b)
		if missM > 1e-3 {
			t.Fatalf("from %v to %v misses by %g m", a, b, missM)
		}
		backM, _, _ := Inverse(Direct(b, backAzDeg, distM), a)
		if backM > 1e-3 {
			t.Fatalf("from %v back to %v misses by %g m", b, a, backM)
		}
	})
}

// The points of a line lie at their distances on it, whichever side of the date line or a pole.
func TestLine(t *testing.T) {
	for _, tc := range geodesics {
		distM, azDeg, _ := Inverse(tc.a, tc.b)
		points := make([]orb.Point, 11)
		Line(tc.a, azDeg, distM/10, points)
		for i, p := range points {
			fromM, _, _ := Inverse(tc.a, p)
			toM, _, _ := Inverse(p, tc.b)
			if math.Abs(fromM-distM*float64(i)/10) > 1e-6 || math.Abs(fromM+toM-distM) > 1e-6 {
				t.Errorf("%s: point %d, %v, is %.7f m from one end and %.7f m from the other of %.7f m", tc.name, i, p, fromM, toM, distM)
			}
			if math.Abs(p.Lon()) > 180 {
				t.Errorf("%s: longitude %g", tc.name, p.Lon())
			}
		}
	}
	Line(orb.Point{1, 2}, 3, 4, nil) // nothing to fill
}

func TestInverseOfOnePlace(t *testing.T) {
	distM, azDeg, backAzDeg := Inverse(orb.Point{7, 8}, orb.Point{7, 8})
	if distM != 0 || math.IsNaN(azDeg) || math.IsNaN(backAzDeg) {
		t.Errorf("Inverse of one place = %g, %g, %g", distM, azDeg, backAzDeg)
	}
}

func TestCompass(t *testing.T) {
	for _, tc := range []struct{ deg, want float64 }{{0, 0}, {-1, 359}, {360, 0}, {725, 5}, {-1e-300, 0}, {-720.5, 359.5}} {
		if got := compass(tc.deg); got != tc.want {
			t.Errorf("compass(%g) = %g, want %g", tc.deg, got, tc.want)
		}
	}
}

package antenna

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func cross(a, b vector) vector {
	return vector{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
}

func vectorsNear(a, b vector, tolerance float64) bool {
	for i := range 3 {
		if math.Abs(a[i]-b[i]) > tolerance {
			return false
		}
	}
	return true
}

func anyDirection(t *rapid.T, label string) Direction {
	return Direction{
		AzDeg: rapid.Float64Range(-180, 360).Draw(t, label+" azimuth"),
		ElDeg: rapid.Float64Range(-90, 90).Draw(t, label+" elevation"),
	}
}

// Source: the definition of the frames in the package's documentation.
func TestAxes(t *testing.T) {
	for _, tc := range []struct {
		name               string
		d                  Direction
		toward, theta, phi vector
	}{
		{"facing", Direction{0, 0}, vector{1, 0, 0}, vector{0, 0, -1}, vector{0, -1, 0}},
		{"right", Direction{90, 0}, vector{0, -1, 0}, vector{0, 0, -1}, vector{-1, 0, 0}},
		{"behind", Direction{180, 0}, vector{-1, 0, 0}, vector{0, 0, -1}, vector{0, 1, 0}},
		{"left", Direction{-90, 0}, vector{0, 1, 0}, vector{0, 0, -1}, vector{1, 0, 0}},
		{"zenith", Direction{0, 90}, vector{0, 0, 1}, vector{1, 0, 0}, vector{0, -1, 0}},
	} {
		toward, theta, phi := tc.d.axes()
		if !vectorsNear(toward, tc.toward, 1e-15) || !vectorsNear(theta, tc.theta, 1e-15) || !vectorsNear(phi, tc.phi, 1e-15) {
			t.Errorf("%s: axes of %v = %v %v %v, want %v %v %v", tc.name, tc.d, toward, theta, phi, tc.toward, tc.theta, tc.phi)
		}
	}
}

func TestAxesAreOrthonormal(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := anyDirection(t, "direction")
		toward, theta, phi := d.axes()
		if !vectorsNear(cross(phi, theta), toward, 1e-14) { // clockwise azimuth: phi comes first
			t.Fatalf("%v: phi x theta = %v, want %v", d, cross(phi, theta), toward)
		}
		if math.Abs(toward.dot(toward)-1) > 1e-14 || math.Abs(theta.dot(phi)) > 1e-14 {
			t.Fatalf("%v: axes are not orthonormal", d)
		}
	})
}

func TestDirectionOfVectorIsInverse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		toward, _, _ := anyDirection(t, "direction").axes()
		d := toward.direction()
		again, _, _ := d.axes()
		if !vectorsNear(toward, again, 1e-14) || math.Abs(d.ElDeg) > 90 || math.Abs(d.AzDeg) > 180 {
			t.Fatalf("%v came back as %v by %v", toward, again, d)
		}
	})
}

// An arcsine would lose half the digits within 1e-6 degrees of the zenith.
func TestDirectionAtThePoles(t *testing.T) {
	for _, d := range []Direction{{30, 90 - 1e-7}, {-120, -90 + 1e-7}} {
		toward, _, _ := d.axes()
		got := toward.direction()
		near(t, "distance from the pole", (90-math.Abs(got.ElDeg))/1e-7, 1, 1e-6)
		near(t, "azimuth", got.AzDeg, d.AzDeg, 1e-6)
	}
}

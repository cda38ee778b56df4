package antenna

import "math"

// A Direction is where something is seen from an antenna or a site: AzDeg clockwise from the
// reference (true north at a site, the facing of an antenna in its own frame), ElDeg up from
// the horizontal, both in degrees.
type Direction struct{ AzDeg, ElDeg float64 }

// A vector is given by its x, y and z in a right-handed frame: facing or north, left or west, up.
type vector [3]float64

func (a vector) dot(b vector) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

// axes returns the unit vectors towards the direction, of theta (down) and of phi (clockwise).
func (d Direction) axes() (toward, theta, phi vector) {
	sinAz, cosAz := math.Sincos(radians(d.AzDeg))
	sinEl, cosEl := math.Sincos(radians(d.ElDeg))
	toward = vector{cosEl * cosAz, -cosEl * sinAz, sinEl}
	theta = vector{sinEl * cosAz, -sinEl * sinAz, -cosEl}
	phi = vector{-sinAz, -cosAz, 0}
	return toward, theta, phi
}

// direction returns where a vector points: azimuth within (-180, 180], elevation within
// [-90, 90], accurate at the poles too.
func (a vector) direction() Direction {
	return Direction{
		AzDeg: degrees(math.Atan2(-a[1], a[0])),
		ElDeg: degrees(math.Atan2(a[2], math.Hypot(a[0], a[1]))),
	}
}

func radians(deg float64) float64 { return deg * (math.Pi / 180) }
func degrees(rad float64) float64 { return rad * (180 / math.Pi) }

package wire

import (
	"math"
	"math/cmplx"

	"fellreach/antenna"
)

// A strand is the current on a run: at its nodes, in its direction, in ampere.
type strand struct {
	run
	currents []complex128
}

// A radiator is all currents of a structure, and the place from which its far field is seen.
type radiator struct {
	k       float64
	centre  vec
	reachM  float64 // from the centre to the farthest metal
	strands []strand
}

// newRadiator puts the centre in the middle of the metal: the phase turns least from there.
func newRadiator(k float64, strands []strand) *radiator {
	lo := vec{math.Inf(1), math.Inf(1), math.Inf(1)}
	hi := lo.times(-1)
	for _, s := range strands {
		for _, p := range []vec{s.start, s.place(s.count)} {
			for i := range p {
				lo[i], hi[i] = min(lo[i], p[i]), max(hi[i], p[i])
			}
		}
	}
	r := &radiator{k: k, centre: lo.plus(hi).times(0.5), strands: strands}
	for _, s := range strands {
		r.reachM = max(r.reachM, s.start.apart(r.centre), s.place(s.count).apart(r.centre))
	}
	return r
}

// segmentRule integrates a sine along a segment with the phase of the far field.
var segmentRule = gauss(4)

// along returns the integral of the strand's current with the phase exp(jk r.p), from its start,
// for a cosine between its direction and that of the far field. Horner's rule from the far end.
func (s *strand) along(k, cosine float64) complex128 {
	var rise, fall complex128 // integrals over one segment
	scale := s.stepM / math.Sin(k*s.stepM)
	for i, x := range segmentRule.x {
		wave := cmplx.Rect(segmentRule.weight[i]*scale, k*cosine*s.stepM*x)
		rise += wave * complex(math.Sin(k*s.stepM*x), 0)
		fall += wave * complex(math.Sin(k*s.stepM*(1-x)), 0)
	}
	turn := cmplx.Rect(1, k*cosine*s.stepM)
	var sum complex128
	for i := s.count - 1; i >= 0; i-- {
		sum = sum*turn + fall*s.currents[i] + rise*s.currents[i+1]
	}
	return sum
}

// row returns the far field at one elevation towards several azimuths, in V times exp(-jkr)/r left
// out. What a strand along z adds along itself is the same towards all of them.
func (r *radiator) row(elDeg float64, azDeg []float64) []antenna.Field {
	fields := make([]antenna.Field, len(azDeg))
	sinEl, _ := math.Sincos(elDeg * math.Pi / 180)
	upright := make([]complex128, len(r.strands))
	for i := range r.strands {
		if s := &r.strands[i]; isUpright(s.run.along) {
			upright[i] = s.along(r.k, sinEl*s.run.along[2])
		}
	}
	scale := complex(0, -r.k*antenna.WaveImpedanceOhm/(4*math.Pi))
	for j, az := range azDeg {
		toward, theta, phi := axes(antenna.Direction{AzDeg: az, ElDeg: elDeg})
		var f antenna.Field
		for i := range r.strands {
			s := &r.strands[i]
			n := upright[i]
			if !isUpright(s.run.along) {
				n = s.along(r.k, toward.dot(s.run.along))
			}
			n *= scale * cmplx.Rect(1, r.k*toward.dot(r.centre.to(s.start)))
			f.Theta += n * complex(theta.dot(s.run.along), 0)
			f.Phi += n * complex(phi.dot(s.run.along), 0)
		}
		fields[j] = f
	}
	return fields
}

func isUpright(along vec) bool { return along[0] == 0 && along[1] == 0 }

// axes returns the unit vectors towards a direction, of theta (down) and of phi (clockwise).
func axes(d antenna.Direction) (toward, theta, phi vec) {
	sinAz, cosAz := math.Sincos(d.AzDeg * math.Pi / 180)
	sinEl, cosEl := math.Sincos(d.ElDeg * math.Pi / 180)
	toward = vec{cosEl * cosAz, -cosEl * sinAz, sinEl}
	theta = vec{sinEl * cosAz, -sinEl * sinAz, -cosEl}
	phi = vec{-sinAz, -cosAz, 0}
	return toward, theta, phi
}

// radiatedW integrates the radiated power over the sphere, with points enough for the reach of
// the currents: Gauss over the sine of elevation, equal steps of azimuth.
func (r *radiator) radiatedW() float64 {
	elevations := gauss(15 + int(r.k*r.reachM))
	azimuths := make([]float64, 20+2*int(r.k*r.reachM))
	for i := range azimuths {
		azimuths[i] = float64(i) * 360 / float64(len(azimuths))
	}
	rows := make([]float64, len(elevations.x))
	parallel(len(rows), func(i int) {
		elDeg := math.Asin(2*elevations.x[i]-1) * 180 / math.Pi
		for _, f := range r.row(elDeg, azimuths) {
			rows[i] += f.Power()
		}
	})
	sum := 0.0
	for i, row := range rows {
		sum += elevations.weight[i] * row / float64(len(azimuths))
	}
	return 4 * math.Pi * sum / (2 * antenna.WaveImpedanceOhm)
}

// directionOf returns the direction of a unit vector of the antenna's frame.
func directionOf(v vec) antenna.Direction {
	return antenna.Direction{
		AzDeg: math.Atan2(-v[1], v[0]) * 180 / math.Pi,
		ElDeg: math.Asin(max(-1, min(1, v[2]))) * 180 / math.Pi,
	}
}

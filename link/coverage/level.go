package coverage

import (
	"math"

	"fellreach/link/propagation"
)

// levelGround is a profile whose points all lie at height 0: count points at multiples of step and
// the cell's own beyond them, km, under antennas at txM at 0 and rxM at d. drop is 500 over the
// effective radius, m/km^2.
//
// What a search over all points would find is found without one. The sight lines have their extremes
// next to known places, and on a free path the diffraction parameter has one maximum.
type levelGround struct {
	drop, txM, rxM float64
	d, step        float64
	count          int
	own            []sample
}

func (l *levelGround) bulge(at float64) float64  { return l.drop * at * (l.d - at) }
func (l *levelGround) fromTx(at float64) float64 { return (l.bulge(at) - l.txM) / at }
func (l *levelGround) fromRx(at float64) float64 { return (l.bulge(at) - l.rxM) / (l.d - at) }

// height is that over the ray by the root of the Fresnel zone, as in [propagation.Slopes].
func (l *levelGround) height(at float64) float64 {
	return (l.bulge(at) - (l.txM*(l.d-at)+l.rxM*at)/l.d) / math.Sqrt(at*(l.d-at)/l.d)
}

func (l *levelGround) slopes() propagation.Slopes {
	s := propagation.Slopes{Stim: math.Inf(-1), Str: (l.rxM - l.txM) / l.d, Srim: math.Inf(-1), Height: math.Inf(-1)}
	s.Stim = l.largest(l.fromTx, l.near(math.Sqrt(l.txM/l.drop)))
	if s.Blocked() {
		s.Srim = l.largest(l.fromRx, l.near(l.d-math.Sqrt(l.rxM/l.drop)))
	} else {
		s.Height = l.largest(l.height, l.peak())
	}
	return s
}

// near is the number of the last point up to a distance, from 1 to count.
func (l *levelGround) near(at float64) int { return min(max(int(at/l.step), 1), l.count) }

// largest returns the largest value of f at point i, at the next, and at the cell's own points.
func (l *levelGround) largest(f func(float64) float64, i int) float64 {
	most := math.Inf(-1)
	for k := max(i, 1); k <= min(i+1, l.count); k++ {
		most = max(most, f(float64(k)*l.step))
	}
	for k := range l.own {
		most = max(most, f(l.own[k].d))
	}
	return most
}

// peak is the number of the point with the greatest height: they grow up to it and fall after it.
func (l *levelGround) peak() int {
	lo, hi := 1, l.count
	for lo < hi {
		if mid := (lo + hi) / 2; l.height(float64(mid+1)*l.step) > l.height(float64(mid)*l.step) {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	return lo
}

package coverage

import (
	"math"

	"fellreach/link/propagation"
)

// levelSlopes returns Bullington's slopes over points at height 0, at the distances step, 2 step, ...
// count step, on an Earth of effective radius ap, between antennas at txM at 0 and rxM at d: what a
// search over all of them would find. The sight lines have their extremes next to known places, and
// on a free path the diffraction parameter has one maximum.
func levelSlopes(ap, txM, rxM, d, step float64, count int) propagation.Slopes {
	drop := 500 / ap
	s := propagation.Slopes{Stim: math.Inf(-1), Str: (rxM - txM) / d, Srim: math.Inf(-1), Height: math.Inf(-1)}
	bulge := func(i int) float64 { di := float64(i) * step; return drop * di * (d - di) }
	near := func(km float64) (lo, hi int) {
		lo = min(max(int(km/step), 1), count)
		return lo, min(lo+1, count)
	}
	if count < 1 {
		return s
	}
	fromTx := func(i int) float64 { return (bulge(i) - txM) / (float64(i) * step) }
	lo, hi := near(math.Sqrt(txM / drop))
	if s.Stim = max(fromTx(lo), fromTx(hi)); s.Blocked() {
		fromRx := func(i int) float64 { return (bulge(i) - rxM) / (d - float64(i)*step) }
		lo, hi = near(d - math.Sqrt(rxM/drop))
		s.Srim = max(fromRx(lo), fromRx(hi))
		return s
	}
	height := func(i int) float64 {
		di := float64(i) * step
		return (bulge(i) - (txM*(d-di)+rxM*di)/d) / math.Sqrt(di*(d-di)/d)
	}
	lo, hi = 1, count
	for lo < hi { // the parameter grows up to its maximum and falls after it
		if mid := (lo + hi) / 2; height(mid+1) > height(mid) {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	s.Height = height(lo)
	return s
}

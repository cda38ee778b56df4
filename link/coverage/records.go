package coverage

// A record is a point that is seen from the site under a steeper sight line than all before it:
// distance, km, and slope, m/km.
type record struct{ d, slope float64 }

// records are in the order of the walk: distance and slope grow.
type records []record

const (
	recordBlock = 16
	superBlock  = 256
)

// tightness measures how little of its Fresnel zone a point leaves free under a ray that rises
// from the site by str to the distance at: the square of (clearance over Fresnel radius), up to
// the wavelength. (slope is not above str.)
func tightness(d, slope, str, at float64) float64 {
	c := str - slope
	return c * c * d / (at - d)
}

// tightest returns the record with the least [tightness] if that is below limit, and its value; at is
// beyond all records. Without one the index is -1.
//
// A block of records is bounded by the slope of its last and the distance of its first. The best
// one is mostly near the end or the one that was best for the cell before, guess.
func (r records) tightest(str, at, limit float64, guess int) (value float64, index int) {
	value, index = limit, -1
	if guess >= 0 && guess < len(r) {
		if f := tightness(r[guess].d, r[guess].slope, str, at); f < value {
			value, index = f, guess
		}
	}
	for end := len(r); end > 0; {
		start := (end - 1) &^ (superBlock - 1)
		if tightness(r[start].d, r[end-1].slope, str, at) < value {
			value, index = r.tightestIn(start, end, str, at, value, index)
		}
		end = start
	}
	return value, index
}

func (r records) tightestIn(from, to int, str, at, value float64, index int) (float64, int) {
	for end := to; end > from; {
		start := (end - 1) &^ (recordBlock - 1)
		if tightness(r[start].d, r[end-1].slope, str, at) < value {
			for i := end - 1; i >= start; i-- {
				if f := tightness(r[i].d, r[i].slope, str, at); f < value {
					value, index = f, i
				}
			}
		}
		end = start
	}
	return value, index
}

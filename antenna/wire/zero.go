package wire

import (
	"errors"
	"math"
)

// errNoZero says that a function does not rise through zero in the range searched.
var errNoZero = errors.New("no zero")

// risingZero returns where f rises through zero between lo and hi: from a guess between them, by
// secants kept inside the bracket (the Illinois variant of false position). f may have poles, at
// which it falls, so that a bracket with a rise across zero holds no pole alone.
func risingZero(lo, hi, guess, step float64, f func(float64) (float64, error)) (float64, error) {
	at, err := f(guess)
	if err != nil {
		return 0, err
	}
	a, fa, b, fb, err := bracket(lo, hi, guess, step, at, f)
	if err != nil {
		return 0, err
	}
	const enough = 40
	for range enough {
		x := b - fb*(b-a)/(fb-fa)
		y, err := f(x)
		if err != nil {
			return 0, err
		}
		if math.Abs(y) < 1e-6*(1+math.Abs(fb-fa)) || math.Abs(b-a) < 1e-10*math.Abs(x) {
			return x, nil
		}
		if (y < 0) == (fb < 0) {
			fa /= 2
		} else {
			a, fa = b, fb
		}
		b, fb = x, y
	}
	return b, nil
}

// bracket widens an interval from a guess towards the side where the zero of a rising function
// lies, up to lo or hi, until it holds the zero. The nearer end is returned as b.
func bracket(lo, hi, guess, step, at float64, f func(float64) (float64, error)) (a, fa, b, fb float64, err error) {
	limit := hi
	if at > 0 {
		limit, step = lo, -step
	}
	b, fb = guess, at
	for b != limit {
		a, fa = b, fb
		b, step = b+step, 1.5*step
		if (limit-b)*step < 0 {
			b = limit
		}
		if fb, err = f(b); err != nil {
			return 0, 0, 0, 0, err
		}
		if (fb > 0) != (fa > 0) {
			if (fb-fa)*(b-a) > 0 {
				return a, fa, b, fb, nil
			}
			return 0, 0, 0, 0, errNoZero // fell through zero: a pole, or the wrong resonance
		}
	}
	return 0, 0, 0, 0, errNoZero
}

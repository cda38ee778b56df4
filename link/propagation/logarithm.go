package propagation

import "math"

// A map spends most of its time on logarithms and powers. Those here look up the nearest of some steps
// and go on from it by a short series: they are less than half the work of math.Log and math.Exp,
// and differ from them in the last digits, by a few parts in 1e16.

const (
	stepBits = 7
	steps    = 1 << stepBits // within a factor of 2
)

// A logStep is the reciprocal of the middle of a step, and the logarithm of the middle.
type logStep struct{ inverse, log float64 }

var logSteps = func() (table [steps]logStep) {
	for i := range table {
		inverse := 1 / (1 + (float64(i)+0.5)/steps)
		table[i] = logStep{inverse, -math.Log(inverse)}
	}
	table[0] = logStep{1, 0} // keeps the digits next to 1
	return table
}()

const (
	mantissaBits = 52
	mantissaMask = 1<<mantissaBits - 1
	oneBits      = 1023 << mantissaBits
	minNormal    = 1 << mantissaBits    // bits of the least number with all its digits
	infinityBits = 2047 << mantissaBits // bits of the first that is no number
)

// log is math.Log but for the last digits.
func log(x float64) float64 {
	bits := math.Float64bits(x)
	if bits < minNormal || bits >= infinityBits {
		return math.Log(x)
	}
	mantissa := math.Float64frombits(bits&mantissaMask | oneBits) // 1 to 2
	step := &logSteps[bits>>(mantissaBits-stepBits)%steps]
	r := mantissa*step.inverse - 1 // up to 1/128
	r2 := r * r
	series := r - r2*(1.0/2-r*(1.0/3)) - r2*r2*((1.0/4-r*(1.0/5))+r2*((1.0/6-r*(1.0/7))+r2*(1.0/8)))
	return float64(int64(bits>>mantissaBits)-1023)*math.Ln2 + (step.log + series)
}

// log10 is math.Log10 but for the last digits.
func log10(x float64) float64 { return log(x) * (1 / math.Ln10) }

// expSteps are the powers 2^(i/steps).
var expSteps = func() (table [steps]float64) {
	for i := range table {
		table[i] = math.Exp2(float64(i) / steps)
	}
	return table
}()

// exp is math.Exp but for the last digits.
func exp(x float64) float64 {
	const (
		most     = 700              // beyond lie infinity and the smallest numbers
		rounding = 3 << 51          // brings a number's last digit to the place of 1
		stepHigh = 0x1.62e42fefap-8 // ln 2 / steps, so that its product with a whole number is exact,
		stepLow  = math.Ln2/steps - stepHigh
	)
	if !(x > -most && x < most) {
		return math.Exp(x)
	}
	shifted := x*(steps/math.Ln2) + rounding
	n := int64(math.Float64bits(shifted) - math.Float64bits(rounding))
	whole := shifted - rounding
	r := (x - whole*stepHigh) - whole*stepLow // up to ln 2 / 256
	series := r + r*r*(1.0/2+r*(1.0/6+r*(1.0/24+r*(1.0/120))))
	power := expSteps[n&(steps-1)]
	scale := math.Float64frombits(uint64(n>>stepBits+1023) << mantissaBits)
	return (power + power*series) * scale
}

// exp10 is 10 to the power of x.
func exp10(x float64) float64 { return exp(x * math.Ln10) }

package antenna

import (
	"math"
	"math/cmplx"
)

// ImpedanceOhmPerM returns the internal impedance per metre of a solid round wire of the material,
// by which current crowds to its skin: resistance and internal reactance in ohm/m. freqHz and
// radiusM are above zero. Tubes with walls of three skin depths and more count as solid.
//
//	Zi = g/(2 pi a sigma) I0(ga)/I1(ga),  g = sqrt(j w mu sigma)
//
// Source: Bessel solution of the round wire, in every handbook of fields and waves.
func (m Material) ImpedanceOhmPerM(freqHz, radiusM float64) complex128 {
	if math.IsInf(m.ConductivitySPerM, 1) {
		return 0
	}
	omega := 2 * math.Pi * freqHz
	g := cmplx.Sqrt(complex(0, omega*vacuumHPerM*m.RelativePermeability*m.ConductivitySPerM))
	perArea := g / complex(2*math.Pi*radiusM*m.ConductivitySPerM, 0)
	return perArea * besselRatio(g*complex(radiusM, 0))
}

// besselRatio returns I0(z)/I1(z) for z in the right half plane, to about 1e-6 at the seam of its
// two forms and better elsewhere: 1 + 1/2z + 3/8z^2 + 3/8z^3 for large |z|, else the continued
// fraction 2/z + 1/(4/z + 1/(6/z + ...)) evaluated from its tail.
func besselRatio(z complex128) complex128 {
	const large = 30
	if cmplx.Abs(z) > large {
		return 1 + (1+3/(4*z)*(1+1/z))/(2*z)
	}
	const terms = 60 // twice |z| suffices
	ratio := complex(2*terms, 0) / z
	for n := terms - 1; n >= 1; n-- {
		ratio = complex(float64(2*n), 0)/z + 1/ratio
	}
	return ratio
}

package propagation

import "math"

// nuScale turns metres over the square root of km into nu: sqrt(0.002 / lambda), lambda in m.
func nuScale(lambdaM float64) float64 { return math.Sqrt(0.002 / lambdaM) }

// Slopes are what Bullington's construction finds on a profile, on the Earth of one effective
// radius: the rise of the steepest sight lines, m/km.
type Slopes struct {
	Stim float64 // from the transmitter to the profile's points
	Str  float64 // from the transmitter to the receiver
	Srim float64 // from the receiver to the profile's points; used when Blocked
	// Height is the largest (height over the ray) / sqrt(d1 d2 / d) of all points, m/sqrt(km):
	// negative, and used when not Blocked.
	Height float64
}

// Blocked tells whether the profile reaches the ray between the antennas.
func (s Slopes) Blocked() bool { return s.Stim >= s.Str }

// Nu returns the Fresnel-Kirchhoff parameter of Bullington's single edge on a path of dKm at the
// wavelength lambdaM: the edge where the two steepest sight lines meet on a blocked path, the
// point with the largest parameter on a free one.
//
// Source: Rec. ITU-R P.1812-6, (~15) to (~20). On a blocked path the distance db of the edge is put
// into its height, which leaves sqrt(0.002 d A B / lambda) with A = Stim - Str and B = Srim + Str: the same
// number, without the 0/0 of db when the ray grazes.
func (s Slopes) Nu(dKm, lambdaM float64) float64 {
	if !s.Blocked() {
		return s.Height * nuScale(lambdaM)
	}
	ab := (s.Stim - s.Str) * (s.Srim + s.Str)
	return math.Sqrt(dKm*max(ab, 0)) * nuScale(lambdaM) // rounding may leave B a hair below 0
}

// BullingtonDB returns the loss of Bullington's construction, dB, for the parameter nu of its
// single edge on a path of dKm.
//
// Source: Rec. ITU-R P.1812-6, equation (21), Luc being J(nu).
func BullingtonDB(nu, dKm float64) float64 {
	luc := KnifeEdgeDB(nu)
	if luc == 0 {
		return 0
	}
	return luc + (1-exp(-luc/6))*(10+0.02*dKm)
}

// A ridge is a profile as Bullington's construction sees it: bare heights, cover on them, and the
// antennas. Nil heights stand for level, bare ground at 0 m.
type ridge struct {
	distKm, aslM, coverM []float64
	hts, hrs             float64
}

// height returns g of an interior point.
func (r *ridge) height(i int) float64 {
	if r.aslM == nil {
		return 0
	}
	return r.aslM[i] + r.coverM[i]
}

// slopes searches the interior points on an Earth of effective radius ap km. Without interior
// points the path is free and Height is -Inf, which means no loss.
func (r *ridge) slopes(ap float64) Slopes {
	last := len(r.distKm) - 1
	d, ce := r.distKm[last], 1/ap
	s := Slopes{Stim: math.Inf(-1), Str: (r.hrs - r.hts) / d, Srim: math.Inf(-1), Height: math.Inf(-1)}
	for i := 1; i < last; i++ {
		di := r.distKm[i]
		s.Stim = max(s.Stim, (r.height(i)+500*ce*di*(d-di)-r.hts)/di) // (~14)
	}
	for i := 1; i < last; i++ {
		di := r.distKm[i]
		lifted := r.height(i) + 500*ce*di*(d-di)
		if s.Blocked() {
			s.Srim = max(s.Srim, (lifted-r.hrs)/(d-di)) // (~17)
		} else {
			over := lifted - (r.hts*(d-di)+r.hrs*di)/d
			s.Height = max(s.Height, over/math.Sqrt(di*(d-di)/d)) // (~16)
		}
	}
	return s
}

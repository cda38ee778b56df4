package propagation

import "math"

// FresnelRadiusM returns the radius of the n-th Fresnel zone, m, on a straight path at a point
// d1Km from one end and d2Km from the other, at the wavelength lambdaM.
//
// Source: Rec. ITU-R P.526-15, section ~2, (~2), in consistent units.
func FresnelRadiusM(n int, lambdaM, d1Km, d2Km float64) float64 {
	return math.Sqrt(1000 * float64(n) * lambdaM * d1Km * d2Km / (d1Km + d2Km))
}

// neededRatio is the part of the first Fresnel radius that must be free for diffraction to be
// negligible: Rec. ITU-R P.526-15, section ~2.
const neededRatio = 0.6

// A FresnelClearance tells how freely a path runs over ground and cover.
type FresnelClearance struct {
	// WorstRatio is the least clearance over the first Fresnel radius of all points between the
	// ends, at the median effective Earth radius: 0 where the ray grazes, negative where it is
	// blocked. NeededRatio is 0.6.
	WorstRatio, NeededRatio float64
	// Index is that point of the profile, AtKm its distance. A profile of two points is judged in
	// the middle of the straight ground between them, Index being -1.
	Index int
	AtKm  float64
}

// Clearance returns the first-Fresnel clearance of a path, with the errors of a method.
func Clearance(p Path) (FresnelClearance, error) {
	if err := p.check(); err != nil {
		return FresnelClearance{}, err
	}
	last, d := len(p.DistKm)-1, p.LengthKm()
	ae, lambda := EffectiveEarthRadiusKm(p.DeltaN), WavelengthM(p.FreqHz)
	ratio := func(groundM, d1 float64) float64 {
		d2 := d - d1
		ray := (p.txAslM()*d2 + p.rxAslM()*d1) / d
		return (ray - groundM - BulgeM(d1, d2, ae)) / FresnelRadiusM(1, lambda, d1, d2)
	}
	if last == 1 {
		return FresnelClearance{ratio((p.AslM[0]+p.AslM[1])/2, d/2), neededRatio, -1, d / 2}, nil
	}
	worst := FresnelClearance{WorstRatio: math.Inf(1), NeededRatio: neededRatio}
	for i := 1; i < last; i++ {
		if r := ratio(p.AslM[i]+p.CoverM[i], p.DistKm[i]); r < worst.WorstRatio {
			worst.WorstRatio, worst.Index, worst.AtKm = r, i, p.DistKm[i]
		}
	}
	return worst, nil
}

package propagation

import "math"

// An Outline is what P.1812 takes from the ground under any path, by the Recommendation's symbols:
// what a search along the profile finds, whatever the frequency, the polarization and the time.
// It stands in place of a profile where many paths share their ground, see [Brief].
type Outline struct {
	LengthKm             float64
	TxGroundM, RxGroundM float64 // bare ground at the ends, m above sea level
	Hts, Hrs             float64 // antennas, m above sea level
	Ae                   float64 // median effective Earth radius, km

	// TransHorizon, the elevations of the horizons (of the other antenna on a line of sight), mrad,
	// and on a trans-horizon path their distances, km: (76) to (81).
	TransHorizon             bool
	ThetaT, ThetaR, Dlt, Dlr float64
	// V1 and V2 are the sums of the smooth-surface fit, (85) and (86).
	V1, V2 float64
	// Hobs, AlphaT and AlphaR are the height, m, and the slopes, m/km, by which ground stands over
	// the line between the antennas, (~87), (~88); all 0 where it does not.
	Hobs, AlphaT, AlphaR float64
	// Slopes are Bullington's over ground and cover at the radius Ae.
	Slopes Slopes
}

// Theta returns the path angular distance, mrad, (82).
func (o *Outline) Theta() float64 { return 1000*o.LengthKm/o.Ae + o.ThetaT + o.ThetaR }

// A Ground answers what P.1812 asks about the ground under some paths only.
type Ground interface {
	// SlopesBeta returns Bullington's over ground and cover where k = 3.
	SlopesBeta() Slopes
	// LevelSlopes returns Bullington's over the same points at height 0, on an Earth of radiusKm,
	// between antennas at txM and rxM.
	LevelSlopes(radiusKm, txM, rxM float64) Slopes
	// ObstacleKm returns the distance of the point with the largest diffraction parameter over bare
	// ground; asked on a line of sight.
	ObstacleKm() float64
	// RoughnessM returns hm, the largest height of bare ground over the line from txM to rxM (above
	// sea level at the ends), between the horizons.
	RoughnessM(txM, rxM float64) float64
	// Zones returns dtm and dlm, the longest stretches of land and of inland, and the length over
	// sea, km.
	Zones() (dtm, dlm, sea float64)
	// LatDeg returns the latitude of the path's centre.
	LatDeg() float64
	// CoastKm returns the distances over land from both antennas to the sea.
	CoastKm() (tx, rx float64)
}

// SlopesOf returns Bullington's slopes on the profile of a path, over ground and cover, on an Earth
// of effective radius radiusKm. It does not check the path.
func SlopesOf(p *Path, radiusKm float64) Slopes {
	r := ridge{p.DistKm, p.AslM, p.CoverM, p.txAslM(), p.rxAslM()}
	return r.slopes(radiusKm)
}

// BetaRadiusKm is the effective Earth radius at which a [Ground] gives SlopesBeta.
const BetaRadiusKm = betaRadiusKm

// ElevationMrad returns the elevation of a sight line that rises by slope m/km over the local
// horizontal, mrad. Below 0.02 rad the series of the arc tangent is exact to the last digits.
func ElevationMrad(slope float64) float64 {
	x := slope / 1000
	if x > 0.02 || x < -0.02 {
		return 1000 * math.Atan(x)
	}
	x2 := x * x
	return slope * (1 - x2*(1.0/3-x2*(1.0/5-x2*(1.0/7))))
}

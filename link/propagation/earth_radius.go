package propagation

// earthRadiusKm is the mean radius of the Earth in the Recommendations.
const earthRadiusKm = 6371

// betaRadiusKm is a_beta, the effective Earth radius exceeded for beta0 of the time: k = 3 whatever
// the air, (~7b).
const betaRadiusKm = 3 * earthRadiusKm

// EffectiveEarthRadiusKm returns the median effective Earth radius ae, km.
//
// deltaN is the average fall of radio refractivity through the lowest kilometre, positive, in
// N-units/km, below 157: 39 gives about 4/3 of 6371 km.
//
// Source: Rec. ITU-R P.1812-6, (7a).
func EffectiveEarthRadiusKm(deltaN float64) float64 {
	return earthRadiusKm * 157 / (157 - deltaN)
}

// BulgeM returns the height, m, by which an Earth of effective radius aeKm rises over the chord
// between two ends at a point d1Km from one and d2Km from the other. It is the parabola
// 500 d1 d2 / ae of the Recommendations, close to the circle for any path on Earth.
func BulgeM(d1Km, d2Km, aeKm float64) float64 {
	return 500 * d1Km * d2Km / aeKm
}

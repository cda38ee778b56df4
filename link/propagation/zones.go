package propagation

import (
	"math"

	"fellreach/terrain"
)

// timeParameters are what zones and latitude say about anomalous propagation on a path.
//
// Source: Rec. ITU-R P.1812-6, (2) to (5).
type timeParameters struct {
	dtm, dlm float64 // longest unbroken stretches of land and of inland, km
	omega    float64 // share of the path over sea
	tau      float64
	beta0    float64 // time for which the gradients of anomalous propagation occur, %
}

func newTimeParameters(p terrain.Profile, latDeg float64) timeParameters {
	dtm, _ := stretches(p, func(z terrain.Zone) bool { return z != terrain.Sea })
	dlm, _ := stretches(p, func(z terrain.Zone) bool { return z == terrain.Inland })
	return timeParametersOf(dtm, dlm, seaShare(p), latDeg)
}

func timeParametersOf(dtm, dlm, omega, latDeg float64) timeParameters {
	t := timeParameters{dtm: dtm, dlm: dlm, omega: omega}
	t.tau = 1 - exp(-4.12e-4*exp(2.41*log(t.dlm)))
	t.beta0 = anomalousTimePct(t.dtm, t.tau, math.Abs(latDeg))
	return t
}

// anomalousTimePct returns beta0 for the absolute latitude phi in degrees: b0 of the Recommendation.
func anomalousTimePct(dtm, tau, phi float64) float64 {
	logMu1 := min(0, 0.2*log10(exp10(-dtm/(16-6.6*tau))+exp10(-5*(0.496+0.354*tau))))
	if phi > 70 {
		return 4.17 * exp10(1.3*logMu1) // mu1 mu4
	}
	return exp10(1.67 - 0.015*phi + logMu1*(0.065+0.0176*phi))
}

// seaShare returns omega, the part of the path over sea.
func seaShare(p terrain.Profile) float64 {
	_, sea := stretches(p, func(z terrain.Zone) bool { return z == terrain.Sea })
	return sea / p.LengthKm()
}

// stretches returns the lengths, km, of the longest unbroken stretch of the profile that lies in
// some zones and of all such stretches together. Between two points of different zones the border
// lies half-way.
func stretches(p terrain.Profile, in func(terrain.Zone) bool) (longest, total float64) {
	start, inside := 0.0, in(p.Zone[0])
	for i := 1; i <= len(p.Zone); i++ {
		end := p.LengthKm()
		if i < len(p.Zone) {
			if in(p.Zone[i]) == inside {
				continue
			}
			end = (p.DistKm[i-1] + p.DistKm[i]) / 2
		}
		if inside {
			longest, total = max(longest, end-start), total+(end-start)
		}
		start, inside = end, !inside
	}
	return longest, total
}

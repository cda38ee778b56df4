package propagation

import "math"

// horizons are the radio horizons of a path over bare ground at the median effective Earth radius.
type horizons struct {
	ae             float64 // median effective Earth radius, km
	theta          float64 // path angular distance, mrad
	thetaT, thetaR float64 // elevations of the horizons, or of the other antenna on a line of sight, mrad
	dlt, dlr       float64 // distances of the horizons, km
	tx, rx         int     // their points on the profile
	trans          bool    // the path is trans-horizon
}

// findHorizons searches a checked path.
//
// On a line of sight both horizons are the interior point with the largest diffraction parameter;
// a path of two points has none and takes its middle, with the two ends as its points.
//
// Source: Rec. ITU-R P.1812-6, (76) to (82).
func findHorizons(p *Path) horizons {
	last := len(p.DistKm) - 1
	d, hts, hrs := p.LengthKm(), p.txAslM(), p.rxAslM()
	h := horizons{ae: EffectiveEarthRadiusKm(p.DeltaN)}

	ray := rise(hts, hrs, d, h.ae)
	steepest := math.Inf(-1)
	for i := 1; i < last; i++ {
		if s := rise(hts, p.AslM[i], p.DistKm[i], h.ae); s > steepest { // the first of equals
			steepest, h.tx = s, i
		}
	}
	h.trans = steepest > ray
	if h.trans {
		h.thetaT = elevationMrad(steepest)
		h.rx, h.thetaR = receiverHorizon(p, h.ae)
	} else {
		h.thetaT, h.thetaR = elevationMrad(ray), elevationMrad(rise(hrs, hts, d, h.ae))
		h.tx, h.rx = nearestObstacle(p, h.ae)
	}
	h.dlt, h.dlr = p.DistKm[h.tx], d-p.DistKm[h.rx]
	if last == 1 {
		h.dlt, h.dlr = d/2, d/2
	}
	h.theta = 1000*d/h.ae + h.thetaT + h.thetaR
	return h
}

// rise returns the tangent of the elevation at which a point at height toM and distance d km is
// seen from height fromM: the chord's slope less the fall of the local horizontal.
func rise(fromM, toM, d, ae float64) float64 { return (toM-fromM)/(1000*d) - d/(2*ae) }

func elevationMrad(rise float64) float64 { return 1000 * math.Atan(rise) }

// receiverHorizon returns the horizon point seen from the receiver, the nearest of equals, and its
// elevation.
func receiverHorizon(p *Path, ae float64) (point int, thetaR float64) {
	d, hrs, steepest := p.LengthKm(), p.rxAslM(), math.Inf(-1)
	for i := 1; i < len(p.DistKm)-1; i++ {
		if s := rise(hrs, p.AslM[i], d-p.DistKm[i], ae); s >= steepest {
			steepest, point = s, i
		}
	}
	return point, elevationMrad(steepest)
}

// nearestObstacle returns the interior point with the largest diffraction parameter, twice: it is
// the horizon of both ends. Without interior points it returns the ends. The wavelength scales all
// parameters alike and is left out.
func nearestObstacle(p *Path, ae float64) (tx, rx int) {
	last := len(p.DistKm) - 1
	if last == 1 {
		return 0, 1
	}
	d, hts, hrs, largest := p.LengthKm(), p.txAslM(), p.rxAslM(), math.Inf(-1)
	for i := 1; i < last; i++ {
		di := p.DistKm[i]
		over := p.AslM[i] + BulgeM(di, d-di, ae) - (hts*(d-di)+hrs*di)/d
		if nu := over / math.Sqrt(di*(d-di)); nu > largest {
			largest, tx = nu, i
		}
	}
	return tx, tx
}

// setHorizons writes the geometry that all methods share.
func (l *Loss) setHorizons(p *Path, h horizons) {
	l.TxElDeg, l.RxElDeg = mradToDeg(h.thetaT), mradToDeg(h.thetaR)
	l.TransHorizon = h.trans
	t := &l.Terms
	t.Theta, t.ThetaT, t.ThetaR = h.theta, h.thetaT, h.thetaR
	t.Dlt, t.Dlr, t.Ae = h.dlt, h.dlr, h.ae
	t.Hts, t.Hrs = p.txAslM(), p.rxAslM()
}

func mradToDeg(mrad float64) float64 { return mrad / 1000 * 180 / math.Pi }

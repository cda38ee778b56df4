package coverage

import (
	"math"

	"fellreach/link/propagation"
	"fellreach/terrain"
)

// mostOwn is the most points of a profile that may lie on a cell's own bearing.
const mostOwn = 8

// A walk goes along one radial after the other and keeps what its points say to the cells beyond
// them. It serves one goroutine.
type walk struct {
	*sweep
	// The radial's points 0 to known, the site first: bridged heights, cover, zones.
	aslM, coverM []float64
	zones        []terrain.Zone
	known        int

	pushed     int     // the points 1 to pushed are in what follows
	bare, clad skyline // at the median radius; clad is in use where wooded
	beta       skyline // clad, where k = 3; if some request asks for it
	wooded     bool
	flat       hull    // bare heights as they are
	flatSteep  float64 // the steepest of them from the site's antenna, m/km
	v1, v2     float64
	runs       zoneRuns
	firstSeaKm float64 // NaN where there is none
	lastSeaKm  float64
	blocks     heightBlocks
	blocked    bool // blocks are built

	cell Cell
	list cellList
}

func newWalk(s *sweep) *walk {
	w := &walk{sweep: s}
	points := s.points + 1
	w.aslM, w.coverM, w.zones = make([]float64, points), make([]float64, points), make([]terrain.Zone, points)
	w.cell.walk = w
	return w
}

// start samples a radial and begins at the site.
func (w *walk) start(radial int) {
	sin, cos := math.Sincos(2 * math.Pi * float64(radial) / float64(w.radials))
	w.disc.Sample(terrain.Ray{StepEast: sin * w.stepM, StepNorth: cos * w.stepM}, w.aslM, w.coverM, w.zones)
	w.aslM[0], w.coverM[0], w.zones[0] = w.site.groundM, 0, w.site.zone
	for i := 1; i < len(w.coverM) && float64(i)*w.stepM < w.ClearingM; i++ {
		w.coverM[i] = 0
	}
	w.known = w.bridge(sin*w.stepM, cos*w.stepM)
	w.pushed, w.wooded, w.blocked = 0, false, false
	w.bare.start(w.ae, w.site.antennaM)
	if w.needsBeta {
		w.beta.start(propagation.BetaRadiusKm, w.site.antennaM)
	}
	w.flat, w.flatSteep = w.flat[:0], math.Inf(-1)
	w.v1, w.v2 = 0, 0
	w.runs.start(w.site.zone)
	w.firstSeaKm, w.lastSeaKm = math.NaN(), math.NaN()
	w.noteSea(&w.firstSeaKm, &w.lastSeaKm, 0, w.site.zone)
}

func (w *walk) noteSea(first, last *float64, d float64, zone terrain.Zone) {
	if zone != terrain.Sea {
		return
	}
	if math.IsNaN(*first) {
		*first = d
	}
	*last = d
}

// bridge fills voids that may be crossed and returns the last point before the first that may not.
// east and north lead from each point to the next.
func (w *walk) bridge(east, north float64) int {
	for i := 1; i < len(w.aslM); i++ {
		if !math.IsNaN(w.aslM[i]) {
			continue
		}
		next := i
		for next < len(w.aslM) && math.IsNaN(w.aslM[next]) {
			next++
		}
		const slackM = 1e-6 // for rounding
		if next == len(w.aslM) || float64(next-i+1)*w.stepM > w.BridgeM+slackM {
			return i - 1
		}
		from, rise := w.aslM[i-1], (w.aslM[next]-w.aslM[i-1])/float64(next-i+1)
		for k := i; k < next; k++ {
			w.aslM[k] = from + rise*float64(k-i+1)
			w.zones[k] = w.disc.Coastal(w.zones[k], w.aslM[k], float64(k)*east, float64(k)*north)
		}
	}
	return len(w.aslM) - 1
}

// km is the distance of a point.
func (w *walk) km(i int) float64 { return float64(i) * w.stepKm }

// advance takes in the points up to index to.
func (w *walk) advance(to int) {
	for i := w.pushed + 1; i <= to; i++ {
		w.push(w.km(i), w.aslM[i], w.coverM[i], i)
	}
	w.pushed = max(w.pushed, to)
}

func (w *walk) push(d, h, cover float64, i int) {
	if cover > 0 && !w.wooded {
		w.wooded = true
		w.clad.copyFrom(&w.bare)
	}
	w.bare.push(d, h)
	if w.wooded {
		w.clad.push(d, h+cover)
	}
	if w.needsBeta {
		w.beta.push(d, h+cover)
	}
	w.flat = w.flat.push(d, h)
	if slope := (h - w.site.antennaM) / d; slope > w.flatSteep {
		w.flatSteep = slope
	}
	w.v1, w.v2 = fitSums(w.v1, w.v2, w.km(i-1), w.aslM[i-1], d, h)
	w.runs.push(d, w.zones[i])
	w.noteSea(&w.firstSeaKm, &w.lastSeaKm, d, w.zones[i])
}

// fitSums adds the stretch between two points to the sums of the smooth-surface fit.
func fitSums(v1, v2, d0, h0, d1, h1 float64) (float64, float64) {
	step := d1 - d0
	return v1 + step*(h1+h0), v2 + step*(h1*(2*d1+d0)+h0*(d1+2*d0))
}

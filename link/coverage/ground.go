package coverage

import (
	"math"

	"fellreach/link/propagation"
)

var _ propagation.Ground = (*Cell)(nil)

// SlopesBeta implements [propagation.Ground].
func (c *Cell) SlopesBeta() propagation.Slopes {
	s, antennaM := &c.walk.beta, c.Outline.Hrs
	return s.slopes(s.sight(c.d, antennaM, c.own, true), c.d, antennaM, c.walk.clearLimit/c.d, c.own, true)
}

// LevelSlopes implements [propagation.Ground].
func (c *Cell) LevelSlopes(radiusKm, txM, rxM float64) propagation.Slopes {
	l := levelGround{drop: 500 / radiusKm, txM: txM, rxM: rxM, d: c.d, step: c.walk.stepKm, count: c.interior - len(c.own), own: c.own}
	return l.slopes()
}

// ObstacleKm implements [propagation.Ground]. Without interior points it is the path's middle.
func (c *Cell) ObstacleKm() float64 {
	if c.interior == 0 {
		return c.d / 2
	}
	if math.IsNaN(c.obstacleKm) {
		s := &c.walk.bare
		_, c.obstacleKm = s.tightest(s.ray(c.d, c.Outline.Hrs), c.d, math.Inf(1), c.own, false)
	}
	return c.obstacleKm
}

// RoughnessM implements [propagation.Ground].
func (c *Cell) RoughnessM(txM, rxM float64) float64 {
	w, o := c.walk, &c.Outline
	l := line{txM, (rxM - txM) / c.d}
	if c.interior == 0 {
		return max(o.TxGroundM-txM, o.RxGroundM-rxM)
	}
	from, to := o.Dlt, c.d-o.Dlr
	if !o.TransHorizon {
		from = c.ObstacleKm()
		to = from
	}
	between := w.stepKm / 4 // no two points are nearer to each other than twice that
	from, to = min(from, to)-between, max(from, to)+between
	hm := math.Inf(-1)
	for i := range c.own {
		if p := &c.own[i]; p.d > from && p.d < to {
			hm = max(hm, p.bare-l.at(p.d))
		}
	}
	if !w.blocked {
		w.blocks.build(w.aslM[:w.known+1], w.stepKm)
		w.blocked = true
	}
	first, last := int(math.Ceil(from/w.stepKm)), int(math.Floor(to/w.stepKm))
	return w.blocks.highestOver(l, first, min(last, c.interior-len(c.own)), hm)
}

// index is the number of the radial's point nearest to a distance.
func (s *sweep) index(km float64) int { return int(math.Round(km / s.stepKm)) }

// Zones implements [propagation.Ground].
func (c *Cell) Zones() (dtm, dlm, sea float64) { return c.dtm, c.dlm, c.sea }

// LatDeg implements [propagation.Ground].
func (c *Cell) LatDeg() float64 {
	_, lat := c.walk.disc.Places.At(c.EastM/2, c.NorthM/2)
	return lat
}

// noCoastKm is P.1812's distance to the coast where there is none.
const noCoastKm = 500

// CoastKm implements [propagation.Ground].
func (c *Cell) CoastKm() (tx, rx float64) {
	w := c.walk
	first, last := w.firstSeaKm, w.lastSeaKm
	for i := range c.own {
		w.noteSea(&first, &last, c.own[i].d, c.zoneOf[i])
	}
	w.noteSea(&first, &last, c.d, c.zoneOf[len(c.own)])
	if math.IsNaN(first) {
		return noCoastKm, noCoastKm
	}
	return first, c.d - last
}

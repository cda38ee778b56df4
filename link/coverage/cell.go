package coverage

import (
	"math"

	"fellreach/link/propagation"
	"fellreach/terrain"
)

// A Cell is one cell of the map, seen from the site. It is the [propagation.Ground] under its path.
// It is valid while it is visited.
type Cell struct {
	Index int // row by row in the map
	// EastM and NorthM are its centre on the plane of geodesics from the site, see [terrain.Disc].
	EastM, NorthM float64
	// CoverM is the height of what stands there.
	CoverM float64
	// Outline is what P.1812 takes from the ground.
	Outline propagation.Outline

	walk     *walk
	d        float64 // distance, km
	interior int     // how many interior points the profile has
	points   [mostOwn]sample
	own      []sample // the last of them, on the own bearing
	zoneOf   [mostOwn + 1]terrain.Zone
	covered  bool // some own point carries cover

	aslM, coverM [mostOwn + 1]float64

	obstacleKm    float64 // NaN until asked for
	dtm, dlm, sea float64
}

// DistanceM returns the length of the geodesic from the site.
func (c *Cell) DistanceM() float64 { return 1000 * c.d }

// AzimuthDeg returns the azimuth of the cell at the site, clockwise from true north, in [0, 360).
func (c *Cell) AzimuthDeg() float64 {
	az := math.Atan2(c.EastM, c.NorthM) * 180 / math.Pi
	if az < 0 {
		az += 360
	}
	return az
}

// set makes the cell that of an index with its centre at a position of the plane and a profile of so
// many interior points, and finds its outline. It returns false where the profile is not known.
func (c *Cell) set(p place) bool {
	w := c.walk
	c.Index, c.EastM, c.NorthM, c.interior = int(p.index), p.east, p.north, int(p.interior)
	distM := math.Hypot(p.east, p.north)
	c.d = distM / 1000
	own := min(w.ownPoints, c.interior)
	if c.interior-own > w.known || !c.sample(own, p.east/distM, p.north/distM) {
		return false
	}
	w.advance(c.interior - own)
	c.findOutline(c.aslM[own])
	return true
}

// sample reads the points on the own bearing, whose direction is given, and the cell itself.
func (c *Cell) sample(count int, east, north float64) bool {
	w := c.walk
	w.disc.Sample(w.ownRay(count, 1000*c.d, east, north), c.aslM[:count+1], c.coverM[:count+1], c.zoneOf[:count+1])
	c.own, c.CoverM, c.covered = c.points[:count], c.coverM[count], false
	for i := range c.own {
		d, h, cover := c.d-float64(count-i)*w.stepKm, c.aslM[i], c.coverM[i]
		if math.IsNaN(h) {
			at := w.index(d)
			if at > w.known {
				return false
			}
			h = w.aslM[at]
		}
		if cover > 0 && 1000*d < w.ClearingM {
			cover = 0
		}
		c.covered = c.covered || cover > 0
		c.own[i] = sample{d, h, h + cover}
	}
	return !math.IsNaN(c.aslM[count])
}

// ownRay leads over the last count points of the profile of a cell at distM, in steps up to one
// before the cell, and on to the cell; east and north are its direction.
func (s *sweep) ownRay(count int, distM, east, north float64) terrain.Ray {
	from := distM - float64(count)*s.stepM
	return terrain.Ray{East: east * from, North: north * from, StepEast: east * s.stepM, StepNorth: north * s.stepM}
}

func (c *Cell) findOutline(groundM float64) {
	w, o, d := c.walk, &c.Outline, c.d
	*o = propagation.Outline{
		LengthKm: d, TxGroundM: w.site.groundM, RxGroundM: groundM, Hts: w.site.antennaM, Hrs: groundM + w.FarAglM, Ae: w.ae,
	}
	c.obstacleKm = math.NaN()
	c.findZones()
	bare := w.bare.sight(d, o.Hrs, c.own, false)
	c.setHorizons(bare)
	c.fit()
	c.findObstructions()
	if w.wooded || c.covered {
		s := c.cladSkyline()
		o.Slopes = s.slopes(s.sight(d, o.Hrs, c.own, true), d, o.Hrs, w.clearLimit/d, c.own, true)
	} else {
		o.Slopes = w.bare.slopes(bare, d, o.Hrs, w.clearLimit/d, c.own, false)
	}
}

// cladSkyline is the skyline with cover; without cover on the radial it is the bare one.
func (c *Cell) cladSkyline() *skyline {
	if c.walk.wooded {
		return &c.walk.clad
	}
	return &c.walk.bare
}

func (c *Cell) setHorizons(v sight) {
	o, s := &c.Outline, &c.walk.bare
	if v.fromSite > v.ray {
		o.TransHorizon, o.ThetaT, o.Dlt = true, propagation.ElevationMrad(v.fromSite), v.siteKm
		o.ThetaR, o.Dlr = propagation.ElevationMrad(v.fromCell-2*s.drop*c.d), c.d-v.cellKm
		return
	}
	o.ThetaT = propagation.ElevationMrad(v.ray)
	o.ThetaR = propagation.ElevationMrad((o.Hts-o.Hrs)/c.d - s.drop*c.d)
}

// fit ends the sums of the smooth-surface fit at the cell.
func (c *Cell) fit() {
	w, o := c.walk, &c.Outline
	d0, h0 := w.km(w.pushed), w.aslM[w.pushed]
	v1, v2 := w.v1, w.v2
	for i := range c.own {
		p := &c.own[i]
		v1, v2 = fitSums(v1, v2, d0, h0, p.d, p.bare)
		d0, h0 = p.d, p.bare
	}
	o.V1, o.V2 = fitSums(v1, v2, d0, h0, c.d, o.RxGroundM)
}

// findObstructions looks for bare ground over the line between the antennas, without the bulge.
func (c *Cell) findObstructions() {
	w, o := c.walk, &c.Outline
	ray := (o.Hrs - o.Hts) / c.d
	steepest := w.flatSteep
	for i := range c.own {
		if slope := (c.own[i].bare - o.Hts) / c.own[i].d; slope > steepest {
			steepest = slope
		}
	}
	if steepest <= ray {
		return
	}
	hobs := w.flat.extreme(o.Hts, ray)
	back, _ := w.flat.tangent(c.d, o.Hrs)
	for i := range c.own {
		p := &c.own[i]
		if over := p.bare - (o.Hts + ray*p.d); over > hobs {
			hobs = over
		}
		if slope := (p.bare - o.Hrs) / (c.d - p.d); slope > back {
			back = slope
		}
	}
	o.Hobs, o.AlphaT, o.AlphaR = hobs, steepest-ray, back+ray
}

func (c *Cell) findZones() {
	w := c.walk
	if r := &w.runs; r.zone == terrain.Inland && r.inlandFrom == 0 && c.allInland() {
		c.dtm, c.dlm, c.sea = c.d, c.d, 0
		return
	}
	runs := w.runs
	for i := range c.own {
		runs.push(c.own[i].d, c.zoneOf[i])
	}
	runs.push(c.d, c.zoneOf[len(c.own)])
	runs = runs.ended(c.d)
	c.dtm, c.dlm, c.sea = runs.land, runs.inland, runs.sea
}

func (c *Cell) allInland() bool {
	for _, zone := range c.zoneOf[:len(c.own)+1] {
		if zone != terrain.Inland {
			return false
		}
	}
	return c.walk.site.zone == terrain.Inland
}

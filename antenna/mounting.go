package antenna

import "math"

// A Mount is how an antenna is fixed at its site, in degrees: from upright and facing north it is
// rolled about its facing (clockwise seen from behind the antenna), then tilted (up positive),
// then turned to the bearing of its facing (clockwise from true north).
//
// The roll is the polarization: 0 vertical, 90 horizontal, anything else slanted. Patterns that
// know their polarization turn with it; of those that are [Pattern.GainOnly] the roll turns the
// polarization alone, the same way in all directions as seen from the antenna outward.
type Mount struct{ FacingDeg, TiltDeg, RollDeg float64 }

// A Mounted is a pattern on its mount, made ready to be asked for many directions.
type Mounted struct {
	pattern          Pattern
	frame            frame
	sinTurn, cosTurn float64 // of the polarization alone, of a pattern that is [Pattern.GainOnly]
	floor, null      float64 // powers, see [Pattern.Filled]
}

// On makes a pattern on this mount ready.
func (m Mount) On(p Pattern) Mounted {
	roll := m.RollDeg
	if p.GainOnly {
		m.RollDeg = 0
	}
	sin, cos := math.Sincos(radians(roll))
	floor, null := p.floors()
	return Mounted{p, m.frame(), sin, cos, floor, null}
}

// Field returns the far field of a mounted pattern towards a true direction of the site, with
// theta down and phi towards growing azimuth at the site. Nulls are left as deep as they are;
// see [Pattern.Filled].
func (m Mount) Field(p Pattern, toward Direction) Field {
	on := m.On(p)
	return on.Field(toward)
}

// Field is [Mount.Field].
func (m *Mounted) Field(toward Direction) Field {
	ray, siteTheta, _ := toward.axes()
	own := m.frame.seen(ray).direction()
	field := m.pattern.Field(own)
	if m.pattern.GainOnly {
		// Rolled clockwise, a vertical field -theta leans towards +phi.
		field = field.turned(m.cosTurn, m.sinTurn)
	}
	_, theta, phi := own.axes()
	siteTheta = m.frame.seen(siteTheta)
	return field.turned(siteTheta.dot(theta), siteTheta.dot(phi))
}

// Filled returns [Mounted.Field] with the pattern's nulls filled, see [Pattern.Filled].
func (m *Mounted) Filled(toward Direction) Field { return filled(m.Field(toward), m.floor, m.null) }

// VerticalWidthDeg returns the half-power width in elevation, in degrees, of the lobe that holds
// the largest gain in the front half of the vertical plane through the facing, for the pattern as
// mounted. A lobe that nowhere falls to half power gives 360.
func (m Mount) VerticalWidthDeg(p Pattern) float64 {
	power := func(elDeg float64) float64 {
		return m.Field(p, Direction{AzDeg: m.FacingDeg, ElDeg: elDeg}).Power()
	}
	const step = 0.25
	peak, most := 0.0, power(0)
	for el := -90.0; el <= 90; el += step {
		if here := power(el); here > most {
			peak, most = el, here
		}
	}
	lower := halfPowerEdge(power, peak, -step, most/2)
	upper := halfPowerEdge(power, peak, step, most/2)
	if math.IsNaN(lower + upper) {
		return 360
	}
	return upper - lower
}

// halfPowerEdge walks from the peak in steps until the power is under half, over the zenith or
// the nadir if need be, and returns the angle at which it is half, or NaN if there is none.
func halfPowerEdge(power func(deg float64) float64, peak, step, half float64) float64 {
	for at := peak; math.Abs(at-peak) < 360; at += step {
		if power(at+step) < half {
			return bisect(at, at+step, func(deg float64) float64 { return power(deg) - half })
		}
	}
	return math.NaN()
}

// A frame holds the axes of a mounted antenna (facing, left, up) in the frame of its site.
type frame struct{ facing, left, up vector }

// seen returns a vector of the site in the antenna's frame.
func (f frame) seen(v vector) vector { return vector{f.facing.dot(v), f.left.dot(v), f.up.dot(v)} }

func (m Mount) frame() frame {
	sinRoll, cosRoll := math.Sincos(radians(m.RollDeg))
	facing, down, right := Direction{AzDeg: m.FacingDeg, ElDeg: m.TiltDeg}.axes()
	f := frame{facing: facing}
	for i := range 3 {
		f.left[i] = -right[i]*cosRoll - down[i]*sinRoll
		f.up[i] = right[i]*sinRoll - down[i]*cosRoll
	}
	return f
}

package wire

import (
	"math"

	"fellreach/antenna"
)

// A block holds the interaction of two segments in ohm: of the sine falling from the start (0) or
// rising to the end (1) of the first with that of the second.
type block [2][2]complex128

func (b block) transposed() block { return block{{b[0][0], b[1][0]}, {b[0][1], b[1][1]}} }

// nearSegments is the distance between the centres of two segments, over the mean of their
// lengths, up to which the kernel is integrated as a near one. It is no ratio that segments at a
// feed are likely to stand in: rounding must not decide.
const nearSegments = 2.553

// An interaction is what two runs have to do with each other. With w the sines on a segment of
// length d, w0 = sin k(d-s)/sin kd and w1 = sin ks/sin kd, and t the directions, the blocks are
//
//	Z = jk eta/4pi INTEGRAL INTEGRAL [t.t w w - w' w'/k^2] exp(-jkR)/R ds ds'
//
// the mixed-potential form with the charge explicit, Galerkin's choice of test functions.
//
// R is between points on the surfaces of wires on one line, averaged around both (the exact
// kernel, here for unequal radii too: R^2 = (s-s')^2 + (a-b)^2 + 4ab sin^2(phi/2), far away
// (s-s')^2 + a^2 + b^2); between the axes of parallel wires, since the mean of the logarithm over
// a circle is its value at the centre; and for wires at an angle from axis to axis with the mean
// square of the radii added.
type interaction struct {
	k          float64
	p, q       *run
	cosine     float64 // of the angle between them
	coaxial    bool
	radiusM2   float64 // added to R^2 unless coaxial and near
	pFar, qFar [5][]sinePoint
	pNear      []sinePoint
	sinKd      float64
	cosKd      float64 // of q's segments
}

// A sinePoint is a point of quadrature on a segment: its place from the start, and there both
// sines and their slopes over k, times the point's weight.
type sinePoint struct {
	s      float64
	w0, w1 float64
	c0, c1 float64
}

func (r rule) sinePoints(k, d float64) []sinePoint {
	points := make([]sinePoint, len(r.x))
	scale := d / math.Sin(k*d)
	for i, x := range r.x {
		sinEnd, cosEnd := math.Sincos(k * d * (1 - x))
		sin, cos := math.Sincos(k * d * x)
		weight := r.weight[i] * scale
		points[i] = sinePoint{x * d, sinEnd * weight, sin * weight, -cosEnd * weight, cos * weight}
	}
	return points
}

func newInteraction(k float64, p, q *run) interaction {
	x := interaction{k: k, p: p, q: q, cosine: p.along.dot(q.along)}
	x.sinKd, x.cosKd = math.Sincos(k * q.stepM)
	offset := p.start.to(q.start)
	parallel := p.along.cross(q.along).length() < 1e-9
	x.coaxial = parallel && offset.across(p.along).length() < 1e-6*min(p.radiusM, q.radiusM)
	switch {
	case x.coaxial:
		x.radiusM2 = p.radiusM*p.radiusM + q.radiusM*q.radiusM
	case !parallel:
		x.radiusM2 = (p.radiusM*p.radiusM + q.radiusM*q.radiusM) / 2
	}
	for n := 2; n <= 4; n++ {
		x.pFar[n], x.qFar[n] = farRules[n].sinePoints(k, p.stepM), farRules[n].sinePoints(k, q.stepM)
	}
	x.pNear = outerRule.sinePoints(k, p.stepM)
	return x
}

// block returns the interaction of segment i of p with segment j of q.
func (x *interaction) block(i, j int) block {
	offset := x.p.place(i).to(x.q.place(j))
	middles := offset.plus(x.q.along.times(x.q.stepM / 2)).minus(x.p.along.times(x.p.stepM / 2))
	distance := middles.length() / ((x.p.stepM + x.q.stepM) / 2)
	if distance <= nearSegments {
		return x.near(offset)
	}
	return x.far(offset, farPoints(distance))
}

// sums collects the integrals of a block: products of the sines, and of their slopes over k.
type sums struct{ sine, slope block }

// add adds what one point of the first segment contributes, with the integrals over the second of
// its sines (v) and their slopes over k (e), each times exp(-jkR)/R.
func (s *sums) add(p *sinePoint, v0, v1, e0, e1 complex128) {
	w0, w1, c0, c1 := complex(p.w0, 0), complex(p.w1, 0), complex(p.c0, 0), complex(p.c1, 0)
	s.sine[0][0] += w0 * v0
	s.sine[0][1] += w0 * v1
	s.sine[1][0] += w1 * v0
	s.sine[1][1] += w1 * v1
	s.slope[0][0] += c0 * e0
	s.slope[0][1] += c0 * e1
	s.slope[1][0] += c1 * e0
	s.slope[1][1] += c1 * e1
}

// ohms returns the block in ohm.
func (x *interaction) ohms(s *sums) block {
	scale := complex(0, x.k*antenna.WaveImpedanceOhm/(4*math.Pi))
	var b block
	for i := range b {
		for j := range b[i] {
			b[i][j] = scale * (complex(x.cosine, 0)*s.sine[i][j] - s.slope[i][j])
		}
	}
	return b
}

// far integrates over n by n points. offset leads from the start of the first segment to that of
// the second.
func (x *interaction) far(offset vec, n int) block {
	var s sums
	square, alongP, alongQ := offset.dot(offset)+x.radiusM2, offset.dot(x.p.along), offset.dot(x.q.along)
	for i := range x.pFar[n] {
		p := &x.pFar[n][i]
		atP, turn := square+p.s*p.s-2*p.s*alongP, alongQ-p.s*x.cosine
		var v0, v1, e0, e1 complex128
		for j := range x.qFar[n] {
			q := &x.qFar[n][j]
			r := math.Sqrt(atP + q.s*(q.s+2*turn))
			sin, cos := math.Sincos(x.k * r)
			re, im := cos/r, -sin/r
			v0 += complex(q.w0*re, q.w0*im)
			v1 += complex(q.w1*re, q.w1*im)
			e0 += complex(q.c0*re, q.c0*im)
			e1 += complex(q.c1*re, q.c1*im)
		}
		s.add(p, v0, v1, e0, e1)
	}
	return x.ohms(&s)
}

// near integrates with the peak of 1/R taken out: from each point of the first segment, whose foot
// on the second's axis is z from its start, at the height h above it, s' = z + h sinh u turns ds'/R
// into du.
func (x *interaction) near(offset vec) block {
	var s sums
	for i := range x.pNear {
		p := &x.pNear[i]
		from := x.p.along.times(p.s).minus(offset)
		z := from.dot(x.q.along)
		var jc, js complex128
		if x.coaxial {
			jc, js = x.around(z)
		} else {
			square := from.across(x.q.along)
			jc, js = x.inner(z, math.Sqrt(square.dot(square)+x.radiusM2))
		}
		sin, cos := complex(x.sinKd, 0), complex(x.cosKd, 0)
		s.add(p, (sin*jc-cos*js)/sin, js/sin, -(cos*jc+sin*js)/sin, jc/sin)
	}
	return x.ohms(&s)
}

// around averages the inner integrals over the angle between points on two coaxial surfaces.
func (x *interaction) around(z float64) (jc, js complex128) {
	a, b := x.p.radiusM, x.q.radiusM
	for i, turn := range roundRule.x {
		sin := math.Sin(math.Pi / 2 * turn)
		c, s := x.inner(z, math.Sqrt((a-b)*(a-b)+4*a*b*sin*sin))
		weight := complex(roundRule.weight[i], 0)
		jc += weight * c
		js += weight * s
	}
	return jc, js
}

// inner returns the integrals of cos ks' and of sin ks', times exp(-jkR)/R, over q's segment from
// a point at the height h above its axis, z along it from its start.
func (x *interaction) inner(z, h float64) (jc, js complex128) {
	const least = 1e-12 // of a wavelength; an unexpected point on the axis must not give NaN
	h = max(h, least*2*math.Pi/x.k)
	from, to := math.Asinh(-z/h), math.Asinh((x.q.stepM-z)/h)
	for i, t := range innerRule.x {
		sinh, cosh := sinhCosh(from + (to-from)*t)
		sinR, cosR := math.Sincos(x.k * h * cosh)
		sinS, cosS := math.Sincos(x.k * (z + h*sinh))
		weight := innerRule.weight[i]
		re, im := weight*cosR, -weight*sinR
		jc += complex(cosS*re, cosS*im)
		js += complex(sinS*re, sinS*im)
	}
	length := complex(to-from, 0)
	return length * jc, length * js
}

// lossBlock returns what a conductor's own impedance per metre adds to the interaction of a
// segment with itself: its product with the integrals of w0 w0, w0 w1 and w1 w1.
func lossBlock(ohmPerM complex128, k, d float64) block {
	same, cross := sineIntegrals(k, d)
	z00, z01 := ohmPerM*complex(same, 0), ohmPerM*complex(cross, 0)
	return block{{z00, z01}, {z01, z00}}
}

// sineIntegrals returns the integrals of w0^2 and of w0 w1 over a segment of length d, in metres.
func sineIntegrals(k, d float64) (same, cross float64) {
	kd := k * d
	if kd < 0.02 { // the differences below cancel
		return d / 3 * (1 + 2*kd*kd/15), d / 6 * (1 + 7*kd*kd/30)
	}
	sin, cos := math.Sincos(kd)
	return (d/2 - sin*cos/(2*k)) / (sin * sin), (sin/(2*k) - d*cos/2) / (sin * sin)
}

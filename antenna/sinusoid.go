package antenna

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"
)

// A sinusoid is a thin straight wire on the z axis, fed at z = 0 between a lower and an upper
// arm, with the current A sin k(l - |z|) on each arm of length l: zero at the ends, the same on
// both sides of the feed.
//
// Such a current radiates as if from its three kinks alone. With dI the steps of its slope there,
// over k, its axial field at distance R from each is
//
//	Ez = -j (eta/4pi) SUM dI exp(-jkR)/R
//
// from which impedance and far field follow. Source: induced-EMF method, Balanis, Antenna
// Theory, chapter 8 (from memory), here for arms of unequal length.
type sinusoid struct {
	wavelengthM, radiusM float64
	lowerM, upperM       float64
	ohmPerM              complex128 // internal impedance of the conductor

	lowerA, upperA float64    // the arms' amplitudes A, the larger of them 1
	kinks          [3]float64 // their places, m
	steps          [3]float64 // of I'/k there
}

// newSinusoid fills in the current of a wire given by its arms. Arms that are both multiples of
// a half wave share the current evenly if they are equal; if not, the current has no answer.
func newSinusoid(s sinusoid) (sinusoid, error) {
	k := s.wavenumber()
	sinLower, cosLower := math.Sincos(k * s.lowerM)
	sinUpper, cosUpper := math.Sincos(k * s.upperM)
	// Continuity at the feed: lowerA sin k lower = upperA sin k upper.
	s.lowerA, s.upperA = sinUpper, sinLower
	if math.Abs(s.lowerM-s.upperM) < 1e-9*s.wavelengthM {
		s.lowerA, s.upperA = 1, 1
	}
	largest := max(math.Abs(s.lowerA), math.Abs(s.upperA))
	if largest < 1e-6 {
		return sinusoid{}, fmt.Errorf("arms of %.4g and %.4g m are both multiples of a half wave: a sinusoidal current cannot tell how they share it; change the length or the feed", s.lowerM, s.upperM)
	}
	s.lowerA /= largest
	s.upperA /= largest
	s.kinks = [3]float64{-s.lowerM, 0, s.upperM}
	s.steps = [3]float64{s.lowerA, -s.lowerA*cosLower - s.upperA*cosUpper, s.upperA}
	return s, nil
}

// rule returns enough points to integrate the current's products with waves along the wire.
func (s sinusoid) rule() gaussRule {
	return newGaussRule(24 + int(16*(s.lowerM+s.upperM)/s.wavelengthM))
}

func (s sinusoid) wavenumber() float64 { return 2 * math.Pi / s.wavelengthM }

// feedA returns the current at the feed.
func (s sinusoid) feedA() float64 { return s.upperA * math.Sin(s.wavenumber()*s.upperM) }

// crestA returns the largest current on the wire.
func (s sinusoid) crestA() float64 {
	crest := func(amplitude, armM float64) float64 {
		return math.Abs(amplitude * math.Sin(min(s.wavenumber()*armM, math.Pi/2)))
	}
	return max(crest(s.lowerA, s.lowerM), crest(s.upperA, s.upperM))
}

// The part of the largest current that must flow at the feed. A real current has a part in
// quadrature there that a sinusoid leaves out: under the second figure it counts; under the first
// it rules, and the resistance comes out five times too large and more.
const (
	refusedFeed  = 0.2
	doubtfulFeed = 0.8
)

func (s sinusoid) notes() []string {
	var notes []string
	if math.Abs(s.feedA()) < doubtfulFeed*s.crestA() {
		notes = append(notes, "the feed is far from the largest current: impedance by the closed forms is a rough estimate")
	}
	if s.radiusM > 0.01*s.wavelengthM {
		notes = append(notes, "radius over 0.01 wl: closed forms are for thin rods, resistance and resonance are uncertain")
	}
	return notes
}

// impedanceOhm returns the impedance at the feed: induced EMF at the wire's surface, and the
// conductor's own impedance weighted with the square of the current.
func (s sinusoid) impedanceOhm() (complex128, error) {
	feed := s.feedA()
	if math.Abs(feed) < refusedFeed*s.crestA() {
		return 0, errors.New("a sinusoidal current is too small at the feed (an arm is close to a multiple of a half wave): the closed forms give no impedance there; change the length or the feed")
	}
	return (s.emf() + s.ohmPerM*complex(s.meanSquare(), 0)) / complex(feed*feed, 0), nil
}

// emf returns -INTEGRAL Ez I dz over the wire's surface, in ohm for the current's own scale. As in
// the handbooks' Si and Ci forms, terms of the order of radius over length are left out: the
// radius counts at the feed alone, where the current does not vanish at the kink.
func (s sinusoid) emf() complex128 {
	rule := s.rule()
	var sum complex128
	for i, kink := range s.kinks {
		sum += complex(s.steps[i], 0) * (s.potential(rule, kink, -s.lowerM, 0) + s.potential(rule, kink, 0, s.upperM))
	}
	return complex(0, WaveImpedanceOhm/(4*math.Pi)) * sum
}

// potential returns the integral of I exp(-jkR)/R over one arm, R from a kink. Around the feed
// 1/R is integrated apart, to log(2 length/radius), and the rest is smooth.
func (s sinusoid) potential(rule gaussRule, kink, from, to float64) complex128 {
	k := s.wavenumber()
	atKink := 0.0
	if kink == 0 {
		atKink = s.feedA()
	}
	smooth := rule.integral(from, to, func(z float64) complex128 {
		r := math.Abs(z - kink)
		sin, cos := math.Sincos(k * r)
		current := s.current(z)
		return complex((current*cos-atKink)/r, -current*sin/r)
	})
	return smooth + complex(atKink*math.Log(2*(to-from)/s.radiusM), 0)
}

func (s sinusoid) current(z float64) float64 {
	if z < 0 {
		return s.lowerA * math.Sin(s.wavenumber()*(s.lowerM+z))
	}
	return s.upperA * math.Sin(s.wavenumber()*(s.upperM-z))
}

// meanSquare returns the integral of the squared current along the wire, in metres for the
// current's own scale.
func (s sinusoid) meanSquare() float64 {
	k := s.wavenumber()
	arm := func(amplitude, l float64) float64 {
		return amplitude * amplitude * (l/2 - math.Sin(2*k*l)/(4*k))
	}
	return arm(s.lowerA, s.lowerM) + arm(s.upperA, s.upperM)
}

// efficiency returns radiated over accepted power.
func (s sinusoid) efficiency() float64 {
	radiated := real(s.emf())
	return radiated / (radiated + real(s.ohmPerM)*s.meanSquare())
}

// pattern returns the directivity of the wire, vertical in the antenna's frame.
func (s sinusoid) pattern() Pattern {
	mean := s.rule().mean(func(sinEl float64) float64 {
		return squared(s.farField(sinEl, math.Sqrt(1-sinEl*sinEl)))
	})
	scale := complex(1/math.Sqrt(mean), 0)
	at := func(elDeg float64) complex128 {
		sinEl, cosEl := math.Sincos(radians(elDeg))
		return scale * s.farField(sinEl, cosEl)
	}
	peak := largest(-90, 90, 720, func(elDeg float64) float64 { return squared(at(elDeg)) })
	return Pattern{
		Field:   func(d Direction) Field { return Field{Theta: at(d.ElDeg)} },
		PeakDBi: decibels(peak),
		Phased:  true,
	}
}

// farField returns the theta component towards an elevation, up to a constant factor.
func (s sinusoid) farField(sinEl, cosEl float64) complex128 {
	if cosEl < 1e-6 {
		return 0 // the field vanishes along the wire, in proportion to cosEl
	}
	var sum complex128
	for i, kink := range s.kinks {
		sum += complex(s.steps[i], 0) * cmplx.Rect(1, s.wavenumber()*kink*sinEl)
	}
	return sum / complex(cosEl, 0)
}

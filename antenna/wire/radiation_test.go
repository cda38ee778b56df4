package wire

import (
	"math"
	"math/cmplx"
	"strings"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

// Source: the integral by the midpoint rule.
func TestStrandIntegral(t *testing.T) {
	const k, step = 2 * math.Pi, 0.04
	s := strand{run{along: vec{0, 0, 1}, stepM: step, count: 5}, []complex128{0, 1i, 0.5, complex(0.3, -0.2), 1, 0}}
	for _, cosine := range []float64{-1, -0.4, 0, 0.9999, 1} {
		var want complex128
		const points = 20000
		for i := range points * s.count {
			at := step * (float64(i) + 0.5) / points
			n, x := i/points, math.Mod(at, step)
			current := (s.currents[n]*complex(math.Sin(k*(step-x)), 0) + s.currents[n+1]*complex(math.Sin(k*x), 0)) / complex(math.Sin(k*step), 0)
			want += current * cmplx.Rect(step/points, k*cosine*at)
		}
		if got := s.along(k, cosine); cmplx.Abs(got-want) > 1e-8 {
			t.Errorf("cosine %g: %v, want %v", cosine, got, want)
		}
	}
}

// Source: Hertz's dipole (any handbook): E_theta = j eta k I l sin(theta)/(4 pi), here times -1 for
// theta down from a current up; it radiates eta k^2 (I l)^2/(12 pi).
func TestHertzianDipole(t *testing.T) {
	const k, l = 2 * math.Pi, 0.001
	r := newRadiator(k, []strand{{run{start: vec{0, 0, -l / 2}, along: vec{0, 0, 1}, stepM: l / 2, count: 2}, []complex128{1, 1, 1}}})
	for _, el := range []float64{-60, 0, 30, 89} {
		f := r.row(el, []float64{123})[0]
		want := complex(0, antenna.WaveImpedanceOhm*k*l*math.Cos(el*math.Pi/180)/(4*math.Pi))
		if cmplx.Abs(f.Theta-want) > 1e-4*cmplx.Abs(want) || cmplx.Abs(f.Phi) > 1e-12 {
			t.Errorf("elevation %g: %v, want theta %v", el, f, want)
		}
	}
	near(t, "radiated power over Hertz's", r.radiatedW()/(antenna.WaveImpedanceOhm*k*k*l*l/(12*math.Pi)), 1, 1e-4)
}

// Upright strands take a short cut, which gives what the general way does.
func TestUprightStrands(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := strand{run{start: drawnVec(t, "start"), along: vec{0, 0, 1}, stepM: 0.05, count: 2}, []complex128{0, 1, 0.5i}}
		leaning := s
		leaning.run.along = vec{1e-9, 0, 1}.unit()
		el, az := rapid.Float64Range(-90, 90).Draw(t, "el"), rapid.Float64Range(0, 360).Draw(t, "az")
		f := (&radiator{k: 6, strands: []strand{s}}).row(el, []float64{az})[0]
		g := (&radiator{k: 6, strands: []strand{leaning}}).row(el, []float64{az})[0]
		if cmplx.Abs(f.Theta-g.Theta)+cmplx.Abs(f.Phi-g.Phi) > 1e-5 {
			t.Errorf("%v by the short cut, %v without", f, g)
		}
	})
}

// Source: the frames of package antenna: theta down, phi with growing azimuth, clockwise; and the
// field of a lying wire has its component along the wire.
func TestComponents(t *testing.T) {
	lying := Structure{Wires: []Wire{{From: [3]float64{0, -0.235, 0}, To: [3]float64{0, 0.235, 0}, DiameterM: 0.004, Material: antenna.Ideal}}, Feeds: middleFeed()}
	_, r := excited(t, lying)
	ahead, up := r.Field(antenna.Direction{}), r.Field(antenna.Direction{ElDeg: 90})
	if cmplx.Abs(ahead.Theta) > 1e-9 || cmplx.Abs(ahead.Phi) < 1 {
		t.Errorf("ahead of a wire to the left: %v", ahead)
	}
	near(t, "gain ahead and above", ahead.GainDBi(), up.GainDBi(), 1e-9)
	if along := r.Field(antenna.Direction{AzDeg: 90}).GainDBi(); along > -60 {
		t.Errorf("%.1f dBi along the wire, want none", along)
	}
	for _, d := range []antenna.Direction{{}, {AzDeg: 90}, {AzDeg: 33, ElDeg: -20}} {
		toward, theta, phi := axes(d)
		if c := theta.cross(phi).apart(toward); c > 1e-12 && theta.cross(phi).apart(toward.times(-1)) > 1e-12 {
			t.Errorf("axes towards %v are not at right angles", d)
		}
		const little = 1e-6
		more, _, _ := axes(antenna.Direction{AzDeg: d.AzDeg + little, ElDeg: d.ElDeg})
		if toward.to(more).dot(phi) <= 0 {
			t.Errorf("phi towards %v is not that of growing azimuth", d)
		}
	}
}

// Source: linearity: twice the voltage is four times the power; and the currents of two ports driven
// together are the sum of theirs.
func TestExcitationIsLinear(t *testing.T) {
	n := network(t, Structure{Wires: []Wire{upright(0.47, 0.002), upright(0.5, 0.002).moved(vec{0.3, 0.1, 0})}, Feeds: []Feed{{1, 0.5}, {2, 0.3}}})
	drive := func(volts ...complex128) *Radiation {
		r, err := n.Excite(volts)
		if err != nil {
			t.Fatal(err)
		}
		return r
	}
	one, double, both := drive(1, 0), drive(2, 0), drive(1, 1i)
	near(t, "power of twice the voltage", double.InputW/one.InputW, 4, 1e-12)
	near(t, "radiated power of it", double.RadiatedW/one.RadiatedW, 4, 1e-12)
	other := drive(0, 1i)
	for i, a := range both.PortA {
		if cmplx.Abs(a-one.PortA[i]-other.PortA[i]) > 1e-15 {
			t.Errorf("port %d: %v A, want the sum of %v and %v", i+1, a, one.PortA[i], other.PortA[i])
		}
	}
	near(t, "balance", both.Balance(), 1, 1e-3)
}

func TestExciteRefuses(t *testing.T) {
	n := network(t, Structure{Wires: []Wire{upright(0.47, 0.002)}, Feeds: middleFeed()})
	if _, err := n.Excite([]complex128{0}); err == nil || !strings.Contains(err.Error(), "no power") {
		t.Errorf("without a voltage: %v", err)
	}
	defer func() {
		if recover() == nil {
			t.Error("two voltages for one port were taken")
		}
	}()
	_, _ = n.Excite([]complex128{1, 1})
}

// A structure at the edge of the method says that its power does not balance, one beyond it is
// refused.
func TestPowerImbalance(t *testing.T) {
	s := Structure{Wires: []Wire{upright(0.47, 0.022)}, Feeds: middleFeed()}
	_, r := excited(t, s)
	if w := r.warnings(); len(w) != 1 || !strings.Contains(w[0], "power balance 1.0") {
		t.Errorf("balance %.4f: warnings %q", r.Balance(), w)
	}
	n := network(t, besideMast(0.33, 0.3, 0, 5))
	if _, err := n.Excite([]complex128{1}); err == nil || !strings.Contains(err.Error(), "must be within 2 % of the input") {
		t.Errorf("0.03 wl from a mast of 0.3: %v", err)
	}
}

// Source: loss by the definition, for a current that is constant over a segment short against the
// wavelength: R I^2/2 per metre.
func TestLossOfAStrand(t *testing.T) {
	s := strand{run{stepM: 0.001, count: 3}, []complex128{2i, 2i, 2i, 2i}}
	near(t, "loss", s.lossW(2*math.Pi, 5), 5*4*0.003/2, 1e-6)
}

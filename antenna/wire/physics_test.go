package wire

import (
	"math"
	"math/cmplx"
	"testing"

	"fellreach/antenna"
)

// polygon returns a closed loop of straight wires in the plane of x and y, fed in the middle of the
// first.
func polygon(sides int, perimeterM, radiusM float64) Structure {
	s := Structure{Feeds: middleFeed()}
	circle := perimeterM / float64(sides) / (2 * math.Sin(math.Pi/float64(sides)))
	corner := func(i int) vec {
		sin, cos := math.Sincos(2 * math.Pi * float64(i) / float64(sides))
		return vec{circle * cos, circle * sin, 0}
	}
	for i := range sides {
		s.Wires = append(s.Wires, Wire{From: corner(i), To: corner(i + 1), DiameterM: 2 * radiusM, Material: antenna.Ideal})
	}
	return s
}

// Source: small loops (Kraus, Balanis): radiation resistance 20 (2 pi)^4 A^2/wl^4 ohm, here of a
// square of 0.04 wl around; inductance of a square of side s from round wire (Grover, from memory):
// mu0 2s/pi [ln(s/a) - 0.774], both of
// which the current on a loop of some size exceeds by a few per cent. A loop radiates nothing along its axis and vertically polarized nothing at all.
func TestSmallLoop(t *testing.T) {
	const side, radiusM = 0.01, 2e-5
	n, r := excited(t, polygon(4, 4*side, radiusM))
	z := n.TogetherOhm()
	near(t, "radiation resistance over the formula", real(z)/(20*math.Pow(2*math.Pi, 4)*math.Pow(side, 4)), 1.03, 0.05)
	wL := 2 * math.Pi * testHz * 4e-7 * math.Pi * 2 * side / math.Pi * (math.Log(side/radiusM) - 0.774)
	near(t, "reactance over that of the inductance", imag(z)/wL, 1.02, 0.03)
	if g := r.gainDBi(vec{0, 0, 1}); g > -15 {
		t.Errorf("%.1f dBi along the axis of a small loop", g)
	}
	f := r.Field(antenna.Direction{AzDeg: 45})
	near(t, "horizontal directivity", f.GainDBi(), 1.76, 0.3)
	if cmplx.Abs(f.Theta) > 1e-9 {
		t.Errorf("theta %v of a lying loop", f.Theta)
	}
}

// Source: loop of one wavelength (Kraus): its beam is along the axis, near 3.5 dBi, and its resistance
// near 100 ohm and more; with more sides it comes closer to the circle's 135 ohm.
func TestLoopOfOneWave(t *testing.T) {
	square, _ := excited(t, polygon(4, 1, 1e-4))
	round, r := excited(t, polygon(16, 1, 1e-4))
	if s, c := real(square.TogetherOhm()), real(round.TogetherOhm()); s < 90 || c <= s || c > 150 {
		t.Errorf("square loop %.1f ohm, round loop %.1f", s, c)
	}
	near(t, "gain along the axis", r.gainDBi(vec{0, 0, 1}), 3.4, 0.2)
}

// Source: a lossless two-wire line of impedance Z0 = 120 arcosh(D/2a), closed at its far end by a bar:
// reactance Z0 tan(k l). The wires are ten radii apart, and the bars at both ends count as half
// their length of line each. Tolerance: the bars.
func TestTwoWireStub(t *testing.T) {
	const spacingM, radiusM = 0.01, 0.001
	z0 := 120 * math.Acosh(spacingM/(2*radiusM))
	for _, lengthM := range []float64{0.1, 0.15, 0.4} {
		z := network(t, stub(lengthM, spacingM, radiusM)).TogetherOhm()
		length := math.Atan2(imag(z), z0) / (2 * math.Pi)
		if lengthM > 0.25 {
			length += 0.5
		}
		near(t, "electrical length of line, wl", length, lengthM+spacingM, 0.004)
		if real(z) < 0 || real(z) > 20 {
			t.Errorf("resistance %.2f ohm of a line of %g wl", real(z), lengthM)
		}
	}
}

// stub returns a two-wire line along z, fed in the middle of the bar at its foot, closed at its head.
func stub(lengthM, spacingM, radiusM float64) Structure {
	left, right := vec{0, spacingM / 2, 0}, vec{0, -spacingM / 2, 0}
	up := vec{0, 0, lengthM}
	wire := func(from, to vec) Wire {
		return Wire{From: from, To: to, DiameterM: 2 * radiusM, Material: antenna.Ideal}
	}
	return Structure{
		Wires: []Wire{wire(right, left), wire(left, left.plus(up)), wire(left.plus(up), right.plus(up)), wire(right.plus(up), right)},
		Feeds: middleFeed(),
	}
}

// Source: network theory: a parasitic element shorted at its middle makes Z11 - Z12^2/Z22 of the fed
// one; two rods driven alike show Z11 + Z12 each.
func TestPortsAsANetwork(t *testing.T) {
	rods := []Wire{upright(0.47, 0.002), upright(0.49, 0.002).moved(vec{-0.15, 0, 0})}
	z, err := network(t, Structure{Wires: rods, Feeds: []Feed{{1, 0.5}, {2, 0.5}}}).ImpedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	want := z[0][0] - z[0][1]*z[1][0]/z[1][1]
	rods[1].Segments = 20 // as it is divided with a feed
	if got := network(t, Structure{Wires: rods, Feeds: middleFeed()}).TogetherOhm(); cmplx.Abs(got-want) > 1e-6*cmplx.Abs(want) {
		t.Errorf("fed element %.5f ohm, by the impedance matrix %.5f", got, want)
	}
	alike := network(t, rowOf(2, vec{0, 0.4, 0}))
	z, err = alike.ImpedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	if sum := z[0][0] + z[0][1]; cmplx.Abs(alike.TogetherOhm()-sum) > 1e-9*cmplx.Abs(sum) {
		t.Errorf("together %.5f ohm, Z11 + Z12 = %.5f", alike.TogetherOhm(), sum)
	}
}

// Source: crossed dipoles fed in quadrature radiate a circle broadside, of either hand by the sign,
// 3 dB of it in each linear component, and are alike all around.
func TestTurnstile(t *testing.T) {
	lying := func(from, to vec) Wire {
		return Wire{From: from, To: to, DiameterM: 0.002, Material: antenna.Ideal}
	}
	s := Structure{
		Wires: []Wire{lying(vec{0, -0.235, 0}, vec{0, 0.235, 0}), lying(vec{0.02, 0, -0.235}, vec{0.02, 0, 0.235})},
		Feeds: []Feed{{1, 0.5}, {2, 0.5}},
	}
	n := network(t, s)
	for _, quadrature := range []complex128{1i, -1i} {
		// The second rod is 0.02 wl ahead: it is fed so much later.
		r, err := n.Excite([]complex128{1, quadrature * cmplx.Rect(1, -2*math.Pi*0.02)})
		if err != nil {
			t.Fatal(err)
		}
		f := r.Pattern().Field(antenna.Direction{})
		ratio := f.Theta / f.Phi
		if cmplx.Abs(ratio-quadrature) > 0.02 && cmplx.Abs(ratio+quadrature) > 0.02 {
			t.Errorf("theta over phi %.4f, want a circle", ratio)
		}
		near(t, "share of the vertical", f.VerticalShare(), 0.5, 0.01)
	}
}

// Source: reciprocity and the definition of mutual impedance: of rods at right angles, their middles
// on the common normal, it vanishes.
func TestCrossedRodsAreApart(t *testing.T) {
	lying := Wire{From: [3]float64{0.1, -0.25, 0}, To: [3]float64{0.1, 0.25, 0}, DiameterM: 0.002, Material: antenna.Ideal}
	z, err := network(t, Structure{Wires: []Wire{upright(0.47, 0.001), lying}, Feeds: []Feed{{1, 0.5}, {2, 0.5}}}).ImpedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	if cmplx.Abs(z[0][1]) > 1e-8 {
		t.Errorf("mutual impedance %v ohm of crossed rods", z[0][1])
	}
}

// Source: far apart, the current in a shorted rod follows from the far field of the other and its own
// pattern: |Z12| = eta/(4 pi) wl/d sqrt(D1 D2 R1 R2) 4 pi/eta... the transmission formula,
// |Z12|^2 = 4 R1 R2 G1 G2 (wl/(4 pi d))^2.
func TestTransmissionFormula(t *testing.T) {
	const apart = 30.0
	z, err := network(t, Structure{
		Wires: []Wire{upright(0.47, 0.001), upright(0.47, 0.001).moved(vec{apart, 0, 0})},
		Feeds: []Feed{{1, 0.5}, {2, 0.5}},
	}).ImpedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	_, r := solvedRod(t, 0.47, 0.001, 0.5)
	gain := r.Field(antenna.Direction{}).Power()
	want := 2 * real(z[0][0]) * gain / (4 * math.Pi * apart)
	near(t, "mutual impedance over the formula's", cmplx.Abs(z[0][1])/want, 1, 0.002)
}

// Source: perturbation of the reaction: a small impedance per metre adds its integral with the square
// of the current, over that of the feed's, to the input impedance; and power is conserved.
func TestLossAddsToImpedance(t *testing.T) {
	rod := upright(0.47, 0.001)
	ideal, free := excited(t, Structure{Wires: []Wire{rod}, Feeds: middleFeed()})
	rod.Material = antenna.Materials()[1]
	lossy, r := excited(t, Structure{Wires: []Wire{rod}, Feeds: middleFeed()})
	s := free.radiator.strands[0]
	same, cross := sineIntegrals(2*math.Pi, s.stepM)
	var squares complex128
	for i := range s.count {
		a, b := s.currents[i], s.currents[i+1]
		squares += complex(same, 0)*(a*a+b*b) + complex(2*cross, 0)*a*b
	}
	want := rod.Material.ImpedanceOhmPerM(testHz, 0.001) * squares / (free.PortA[0] * free.PortA[0])
	if got := lossy.TogetherOhm() - ideal.TogetherOhm(); cmplx.Abs(got-want) > 0.01*cmplx.Abs(want) {
		t.Errorf("aluminium adds %.5f ohm, by the current without loss %.5f", got, want)
	}
	near(t, "input power", r.InputW, r.RadiatedW+r.LossW, 1e-4*r.InputW)
}

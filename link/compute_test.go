package link

import (
	"math"
	"slices"
	"strings"
	"testing"

	"fellreach/antenna"
	"fellreach/link/propagation"
	"fellreach/terrain"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"
)

// level is flat ground at 100 m, in steps of 50 m, running east.
func level(km float64) terrain.Profile {
	n := int(math.Ceil(km*20)) + 1
	p := terrain.Profile{AzDeg: 90, BackAzDeg: 270}
	for i := range n {
		d := km * float64(i) / float64(n-1)
		p.DistKm = append(p.DistKm, d)
		p.AslM = append(p.AslM, 100)
		p.CoverM = append(p.CoverM, 0)
		p.Zone = append(p.Zone, terrain.Inland)
		p.Points = append(p.Points, orb.Point{d / 100, 47})
	}
	return p
}

// hill puts a ridge of a height in metres into the middle of a profile.
func hill(p terrain.Profile, heightM float64) terrain.Profile {
	p.AslM = slices.Clone(p.AslM)
	p.AslM[len(p.AslM)/2] += heightM
	return p
}

func isotropic(t testing.TB, gainDBi, vswr float64) antenna.Design {
	t.Helper()
	d, err := antenna.Isotropic(gainDBi, antenna.Port{ImpedanceOhm: 50, VSWR: vswr})
	if err != nil {
		t.Fatal(err)
	}
	d.Name = "iso"
	return d
}

func dipole(t testing.TB) antenna.Design {
	t.Helper()
	d, err := antenna.Dipole(antenna.DipoleSpec{Length: antenna.Length{Wavelengths: 0.5}, FeedAt: 0.5, DiameterM: 0.012, Material: antenna.Ideal})
	if err != nil {
		t.Fatal(err)
	}
	d.Name = "rod"
	return d
}

// plainStation has 30 m of height, 37 dBm, -117 dBm and nothing between radio and antenna.
func plainStation(name string, order int, d antenna.Design) *Station {
	return &Station{
		Name: name, Order: order, Antenna: d, AglM: 30,
		Radio: Radio{Name: "set", PowerDBm: 37, Needs: Need{Stated: true, SensitivityDBm: -117, FigureDB: 7}},
	}
}

func conditions(m propagation.Model) Conditions {
	return Conditions{Method: m, DeltaN: 45, N0: 325, SpreadDB: 9}
}

var poll = Channel{Name: "poll", OutHz: 150e6, BackHz: 150e6, BandwidthHz: 12.5e3}

func mustCompute(t testing.TB, l *Link, p terrain.Profile, m propagation.Model) *Result {
	t.Helper()
	r, err := Compute(l, p, conditions(m))
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// A budget worked by hand. Free space over 10 km at 150 MHz: 20 log(4 pi 10000/1.998616) = 95.970 dB
// (P.525). The feeder, 20 m of 0.05 dB/m, loses a = 1 dB = 1.258925; VSWR 2 is |G|^2 = 1/9, so line
// and mismatch together lose 10 log(a/(1 - 1/9)) = 1.51153 dB (line theory), of which the mismatch
// seen at the radio, |G|^2/a^2 = 0.070106, is 0.31567 dB and the standing waves 0.19586 dB.
func TestBudgetWorkedByHand(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 3, 2)), plainStation("B", 1, isotropic(t, 6, 1))
	a.Run = antenna.Run{
		Feeder:  antenna.Feeder{Name: "cable", ImpedanceOhm: 50, VelocityFactor: 0.8, Loss: []antenna.LossPoint{{FreqHz: 150e6, DBPerM: 0.05}}},
		LengthM: 20,
	}
	a.Inserts = []Insert{{Name: "duplexer", LossDB: 1.2}, {Name: "listening filter", LossDB: 0.7, ReceiveOnly: true}}
	l := &Link{
		From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 99, MarginDB: 6},
		Fade: &Allowance{LossDB: 10}, Allowances: []Allowance{{Name: "wet leaves", LossDB: 2}},
	}
	r := mustCompute(t, l, level(10), propagation.FreeSpace)
	const freeSpace = 95.9697
	for i, want := range []struct{ received, margin float64 }{
		{37 - 1.2 - 1.51153 + 3 - freeSpace + 6, 117 - 10 - 2},
		{37 + 6 - freeSpace + 3 - 1.51153 - 1.2 - 0.7, 117 - 10 - 2},
	} {
		d := r.Directions[i]
		if math.Abs(d.ReceivedDBm-want.received) > 2e-4 {
			t.Errorf("direction %d: received %.4f dBm, want %.4f", i, d.ReceivedDBm, want.received)
		}
		if got := d.MarginDB; math.Abs(got-want.received-want.margin) > 2e-4 {
			t.Errorf("direction %d: margin %.4f dB, want %.4f", i, got, want.received+want.margin)
		}
	}
	for name, want := range map[string]float64{
		"A: mismatch at the radio": -0.31567, "A: standing waves on the feeder": -0.19586, "A: feeder cable, 20 m": -1, "free space, 10.00 km": -freeSpace,
		"fading, 99 % of the year": -10, "B: sensitivity": 117, "A: gain towards the path": 3, "polarization": 0,
	} {
		if got := line(t, r.Directions[0], name); math.Abs(got-want) > 2e-4 {
			t.Errorf("%s: %.5f dB, want %.5f", name, got, want)
		}
	}
	if r.Verdict != Closes || r.MarginDB != min(r.Directions[0].MarginDB, r.Directions[1].MarginDB) {
		t.Errorf("verdict %s with %.2f dB", r.Verdict, r.MarginDB)
	}
}

func line(t *testing.T, b Budget, name string) float64 {
	t.Helper()
	for _, l := range b.Lines {
		if l.Name == name {
			return l.DB
		}
	}
	t.Errorf("no line %q in %v", name, b.Lines)
	return math.NaN()
}

// The noise floor by hand: k T0 B in 8 kHz is -134.944 dBm, with 7 dB of figure and 12 dB of ratio
// -115.944 dBm. The preamplifier's noise is Friis' as in package noise's own test.
func TestNeedFromNoise(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	b.Radio.Needs = Need{FigureDB: 7, BandwidthHz: 8000, RequiredSNRDB: 12}
	b.Inserts = []Insert{{Name: "preamp", GainDB: 12, FigureDB: 2, ReceiveOnly: true, AtMast: true}, {Name: "pad", LossDB: 3}}
	l := &Link{From: a, To: b, Channel: poll, OneWay: true, Aim: Aim{AvailabilityPct: 50}}
	r := mustCompute(t, l, level(10), propagation.FreeSpace)
	if len(r.Directions) != 1 {
		t.Fatalf("a one-way link has %d directions", len(r.Directions))
	}
	d := r.Directions[0]
	if math.Abs(d.RequiredDBm+115.944) > 1e-3 {
		t.Errorf("required %.4f dBm, want -115.944", d.RequiredDBm)
	}
	if got := line(t, d, "B: noise from outside and of the preamplifier"); math.Abs(got+5.32995) > 1e-4 {
		t.Errorf("preamplifier's noise %.5f dB, want -5.32995", got)
	}
	if got := line(t, d, "B: preamp"); got != 12 {
		t.Errorf("preamplifier's gain %.2f dB, want 12", got)
	}
}

// Half-wave dipoles, both upright, are matched and broadside to each other: 2.15 dBi each
// (handbooks). Slanted alike by 45 degrees they face each other crossed, and slanted the opposite
// way they are matched; crossed antennas lose what scattering leaves: 16 dB on a clear path.
func TestPolarization(t *testing.T) {
	for _, tc := range []struct{ slantA, slantB, want float64 }{
		{0, 0, 0}, {45, 45, 16}, {45, -45, 0}, {0, 90, 16}, {90, 90, 0}, {0, 45, 3.0103},
	} {
		a, b := plainStation("A", 0, dipole(t)), plainStation("B", 1, dipole(t))
		a.Mount = antenna.Mount{FacingDeg: 90, RollDeg: tc.slantA}
		b.Mount = antenna.Mount{FacingDeg: 270, RollDeg: tc.slantB}
		l := &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}
		r := mustCompute(t, l, level(5), propagation.FreeSpace)
		if got := -line(t, r.Directions[0], "polarization"); math.Abs(got-tc.want) > 0.02 {
			t.Errorf("slants %g and %g: polarization loses %.3f dB, want %.3f", tc.slantA, tc.slantB, got, tc.want)
		}
		if got := line(t, r.Directions[0], "A: directivity towards the path"); math.Abs(got-2.15) > 0.01 {
			t.Errorf("slant %g: directivity %.3f dBi, want 2.15", tc.slantA, got)
		}
	}
}

// Phases not known matter between two slanted fields alone, and only then the line says so.
func TestUnknownPhasesAreTold(t *testing.T) {
	for _, tc := range []struct {
		slantA, slantB float64
		told           bool
	}{{0, 0, false}, {0, 45, false}, {45, 0, false}, {90, 90, false}, {45, 90, false}, {45, 30, true}} {
		a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
		a.Mount.RollDeg, b.Mount.RollDeg = tc.slantA, tc.slantB
		r := mustCompute(t, &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}, level(5), propagation.FreeSpace)
		for _, l := range r.Directions[0].Lines {
			if l.Name == "polarization" && strings.Contains(l.Source, "phases not known") != tc.told {
				t.Errorf("slants %g and %g: told %v, want %v: %s", tc.slantA, tc.slantB, !tc.told, tc.told, l.Source)
			}
		}
	}
}

// The mismatch line tells the load whose VSWR it tells: behind the transformer, at the edge of the
// channel that is worst. A load of 75 ohm behind 4:1 is 18.75 ohm: VSWR 2.67 on 50 ohm.
func TestMismatchTellsItsLoad(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1.5)), plainStation("B", 1, isotropic(t, 0, 1))
	a.Match = antenna.Match{Ratio: 4}
	r := mustCompute(t, &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}, level(5), propagation.FreeSpace)
	const want = "VSWR 2.67 at the radio, 2.67 at the antenna (18.8 + j0.0 ohm behind 4:1)"
	for _, l := range r.Directions[0].Lines {
		if l.Name == "A: mismatch at the radio" && l.Source != want {
			t.Errorf("got %q, want %q", l.Source, want)
		}
	}
}

func TestObstructedPathLosesMore(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	l := &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}
	clear, blocked := mustCompute(t, l, level(10), propagation.P526), mustCompute(t, l, hill(level(10), 300), propagation.P526)
	if blocked.MarginDB > clear.MarginDB-20 {
		t.Errorf("a ridge of 300 m takes %.1f dB", clear.MarginDB-blocked.MarginDB)
	}
	if blocked.Clearance.WorstRatio >= 0 || math.Abs(blocked.Clearance.AtKm-5) > 0.06 {
		t.Errorf("worst point %+v, want blocked at 5 km", blocked.Clearance)
	}
	if blocked.Directions[0].DepartureDeg <= clear.Directions[0].DepartureDeg {
		t.Error("the path does not leave over the ridge")
	}
}

func TestVerdicts(t *testing.T) {
	for _, tc := range []struct {
		aim            Aim
		margin, chance float64
		want           Verdict
	}{
		{Aim{MarginDB: 6}, 6, 0, Closes},
		{Aim{MarginDB: 6}, 5.999, 99, Thin},
		{Aim{MarginDB: 6}, 0, 0, Thin},
		{Aim{MarginDB: 6}, -0.001, 99, Fails},
		{Aim{MarginDB: 0}, 0, 0, Closes},
		{Aim{MarginDB: -3}, -1, 0, Fails},
		{Aim{ChancePct: 90}, 3, 90, Closes},
		{Aim{ChancePct: 90}, 30, 89, Thin},
		{Aim{ChancePct: 40}, -1, 45, Fails},
	} {
		if got := tc.aim.judge(tc.margin, tc.chance); got != tc.want {
			t.Errorf("%+v with %g dB and %g %%: %s, want %s", tc.aim, tc.margin, tc.chance, got, tc.want)
		}
	}
}

// The chance by a table of the normal distribution: Phi(1) = 84.134 %, Phi(0) = 50 %,
// Phi(-1.6449) = 5 %; s is hypot(9, 1) = 9.05539 dB.
func TestChance(t *testing.T) {
	c := Conditions{SpreadDB: 9}
	s := math.Hypot(9, 1)
	for _, tc := range []struct{ margin, bias, want float64 }{
		{s, 0, 84.1345}, {0, 0, 50}, {-1.644854 * s, 0, 5}, {0, s, 84.1345},
	} {
		c.BiasDB = tc.bias
		if got := c.chancePct(tc.margin, heard{}); math.Abs(got-tc.want) > 1e-3 {
			t.Errorf("margin %g, bias %g: %.4f %%, want %.4f", tc.margin, tc.bias, got, tc.want)
		}
	}
}

// Surveyed ground replaces the raster's, cover within the clearing is left out, and notes of the
// ground reach the reader.
func TestGroundOfTheSites(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	surveyed := 150.0
	a.GroundAslM, a.ClearingM, b.ClearingM = &surveyed, 200, 0
	p := level(5)
	p.Notes = []string{"bridged a void"}
	for i := range p.CoverM {
		p.CoverM[i] = 12
	}
	l := &Link{From: b, To: a, Channel: poll, Aim: Aim{AvailabilityPct: 50}} // from the second end
	r := mustCompute(t, l, p, propagation.P526)
	n := len(r.Profile.AslM)
	if r.Profile.AslM[0] != 100 || r.Profile.AslM[n-1] != 150 {
		t.Errorf("ground at the ends is %g and %g m, want 100 and 150 from From to To", r.Profile.AslM[0], r.Profile.AslM[n-1])
	}
	if r.Profile.CoverM[0] != 0 || r.Profile.CoverM[1] != 12 || r.Profile.CoverM[n-2] != 0 || r.Profile.CoverM[n-5] != 12 {
		t.Errorf("cover near the ends: %v ... %v", r.Profile.CoverM[:3], r.Profile.CoverM[n-6:])
	}
	if r.Profile.AzDeg != 270 {
		t.Errorf("azimuth %g from From, want 270", r.Profile.AzDeg)
	}
	if !slices.Contains(r.Warnings, Warning{"", "bridged a void"}) {
		t.Errorf("the bridged void is not among %v", r.Warnings)
	}
	if p.AslM[0] != 100 || p.CoverM[1] != 12 {
		t.Error("the caller's profile was changed")
	}
}

func TestErrorsNameTheStation(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	b.Run = antenna.Run{Feeder: antenna.Feeder{Name: "cable", ImpedanceOhm: 50, VelocityFactor: 0.8, Loss: []antenna.LossPoint{{FreqHz: 1e9, DBPerM: 0.05}}}, LengthM: 20}
	_, err := Compute(&Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}, level(5), conditions(propagation.FreeSpace))
	if err == nil || !strings.Contains(err.Error(), "B: ") || !strings.Contains(err.Error(), "cable") {
		t.Errorf("got %v, want an error that names B and its cable", err)
	}
}

// The section is the same ground whichever end it is drawn from.
func TestTraceBothWays(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	b.AglM = 12
	p := hill(level(8), 120)
	there, err := Trace(&Link{From: a, To: b, Channel: poll}, p, conditions(propagation.P526))
	if err != nil {
		t.Fatal(err)
	}
	back, err := Trace(&Link{From: b, To: a, Channel: poll}, p, conditions(propagation.P526))
	if err != nil {
		t.Fatal(err)
	}
	n := len(there.RayM)
	for i := range n {
		j := n - 1 - i
		if math.Abs(there.RayM[i]-back.RayM[j]) > 1e-9 || math.Abs(there.Fresnel1M[i]-back.Fresnel1M[j]) > 1e-9 || math.Abs(there.BulgeM[i]-back.BulgeM[j]) > 1e-9 {
			t.Fatalf("point %d differs between the two ways", i)
		}
	}
	if math.Abs(there.Clearance.AtKm+back.Clearance.AtKm-8) > 1e-9 || there.Horizon.DepartureDeg != back.Horizon.ArrivalDeg || there.Horizon.FromHorizonKm != back.Horizon.ToHorizonKm {
		t.Errorf("worst point or horizon differ: %+v %+v, %+v %+v", there.Clearance, back.Clearance, there.Horizon, back.Horizon)
	}
	if there.RayM[0] != 130 || there.RayM[n-1] != 112 {
		t.Errorf("the ray runs from %g to %g m, want 130 to 112", there.RayM[0], there.RayM[n-1])
	}
}

// Properties of every budget: the lines add up, one of them is the need, equal frequencies lose
// the same both ways, and which end is called first does not matter.
func TestBudgetProperties(t *testing.T) {
	rod, iso := dipole(t), isotropic(t, 4, 1.7)
	rapid.Check(t, func(t *rapid.T) {
		a, b := plainStation("A", 0, rod), plainStation("B", 1, iso)
		a.AglM, b.AglM = rapid.Float64Range(2, 60).Draw(t, "height of A"), rapid.Float64Range(2, 60).Draw(t, "height of B")
		a.Mount = antenna.Mount{FacingDeg: rapid.Float64Range(0, 360).Draw(t, "facing"), RollDeg: rapid.Float64Range(-90, 90).Draw(t, "roll")}
		p := hill(level(rapid.Float64Range(0.5, 60).Draw(t, "km")), rapid.Float64Range(-50, 400).Draw(t, "ridge"))
		ch := poll
		if rapid.Bool().Draw(t, "two frequencies") {
			ch.BackHz = 155e6
		}
		fade := rapid.Float64Range(0, 30).Draw(t, "fade")
		l := &Link{From: a, To: b, Channel: ch, Aim: Aim{AvailabilityPct: 99, MarginDB: 6}, Fade: &Allowance{LossDB: fade}}
		r, err := Compute(l, p, conditions(propagation.P526))
		if err != nil {
			t.Fatal(err)
		}
		swapped := *l
		swapped.From, swapped.To = b, a
		swapped.Channel.OutHz, swapped.Channel.BackHz = ch.BackHz, ch.OutHz
		back, err := Compute(&swapped, p, conditions(propagation.P526))
		if err != nil {
			t.Fatal(err)
		}
		for i, d := range r.Directions {
			sum, needs := 0.0, 0
			for _, l := range d.Lines {
				sum += l.DB
				if l.Kind == NeedLine {
					needs++
				}
				if l.Name == "" || math.IsNaN(l.DB) || math.IsInf(l.DB, 0) {
					t.Fatalf("line %+v", l)
				}
			}
			if math.Abs(sum-d.MarginDB) > 1e-9 || needs != 1 || math.Abs(d.ReceivedDBm-d.RequiredDBm-d.FadeDB-d.MarginDB) > 1e-9 {
				t.Fatalf("lines add up to %g, the margin is %g, %d needs", sum, d.MarginDB, needs)
			}
			if other := back.Directions[1-i]; other.TransmissionLossDB != d.TransmissionLossDB || math.Abs(other.MarginDB-d.MarginDB) > 1e-9 {
				t.Fatalf("called the other way round, the direction loses %g and not %g dB", other.TransmissionLossDB, d.TransmissionLossDB)
			}
		}
		if ch.OutHz == ch.BackHz && r.Directions[0].TransmissionLossDB != r.Directions[1].TransmissionLossDB {
			t.Fatal("one frequency, two losses")
		}
	})
}

package wire

import (
	"math"
	"strings"
	"testing"

	"fellreach/antenna"
)

func metresOf(m float64) antenna.Length       { return antenna.Length{M: m} }
func wavelengthsOf(wl float64) antenna.Length { return antenna.Length{Wavelengths: wl} }

// testYagi has a resonant driven element between a reflector and two directors.
func testYagi() YagiSpec {
	return YagiSpec{DiameterM: 0.008, Material: antenna.Ideal, Elements: []Element{
		{Length: metresOf(0.982), At: metresOf(-0.1)},
		{At: metresOf(0.3), Driven: true},
		{Length: metresOf(0.9), At: metresOf(0.7)},
		{Length: metresOf(0.88), At: wavelengthsOf(0.5)},
	}}
}

func testFolded() FoldedDipoleSpec {
	return FoldedDipoleSpec{Spacing: metresOf(0.06), DiameterM: 0.008, Material: antenna.Ideal}
}

const channelHz = 151.5e6

func analysed(t testing.TB, a Antenna, in antenna.Setting, referenceOhm float64) Analysis {
	t.Helper()
	r, err := a.Analyse(in, referenceOhm)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// Each kind says what it is, is cut to resonance in the clear and on its mast, and its cut list is
// what its wires are.
func TestKinds(t *testing.T) {
	dipole, err := Dipole(antenna.DipoleSpec{FeedAt: 0.4, DiameterM: 0.012, Material: antenna.Materials()[1]})
	built(t, dipole, err)
	folded, err := FoldedDipole(testFolded())
	built(t, folded, err)
	yagi, err := Yagi(testYagi())
	built(t, yagi, err)
	stack, err := Stack(StackSpec{Of: dipole, Count: 3, Spacing: wavelengthsOf(0.8)})
	built(t, stack, err)
	onMast := endless(antenna.Setting{FreqHz: channelHz, MastDiameterM: 0.114, StandoffM: 0.7})
	onTop := endless(antenna.Setting{FreqHz: channelHz, MastDiameterM: 0.06})
	for _, tc := range []struct {
		a           Antenna
		kind        string
		directional bool
		parts       string
		wires       int
	}{
		{dipole, "dipole", false, "lower arm, upper arm", 1},
		{folded, "folded-dipole", false, "fed limb, plain limb, spacing, axis to axis", 4},
		{yagi, "yagi", true, "reflector, driven element, director 1, director 2", 4},
		{stack, "stack", false, "each lower arm, each upper arm, antenna 2 above antenna 1, antenna 3 above antenna 1", 3},
	} {
		if tc.a.Kind != tc.kind || tc.a.Directional != tc.directional {
			t.Errorf("kind %q, directional %v; want %q, %v", tc.a.Kind, tc.a.Directional, tc.kind, tc.directional)
		}
		for _, in := range []antenna.Setting{endless(antenna.Setting{FreqHz: channelHz}), onMast, onTop} {
			s, err := tc.a.Solve(in)
			if err != nil {
				t.Fatal(err)
			}
			if abs(imag(s.ImpedanceOhm)) > 0.02 {
				t.Errorf("%s: %.3f ohm at the channel", tc.kind, s.ImpedanceOhm)
			}
			if in.MastDiameterM > 0 && len(s.Remarks) == 0 {
				t.Errorf("%s: no remark on its mast", tc.kind)
			}
			checked, _ := in.Checked()
			c, err := tc.a.cut(checked)
			if err != nil {
				t.Fatal(err)
			}
			var names []string
			for _, p := range c.parts {
				names = append(names, p.Name)
			}
			if got := strings.Join(names, ", "); got != tc.parts || len(c.wires) != tc.wires {
				t.Errorf("%s: parts %q, want %q; %d wires, want %d", tc.kind, got, tc.parts, len(c.wires), tc.wires)
			}
		}
		r := analysed(t, tc.a, endless(antenna.Setting{FreqHz: channelHz}), 50)
		near(t, tc.kind+": resonance over the channel", r.ResonantHz/channelHz, 1, 1e-4)
	}
	r := analysed(t, dipole, onMast, 50)
	near(t, "arms of a dipole", r.Cut[0].LengthM/(r.Cut[0].LengthM+r.Cut[1].LengthM), 0.4, 1e-12)
}

// Directivity and gain differ by the efficiency; the band's edges are where the VSWR is 2; a rod
// made 1 mm longer resonates where it is said to.
func TestAnalysis(t *testing.T) {
	spec := antenna.DipoleSpec{FeedAt: 0.5, DiameterM: 0.012, Material: antenna.Materials()[3]}
	a, err := Dipole(spec)
	built(t, a, err)
	for _, in := range []antenna.Setting{
		endless(antenna.Setting{FreqHz: channelHz}),
		endless(antenna.Setting{FreqHz: channelHz, MastDiameterM: 0.114, StandoffM: 0.5}),
	} {
		r := analysed(t, a, in, 50)
		near(t, "gain under directivity", r.DirectivityDBi-r.GainDBi, -10*math.Log10(r.Efficiency), 1e-9)
		near(t, "VSWR", r.VSWR, antenna.VSWR(r.ImpedanceOhm, 50), 1e-12)
		in.DesignHz = channelHz
		edges, err := a.Sweep(in, r.BandHz[:])
		if err != nil {
			t.Fatal(err)
		}
		for i, z := range edges {
			near(t, "VSWR at an edge", antenna.VSWR(z, 50), 2, 1e-3)
			if (r.BandHz[i] > channelHz) != (i == 1) {
				t.Errorf("band %v Hz does not hold the channel", r.BandHz)
			}
		}
		near(t, "relative width", r.BandWidth(), (r.BandHz[1]-r.BandHz[0])/channelHz, 0.02*r.BandWidth())
		longer := spec
		longer.Length = metresOf(r.Cut[0].LengthM + r.Cut[1].LengthM + 0.001)
		b, err := Dipole(longer)
		built(t, b, err)
		moved := analysed(t, b, in, 50)
		near(t, "shift by 1 mm, Hz", moved.ResonantHz-r.ResonantHz, r.HzPerMM, 0.03*abs(r.HzPerMM))
		if !(r.HzPerMM < -50e3) || !(r.PowerBalance > 0.995) || r.Segments < 20 || !strings.Contains(r.Source, "segments, power balance 1.00") {
			t.Errorf("%g Hz per mm, balance %g, %d segments, source %q", r.HzPerMM, r.PowerBalance, r.Segments, r.Source)
		}
	}
}

// An antenna cut for one frequency and used at others: the band lies where the design is, and a
// VSWR above 2 at the frequency of interest leads to the band nearby, or to none.
func TestAnalysisBesideTheBand(t *testing.T) {
	a := rodOf(t, 0, 0.006, 0.5)
	r := analysed(t, a, endless(antenna.Setting{FreqHz: 170e6, DesignHz: channelHz}), 50)
	if r.VSWR < 2 || r.BandHz[0] > channelHz || r.BandHz[1] < channelHz {
		t.Errorf("VSWR %.2f at 170 MHz, band %v Hz", r.VSWR, r.BandHz)
	}
	near(t, "resonance", r.ResonantHz, channelHz, 1e-4*channelHz)
	if r := analysed(t, a, endless(antenna.Setting{FreqHz: channelHz}), 5000); r.BandHz != [2]float64{} || r.BandWidth() != 0 {
		t.Errorf("band %v Hz in 5000 ohm, want none", r.BandHz)
	}
	far := analysed(t, a, endless(antenna.Setting{FreqHz: 430e6, DesignHz: channelHz}), 50)
	if far.ResonantHz < 430e6 || far.ResonantHz > 490e6 {
		t.Errorf("three half waves resonate at %.1f MHz, want a little above three times the design", far.ResonantHz/1e6)
	}
	if _, err := a.Analyse(endless(antenna.Setting{FreqHz: channelHz}), -50); err == nil {
		t.Error("a reference of -50 ohm was taken")
	}
}

// Source: collinear_stack.csv, typed: two dipoles of 0.47 wl, 0.8 wl apart, equal voltages; gain and
// impedance of each, by the spread of five solutions.
func TestStackOfTwo(t *testing.T) {
	stack, err := Stack(StackSpec{Of: rodOf(t, 0.47, 0.002, 0.5), Count: 2, Spacing: metresOf(0.8)})
	s, err := built(t, stack, err).Solve(antenna.Setting{FreqHz: testHz})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "gain", s.Pattern.Field(antenna.Direction{}).GainDBi(), 5.18988, 0.06)
	near(t, "R", real(s.ImpedanceOhm), 68.764, 1.5)
	near(t, "X", imag(s.ImpedanceOhm), -10.9, 1.5)
}

// The pair of a stack shares power as its ports do: the power into the harness is that into both.
func TestHarnessKeepsPower(t *testing.T) {
	s := besideMast(0.3, 0.03, 0, 5)
	s.Wires = append(s.Wires, s.Wires[0].moved(vec{0, 0, 0.9}))
	s.Feeds = append(s.Feeds, Feed{2, 0.5})
	n, r := excited(t, s)
	// 1 V at each of two ports is sqrt(2) V at one of twice the resistance.
	near(t, "power", real(1/n.TogetherOhm()), r.InputW, 1e-12)
}

func TestBadKinds(t *testing.T) {
	nan := math.NaN()
	yagi := func(change func(*YagiSpec)) error { s := testYagi(); change(&s); _, err := Yagi(s); return err }
	folded := func(change func(*FoldedDipoleSpec)) error {
		s := testFolded()
		change(&s)
		_, err := FoldedDipole(s)
		return err
	}
	stack := func(s StackSpec) error { _, err := Stack(s); return err }
	rod := rodOf(t, 0.5, 0.001, 0.5)
	dipole := func(s antenna.DipoleSpec) error { _, err := Dipole(s); return err }
	wires := func(w []Wire, f []Feed) error { _, err := Wires(w, f); return err }
	for _, tc := range []struct {
		name string
		err  error
		says string
	}{
		{"yagi without driven", yagi(func(s *YagiSpec) { s.Elements[1].Driven = false; s.Elements[1].Length.M = 1 }), "0 of 4 elements are driven"},
		{"yagi with two driven", yagi(func(s *YagiSpec) { s.Elements[0].Driven = true }), "2 of 4 elements are driven"},
		{"yagi with a resonant director", yagi(func(s *YagiSpec) { s.Elements[2].Length = antenna.Length{} }), "element 3: only the driven element can be resonant"},
		{"yagi with two lengths", yagi(func(s *YagiSpec) { s.Elements[2].Length.Wavelengths = 0.4 }), "element 3: length is given both"},
		{"yagi place", yagi(func(s *YagiSpec) { s.Elements[2].At.M = nan }), "element 3: place NaN m"},
		{"yagi length", yagi(func(s *YagiSpec) { s.Elements[0].Length.M = -1 }), "element 1: length of -1 m"},
		{"yagi diameter", yagi(func(s *YagiSpec) { s.DiameterM = nan }), "diameter NaN m"},
		{"yagi of nothing", yagi(func(s *YagiSpec) { s.Elements = nil }), "0 of 0 elements"},
		{"yagi material", yagi(func(s *YagiSpec) { s.Material = antenna.Material{Name: "wood"} }), "wood"},
		{"folded without spacing", folded(func(s *FoldedDipoleSpec) { s.Spacing = antenna.Length{} }), "spacing of 0 m"},
		{"folded length", folded(func(s *FoldedDipoleSpec) { s.Length.M = math.Inf(1) }), "length of +Inf m"},
		{"stack of one", stack(StackSpec{Of: rod, Count: 1, Spacing: metresOf(1)}), "count 1 is out of range"},
		{"stack of many", stack(StackSpec{Of: rod, Count: 99, Spacing: metresOf(1)}), "2 to 16"},
		{"stack without spacing", stack(StackSpec{Of: rod, Count: 2}), "spacing of 0 m"},
		{"stack of nothing", stack(StackSpec{Count: 2, Spacing: metresOf(1)}), "missing"},
		{"dipole feed", dipole(antenna.DipoleSpec{FeedAt: 0, DiameterM: 0.01, Material: antenna.Ideal}), "feed_at"},
		{"wires", wires([]Wire{{}}, nil), "wire 1"},
		{"wires without feed", wires([]Wire{upright(1, 0.001)}, nil), "no feed"},
	} {
		if tc.err == nil || !strings.Contains(tc.err.Error(), tc.says) {
			t.Errorf("%s: error %v, want one that says %q", tc.name, tc.err, tc.says)
		}
	}
}

// What only an installation shows to be wrong is an error when it is solved.
func TestBadInstallations(t *testing.T) {
	rod := rodOf(t, 0.5, 0.005, 0.5)
	thick, err := Dipole(antenna.DipoleSpec{FeedAt: 0.5, DiameterM: 0.25, Material: antenna.Ideal})
	built(t, thick, err)
	overlapping, err := Stack(StackSpec{Of: rod, Count: 2, Spacing: metresOf(0.3)})
	built(t, overlapping, err)
	for _, tc := range []struct {
		name string
		a    Antenna
		in   antenna.Setting
		says string
	}{
		{"frequency", rod, antenna.Setting{}, "frequency 0 Hz"},
		{"roll", rod, antenna.Setting{FreqHz: testHz, RollDeg: math.NaN()}, "roll NaN deg"},
		{"mast height", rod, antenna.Setting{FreqHz: testHz, MastAboveM: math.NaN()}, "mast's height"},
		{"in the mast", rod, endless(antenna.Setting{FreqHz: testHz, MastDiameterM: 0.2, StandoffM: 0.05}), "runs into the mast"},
		{"mast", rod, endless(antenna.Setting{FreqHz: testHz, MastDiameterM: 5, StandoffM: 4}), "mast diameter 5 m is out of range"},
		{"too thick", thick, endless(antenna.Setting{FreqHz: testHz}), "too long"},
		{"stack overlaps", overlapping, endless(antenna.Setting{FreqHz: testHz}), "wires 1 and 2 cross, touch or overlap"},
	} {
		for _, solve := range []func() error{
			func() error { _, err := tc.a.Solve(tc.in); return err },
			func() error { _, err := tc.a.Analyse(tc.in, 50); return err },
			func() error { _, err := tc.a.Refine(tc.in); return err },
		} {
			if err := solve(); err == nil || !strings.Contains(err.Error(), tc.says) {
				t.Errorf("%s: error %v, want one that says %q", tc.name, err, tc.says)
			}
		}
	}
	if _, err := rod.Sweep(antenna.Setting{}, []float64{testHz}); err == nil {
		t.Error("a sweep without a frequency was made")
	}
}

// Wires are solved as given; several feeds are one port.
func TestWires(t *testing.T) {
	rod := upright(0.47, 0.003)
	a, err := Wires([]Wire{rod, rod.moved(vec{0, 0.5, 0})}, []Feed{{1, 0.5}, {2, 0.5}})
	built(t, a, err)
	if !a.Directional || a.Kind != "wires" {
		t.Errorf("kind %q, directional %v", a.Kind, a.Directional)
	}
	r := analysed(t, a, clearOfMasts(), 50)
	n, direct := excited(t, Structure{Wires: []Wire{rod, rod.moved(vec{0, 0.5, 0})}, Feeds: []Feed{{1, 0.5}, {2, 0.5}}})
	near(t, "R", real(r.ImpedanceOhm), real(n.TogetherOhm()), 1e-9)
	near(t, "directivity", r.DirectivityDBi, direct.gainDBi(vec{1, 0, 0}), 0.01)
	if r.HzPerMM != 0 || len(r.Cut) != 2 || r.Cut[1] != (Part{"wire 2", 0.47}) {
		t.Errorf("%g Hz per mm, parts %v", r.HzPerMM, r.Cut)
	}
	finer := rod
	finer.Segments = 34
	asked, err := Wires([]Wire{finer}, middleFeed())
	if r := analysed(t, built(t, asked, err), clearOfMasts(), 50); r.Segments != 34 {
		t.Errorf("%d segments, want the 34 asked for", r.Segments)
	}
	if one, err := Wires([]Wire{rod}, middleFeed()); err != nil || one.Directional {
		t.Errorf("a wire along z: directional %v, %v", one.Directional, err)
	}
}

// Many at once get the same answer, to the last bit, and each question is answered once.
func TestSolutionsAreShared(t *testing.T) {
	a := rodOf(t, 0, 0.003, 0.5)
	s := antenna.Setting{FreqHz: testHz, MastDiameterM: 0.05, StandoffM: 0.3, MastAboveM: 0.4, RollDeg: 30}
	in := s
	answers := make([]antenna.Solution, 16)
	parallel(len(answers), func(i int) { answers[i], _ = a.Solve(s) })
	fresh, err := rodOf(t, 0, 0.003, 0.5).Solve(in)
	if err != nil {
		t.Fatal(err)
	}
	d := antenna.Direction{AzDeg: 33, ElDeg: 7}
	for _, got := range answers {
		if got.ImpedanceOhm != fresh.ImpedanceOhm || got.Pattern.Field(d) != fresh.Pattern.Field(d) {
			t.Errorf("%v and %v differ", got.ImpedanceOhm, fresh.ImpedanceOhm)
		}
	}
	calls := 0
	var m memo[int, int]
	for range 3 {
		if v, err := m.get(4, func() (int, error) { calls++; return 7, nil }); v != 7 || err != nil {
			t.Error(v, err)
		}
	}
	if calls != 1 {
		t.Errorf("made %d times", calls)
	}
}

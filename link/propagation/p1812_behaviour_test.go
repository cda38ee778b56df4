package propagation

import (
	"math"
	"slices"
	"strings"
	"testing"

	"fellreach/terrain"
	"pgregory.net/rapid"
)

// drawStatistics sets what P.1812 alone reads.
func drawStatistics(t *rapid.T, p *Path) {
	p.N0 = rapid.Float64Range(280, 400).Draw(t, "N0")
	p.TimePct = rapid.SampledFrom([]float64{1, 3, 10, 30, 50}).Draw(t, "time")
	p.LocationPct = rapid.SampledFrom([]float64{1, 50, 95}).Draw(t, "locations")
	p.LocationSpreadDB = 6
	p.LatDeg = rapid.Float64Range(-90, 90).Draw(t, "latitude")
	p.TxCoastKm, p.RxCoastKm = rapid.Float64Range(0, 10).Draw(t, "dct"), rapid.Float64Range(0, 10).Draw(t, "dcr")
}

func mustLoss(t rapid.TB, p Path) Loss {
	t.Helper()
	l, err := P1812.Loss(p)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// The loss is the same from either end. Passed over are paths that lie on a step of the method to
// the last digit: two points that tie for the horizon of a line of sight, of which each direction takes
// its own first one, and a sea share of 0.75, where coupling at the coast sets in.
func TestP1812Reciprocity(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		drawStatistics(t, &p)
		there, back := mustLoss(t, p), mustLoss(t, fromOtherEnd(p))
		if math.Abs(there.Terms.Dlt-back.Terms.Dlr) > 1e-9 || math.Abs(there.Terms.Omega-0.75) < 1e-9 {
			t.Skip("on a step")
		}
		if math.Abs(there.DB-back.DB) > 1e-6 {
			t.Errorf("there %.9f dB, back %.9f dB", there.DB, back.DB)
		}
	})
}

// No path loses less than its line of sight with focusing, and leaving out ducting never gains.
func TestLeastLoss(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		drawStatistics(t, &p)
		l := mustLoss(t, p)
		if l.DB < l.Terms.Lb0p || l.Terms.Lb0p > l.Terms.Lbfs {
			t.Errorf("loss %g, Lb0p %g, Lbfs %g", l.DB, l.Terms.Lb0p, l.Terms.Lbfs)
		}
		without, err := P1812WithoutDucting(p)
		if err != nil {
			t.Fatal(err)
		}
		if without.DB < l.DB-1e-9 {
			t.Errorf("%g dB without ducting, %g dB with it", without.DB, l.DB)
		}
	})
}

// Raising cover between the ends never lowers the median loss.
func TestP1812GrowsWithCover(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		if len(p.DistKm) < 3 {
			t.Skip("no point between the ends")
		}
		before := mustLoss(t, p)
		p.CoverM[rapid.IntRange(1, len(p.DistKm)-2).Draw(t, "point")] += rapid.Float64Range(0, 100).Draw(t, "rise")
		if after := mustLoss(t, p); after.DB < before.DB-1e-9 {
			t.Errorf("%.9f dB, %.9f dB before", after.DB, before.DB)
		}
	})
}

// Cover enters the actual Bullington alone, and at the two ends not even that.
func TestWhereCoverEnters(t *testing.T) {
	p := rolling(200)
	p.TimePct = 10
	clear(p.CoverM)
	bare := mustLoss(t, p)
	p.CoverM[0], p.CoverM[199] = 25, 25
	if got := mustLoss(t, p); got.DB != bare.DB {
		t.Errorf("cover at the ends: %g dB, %g dB without it", got.DB, bare.DB)
	}
	for i := range p.CoverM {
		p.CoverM[i] = 15
	}
	covered := mustLoss(t, p).Terms
	if covered.LbullaK50 <= bare.Terms.LbullaK50 {
		t.Errorf("Lbulla %g dB with cover, %g dB without", covered.LbullaK50, bare.Terms.LbullaK50)
	}
	want := bare.Terms.List()
	for i, got := range covered.List() {
		switch got.Symbol {
		case "Lbulla_k50", "Ld50", "Ldbeta", "Ldp", "Lbd50", "Lbd", "Lminb0p", "Lbda", "Lbam", "Lbc", "Lb", "Ep":
		default:
			if got.Value != want[i].Value {
				t.Errorf("%s = %g with cover, %g without", got.Symbol, got.Value, want[i].Value)
			}
		}
	}
}

// Where Bullington loses more over the smooth profile than the spherical Earth does, the
// difference counts as nothing: a spike half-way lowers the smooth surface far under the antennas.
func TestSphericalEarthBelowBullington(t *testing.T) {
	if got := DeltaBullingtonDB(30, 12, 5); got != 30 {
		t.Errorf("Ld = %g dB, want Bullington's 30", got)
	}
	if got := DeltaBullingtonDB(30, 12, 17); got != 35 {
		t.Errorf("Ld = %g dB, want 35", got)
	}
	p := level(101, 30)
	p.FreqHz = 900e6
	p.AslM[50] = 400
	got := mustLoss(t, p).Terms
	if got.LbullsK50 > 0 && got.LdsphK50 > got.LbullsK50 || got.Ld50 != got.LbullaK50 {
		t.Errorf("Lbulls %g, Ldsph %g, Lbulla %g, Ld50 %g", got.LbullsK50, got.LdsphK50, got.LbullaK50, got.Ld50)
	}
}

// An antenna in a valley, lower than the smooth surface through the hills, keeps its height above ground.
func TestAntennaUnderTheSmoothSurface(t *testing.T) {
	p := level(101, 20)
	for i := 10; i < 101; i++ {
		p.AslM[i] = 300
	}
	got := mustLoss(t, p).Terms
	if raw := fitSurface(p.DistKm, p.AslM); raw.tx <= p.txAslM() {
		t.Fatalf("the smooth surface lies at %g m, the antenna at %g m: no valley", raw.tx, p.txAslM())
	}
	if got.Hst != 0 || got.Hte != 10 {
		t.Errorf("hst = %g m, hte = %g m, want 0 and 10", got.Hst, got.Hte)
	}
}

// Profiles of two and three points, all sea, across the poles: a loss, without notes.
func TestUnusualPaths(t *testing.T) {
	for _, points := range []int{2, 3, 4} {
		for _, zone := range []terrain.Zone{terrain.Sea, terrain.Coastal, terrain.Inland} {
			for _, km := range []float64{0.25, 0.9, 15, 900} {
				for _, pct := range []float64{1, 50} {
					p := level(points, km)
					p.Zone = slices.Repeat([]terrain.Zone{zone}, points)
					p.TimePct, p.LatDeg = pct, 89.9
					l := mustLoss(t, p)
					if math.IsNaN(l.DB) || l.DB < l.Terms.Lb0p || l.Notes != nil || len(l.Terms.List()) != 41 {
						t.Errorf("%d points of zone %d over %g km at %g %%: %+v", points, zone, km, pct, l)
					}
				}
			}
		}
	}
}

// Two points and the same ground with a point more: the middle of a straight slope changes nothing on a
// path that clears it well.
func TestTwoPointsAgainstThree(t *testing.T) {
	two, three := level(2, 0.6), level(3, 0.6)
	two.FreqHz, three.FreqHz = 900e6, 900e6
	two.AslM[1], three.AslM[1], three.AslM[2] = 20, 10, 20
	a, b := mustLoss(t, two), mustLoss(t, three)
	if math.Abs(a.DB-b.DB) > 1e-9 || a.Terms.Dlt != 0.3 || b.Terms.Dlt != 0.3 {
		t.Errorf("two points: %.9f dB, three: %.9f dB", a.DB, b.DB)
	}
}

// The percentages at which formulas change hands: exactly beta0 and exactly 50 %.
func TestTimeBorders(t *testing.T) {
	for _, p := range []Path{tenKm(), rolling(500), level(100, 150)} {
		p.TimePct = 50
		l := mustLoss(t, p)
		if l.Terms.Fi != 0 || l.Terms.Ldp != l.Terms.Ld50 || l.Terms.Lb0p != l.Terms.Lbfs {
			t.Errorf("at 50 %%: Fi %g, Ldp %g, Ld50 %g, Lb0p %g, Lbfs %g", l.Terms.Fi, l.Terms.Ldp, l.Terms.Ld50, l.Terms.Lb0p, l.Terms.Lbfs)
		}
		for _, border := range []float64{50, l.Terms.Beta0} {
			p.TimePct = border
			at := mustLoss(t, p).DB
			for _, pct := range []float64{border * (1 - 1e-12), min(50, border*(1+1e-12))} {
				p.TimePct = pct
				if got := mustLoss(t, p).DB; math.Abs(got-at) > 1e-6 {
					t.Errorf("%.15g %%: %.9f dB, at %g %% %.9f dB", pct, got, border, at)
				}
			}
		}
	}
}

// Nearer than 250 m the method gives its free space, and says so.
func TestNearerThanTheMethod(t *testing.T) {
	p := level(20, 0.2499)
	p.AslM[7] = 60
	for _, loss := range []func(Path) (Loss, error){P1812.Loss, P1812WithoutDucting} {
		l, err := loss(p)
		if err != nil {
			t.Fatal(err)
		}
		if want := FreeSpaceDB(p.FreqHz, 249.9); math.Abs(l.DB-want) > 0.05 || l.DB != l.Terms.Lbfs || l.DB != l.Terms.Lb {
			t.Errorf("loss %g dB, want free space %g", l.DB, want)
		}
		want := []string{
			"the length of the path is 0.2499 km, P.1812 is stated for 0.25 to 3000 km",
			"nearer than 0.25 km the loss is that of free space, whatever stands in the way",
		}
		if !slices.Equal(l.Notes, want) {
			t.Errorf("notes %q, want %q", l.Notes, want)
		}
		if !l.TransHorizon || !math.IsNaN(l.Terms.Ld50) {
			t.Errorf("trans-horizon %v, Ld50 %g", l.TransHorizon, l.Terms.Ld50)
		}
	}
}

func TestP1812Notes(t *testing.T) {
	for _, tc := range []struct {
		name  string
		spoil func(*Path)
		want  string
	}{
		{"low", func(p *Path) { p.RxAglM = 0.5 }, "the receiver's height above ground is 0.5 m, P.1812 is stated for 1 to 3000 m"},
		{"high", func(p *Path) { p.TxAglM = 3500 }, "the transmitter's height above ground is 3500 m, P.1812 is stated for 1 to 3000 m"},
		{"rare", func(p *Path) { p.TimePct = 0.1 }, "the percentage of time is 0.1 %, P.1812 is stated for 1 to 50 %"},
		{"far", func(p *Path) { *p = level(100, 3200) }, "the length of the path is 3200 km, P.1812 is stated for 0.25 to 3000 km"},
	} {
		p := level(50, 20)
		tc.spoil(&p)
		l := mustLoss(t, p)
		if !slices.Equal(l.Notes, []string{tc.want}) {
			t.Errorf("%s: notes %q, want %q", tc.name, l.Notes, tc.want)
		}
		if math.IsNaN(l.DB) {
			t.Errorf("%s: %g dB", tc.name, l.DB)
		}
	}
}

func TestBadStatistics(t *testing.T) {
	for _, tc := range []struct {
		name  string
		spoil func(*Path)
		want  string
	}{
		{"N0 unset", func(p *Path) { p.N0 = 0 }, "N0 is 0 N-units, it must lie between 100 and 600 N-units"},
		{"time unset", func(p *Path) { p.TimePct = 0 }, "the percentage of time is 0 %, it must lie between 0.001 and 50 %"},
		{"time over 50", func(p *Path) { p.TimePct = 99 }, "the percentage of time is 99 %"},
		{"time NaN", func(p *Path) { p.TimePct = math.NaN() }, "the percentage of time is NaN %"},
		{"locations unset", func(p *Path) { p.LocationPct = 0 }, "the percentage of locations is 0 %, it must lie between 1 and 99 %"},
		{"all locations", func(p *Path) { p.LocationPct = 100 }, "the percentage of locations is 100 %"},
		{"negative spread", func(p *Path) { p.LocationSpreadDB = -1 }, "the spread among locations is -1 dB"},
		{"latitude", func(p *Path) { p.LatDeg = 90.5 }, "the latitude is 90.5 degrees, it must lie between -90 and 90 degrees"},
		{"coast", func(p *Path) { p.TxCoastKm = -1 }, "the transmitter's distance to the coast is -1 km"},
		{"coast NaN", func(p *Path) { p.RxCoastKm = math.NaN() }, "the receiver's distance to the coast is NaN km"},
	} {
		p := level(50, 20)
		tc.spoil(&p)
		for _, loss := range []func(Path) (Loss, error){P1812.Loss, P1812WithoutDucting} {
			if _, err := loss(p); err == nil || !strings.Contains(err.Error(), tc.want) {
				t.Errorf("%s: got error %v, want one with %q", tc.name, err, tc.want)
			}
		}
		if _, err := P526.Loss(p); err != nil {
			t.Errorf("%s: P.526 does not read it, but: %v", tc.name, err)
		}
	}
}

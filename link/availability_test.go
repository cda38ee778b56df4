package link

import (
	"math"
	"strings"
	"testing"

	"fellreach/link/noise"
	"fellreach/link/propagation"
	"fellreach/terrain"
)

func fadeOf(t *testing.T, q float64, p terrain.Profile, ch Channel, heightM float64) (float64, string) {
	t.Helper()
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	a.AglM, b.AglM = heightM, heightM
	c := conditions(propagation.P1812)
	c.Dn1, c.Dn1Source = -200, "assumed"
	r, err := Compute(&Link{From: a, To: b, Channel: ch, OneWay: true, Aim: Aim{AvailabilityPct: q}}, p, c)
	if err != nil {
		t.Fatal(err)
	}
	for _, l := range r.Directions[0].Lines {
		if l.Kind == AllowanceLine {
			if l.DB != -r.Directions[0].FadeDB {
				t.Errorf("the line says %g dB, the direction %g dB", l.DB, r.Directions[0].FadeDB)
			}
			return -l.DB, l.Source
		}
	}
	return 0, ""
}

// The fading allowance by its definition: the loss without ducting for 50 % of the time less that
// for 100 - q %, and beyond 99 % times the ratio of normal quantiles, from tables of the normal
// distribution 3.0902/2.3263 = 1.3284 for 99.9 %.
func TestFadeIsTheMirroredEnhancement(t *testing.T) {
	p := hill(level(25), 150)
	lossAt := func(pct float64) float64 {
		loss, err := propagation.P1812WithoutDucting(propagation.Path{
			Profile: p, FreqHz: 150e6, TxAglM: 30, RxAglM: 30, VerticalShare: 1, DeltaN: 45, N0: 325, TimePct: pct, LocationPct: 50,
			LatDeg: 47, TxCoastKm: 500, RxCoastKm: 500,
		})
		if err != nil {
			t.Fatal(err)
		}
		return loss.DB
	}
	ninetyNine := lossAt(50) - lossAt(1)
	for _, tc := range []struct{ q, want float64 }{{90, lossAt(50) - lossAt(10)}, {99, ninetyNine}, {99.9, 1.3284 * ninetyNine}, {50, 0}} {
		got, _ := fadeOf(t, tc.q, p, poll, 30)
		if math.Abs(got-tc.want) > 1e-3 || (tc.q > 50 && got <= 0) {
			t.Errorf("fade for %g %%: %.4f dB, want %.4f", tc.q, got, tc.want)
		}
	}
}

// On a line of sight of 40 km at 900 MHz (above 15/40 GHz) P.530 speaks; on the same path at
// 150 MHz it does not. The larger of the two counts, never the sum.
func TestMultipathCountsWhenLarger(t *testing.T) {
	uhf := Channel{Name: "uhf", OutHz: 900e6, BackHz: 900e6, BandwidthHz: 12.5e3}
	p := level(40)
	deep, source := fadeOf(t, 99.9, p, uhf, 200)
	m := propagation.Multipath{FreqHz: 900e6, LengthKm: 40, TxAslM: 300, RxAslM: 300, LatDeg: 47, Dn1: -200}
	if want := m.FadeDB(99.9); !strings.Contains(source, "P.530-17") || math.Abs(deep-want) > 1e-9 {
		t.Errorf("fade %.3f dB by %q, want P.530's %.3f dB", deep, source, want)
	}
	if _, source := fadeOf(t, 99.9, p, poll, 200); strings.Contains(source, "P.530-17") {
		t.Errorf("P.530 spoke at 150 MHz over 40 km: %s", source)
	}
}

func TestFadeRefused(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	for _, tc := range []struct {
		model propagation.Model
		q     float64
		want  string
	}{{propagation.P1812, 99.95, "the most is 99.9 %"}, {propagation.P526, 99, "does not compute the fading"}, {propagation.FreeSpace, 90, "does not compute the fading"}} {
		_, err := Compute(&Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: tc.q}}, level(5), conditions(tc.model))
		if err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%s at %g %%: %v, want %q", tc.model.Name, tc.q, err, tc.want)
		}
	}
}

// External noise by hand: P.372 rural at 150 MHz is 6.92 dB (4.923), galactic 1.95 dB (1.567), together
// fa = 6.490; through a line of l = 2 (3.0103 dB) into a receiver of 7 dB (5.0119) the noise rises by
// 10 log[1 + 5.490/(2 x 5.0119)] = 1.897 dB, and 5.490/(5.490 + 10.0237) = 0.3539 of it is outside's.
func TestNoiseFromOutside(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	b.Inserts = []Insert{{Name: "line", LossDB: 3.0103}}
	b.Noise = Noise{Environment: noise.Rural, Source: "plan"}
	r := mustCompute(t, &Link{From: a, To: b, Channel: poll, OneWay: true, Aim: Aim{AvailabilityPct: 50}}, level(10), propagation.P1812)
	if got := -line(t, r.Directions[0], "B: noise from outside"); math.Abs(got-1.897) > 2e-3 {
		t.Errorf("noise from outside takes %.4f dB, want 1.897", got)
	}
	// The chance: s^2 = 9^2 + (0.3539 x 6.8/1.2816)^2 + 1.
	s := math.Sqrt(81 + math.Pow(0.3539*6.8/1.2816, 2) + 1)
	c := conditions(propagation.P1812)
	if got, want := c.chancePct(s, heard{0.3539, 6.8}), 84.1345; math.Abs(got-want) > 1e-3 {
		t.Errorf("chance of one standard deviation: %.4f %%, want %.4f", got, want)
	}
}

// A floor of -110 dBm measured in 12.5 kHz is 23.01 dB over k T0 B (-133.006 dBm), so n/(k T0 B fr) =
// 199.8/5.0119 and the noise rises by 10 log(1 + 39.87) = 16.114 dB.
func TestMeasuredNoise(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	b.Noise = Noise{MeasuredDBm: -110, MeasuredInHz: 12.5e3}
	r := mustCompute(t, &Link{From: a, To: b, Channel: poll, OneWay: true, Aim: Aim{AvailabilityPct: 50}}, level(10), propagation.P1812)
	if got := -line(t, r.Directions[0], "B: noise measured on site"); math.Abs(got-16.114) > 3e-3 {
		t.Errorf("measured noise takes %.4f dB, want 16.114", got)
	}
}

// Student's t with 5 degrees of freedom lies below 2.015 for 95 % (tables); six readings have five.
func TestChanceOfFewReadings(t *testing.T) {
	c := Conditions{SpreadDB: 9, Readings: 6}
	if got := c.chancePct(2.015*math.Hypot(9, 1), heard{}); math.Abs(got-95) > 0.01 {
		t.Errorf("chance %.3f %%, want 95", got)
	}
}

// Woodland takes the cover away over its depth and puts P.833's loss in a line; houses lift the
// path to the roofs and lead down in a line. Cover and line never both count.
func TestSurroundings(t *testing.T) {
	p := level(10)
	for i := range p.CoverM {
		p.CoverM[i] = 15
	}
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	b.AglM = 4
	l := &Link{From: a, To: b, Channel: poll, OneWay: true, Aim: Aim{AvailabilityPct: 50}}
	b.Surroundings = Surroundings{WoodlandM: 120, Source: "plan"}
	wood := mustCompute(t, l, p, propagation.P1812)
	want, _ := propagation.WoodlandLossDB(150e6, 120)
	if got := -line(t, wood.Directions[0], "B: woodland, 120 m"); got != want || got <= 0 {
		t.Errorf("woodland takes %g dB, want %g", got, want)
	}
	n := len(wood.Profile.CoverM)
	if wood.Profile.CoverM[n-3] != 0 || wood.Profile.CoverM[n-4] != 15 {
		t.Errorf("cover near the wood: %v, want none within 120 m", wood.Profile.CoverM[n-5:])
	}
	b.Surroundings = Surroundings{BuiltM: 9, StreetM: 27, Source: "plan"}
	built := mustCompute(t, l, p, propagation.P1812)
	want, _ = propagation.BuiltLossDB(150e6, 4, 9, 27)
	if got := -line(t, built.Directions[0], "B: among buildings of 9 m"); got != want || got <= 0 {
		t.Errorf("houses take %g dB, want %g", got, want)
	}
	b.Surroundings, b.AglM, b.ClearingM = Surroundings{}, 9, 27
	roof := mustCompute(t, l, p, propagation.P1812)
	if roof.Directions[0].TransmissionLossDB != built.Directions[0].TransmissionLossDB {
		t.Errorf("the path to an antenna among houses loses %g dB, to one on the roofs %g dB", built.Directions[0].TransmissionLossDB, roof.Directions[0].TransmissionLossDB)
	}
}

func TestCanopyWarnings(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	a.CanopyM, b.OnCanopyM = 40, 12
	r := mustCompute(t, &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}, level(10), propagation.P1812)
	for _, want := range []string{"A: stands in cover of 40 m", "B: stands in cover of 12 m, and the raster's heights hold it"} {
		found := false
		for _, w := range r.Warnings {
			found = found || strings.HasPrefix(w.String(), want)
		}
		if !found {
			t.Errorf("%q is not among %v", want, r.Warnings)
		}
	}
}

// A section is drawn from where its path is seen: among roofs of 12 m an antenna at 5 m sees it from
// 12 m, and the clearance found is the one that the picture shows.
func TestSectionOverRoofs(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	a.AglM, a.Surroundings = 5, Surroundings{BuiltM: 12, StreetM: 20}
	s, err := Trace(&Link{From: a, To: b, Channel: poll}, hill(level(10), 8), conditions(propagation.P1812))
	if err != nil {
		t.Fatal(err)
	}
	if s.FromAglM != 12 || s.ToAglM != b.AglM || s.RayM[0] != s.Profile.AslM[0]+12 {
		t.Errorf("seen from %g and %g m above ground, the ray from %g m over it", s.FromAglM, s.ToAglM, s.RayM[0]-s.Profile.AslM[0])
	}
	worst := math.Inf(1)
	for i := 1; i < len(s.RayM)-1; i++ {
		worst = min(worst, (s.RayM[i]-s.Profile.AslM[i]-s.Profile.CoverM[i]-s.BulgeM[i])/s.Fresnel1M[i])
	}
	if math.Abs(worst-s.Clearance.WorstRatio) > 1e-9 {
		t.Errorf("worst clearance %.6f of F1, the picture shows %.6f", s.Clearance.WorstRatio, worst)
	}
}

// The free-space line says whose free space it is. P.525 for 10 km at 150 MHz: 20 log(4 pi d f/c) is
// 95.970 dB; P.1812's 92.4 + 20 log f + 20 log d is 95.922 dB.
func TestFreeSpaceNamesItsSource(t *testing.T) {
	for _, tc := range []struct {
		method propagation.Model
		dB     float64
		source string
	}{{propagation.P526, -95.970, "P.525 at 150 MHz"}, {propagation.FreeSpace, -95.970, "P.525 at 150 MHz"}, {propagation.P1812, -95.922, "Lbfs of P.1812-8 at 150 MHz"}} {
		a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
		ch := Channel{Name: "c", OutHz: 150e6, BackHz: 150e6, BandwidthHz: 12.5e3}
		r := mustCompute(t, &Link{From: a, To: b, Channel: ch, Aim: Aim{AvailabilityPct: 50}}, level(10), tc.method)
		for _, l := range r.Directions[0].Lines {
			if l.Name == "free space, 10.00 km" && (math.Abs(l.DB-tc.dB) > 1e-3 || !strings.HasPrefix(l.Source, tc.source)) {
				t.Errorf("%s: %.4f dB from %q, want %.4f from %q", tc.method.Name, l.DB, l.Source, tc.dB, tc.source)
			}
		}
		line(t, r.Directions[0], "free space, 10.00 km")
	}
}

// An antenna beside a mast of no stated width is told so: its pattern is that without the mast.
func TestMastOfNoWidthWarns(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	a.StandoffM = 0.5
	r := mustCompute(t, &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}, level(10), propagation.P1812)
	told := 0
	for _, w := range r.Warnings {
		if w.At == "A" && strings.Contains(w.Text, "the mast's effect is not computed") {
			told++
		}
	}
	if told != 1 {
		t.Errorf("told %d times in %v", told, r.Warnings)
	}
}

// The sensitivity is what computing the changed link again gives.
func TestSensitivity(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 0, 1)), plainStation("B", 1, isotropic(t, 0, 1))
	p := hill(level(12), 80)
	l := &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 99}}
	r := mustCompute(t, l, p, propagation.P1812)
	higher := *a
	higher.AglM++
	up := mustCompute(t, &Link{From: &higher, To: b, Channel: poll, Aim: l.Aim}, p, propagation.P1812)
	if got, want := r.Sensitivity.FromMastDB, up.MarginDB-r.MarginDB; got != want || got <= 0 {
		t.Errorf("one more metre gives %g dB, want %g", got, want)
	}
	if r.Sensitivity.RasterDB >= 0 || r.Sensitivity.ChancePct <= 0 {
		t.Errorf("sensitivity %+v: higher ground must lose and a decibel must gain", r.Sensitivity)
	}
}

// An unwanted signal is stronger for 1 % of the time than in the median, and never above its
// bound.
func TestUnwanted(t *testing.T) {
	a, b := plainStation("A", 0, isotropic(t, 3, 1)), plainStation("B", 1, isotropic(t, 3, 1))
	for _, ridge := range []float64{0, 100, 300} {
		p := hill(level(40), ridge)
		level, err := UnwantedDBm(a, b, poll, poll.OutHz, p, conditions(propagation.P1812))
		if err != nil {
			t.Fatal(err)
		}
		most, err := MostUnwantedDBm(a, b, poll, poll.OutHz, 40)
		if err != nil {
			t.Fatal(err)
		}
		wanted := mustCompute(t, &Link{From: a, To: b, Channel: poll, Aim: Aim{AvailabilityPct: 50}}, p, propagation.P1812).Directions[0].ReceivedDBm
		if level < wanted || level > most {
			t.Errorf("ridge of %g m: unwanted %.2f dBm, median %.2f dBm, bound %.2f dBm", ridge, level, wanted, most)
		}
	}
}

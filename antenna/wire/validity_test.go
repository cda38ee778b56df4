package wire

import (
	"math"
	"strings"
	"testing"

	"fellreach/antenna"
	"pgregory.net/rapid"
)

// rodFrom returns a lossless wire of 2 mm between two places.
func rodFrom(from, to vec) Wire {
	return Wire{From: from, To: to, DiameterM: 0.002, Material: antenna.Ideal}
}

func middleFeed() []Feed { return []Feed{{1, 0.5}} }

// One clear error for each thing that is wrong, with the number of the wire or feed.
func TestBadStructures(t *testing.T) {
	nan, o := math.NaN(), vec{}
	good := rodFrom(vec{0, 0, -0.25}, vec{0, 0, 0.25})
	beside := func(w Wire) []Wire { return []Wire{good, w} }
	with := func(change func(w *Wire)) []Wire { w := good; change(&w); return []Wire{w} }
	many := make([]Wire, 120)
	for i := range many {
		many[i] = rodFrom(vec{0.1 * float64(i), 0, 0}, vec{0.1 * float64(i), 0, 0.5})
	}
	for _, tc := range []struct {
		name  string
		wires []Wire
		feeds []Feed
		mast  Mast
		says  string
	}{
		{"nothing", nil, middleFeed(), Mast{}, "0 wires are given"},
		{"no feed", []Wire{good}, nil, Mast{}, "no feed is given"},
		{"no length", beside(rodFrom(vec{1, 1, 1}, vec{1, 1, 1})), middleFeed(), Mast{}, "wire 2 has no length"},
		{"not a number", with(func(w *Wire) { w.To[1] = nan }), middleFeed(), Mast{}, "wire 1: its ends"},
		{"infinite", with(func(w *Wire) { w.From[2] = math.Inf(-1) }), middleFeed(), Mast{}, "must be finite"},
		{"diameter not a number", with(func(w *Wire) { w.DiameterM = nan }), middleFeed(), Mast{}, "wire 1: diameter NaN m"},
		{"no diameter", with(func(w *Wire) { w.DiameterM = 0 }), middleFeed(), Mast{}, "wire 1: diameter 0 m"},
		{"negative diameter", with(func(w *Wire) { w.DiameterM = -0.002 }), middleFeed(), Mast{}, "must be above 0"},
		{"thicker than long", with(func(w *Wire) { w.DiameterM = 0.6 }), middleFeed(), Mast{}, "wire 1 is thicker than it is long"},
		{"thick", with(func(w *Wire) { w.DiameterM = 0.12 }), middleFeed(), Mast{}, "wire 1: segments of 0.125 wl are too long"},
		{"no material", with(func(w *Wire) { w.Material = antenna.Material{} }), middleFeed(), Mast{}, "conductivity 0 S/m"},
		{"negative segments", with(func(w *Wire) { w.Segments = -1 }), middleFeed(), Mast{}, "-1 segments"},
		{"one segment", with(func(w *Wire) { w.Segments = 1 }), middleFeed(), Mast{}, "feed 1 on wire 1: the wire has one segment"},
		{"long segments", with(func(w *Wire) { w.Segments = 4 }), middleFeed(), Mast{}, "wire 1: segments of 0.125 wl are too long"},
		{"short segments", with(func(w *Wire) { w.Segments = 800 }), middleFeed(), Mast{}, "wire 1: segments of 0.62 radii are too short"},
		{"thousands of segments", with(func(w *Wire) { w.Segments = 1e6 }), middleFeed(), Mast{}, "1000000 segments would take"},
		{"many wires", many, middleFeed(), Mast{}, "2400 segments would take 276 MB: at most 2000"},
		{"kilometres", []Wire{rodFrom(o, vec{0, 0, 5e4})}, middleFeed(), Mast{}, "at most 2000 are allowed"},
		{"the same twice", beside(good), middleFeed(), Mast{}, "wires 1 and 2 overlap"},
		{"the same turned", beside(rodFrom(good.To, good.From)), middleFeed(), Mast{}, "wires 1 and 2 overlap"},
		{"partly the same", beside(rodFrom(vec{0, 0, 0}, vec{0, 0, 0.5})), middleFeed(), Mast{}, "wires 1 and 2 cross, touch or overlap"},
		{"crossing", beside(rodFrom(vec{-0.2, 0, 0.1}, vec{0.2, 0, 0.1})), middleFeed(), Mast{}, "wires 1 and 2 cross"},
		{"touching", beside(rodFrom(vec{0, 0, 0.1}, vec{0.3, 0, 0.1})), middleFeed(), Mast{}, "wires 1 and 2 cross, touch"},
		{"too close", beside(rodFrom(vec{0.0025, 0, -0.2}, vec{0.0025, 0, 0.2})), middleFeed(), Mast{}, "wires 1 and 2 are 0.0025 m apart: at least 3 radii"},
		{"folded on itself", []Wire{good, rodFrom(vec{0, 0, 0.25}, vec{0.01, 0, -0.25})}, middleFeed(), Mast{}, "at an angle of 1.1 degrees"},
		{"feed at an open end", []Wire{good}, []Feed{{1, 1}}, Mast{}, "feed 1 is at the open end of wire 1"},
		{"feed beyond", []Wire{good}, []Feed{{1, 1.2}}, Mast{}, "place 1.2 is out of range: 0 to 1"},
		{"feed not a number", []Wire{good}, []Feed{{1, nan}}, Mast{}, "place NaN"},
		{"feed on no wire", []Wire{good}, []Feed{{2, 0.5}}, Mast{}, "feed 1 is on wire 2: the wires are numbered 1 to 1"},
		{"feed on wire 0", []Wire{good}, []Feed{{0, 0.5}}, Mast{}, "feed 1 is on wire 0"},
		{"feed twice", []Wire{good}, []Feed{{1, 0.5}, {1, 0.5}}, Mast{}, "feeds 1 and 2 are in the same place"},
		{"one gap twice", []Wire{good, rodFrom(vec{0, 0, 0.25}, vec{0.2, 0, 0.25})}, []Feed{{1, 1}, {2, 0}}, Mast{}, "feeds 1 and 2 are one gap"},
		{"feed next to the end", []Wire{good}, []Feed{{1, 0.001}}, Mast{}, "the feed may be too close to an end"},
		{"mast not a number", []Wire{good}, middleFeed(), Mast{To: [3]float64{0, 0, nan}, DiameterM: 0.1}, "mast: its ends"},
		{"mast diameter", []Wire{good}, middleFeed(), Mast{From: [3]float64{5, 0, -2}, To: [3]float64{5, 0, 2}, DiameterM: 3}, "mast diameter 3 m is out of range"},
		{"mast too short", []Wire{good}, middleFeed(), Mast{From: [3]float64{5, 0, 0}, To: [3]float64{5, 0, 0.05}, DiameterM: 0.1}, "mast: 0.05 m is too short"},
		{"into the mast", []Wire{good}, middleFeed(), Mast{From: [3]float64{0.1, 0, -2}, To: [3]float64{0.1, 0, 2}, DiameterM: 0.25}, "wire 1 runs into the mast"},
		{"at the mast", []Wire{good}, middleFeed(), Mast{From: [3]float64{0.1, 0, -2}, To: [3]float64{0.1, 0, 2}, DiameterM: 0.196}, "wire 1 is 0.002 m from the mast's surface"},
	} {
		_, err := Structure{tc.wires, tc.feeds, tc.mast}.Solve(testHz, 0)
		if err == nil || !strings.Contains(err.Error(), tc.says) {
			t.Errorf("%s: error %v, want one that says %q", tc.name, err, tc.says)
		} else if strings.Contains(err.Error(), "\n") {
			t.Errorf("%s: several errors for one thing: %v", tc.name, err)
		}
	}
	for _, hz := range []float64{0, -1, nan, 1e12} {
		if _, err := (Structure{Wires: []Wire{good}, Feeds: middleFeed()}).Solve(hz, 0); err == nil || !strings.Contains(err.Error(), "frequency") {
			t.Errorf("frequency %g: error %v", hz, err)
		}
	}
}

// What is doubtful is solved with a warning that names the wire and the rule.
func TestDoubtfulStructures(t *testing.T) {
	at := func(from, to vec, radiusM float64) Wire {
		return Wire{From: from, To: to, DiameterM: 2 * radiusM, Material: antenna.Ideal}
	}
	for _, tc := range []struct {
		name  string
		wires []Wire
		feed  Feed
		says  string
	}{
		{"thick at the feed", []Wire{upright(0.47, 0.012)}, Feed{1, 0.5}, "feed 1: radius 0.012 wl of wire 1 is over 0.01 wl"},
		{"not thin", []Wire{upright(0.47, 0.001), upright(0.5, 0.024).moved(vec{0.3, 0, 0})}, Feed{1, 0.5}, "wire 2: radius 0.024 wl is not thin"},
		{"stubby", []Wire{upright(0.47, 0.001), upright(0.03, 0.002).moved(vec{0.3, 0, 0})}, Feed{1, 0.5}, "wire 2: length is only 15.0 radii"},
		{"short segments", []Wire{{From: [3]float64{}, To: [3]float64{0, 0, 0.5}, DiameterM: 0.02, Material: antenna.Ideal, Segments: 30}}, Feed{1, 0.5}, "wire 1: segments of 1.67 radii are short"},
		{"close", []Wire{upright(0.47, 0.001), upright(0.47, 0.001).moved(vec{0.005, 0, 0})}, Feed{1, 0.5}, "wires 1 and 2 are only 5.0 radii apart"},
		{"sharp", []Wire{at(vec{}, vec{0, 0, 0.2}, 0.001), at(vec{}, vec{0.08, 0, 0.2}, 0.001), at(vec{}, vec{0, 0, -0.2}, 0.001)}, Feed{3, 0}, "wires 1 and 2 meet at 22 degrees"},
		{"steps", []Wire{upright(0.3, 0.005), at(vec{0, 0, 0.15}, vec{0, 0, 0.25}, 0.001)}, Feed{1, 0.5}, "wires 1 and 2 meet with radii in the ratio 5.0"},
		{"unequal segments", []Wire{upright(0.3, 0.0003), at(vec{0, 0, 0.15}, vec{0.007, 0, 0.15}, 0.0003)}, Feed{1, 0.5}, "wires 1 and 2 meet with segments in the ratio 3.6"},
		{"full wave", []Wire{upright(0.95, 0.001)}, Feed{1, 0.5}, "in the middle of a wire of 0.95 wl"},
	} {
		n, err := Structure{Wires: tc.wires, Feeds: []Feed{tc.feed}}.Solve(testHz, 0)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
			continue
		}
		if len(n.Warnings) != 1 || !strings.Contains(n.Warnings[0], tc.says) {
			t.Errorf("%s: warnings %q, want one that says %q", tc.name, n.Warnings, tc.says)
		}
	}
	if n := network(t, Structure{Wires: []Wire{upright(0.47, 0.002)}, Feeds: middleFeed()}); len(n.Warnings) > 0 {
		t.Errorf("a plain rod has warnings: %q", n.Warnings)
	}
	close := besideMast(0.065, 0.05, 0, 4)
	n := network(t, close)
	if len(n.Warnings) != 1 || !strings.Contains(n.Warnings[0], "from the mast's surface") {
		t.Errorf("close to a mast: warnings %q", n.Warnings)
	}
}

// Whatever is given, there is an error or a finite answer.
func TestNoWireGivesNaN(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		coordinate := rapid.OneOf(rapid.Float64Range(-1, 1), rapid.SampledFrom([]float64{0, 0.25, -0.25, 1e-9, 1e3, math.NaN(), math.Inf(1)}))
		var s Structure
		for range rapid.IntRange(1, 4).Draw(t, "wires") {
			var w Wire
			for i := range 3 {
				w.From[i], w.To[i] = coordinate.Draw(t, "from"), coordinate.Draw(t, "to")
			}
			w.DiameterM = rapid.OneOf(rapid.Float64Range(1e-6, 0.05), coordinate).Draw(t, "diameter")
			w.Material = antenna.Ideal
			w.Segments = rapid.IntRange(-1, 40).Draw(t, "segments")
			s.Wires = append(s.Wires, w)
		}
		s.Feeds = []Feed{{rapid.IntRange(0, 3).Draw(t, "wire"), rapid.OneOf(rapid.Float64Range(0, 1), coordinate).Draw(t, "at")}}
		n, err := s.Solve(testHz, 0)
		if err != nil {
			return
		}
		if z := n.TogetherOhm(); math.IsNaN(real(z)+imag(z)) || math.IsInf(real(z)+imag(z), 0) {
			t.Errorf("impedance %v of %+v", z, s)
		}
	})
}

// The rule of segmentation, as it is stated.
func TestSegmentation(t *testing.T) {
	for _, tc := range []struct {
		lengthM, radiusM float64
		segments         int
		cuts             []float64
		want             []int
	}{
		{0.5, 1e-3, 0, nil, []int{20}},
		{0.5, 1e-3, 0, []float64{0.5}, []int{10, 10}},
		{0.1, 1e-3, 0, []float64{0.5}, []int{6, 6}},
		{0.1, 1e-3, 0, nil, []int{4}},
		{0.1, 8e-3, 0, []float64{0.5}, []int{3, 3}},
		{0.47, 1e-3, 0, []float64{0.25}, []int{5, 15}},
		{0.5, 1e-4, 0, []float64{0.02}, []int{1, 33}},
		{0.01, 1e-2, 0, nil, []int{1}},
		{0.5, 1e-3, 30, []float64{0.5}, []int{15, 15}},
		{0.5, 1e-3, 30, []float64{0.1, 0.5}, []int{3, 12, 15}},
		{0.5, 1e-3, 2, []float64{0.1}, []int{1, 1}},
		{0.5, 1e-3, 20, []float64{0.625}, []int{12, 8}}, // 12.5 and 7.5: no rounding decides
	} {
		w := upright(tc.lengthM, tc.radiusM)
		w.Segments = tc.segments
		got := w.segmentsOf(tc.cuts, testWavelengthM)
		for i := range got {
			if got[i] != tc.want[i] {
				t.Errorf("%g wl, radius %g, %d segments asked, cut at %v: %d, want %d", tc.lengthM, tc.radiusM, tc.segments, tc.cuts, got, tc.want)
				break
			}
		}
	}
}

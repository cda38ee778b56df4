package coverage

import (
	"math"
	"strings"
	"testing"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

const gpx = `<?xml version="1.0"?><gpx version="1.1" xmlns="http://www.topografix.com/GPX/1/1"><trk><name>x</name><trkseg>
<trkpt lat="47.5" lon="-20"><ele>3</ele></trkpt><trkpt lat="47.51" lon="-20"/><trkpt lat="47.52" lon="-20.01"/></trkseg></trk>
<rte><rtept lat="47" lon="-20"/><rtept lat="47.1" lon="-20"/></rte></gpx>`

func TestParseTrack(t *testing.T) {
	for _, tc := range []struct {
		name, text string
		lines      int
		says       string
	}{
		{"line", `{"type":"LineString","coordinates":[[-20,47],[-20,48]]}`, 1, ""},
		{"feature", `{"type":"Feature","properties":null,"geometry":{"type":"MultiLineString","coordinates":[[[-20,47],[-20,48]],[[1,2],[3,4]]]}}`, 2, ""},
		{"collection", `{"type":"FeatureCollection","features":[{"type":"Feature","properties":{},"geometry":{"type":"Point","coordinates":[1,2]}},{"type":"Feature","properties":{},"geometry":{"type":"LineString","coordinates":[[-20,47],[-20,48]]}}]}`, 1, ""},
		{"gpx", gpx, 2, ""},
		{"point", `{"type":"Point","coordinates":[1,2]}`, 0, "holds no line"},
		{"off the Earth", `{"type":"LineString","coordinates":[[-20,47],[-20,480]]}`, 0, "none on Earth"},
		{"no track", "lat,lon\n47,20\n", 0, "neither GeoJSON nor GPX"},
		{"empty", "", 0, "neither"},
		{"broken", `{"type":"LineString","coordinates":[[-20`, 0, "no GeoJSON"},
	} {
		track, err := ParseTrack([]byte(tc.text))
		if len(track) != tc.lines || (err == nil) != (tc.says == "") || err != nil && !strings.Contains(err.Error(), tc.says) {
			t.Errorf("%s: %d lines, error %v; want %d, %q", tc.name, len(track), err, tc.lines, tc.says)
		}
	}
}

func FuzzParseTrack(f *testing.F) {
	f.Add([]byte(gpx))
	f.Add([]byte(`{"type":"FeatureCollection","features":[{"type":"Feature","properties":{},"geometry":{"type":"LineString","coordinates":[[-20,47],[-20,48]]}}]}`))
	f.Add([]byte(`{"type":"GeometryCollection","geometries":[{"type":"LineString","coordinates":[[1,2],[3,4]]}]}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		track, err := ParseTrack(data)
		if err != nil {
			return
		}
		for _, line := range track {
			if len(line) < 2 {
				t.Errorf("a line of %d places", len(line))
			}
		}
	})
}

// Source: PROJ's geodesics between the stops.
func TestStops(t *testing.T) {
	track := Track{{{-20, 47.5}, {-20, 47.51}, {-20.02, 47.51}}, {{-19, 47}, {-19, 47.001}}}
	stops, err := track.Stops(100)
	if err != nil {
		t.Fatal(err)
	}
	firsts := 0
	for i, s := range stops {
		if s.First {
			firsts++
			continue
		}
		gapM, _, _ := raster.Inverse(stops[i-1].At, s.At)
		if along := s.DistM - stops[i-1].DistM; along > 100+1e-6 || gapM > along+1e-3 {
			t.Errorf("stop %d: %.3f m along the track, %.3f m apart", i, along, gapM)
		}
	}
	a, _, _ := raster.Inverse(orb.Point{-20, 47.5}, orb.Point{-20, 47.51})
	b, _, _ := raster.Inverse(orb.Point{-20, 47.51}, orb.Point{-20.02, 47.51})
	c, _, _ := raster.Inverse(orb.Point{-19, 47}, orb.Point{-19, 47.001})
	if got := stops[len(stops)-1].DistM; firsts != 2 || math.Abs(got-(a+b+c)) > 1e-6 {
		t.Errorf("%d lines, %.3f m; want 2 of %.3f m", firsts, got, a+b+c)
	}
	if _, err := track.Stops(0.01); err == nil {
		t.Error("300,000 stops are no error")
	}
}

func TestRide(t *testing.T) {
	nan := math.NaN()
	for _, tc := range []struct {
		name      string
		margins   []float64
		firsts    []int
		share     float64
		gap, from float64
	}{
		{"all", []float64{9, 9, 9}, nil, 1, 0, 0},
		{"none", []float64{1, 1, nan}, nil, 0, 200, 0},
		{"middle", []float64{9, 1, 1, 9, 9, 1, 9}, nil, 4.0 / 7, 200, 100},
		{"end", []float64{9, 1, 9, 1, 1, 1}, nil, 2.0 / 6, 200, 300},
		{"two lines", []float64{9, 1, 1, 1, 9, 9}, []int{3}, 0.5, 100, 100},
	} {
		r := Ride{AimDB: 6, BestDB: tc.margins}
		for i := range tc.margins {
			s := Stop{DistM: 100 * float64(i), First: i == 0}
			for _, first := range tc.firsts {
				s.First = s.First || i == first
			}
			r.Stops = append(r.Stops, s)
		}
		gap, from := r.LongestGapM()
		if math.Abs(r.ClosesShare()-tc.share) > 1e-12 || gap != tc.gap || gap > 0 && from != tc.from {
			t.Errorf("%s: share %g, gap %g m from %g m; want %g, %g, %g", tc.name, r.ClosesShare(), gap, from, tc.share, tc.gap, tc.from)
		}
	}
}

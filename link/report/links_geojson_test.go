package report

import (
	"math"
	"testing"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"
)

// RFC 7946 section 3.1.9: a line over the antimeridian is cut there into two, one ending at 180
// degrees, the other beginning at -180 at the same latitude.
func TestLineOverAntimeridian(t *testing.T) {
	for _, tc := range []struct {
		name     string
		from, to orb.Point
		latitude float64 // of the crossing
	}{
		{"eastwards on the equator", orb.Point{179.9, 0}, orb.Point{-179.9, 0}, 0},
		{"westwards on the equator", orb.Point{-179.8, 0}, orb.Point{179.9, 0}, 0},
		{"northeast", orb.Point{179.9, 10}, orb.Point{-179.9, 10.4}, 10.2},
		{"unequal parts", orb.Point{179.9, -10}, orb.Point{-179.7, -10.4}, -10.1},
	} {
		t.Run(tc.name, func(t *testing.T) {
			lines, ok := geodesicLine(madeProfile(tc.from, tc.to, make([]float64, 201)...).Points).(orb.MultiLineString)
			if !ok || len(lines) != 2 {
				t.Fatalf("got %v", lines)
			}
			side := math.Copysign(180, tc.from.Lon())
			before, after := lines[0][len(lines[0])-1], lines[1][0]
			if lines[0][0] != tc.from || lines[1][len(lines[1])-1] != tc.to {
				t.Errorf("runs from %v to %v", lines[0][0], lines[1][len(lines[1])-1])
			}
			// The geodesic bends away from the straight line of longitude and latitude by some
			// d^2 tan(lat) / 8 R, here at most 40 m: 0.0004 degrees.
			if before.Lon() != side || after.Lon() != -side || before.Lat() != after.Lat() || math.Abs(before.Lat()-tc.latitude) > 4e-4 {
				t.Errorf("cut at %v and %v, want latitude %g", before, after, tc.latitude)
			}
		})
	}
}

// Any path up to a quarter of the Earth: lines of two points at least that stay on their side, run
// from end to end, and never leap.
func TestGeodesicLines(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		from := orb.Point{rapid.Float64Range(-180, 180).Draw(t, "lon"), rapid.Float64Range(-85, 85).Draw(t, "lat")}
		azDeg := rapid.Float64Range(0, 360).Draw(t, "azimuth")
		points := make([]orb.Point, rapid.IntRange(2, 300).Draw(t, "points"))
		raster.Line(from, azDeg, rapid.Float64Range(10, 100e3).Draw(t, "length")/float64(len(points)), points)
		lines, ok := geodesicLine(points).(orb.MultiLineString)
		if !ok {
			lines = orb.MultiLineString{geodesicLine(points).(orb.LineString)}
		}
		if first, last := lines[0][0], lines[len(lines)-1]; !onePlace(first, rounded(points[0])) || !onePlace(last[len(last)-1], rounded(points[len(points)-1])) {
			t.Fatalf("runs from %v to %v, the points from %v to %v", first, last[len(last)-1], points[0], points[len(points)-1])
		}
		count := 0
		for _, line := range lines {
			count += len(line)
			if len(line) < 2 {
				t.Fatalf("a line of %d points: %v", len(line), lines)
			}
			for i, p := range line {
				if math.Abs(p.Lon()) > 180 || math.Abs(p.Lat()) > 90 || i > 0 && math.Abs(p.Lon()-line[i-1].Lon()) > 180 {
					t.Fatalf("point %d of %v", i, line)
				}
			}
		}
		if count > linePoints+2*len(lines) {
			t.Fatalf("%d points", count)
		}
	})
}

// onePlace tells whether two positions are one place: 180 E is 180 W.
func onePlace(a, b orb.Point) bool {
	apart := math.Abs(a.Lon() - b.Lon())
	return a.Lat() == b.Lat() && (apart == 0 || apart == 360)
}

// Where a point of a line lies on the antimeridian, no position stands twice in a row and no part
// has fewer than two positions (RFC 7946 section 3.1.4).
func TestLinePointOnAntimeridian(t *testing.T) {
	for _, tc := range []struct {
		name   string
		points []orb.Point
		want   orb.Geometry
	}{
		{"in the middle, written as 180", []orb.Point{{179.9, 1}, {180, 1}, {-179.9, 1}}, orb.MultiLineString{{{179.9, 1}, {180, 1}}, {{-180, 1}, {-179.9, 1}}}},
		{"in the middle, written as -180", []orb.Point{{179.9, 1}, {-180, 1}, {-179.9, 1}}, orb.MultiLineString{{{179.9, 1}, {180, 1}}, {{-180, 1}, {-179.9, 1}}}},
		{"at the end", []orb.Point{{179.9, 1}, {-180, 1}}, orb.LineString{{179.9, 1}, {180, 1}}},
		{"at the beginning", []orb.Point{{180, 1}, {-179.9, 1}}, orb.LineString{{-180, 1}, {-179.9, 1}}},
	} {
		if got := geodesicLine(tc.points); !orb.Equal(got, tc.want) {
			t.Errorf("%s: got %v, want %v", tc.name, got, tc.want)
		}
	}
}

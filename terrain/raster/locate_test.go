package raster

import (
	"math"
	"strings"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"

	"fellreach/terrain"
)

// Sources: GeoConvert of GeographicLib 2.1.2 for UTM, printed to 1 mm or 1e-11 degrees; for the
// national grid the worked example of Ordnance Survey, "A guide to coordinate systems in Great
// Britain", annexe C: on the OSGB36 datum 52°39'27.2531"N 1°43'04.5177"E is 651409.903 E,
// 313177.270 N (from memory). On WGS 84 that place is some 100 m away; see TestLocateOtherDatum.
func TestLocate(t *testing.T) {
	for _, tc := range []struct {
		text string
		want orb.Point
	}{
		{"UTM 27N 566397.076 5263673.923", orb.Point{-20.1180, 47.5231}},
		{"UTM 27N 441250 5263420", orb.Point{-21.78039486263, 47.52155164899}},
		{"UTM 56S 334416.394 6251925.360", orb.Point{151.21, -33.86}},
		{"UTM 32N 297230.220 6700510.175", orb.Point{5.32, 60.39}},
		{"UTM 17S 778265.778 9944681.960", orb.Point{-78.5, -0.5}},
		{"47.5231 N, 20.1180 W", orb.Point{-20.1180, 47.5231}},
	} {
		c, err := terrain.ParseCoordinates(tc.text)
		if err != nil {
			t.Fatal(err)
		}
		got, err := Locate(c)
		if err != nil {
			t.Errorf("%s: %v", tc.text, err)
			continue
		}
		if missM, _, _ := Inverse(got, tc.want); missM > 1e-3 {
			t.Errorf("%s = %.9f, want %.9f: %g m apart", tc.text, got, tc.want, missM)
		}
	}
}

// The datum of the British national grid lies about 100 m from WGS 84 there; the place of the
// worked example, taken through PROJ's own figure for its datum, must come back to it.
func TestLocateOtherDatum(t *testing.T) {
	c := terrain.Coordinates{EPSG: 27700, Easting: 651409.903, Northing: 313177.270}
	got, err := Locate(c)
	if err != nil {
		t.Fatal(err)
	}
	osgb := orb.Point{1 + 43.0/60 + 4.5177/3600, 52 + 39.0/60 + 27.2531/3600} // on OSGB36
	if missM, _, _ := Inverse(got, osgb); missM < 60 || missM > 160 {
		t.Errorf("%v = %.7f is %.1f m from its OSGB36 figures: the datum shift is about 100 m", c, got, missM)
	}
}

func TestLocateErrors(t *testing.T) {
	for _, tc := range []struct {
		c    terrain.Coordinates
		want []string
	}{
		{terrain.Coordinates{Lon: 190, Lat: 1}, []string{"longitude 190", "-180 to 180"}},
		{terrain.Coordinates{Lon: math.NaN()}, []string{"NaN", "-180 to 180"}},
		{terrain.Coordinates{EPSG: 99999, Easting: 1, Northing: 2}, []string{"understood as EPSG:99999", "does not know"}},
		{terrain.Coordinates{EPSG: 27700, Easting: 5263420, Northing: 441250}, []string{"understood as", "outside the area of EPSG:27700", "easting before northing"}},
		{terrain.Coordinates{EPSG: 32627, Easting: 441250, Northing: 52634200}, []string{"understood as UTM 27N", "no such place"}},
		{terrain.Coordinates{EPSG: 32627, Easting: math.Inf(1), Northing: 5}, []string{"understood as UTM 27N", "no such place"}},
		{terrain.Coordinates{EPSG: 5703, Easting: 1, Northing: 2}, []string{"EPSG:5703"}}, // a vertical system
	} {
		_, err := Locate(tc.c)
		if err == nil {
			t.Errorf("Locate(%+v) succeeds", tc.c)
			continue
		}
		for _, want := range tc.want {
			if !strings.Contains(err.Error(), want) {
				t.Errorf("Locate(%+v): %q lacks %q", tc.c, err, want)
			}
		}
	}
}

// Zones run on a little beyond their borders; systems across the date line have an area too.
func TestLocateNearTheBorder(t *testing.T) {
	for _, c := range []terrain.Coordinates{
		{EPSG: 32627, Easting: 250000, Northing: 5263420},
		{EPSG: 3832, Easting: 3339584, Northing: -1800000}, // PDC Mercator, around 150 E
		{EPSG: 2193, Easting: 1750000, Northing: 5420000},  // New Zealand
	} {
		if _, err := Locate(c); err != nil {
			t.Error(err)
		}
	}
}

// Source: GeoConvert -u -p 0 of GeographicLib 2.1.2.
func TestUTM(t *testing.T) {
	for _, tc := range []struct {
		p    orb.Point
		want string
	}{
		{orb.Point{-20.1180, 47.5231}, "UTM 27N 566397 5263674"},
		{orb.Point{151.21, -33.86}, "UTM 56S 334416 6251925"},
		{orb.Point{2.9, 60}, "UTM 31N 494422 6651415"},
		{orb.Point{3, 60}, "UTM 32N 165640 6666594"},
		{orb.Point{5, 55.9}, "UTM 31N 625048 6196757"},
		{orb.Point{8.99, 75}, "UTM 31N 672781 8332340"},
		{orb.Point{9, 75}, "UTM 33N 326932 8332369"},
		{orb.Point{20.9, 75}, "UTM 33N 670193 8332079"},
		{orb.Point{21, 75}, "UTM 35N 326932 8332369"},
		{orb.Point{33, 75}, "UTM 37N 326932 8332369"},
		{orb.Point{41.9, 75}, "UTM 37N 583751 8325655"},
		{orb.Point{42, 75}, "UTM 38N 413363 8325798"},
		{orb.Point{-1, 75}, "UTM 30N 557771 8324581"},
		{orb.Point{180, 10}, "UTM 1N 171071 1106909"},
		{orb.Point{-180, 10}, "UTM 1N 171071 1106909"},
		{orb.Point{0, 84.5}, "outside UTM (80 S to 84 N)"},
		{orb.Point{0, -80.5}, "outside UTM (80 S to 84 N)"},
		{orb.Point{0, 95}, "longitude 0, latitude 95 is no place on Earth: allowed are -180 to 180 and -90 to 90 degrees"},
	} {
		if got := UTM(tc.p); got != tc.want {
			t.Errorf("UTM(%v) = %q, want %q", tc.p, got, tc.want)
		}
	}
}

// What UTM writes, ParseCoordinates and Locate read: within the rounding to a metre.
func TestUTMRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := orb.Point{rapid.Float64Range(-180, 180).Draw(t, "lon"), rapid.Float64Range(-80, 84).Draw(t, "lat")}
		c, err := terrain.ParseCoordinates(UTM(p))
		if err != nil {
			t.Fatal(err)
		}
		back, err := Locate(c)
		if err != nil {
			t.Fatal(err)
		}
		if missM, _, _ := Inverse(p, back); missM > 0.75 { // sqrt(0.5) m of rounding
			t.Fatalf("%v comes back %g m away from %s", p, missM, UTM(p))
		}
	})
}

package terrain

import (
	"math"
	"strings"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"
)

// Hand-worked: 47 + 31/60 + 23.2/3600 = 47.523111..., 20 + 7/60 + 5/3600 = 20.118055...
func TestParseCoordinates(t *testing.T) {
	decimal := Coordinates{Lon: -20.1180, Lat: 47.5231}
	sexagesimal := Coordinates{Lon: -20.118055555555555, Lat: 47.52311111111111}
	minutes := Coordinates{Lon: -(20 + 7.08/60), Lat: 47 + 31.387/60}
	for text, want := range map[string]Coordinates{
		"47.5231 N, 20.1180 W":          decimal,
		"47.5231N 20.1180W":             decimal,
		"  47.5231 n ,20.1180 w ":       decimal,
		"N 47.5231 W 20.1180":           decimal,
		"N47.5231, W20.1180":            decimal,
		"20.1180 W, 47.5231 N":          decimal,
		"47.5231, -20.1180":             decimal,
		"47.5231 -20.1180":              decimal,
		"+47.5231; −20.1180":            decimal,
		"47.5231°, -20.1180°":           decimal,
		"47.5231° N 20.1180° W":         decimal,
		"47.5231° -20.1180°":            decimal,
		"47.5231 N, -20.1180":           decimal,
		"-20.1180, 47.5231 N":           decimal,
		`47°31'23.2"N 20°07'05"W`:       sexagesimal,
		`47° 31′ 23.2″ N, 20° 7′ 5″ W`:  sexagesimal,
		`47°31’23.2”N 20°07’05”W`:       sexagesimal,
		`47º31'23.2''N 20º07'05''W`:     sexagesimal,
		"47 31 23.2 N, 20 7 5 W":        sexagesimal,
		"47 31 23.2 N 20 7 5 W":         sexagesimal,
		"N 47 31 23.2 W 20 7 5":         sexagesimal,
		"47 31 23.2, -20 7 5":           sexagesimal,
		`47°31'23.2" -20°07'05"`:        sexagesimal,
		`47°31'23.2", -20°07'05"`:       sexagesimal,
		"47°31.387'N 20°7.08'W":         minutes,
		"47 31.387 N, 20 7.08 W":        minutes,
		"-0 30 0, -0 0 36":              {Lat: -0.5, Lon: -0.01},
		"0 S, 0 W":                      {Lat: math.Copysign(0, -1), Lon: math.Copysign(0, -1)},
		"90 N, 180 E":                   {Lat: 90, Lon: 180},
		"-90, -180":                     {Lat: -90, Lon: -180},
		"UTM 27N 441250 5263420":        {EPSG: 32627, Easting: 441250, Northing: 5263420},
		"utm 27 n 441250.5, 5263420.25": {EPSG: 32627, Easting: 441250.5, Northing: 5263420.25},
		"UTM 56S 334416 6251925":        {EPSG: 32756, Easting: 334416, Northing: 6251925},
		"UTM 1N 171071 1106909":         {EPSG: 32601, Easting: 171071, Northing: 1106909},
		"UTM60S 500000 0":               {EPSG: 32760, Easting: 500000, Northing: 0},
	} {
		got, err := ParseCoordinates(text)
		if err != nil || got.EPSG != want.EPSG || got.Easting != want.Easting || got.Northing != want.Northing ||
			math.Abs(got.Lat-want.Lat) > 1e-12 || math.Abs(got.Lon-want.Lon) > 1e-12 {
			t.Errorf("ParseCoordinates(%q) = %+v, %v, want %+v", text, got, err, want)
		}
	}
}

func TestParseCoordinatesErrors(t *testing.T) {
	for text, want := range map[string]string{
		"":                                "does not divide",
		"here":                            "'H' is no part of coordinates",
		"47.5231":                         "does not divide",
		"47.5231 N":                       "does not divide",
		"47.5231 N,":                      "an angle is missing",
		"47,5231 N, 20,1180 W":            "3 commas: write decimals with a dot",
		"95 N, 20 W":                      "understood as latitude 95: allowed are -90 to 90",
		"-120.5, 47":                      "latitude -120.5: allowed are -90 to 90 degrees; latitude stands first",
		"47, 190":                         "understood as longitude 190: allowed are -180 to 180",
		"-47 N, 20 W":                     "-47 has a sign and the letter N",
		"47 N, 20 S":                      "both angles are of the same kind (N and S)",
		"20 E, 47 W":                      "both angles are of the same kind",
		"47 61 0 N, 20 0 0 W":             "understood as 61 minutes: allowed are 0 to below 60",
		"47 31 60 N, 20 0 0 W":            "understood as 60 seconds: allowed are 0 to below 60",
		"47 -31 0 N, 20 0 0 W":            "understood as -31 minutes",
		"47.5 31 N, 20 7 W":               "47.5 degrees have a fraction, yet more follows",
		"47 31.5 2 N, 20 7 5 W":           "31.5 minutes have a fraction",
		"47 31 23 2 N, 20 7 5 W":          `"2" is out of place`,
		`47'31" N, 20'7" W`:               "out of place",
		"N 47 N, 20 W":                    "out of place",
		"47..5 N, 20 W":                   `"47..5" is not a number`,
		"٤٧, 20":                          "is not a number",
		"1e400, 2":                        `"E" is out of place`,
		"47 N 20 W 3 E":                   "does not divide",
		"47 20 5":                         "does not divide",
		"UTM 27T 441250 5263420":          "T is the letter of a latitude band; the letter here is the hemisphere, for band T the northern: write UTM 27N",
		"UTM 56H 334416 6251925":          "for band H the southern: write UTM 56S",
		"UTM 27 441250 5263420":           "zone 27 without its hemisphere: write 27N or 27S",
		"UTM 61N 441250 5263420":          `"61N" is no UTM zone: allowed are 1 to 60`,
		"UTM 0N 441250 5263420":           "allowed are 1 to 60",
		"UTM N 441250 5263420":            "allowed are 1 to 60",
		"UTM 27I 441250 5263420":          "the letter is N or S",
		"UTM 27NN 441250 5263420":         "the letter is N or S",
		"UTM 27N 441250":                  "UTM with 2 parts where three are due",
		"UTM":                             "UTM with 0 parts",
		"UTM 27N 5263420 441250":          "understood as easting 5.26342e+06 m: allowed are 100000 to 900000; easting stands before northing",
		"UTM 27N 441250 -5":               "understood as northing -5 m: allowed are 0 to 10000000",
		"UTM 27N NaN 5263420":             "understood as easting NaN",
		"UTM 27N a b":                     "are not both numbers",
		strings.Repeat("1 ", 200) + ", 2": "the text has 403 bytes, over 200",
	} {
		_, err := ParseCoordinates(text)
		if err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("ParseCoordinates(%q): %v, want %q", text, err, want)
		}
	}
}

func TestFormat(t *testing.T) {
	for _, tc := range []struct {
		p            orb.Point
		decimal, dms string
	}{
		{orb.Point{-20.1180, 47.5231}, "47.52310 N, 20.11800 W", `47°31'23.2"N 20°07'04.8"W`},
		{orb.Point{151.21, -33.86}, "33.86000 S, 151.21000 E", `33°51'36.0"S 151°12'36.0"E`},
		{orb.Point{0, 0}, "0.00000 N, 0.00000 E", `0°00'00.0"N 0°00'00.0"E`},
		{orb.Point{-180, 89.99999999}, "90.00000 N, 180.00000 W", `90°00'00.0"N 180°00'00.0"W`},
	} {
		if got := FormatDecimal(tc.p); got != tc.decimal {
			t.Errorf("FormatDecimal(%v) = %q, want %q", tc.p, got, tc.decimal)
		}
		if got := FormatDMS(tc.p); got != tc.dms {
			t.Errorf("FormatDMS(%v) = %q, want %q", tc.p, got, tc.dms)
		}
	}
}

func TestCoordinatesString(t *testing.T) {
	for _, tc := range []struct {
		c    Coordinates
		want string
	}{
		{Coordinates{Lon: -20.1180, Lat: 47.5231}, "47.52310 N, 20.11800 W"},
		{Coordinates{EPSG: 32627, Easting: 441250.4, Northing: 5263420}, "UTM 27N 441250 5263420"},
		{Coordinates{EPSG: 32756, Easting: 334416, Northing: 6251925}, "UTM 56S 334416 6251925"},
		{Coordinates{EPSG: 32661, Easting: 2e6, Northing: 2e6}, "EPSG:32661 easting 2000000.00, northing 2000000.00"},
		{Coordinates{EPSG: 27700, Easting: 651409.903, Northing: 313177.27}, "EPSG:27700 easting 651409.90, northing 313177.27"},
	} {
		if got := tc.c.String(); got != tc.want {
			t.Errorf("%#v is %q, want %q", tc.c, got, tc.want)
		}
	}
}

// What is written is read back, within the rounding of the notation.
func TestFormatRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := orb.Point{rapid.Float64Range(-180, 180).Draw(t, "lon"), rapid.Float64Range(-90, 90).Draw(t, "lat")}
		for _, n := range []struct {
			text   string
			tolDeg float64
		}{{FormatDecimal(p), 0.5e-5}, {FormatDMS(p), 0.05 / 3600}} {
			c, err := ParseCoordinates(n.text)
			if err != nil || math.Abs(c.Lon-p.Lon()) > n.tolDeg+1e-12 || math.Abs(c.Lat-p.Lat()) > n.tolDeg+1e-12 {
				t.Fatalf("%v is written %s and read as %+v, %v", p, n.text, c, err)
			}
		}
	})
}

// Any text gives a place in range or an error, and a place that was read is read again from what
// is written of it.
func FuzzParseCoordinates(f *testing.F) {
	for _, text := range []string{
		"47.5231 N, 20.1180 W", "47.5231, -20.1180", `47°31'23.2"N 20°07'05"W`, "47 31 23.2 N, 20 7 5 W", "47°31.387'N 20°7.08'W",
		"UTM 27N 441250 5263420", "UTM 27T 1 2", "''''''", "N,S", "-", "utm60s 1e5 0x1p20",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		c, err := ParseCoordinates(text)
		if err != nil {
			if !strings.HasPrefix(err.Error(), "coordinates ") {
				t.Errorf("%q: %v", text, err)
			}
			return
		}
		if !(math.Abs(c.Lat) <= 90) || !(math.Abs(c.Lon) <= 180) || math.IsNaN(c.Easting+c.Northing) || math.IsInf(c.Easting+c.Northing, 0) {
			t.Errorf("%q is read as %+v", text, c)
		}
		if again, err := ParseCoordinates(c.String()); err != nil || again.EPSG != c.EPSG || math.Abs(again.Lat-c.Lat) > 1e-5 || math.Abs(again.Easting-c.Easting) > 0.51 {
			t.Errorf("%q is read as %s, which is read as %+v, %v", text, c, again, err)
		}
	})
}

package main

import (
	"math"
	"os/exec"
	"strconv"
	"strings"
	"testing"
)

// Real ground: distances and azimuths against GeodSolve 2.1.2 of GeographicLib (inverse problem on
// WGS 84, printed to 0.1 mm and 1e-9 degree; azi2 looks forward, so the back azimuth is 180
// degrees from it).
func TestGeodesicsOnRealGround(t *testing.T) {
	for _, tc := range []struct {
		from, to         string
		s12M, azi1, azi2 float64
	}{
		{"Cairn", "Larch top", 18425.0929, 15.481998698, 15.514764121},
		{"Kestrel rock", "Bracken", 15459.0140, -161.997386213, -162.029176104},
		{"Larch top", "Ferry gauge", 4547.7799, 123.287437004, 123.312796656},
		{"Cairn", "Ferry gauge", 17578.7369, 29.744369635, 29.802438408},
		{"Mill weir", "Ford gauge", 14013.7502, -144.881243795, -144.934860969},
	} {
		s := sectionOf(t, jacksboro, tc.from+".."+tc.to)
		az, back := s.AzimuthDeg, s.BackAzimuthDeg
		if s.From == tc.to { // the plan has the link the other way
			az, back = back, az
		}
		near(t, tc.from+" to "+tc.to+", m", s.DistanceKm*1000, tc.s12M, 1e-3)
		near(t, "azimuth", turn(az-tc.azi1), 0, 1e-7)
		near(t, "back azimuth", turn(back-tc.azi2-180), 0, 1e-7)
	}
}

// turn brings an angle to -180 to 180 degrees.
func turn(deg float64) float64 { return math.Remainder(deg, 360) }

// Places and heights of the sites. The heights are those of the cells they stand in, by
// gdallocationinfo of GDAL 3.6.2.
var jacksboroSites = map[string]struct{ lon, lat, cellM float64 }{
	"Cairn":        {-84.23083, 36.48500, 1076},
	"Larch top":    {-84.17583, 36.64500, 653},
	"Kestrel rock": {-84.31583, 36.64917, 894},
	"Bracken":      {-84.36917, 36.51667, 860},
	"Mill weir":    {-84.24667, 36.61750, 363},
	"Ferry gauge":  {-84.13333, 36.62250, 299},
	"Ford gauge":   {-84.33667, 36.51417, 404},
}

// The program interpolates between cell centres. Five decimals of a degree put a site within 0.005
// cells of one in each direction, and the next cells are up to 29 m lower or higher: 0.3 m.
func TestHeightsOnRealGround(t *testing.T) {
	seen := 0
	for _, l := range linksOf(t, jacksboro) {
		s := sectionOf(t, jacksboro, l.From+".."+l.To)
		for name, p := range map[string]sectionPoint{s.From: s.Points[0], s.To: s.Points[len(s.Points)-1]} {
			seen++
			site := jacksboroSites[name]
			near(t, name+", lon", p.Lon, site.lon, 0)
			near(t, name+", lat", p.Lat, site.lat, 0)
			near(t, name+", height", p.GroundM, site.cellM, 0.3)
		}
	}
	if seen != 10 {
		t.Errorf("%d ends", seen)
	}
}

// Along a whole path, the interpolated height lies between the least and the greatest of the nine
// cells around, as gdallocationinfo gives them.
func TestProfileAgainstGDAL(t *testing.T) {
	if _, err := exec.LookPath("gdallocationinfo"); err != nil {
		t.Skip("gdallocationinfo is not installed (Debian: gdal-bin)")
	}
	const cell = 1 / 1200.0
	s := sectionOf(t, jacksboro, "backbone")
	var places strings.Builder
	for _, p := range s.Points {
		for k := range 9 {
			places.WriteString(strconv.FormatFloat(p.Lon+cell*float64(k%3-1), 'f', 9, 64) + " " + strconv.FormatFloat(p.Lat+cell*float64(k/3-1), 'f', 9, 64) + "\n")
		}
	}
	cmd := exec.Command("gdallocationinfo", "-valonly", "-wgs84", testdata("terrain", "jacksboro.tif"))
	cmd.Stdin = strings.NewReader(places.String())
	out, err := cmd.Output()
	if err != nil {
		t.Fatal(err)
	}
	cells := strings.Fields(string(out))
	if len(cells) != 9*len(s.Points) {
		t.Fatalf("%d cells of %d points", len(cells), len(s.Points))
	}
	for i, p := range s.Points {
		low, high := math.Inf(1), math.Inf(-1)
		for _, text := range cells[9*i : 9*i+9] {
			h, err := strconv.ParseFloat(text, 64)
			if err != nil {
				t.Fatal(err)
			}
			low, high = min(low, h), max(high, h)
		}
		if p.GroundM < low || p.GroundM > high {
			t.Errorf("%.3f km: %.2f m, the cells around hold %g to %g m", p.DKm, p.GroundM, low, high)
		}
	}
}

// Which paths are clear and which are blocked, as the ridges and the valleys between have it (drawn
// once from gdallocationinfo's heights).
func TestClearancesOnRealGround(t *testing.T) {
	for _, tc := range []struct {
		link      string
		low, high float64 // of the worst clearance over the first Fresnel radius
	}{
		{"Cairn..Larch top", 0.6, math.Inf(1)},
		{"Kestrel rock..Bracken", 0.6, math.Inf(1)},
		{"Larch top..Ferry gauge", -0.6, 0.6},
		{"Cairn..Ferry gauge", -3, 0},
		{"Mill weir..Ford gauge", math.Inf(-1), -3},
	} {
		if got := sectionOf(t, jacksboro, tc.link).Clearance.WorstRatio; got < tc.low || got > tc.high {
			t.Errorf("%s: %.2f, want %g to %g", tc.link, got, tc.low, tc.high)
		}
	}
}

// What people see of this plan: a regression check of its wording and its roundings.
func TestGoldenOnRealGround(t *testing.T) {
	golden(t, "jacksboro-links.txt", succeeds(t, exitLinks, "links", jacksboro))
	golden(t, "jacksboro-section.txt", succeeds(t, exitDone, "section", jacksboro, "--link", "Cairn..Ferry gauge"))
	golden(t, "jacksboro-section.svg", succeeds(t, exitDone, "section", jacksboro, "--link", "Cairn..Ferry gauge", "--format", "svg"))
}

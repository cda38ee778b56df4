package report

import (
	"flag"
	"os"
	"path/filepath"
	"testing"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/plan"
	"fellreach/link/propagation"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

var update = flag.Bool("update", false, "write the golden files anew")

// golden compares a text with a file of testdata/golden, or writes it with -update. What the
// reports write of made figures is a regression check of wording and rounding.
func golden(t *testing.T, name, got string) {
	t.Helper()
	path := filepath.Join("..", "..", "testdata", "golden", name)
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if got != string(want) {
		t.Errorf("%s differs (make generate writes it anew); got:\n%s\nwant:\n%s", path, got, want)
	}
}

// The made network: an invented group of islets on either side of the antimeridian. No figure in it
// is computed.
var (
	harbour = &link.Station{Name: "Harbour", Order: 0, At: orb.Point{179.9, -16.8}, AglM: 12, Antenna: antenna.Design{Name: "stick"}}
	reef    = &link.Station{Name: "Outer reef", Order: 1, At: orb.Point{-179.86, -16.7}, AglM: 6, Antenna: antenna.Design{Name: "rod"}}
	hill    = &link.Station{Name: "Hill/uhf", Order: 2, At: orb.Point{179.95, -16.75}, AglM: 8, Antenna: antenna.Design{Name: "panel"}}
	poll    = link.Channel{Name: "poll", OutHz: 151.5e6, BackHz: 151.5e6, BandwidthHz: 12.5e3}
	voice   = link.Channel{Name: "voice <&>", OutHz: 455.2e6, BackHz: 451.1e6, BandwidthHz: 12.5e3}
)

// madeProfile is a profile with its points on the geodesic.
func madeProfile(from, to orb.Point, heightsM ...float64) terrain.Profile {
	n := len(heightsM)
	lengthM, azDeg, backAzDeg := raster.Inverse(from, to)
	p := terrain.Profile{AslM: heightsM, CoverM: make([]float64, n), Points: make([]orb.Point, n), AzDeg: azDeg, BackAzDeg: backAzDeg}
	raster.Line(from, azDeg, lengthM/float64(n-1), p.Points)
	for i := range heightsM {
		p.DistKm = append(p.DistKm, lengthM/1000*float64(i)/float64(n-1))
		zone := terrain.Inland
		if heightsM[i] == 0 {
			zone = terrain.Sea
		}
		p.Zone = append(p.Zone, zone)
	}
	return p
}

func madeBudget(from, to *link.Station, freqHz, lossDB, marginDB float64) link.Budget {
	return link.Budget{
		From: from.Name, To: to.Name, FreqHz: freqHz,
		Lines: []link.Line{
			{Name: from.Name + ": transmitter", DB: 37, Kind: link.PowerLine, Source: "made.yaml:12"},
			{Name: "terrain and air", DB: -lossDB, Kind: link.LossLine, Source: "P.526-15, with a source so long that it must be broken between its words, since no terminal is as wide as that"},
			{Name: to.Name + ": sensitivity", DB: 117, Kind: link.NeedLine, Source: "made.yaml:14"},
			{Name: "fading, 99 % of the year", DB: -0.001, Kind: link.AllowanceLine, Source: "stated, made.yaml:31"},
		},
		ReceivedDBm: 37 - lossDB, RequiredDBm: -117, MarginDB: marginDB, TransmissionLossDB: lossDB, FadeDB: 0.001,
		DepartureDeg: -0.25, ArrivalDeg: 1.5, ChancePct: 50,
	}
}

// madeResult holds a link of each verdict: one over the antimeridian both ways, one way, and with
// two frequencies.
func madeResult() *plan.Result {
	far := link.Warning{Text: "the path is made up"}
	return &plan.Result{Title: "Made islets", Method: "P.526-15", Aim: link.Aim{AvailabilityPct: 99, MarginDB: 6}, Notes: []string{"a note on the whole plan"}, Stations: []*link.Station{harbour, reef, hill}, Links: []*link.Result{
		{
			Link:    &link.Link{Name: "crossing", From: harbour, To: reef, Channel: poll},
			Profile: madeProfile(harbour.At, reef.At, 10, 0, 0, 0, 0, 5),
			Directions: []link.Budget{
				madeBudget(harbour, reef, 151.5e6, 120.25, 33.749), madeBudget(reef, harbour, 151.5e6, 120.25, 33.749),
			},
			MarginDB: 33.749, ChancePct: 99.97, Verdict: link.Closes, Sensitivity: link.Sensitivity{FromMastDB: 0.254, ToMastDB: 0.5, RasterDB: -1.004, ChancePct: 0.04},
			Clearance: propagation.FresnelClearance{WorstRatio: 0.75, NeededRatio: 0.6, Index: 2, AtKm: 11.2},
			Warnings:  []link.Warning{far, {At: "Harbour", Text: "the mast is made up"}},
		},
		{
			Link:       &link.Link{From: reef, To: hill, Channel: voice, OneWay: true},
			Profile:    madeProfile(reef.At, hill.At, 5, 0, 140, 60),
			Directions: []link.Budget{madeBudget(reef, hill, 455.2e6, 160.5, -6.501)},
			MarginDB:   -6.501, ChancePct: 0.04, Verdict: link.Fails,
			Clearance: propagation.FresnelClearance{WorstRatio: -2.5, NeededRatio: 0.6, Index: 2, AtKm: 14.04},
			Warnings:  []link.Warning{far},
		},
		{
			Link:       &link.Link{From: harbour, To: hill, Channel: voice},
			Profile:    madeProfile(harbour.At, hill.At, 10, 20, 60),
			Directions: []link.Budget{madeBudget(harbour, hill, 455.2e6, 151, 2.999), madeBudget(hill, harbour, 451.1e6, 150.9, 3.099)},
			MarginDB:   2.999, ChancePct: 63.2, Verdict: link.Thin,
			Clearance: propagation.FresnelClearance{WorstRatio: 0.1, NeededRatio: 0.6, Index: 1, AtKm: 3.84},
			Warnings:  []link.Warning{{At: "Harbour", Text: "the mast is made up"}},
		},
	}}
}

// madeSection is a path over land, woodland and sea with a hill in its way.
func madeSection() *link.Section {
	s := &link.Section{
		Link:     &link.Link{From: harbour, To: reef, Channel: poll},
		Profile:  madeProfile(harbour.At, reef.At, 40, 52, 90, 31, 0, 0, 0, 2, 5),
		FromAglM: harbour.AglM, ToAglM: reef.AglM, FreqHz: 151.5e6, RadiusKm: 8931,
		RayM:      []float64{52, 47, 42, 37, 32, 26, 21, 16, 11},
		BulgeM:    []float64{0, 1, 2, 2.5, 3, 2.5, 2, 1, 0},
		Fresnel1M: []float64{0, 73, 97, 108, 112, 108, 97, 73, 0},
		Clearance: propagation.FresnelClearance{WorstRatio: -0.5, NeededRatio: 0.6, Index: 2},
		Horizon:   link.Horizon{TransHorizon: true, DepartureDeg: 0.31, ArrivalDeg: -0.05, FromHorizonKm: 6.9, ToHorizonKm: 20.8},
	}
	s.Profile.CoverM[1] = 12
	s.Clearance.AtKm = s.Profile.DistKm[2]
	s.Profile.Notes = []string{"bridged a void of 90 m at 3.1 km"}
	return s
}

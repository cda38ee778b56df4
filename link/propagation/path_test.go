package propagation

import (
	"math"
	"slices"
	"strings"
	"testing"

	"fellreach/terrain"
	"pgregory.net/rapid"
)

// level returns a path over level inland ground at sea level: n equal intervals less one, 150 MHz,
// vertical polarization, antennas 10 m high, temperate air.
func level(points int, lengthKm float64) Path {
	p := Path{
		FreqHz: 150e6, TxAglM: 10, RxAglM: 10, VerticalShare: 1,
		DeltaN: 45, N0: 325, TimePct: 50, LocationPct: 50, LatDeg: 50, TxCoastKm: 500, RxCoastKm: 500,
	}
	p.DistKm = make([]float64, points)
	for i := range p.DistKm {
		p.DistKm[i] = lengthKm * float64(i) / float64(points-1)
	}
	p.AslM = make([]float64, points)
	p.CoverM = make([]float64, points)
	p.Zone = slices.Repeat([]terrain.Zone{terrain.Inland}, points)
	return p
}

// fromOtherEnd returns the same path with its ends exchanged.
func fromOtherEnd(p Path) Path {
	p.Profile = p.Reversed()
	p.TxAglM, p.RxAglM = p.RxAglM, p.TxAglM
	p.TxCoastKm, p.RxCoastKm = p.RxCoastKm, p.TxCoastKm
	return p
}

// drawPath draws a path over rough, partly covered ground with runs of all zones.
func drawPath(t *rapid.T) Path {
	p := level(rapid.IntRange(2, 60).Draw(t, "points"), rapid.Float64Range(0.25, 200).Draw(t, "length"))
	base := rapid.Float64Range(0, 1500).Draw(t, "base")
	relief := rapid.SampledFrom([]float64{0, 5, 50, 500}).Draw(t, "relief")
	zone := rapid.SampledFrom([]terrain.Zone{terrain.Sea, terrain.Coastal, terrain.Inland})
	for i := range p.AslM {
		p.AslM[i] = base + relief*rapid.Float64Range(0, 1).Draw(t, "height")
		p.CoverM[i] = rapid.SampledFrom([]float64{0, 0, 10, 20}).Draw(t, "cover")
		if i == 0 || rapid.IntRange(0, 4).Draw(t, "change") == 0 {
			p.Zone[i] = zone.Draw(t, "zone")
		} else {
			p.Zone[i] = p.Zone[i-1]
		}
	}
	p.FreqHz = 1e6 * math.Exp(rapid.Float64Range(math.Log(30), math.Log(6000)).Draw(t, "log MHz"))
	p.TxAglM = rapid.Float64Range(1, 300).Draw(t, "tx height")
	p.RxAglM = rapid.Float64Range(1, 300).Draw(t, "rx height")
	p.VerticalShare = rapid.SampledFrom([]float64{0, 0.5, 1}).Draw(t, "vertical")
	p.DeltaN = rapid.Float64Range(20, 90).Draw(t, "delta N")
	return p
}

func TestBadPaths(t *testing.T) {
	for _, tc := range []struct {
		name  string
		spoil func(*Path)
		want  string
	}{
		{"one point", func(p *Path) {
			p.DistKm, p.AslM, p.CoverM, p.Zone = p.DistKm[:1], p.AslM[:1], p.CoverM[:1], p.Zone[:1]
		}, "1 points, at least 2"},
		{"no points", func(p *Path) { p.Profile = terrain.Profile{} }, "0 points, at least 2"},
		{"not from 0", func(p *Path) { p.DistKm[0] = 0.5 }, "starts at 0.5 km, it must start at 0"},
		{"standing still", func(p *Path) { p.DistKm[3] = p.DistKm[2] }, "point 3 of the profile lies at 4 km after 4 km"},
		{"going back", func(p *Path) { p.DistKm[3] = 1 }, "point 3 of the profile lies at 1 km after 4 km"},
		{"half a millimetre", func(p *Path) { p.DistKm[3] = p.DistKm[2] + 5e-7 }, "grow by 1 mm"},
		{"distance NaN", func(p *Path) { p.DistKm[3] = math.NaN() }, "point 3"},
		{"distance infinite", func(p *Path) { p.DistKm[5] = math.Inf(1) }, "point 5"},
		{"first distance NaN", func(p *Path) { p.DistKm[0] = math.NaN() }, "must start at 0"},
		{"height NaN", func(p *Path) { p.AslM[2] = math.NaN() }, "point 2 of the profile (4.000 km) is NaN m above sea level"},
		{"height of space", func(p *Path) { p.AslM[2] = 4e5 }, "is 400000 m above sea level, it must lie between -12000 and 12000 m"},
		{"cover negative", func(p *Path) { p.CoverM[2] = -1 }, "cover of -1 m"},
		{"cover NaN", func(p *Path) { p.CoverM[0] = math.NaN() }, "cover of NaN m"},
		{"zone unset", func(p *Path) { p.Zone[4] = 0 }, "point 4 of the profile (8.000 km) has zone 0: it must be 1 (sea), 3 (coastal land) or 4 (inland)"},
		{"zone 2", func(p *Path) { p.Zone[4] = 2 }, "has zone 2"},
		{"too short", func(p *Path) { *p = level(2, 0.0005) }, "the length of the profile is 0.0005 km, it must lie between 0.001 and 20000 km"},
		{"round the Earth", func(p *Path) { *p = level(5, 20001) }, "the length of the profile is 20001 km"},
		{"HF", func(p *Path) { p.FreqHz = 29.9e6 }, "the frequency is 29.9 MHz, it must lie between 30 and 6000 MHz"},
		{"GHz for Hz", func(p *Path) { p.FreqHz = 0.15 }, "the frequency is 1.5e-07 MHz"},
		{"frequency NaN", func(p *Path) { p.FreqHz = math.NaN() }, "the frequency is NaN MHz"},
		{"no mast", func(p *Path) { p.TxAglM = 0 }, "the transmitter's height above ground is 0 m"},
		{"sunken", func(p *Path) { p.RxAglM = -3 }, "the receiver's height above ground is -3 m"},
		{"share over 1", func(p *Path) { p.VerticalShare = 1.1 }, "the share of vertical polarization is 1.1, it must lie between 0 and 1"},
		{"delta N unset", func(p *Path) { p.DeltaN = 0 }, "delta N is 0 N-units/km"},
		{"delta N of a flat Earth", func(p *Path) { p.DeltaN = 157 }, "delta N is 157 N-units/km, it must lie between 0.001 and 150 N-units/km"},
	} {
		t.Run(tc.name, func(t *testing.T) {
			p := level(6, 10)
			tc.spoil(&p)
			check := func(call string, err error) {
				if err == nil || !strings.Contains(err.Error(), tc.want) {
					t.Errorf("%s: got error %v, want one with %q", call, err, tc.want)
				}
			}
			for _, m := range allModels {
				_, err := m.Loss(p)
				check(m.Name, err)
			}
			_, err := Clearance(p)
			check("Clearance", err)
		})
	}
}

func TestRaggedProfilePanics(t *testing.T) {
	p := level(6, 10)
	p.CoverM = p.CoverM[:5]
	defer func() {
		want := "propagation: ragged profile: 6 distances, 6 heights, 5 covers, 6 zones"
		if got := recover(); got != want {
			t.Errorf("panic %v, want %q", got, want)
		}
	}()
	_, _ = P526.Loss(p)
}

func TestByName(t *testing.T) {
	for _, m := range allModels {
		got, err := ByName(m.Name)
		if err != nil || got.Name != m.Name || got.Edition == "" || got.MinHz != 30e6 || got.MaxHz != 6e9 {
			t.Errorf("ByName(%q) = %+v, %v", m.Name, got, err)
		}
	}
	if _, err := ByName("P526"); err == nil || !strings.Contains(err.Error(), `"P526": use free-space, p526, p1812`) {
		t.Errorf(`ByName("P526"): got error %v`, err)
	}
}

var allModels = []Model{FreeSpace, P526, P1812}

// Every method leaves the path's own slices alone and needs no memory of its own.
func TestNoAllocation(t *testing.T) {
	p := level(100, 30)
	p.AslM[40] = 120
	for _, m := range allModels {
		allocs := testing.AllocsPerRun(10, func() {
			if _, err := m.Loss(p); err != nil {
				t.Error(err)
			}
		})
		if allocs != 0 {
			t.Errorf("%s: %v allocations, want none", m.Name, allocs)
		}
	}
}

package coverage

import (
	"context"
	"math"
	"slices"
	"testing"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/propagation"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// madeTask is a base with a slanted, tilted directional antenna and a feeder, and a handheld.
func madeTask(t testing.TB) Task {
	t.Helper()
	port := antenna.Port{ImpedanceOhm: 50, VSWR: 1.5}
	panel, err := antenna.Datasheet(antenna.Sheet{GainDBi: 8, WidthHDeg: 65, WidthVDeg: 30, FrontToBackDB: 18}, port)
	if err != nil {
		t.Fatal(err)
	}
	whip, err := antenna.Isotropic(-3, antenna.Port{ImpedanceOhm: 50, VSWR: 1})
	if err != nil {
		t.Fatal(err)
	}
	radio := link.Radio{Name: "set", PowerDBm: 37, DutyPct: 100, Needs: link.Need{BandwidthHz: 8e3, RequiredSNRDB: 12, FigureDB: 7}}
	base := &link.Station{
		Name: "Base", At: orb.Point{-20, 47.5}, AglM: 20, ClearingM: 50, Radio: radio, Antenna: panel,
		Mount: antenna.Mount{FacingDeg: 130, TiltDeg: -3, RollDeg: 45}, Noise: link.Noise{Environment: "rural"},
		Inserts: []link.Insert{{Name: "duplexer", LossDB: 1.2}},
	}
	hand := &link.Station{Name: "handheld", Order: 1, AglM: 1.5, Radio: radio, Antenna: whip, Noise: link.Noise{Environment: "rural"}}
	hand.Radio.PowerDBm = 30
	return Task{
		Link: &link.Link{
			From: base, To: hand, Channel: link.Channel{Name: "voice", OutHz: 455.2e6, BackHz: 451.1e6, BandwidthHz: 12.5e3},
			Aim: link.Aim{AvailabilityPct: 99, MarginDB: 6}, Allowances: []link.Allowance{{Name: "body", LossDB: 4}},
		},
		Conditions:   link.Conditions{Method: propagation.P1812, DeltaN: 45, N0: 325, Dn1: -200, SpreadDB: 9},
		LocationsPct: 90, RangeM: 4000, CellM: 30, StepM: 30,
	}
}

// Source: link.Compute, for the far end standing in the cell, on the same profile; the location line
// by the direct method. What the budgets are made of besides the losses agrees to 1e-9 dB, the
// losses of the sweep to the 1e-6 dB of its promise.
func TestCellIsALink(t *testing.T) {
	for _, tc := range []struct {
		name                    string
		availability, locations float64
		fade                    *link.Allowance
		backHz                  float64
		within                  float64 // of the margin with the loss taken out of it
	}{
		{"median", 50, 50, nil, 451.1e6, 1e-9},
		{"stated fade", 99, 50, &link.Allowance{LossDB: 7}, 455.2e6, 1e-9},
		{"fading and locations", 99.5, 90, nil, 451.1e6, 1e-6},
	} {
		t.Run(tc.name, func(t *testing.T) {
			task := madeTask(t)
			task.Link.Aim.AvailabilityPct, task.LocationsPct, task.Link.Fade = tc.availability, tc.locations, tc.fade
			task.Link.Channel.BackHz = tc.backHz
			disc, frame := made{cellM: 30, reach: 140, height: rough, class: mixed}.lay(t)
			compared := 0
			forCells(t, task, disc, frame, func(s *sweep, r *reckoner, c *Cell) {
				if c.Index%449 != 0 {
					return
				}
				compared++
				r.cell = c
				want := linkTo(t, task, s, c.Index)
				for i := range want.Directions {
					d, b := &r.places.Directions[i], want.Directions[i]
					got := r.direction(i)
					location := locationLine(t, task, s, c, b.FreqHz, r.pair.verticalPart)
					if diff := got.marginDB + got.lossDB - (b.MarginDB - location + b.TransmissionLossDB); !(math.Abs(diff) <= tc.within) {
						t.Errorf("cell %d, direction %d: the margin is off by %.3g dB; %+v", c.Index, i, diff, got)
					}
					if !(math.Abs(got.lossDB-b.TransmissionLossDB) <= 1e-6) {
						t.Errorf("cell %d, direction %d: loss %.9f, as a link %.9f dB", c.Index, i, got.lossDB, b.TransmissionLossDB)
					}
					if i > 0 {
						continue
					}
					// 77.21 dB lead from the power of an isotropic antenna, dBm, to its field, dB(uV/m), with MHz: P.1812 (70).
					field := propagation.FieldStrength(d.FreqHz, d.SentDBm+r.pair.sentDBi, got.lossDB)
					if byHand := radiatedDBm(b) + 20*math.Log10(b.FreqHz/1e6) + 77.21 - b.TransmissionLossDB; !(math.Abs(field-byHand) <= 1e-6) {
						t.Errorf("cell %d: field %.9f, by hand %.9f dB(uV/m)", c.Index, field, byHand)
					}
				}
			})
			if compared < 100 {
				t.Errorf("%d cells compared", compared)
			}
		})
	}
}

// forCells visits all cells of a task with a reckoner that has all layers, on one goroutine.
func forCells(t testing.TB, task Task, disc *terrain.Disc, frame *raster.Frame, visit func(*sweep, *reckoner, *Cell)) {
	t.Helper()
	places, err := link.NewPlaces(task.Link, task.Conditions)
	if err != nil {
		t.Fatal(err)
	}
	task.Workers = 1
	s, err := newSweep(task.spec(places), disc, frame)
	if err != nil {
		t.Fatal(err)
	}
	m := &Map{MarginDB: voidCells(frame.Cols * frame.Rows)}
	_, err = s.run(context.Background(), func() func(*Cell) {
		r := newReckoner(&task, places, s, m, newSampling(s))
		return func(c *Cell) { visit(s, r, c) }
	}, nil)
	if err != nil {
		t.Fatal(err)
	}
}

// linkTo computes the link to a cell on the stated profile.
func linkTo(t testing.TB, task Task, s *sweep, index int) *link.Result {
	t.Helper()
	p, lat, ok := newWalk(s).statedProfile(index)
	if !ok {
		t.Fatalf("cell %d has no profile", index)
	}
	for range p.DistKm {
		p.Points = append(p.Points, orb.Point{-20, lat})
	}
	east, north := s.frame.Plane.At(float64(index%s.frame.Cols), float64(index/s.frame.Cols))
	p.AzDeg = math.Mod(math.Atan2(east, north)*180/math.Pi+360, 360)
	p.BackAzDeg = math.Mod(p.AzDeg+180, 360)
	r, err := link.Compute(task.Link, p, task.Conditions)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// locationLine is Lb(pL) - Lb(50) by the direct method.
func locationLine(t testing.TB, task Task, s *sweep, c *Cell, freqHz, share float64) float64 {
	t.Helper()
	p, lat, _ := newWalk(s).statedProfile(c.Index)
	path := s.path(p, lat, freqHz, share, task.Conditions.N0)
	median, err := propagation.P1812.Loss(path)
	if err != nil {
		t.Fatal(err)
	}
	path.LocationPct = task.LocationsPct
	path.LocationSpreadDB = propagation.LocationSpreadDB(freqHz, task.CellM, task.Link.To.AglM, c.CoverM)
	most, err := propagation.P1812.Loss(path)
	if err != nil {
		t.Fatal(err)
	}
	return most.DB - median.DB
}

// radiatedDBm adds a budget's lines up to the transmitting antenna's gain.
func radiatedDBm(b link.Budget) (eirp float64) {
	for _, l := range b.Lines {
		eirp += l.DB
		if l.Name == "Base: gain towards the path" {
			return eirp
		}
	}
	return math.NaN()
}

// The layers hold what the reckoner says, in single precision; whatever the number of workers they
// are the same, and the check finds the sweep exact.
func TestMap(t *testing.T) {
	task := madeTask(t)
	all := Layers{Loss: true, Margin: true, Field: true}
	ground := made{cellM: 30, reach: 140, height: rough, class: mixed}
	task.Workers = 1
	one := mapMade(t, task, ground, all)
	task.Workers = 3
	three := mapMade(t, task, ground, all)
	if !slices.EqualFunc(one.MarginDB, three.MarginDB, sameCell) || !slices.EqualFunc(one.LossDB, three.LossDB, sameCell) || !slices.EqualFunc(one.FieldDBuV, three.FieldDBuV, sameCell) {
		t.Error("one and three workers give different maps")
	}
	if one.Check != three.Check || one.Check.Samples < 1000 || !(one.Check.SweepMaxDB <= 1e-6) {
		t.Errorf("checks %+v and %+v", one.Check, three.Check)
	}
	if one.VoidCells != 0 || math.Abs(float64(one.Cells)-math.Pi*4000*4000/900) > 500 {
		t.Errorf("%d cells, %d of them void; a circle of 4 km", one.Cells, one.VoidCells)
	}
	t.Logf("%+v", one.Check)
}

func sameCell(a, b float32) bool { return math.Float32bits(a) == math.Float32bits(b) }

// mapMade maps a task over made ground.
func mapMade(t testing.TB, task Task, m made, wanted Layers) *Map {
	t.Helper()
	disc, frame := m.lay(t)
	places, err := link.NewPlaces(task.Link, task.Conditions)
	if err != nil {
		t.Fatal(err)
	}
	got, err := task.over(context.Background(), places, disc, frame, wanted, nil)
	if err != nil {
		t.Fatal(err)
	}
	return got
}

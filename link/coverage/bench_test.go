package coverage

import (
	"context"
	"math"
	"testing"
	"time"

	"fellreach/link/propagation"
)

// BenchmarkSweep evaluates P.1812 at 450 MHz in all cells of 30 m within 20 km; cells/s is the
// figure.
func BenchmarkSweep(b *testing.B) {
	m := made{cellM: 30, reach: 670, height: rough, class: mixed}
	disc, frame := m.lay(b)
	for _, workers := range []int{1, 2} {
		b.Run(map[int]string{1: "one", 2: "two"}[workers], func(b *testing.B) {
			s, err := newSweep(Spec{RangeM: 20000, StepM: 30, AglM: 20, FarAglM: 1.5, ClearingM: 50, DeltaN: 45, LowestHz: 450e6, Workers: workers}, disc, frame)
			if err != nil {
				b.Fatal(err)
			}
			vertical := fixedShare(1)
			brief := propagation.NewBrief(propagation.P1812, 450e6, 325, propagation.Region{MostKm: 20, LeastLatDeg: 47}, timeRequests[:1])
			cells := make([]float32, frame.Cols*frame.Rows)
			b.ReportAllocs()
			for b.Loop() {
				_, err := s.run(context.Background(), func() func(*Cell) {
					out := make([]propagation.Combined, 1)
					return func(c *Cell) {
						brief.Loss(&c.Outline, c, vertical, out)
						cells[c.Index] = float32(out[0].LossDB(0))
					}
				}, nil)
				if err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(len(cells))*0.785*float64(b.N)/b.Elapsed().Seconds(), "cells/s")
		})
	}
}

// fusedOutline finds the outline of a profile in two plain loops, one from each end: what a cell
// costs when nothing is shared.
func fusedOutline(p *propagation.Path, ae float64) propagation.Outline {
	last, d := len(p.DistKm)-1, p.LengthKm()
	hts, hrs := p.AslM[0]+p.TxAglM, p.AslM[last]+p.RxAglM
	o := propagation.Outline{LengthKm: d, TxGroundM: p.AslM[0], RxGroundM: p.AslM[last], Hts: hts, Hrs: hrs, Ae: ae}
	drop := 500 / ae
	q, ray := hrs-drop*d*d, (hrs-hts)/d
	o.Slopes = propagation.Slopes{Stim: math.Inf(-1), Str: ray, Srim: math.Inf(-1), Height: math.Inf(-1)}
	steep, back := math.Inf(-1), math.Inf(-1)
	for i := 1; i < last; i++ {
		at, h := p.DistKm[i], p.AslM[i]
		y := h - drop*at*at
		if s := (y - hts) / at; s > steep {
			steep, o.Dlt = s, at
		}
		if s := (y - q) / (d - at); s >= back {
			back, o.Dlr = s, d-at
		}
		clad := y + p.CoverM[i]
		o.Slopes.Stim = max(o.Slopes.Stim, (clad-hts)/at+drop*d)
		o.Slopes.Srim = max(o.Slopes.Srim, (clad-q)/(d-at)-drop*d)
		o.Slopes.Height = max(o.Slopes.Height, (clad-hts-(q-hts)/d*at)/math.Sqrt(at*(d-at)/d))
		over := h - hts - ray*at
		o.Hobs, o.AlphaT, o.AlphaR = max(o.Hobs, over), max(o.AlphaT, over/at), max(o.AlphaR, over/(d-at))
	}
	for i := 1; i <= last; i++ {
		o.V1, o.V2 = fitSums(o.V1, o.V2, p.DistKm[i-1], p.AslM[i-1], p.DistKm[i], p.AslM[i])
	}
	if o.TransHorizon = steep > (q-hts)/d; o.TransHorizon {
		o.ThetaT, o.ThetaR = propagation.ElevationMrad(steep), propagation.ElevationMrad(back-2*drop*d)
		return o
	}
	o.Dlt, o.Dlr = 0, 0
	o.ThetaT, o.ThetaR = propagation.ElevationMrad((q-hts)/d), propagation.ElevationMrad(-ray-drop*d)
	return o
}

// BenchmarkFused sets the sweep against the fused loops, cell for cell on one core: the same
// profiles, ready in memory, within 50 km. The loops do not know the level Earth or the roughness,
// which only few cells ask for; the cell answers for them.
func BenchmarkFused(b *testing.B) {
	disc, frame := made{cellM: 30, reach: 1700, height: rough, class: mixed}.lay(b)
	s, err := newSweep(Spec{RangeM: 50000, StepM: 30, AglM: 20, FarAglM: 1.5, ClearingM: 50, DeltaN: 45, LowestHz: 450e6, Workers: 1}, disc, frame)
	if err != nil {
		b.Fatal(err)
	}
	brief := propagation.NewBrief(propagation.P1812, 450e6, 325, propagation.Region{MostKm: 52, LeastLatDeg: 47}, timeRequests[:1])
	vertical, out := fixedShare(1), make([]propagation.Combined, 1)
	var fused time.Duration
	fusedCells, w := 0, newWalk(s)
	visit := func(every int) func() func(*Cell) {
		return func() func(*Cell) {
			return func(c *Cell) {
				if every > 0 && c.Index%every == 0 {
					p, lat, _ := w.statedProfile(c.Index)
					path := s.path(p, lat, 450e6, 1, 325)
					started := time.Now()
					o := fusedOutline(&path, s.ae)
					brief.Loss(&o, c, vertical, out)
					fused, fusedCells = fused+time.Since(started), fusedCells+1
					return
				}
				brief.Loss(&c.Outline, c, vertical, out)
			}
		}
	}
	if _, err := s.run(context.Background(), visit(20011), nil); err != nil {
		b.Fatal(err)
	}
	cells := 0
	for b.Loop() {
		count, err := s.run(context.Background(), visit(0), nil)
		if err != nil {
			b.Fatal(err)
		}
		cells += count.visited
	}
	sweepNs := float64(b.Elapsed().Nanoseconds()) / float64(cells)
	fusedNs := float64(fused.Nanoseconds()) / float64(fusedCells)
	b.ReportMetric(sweepNs, "ns/cell")
	b.ReportMetric(fusedNs, "fused-ns/cell")
	b.ReportMetric(fusedNs/sweepNs, "x-fused")
}

package coverage

import (
	"context"
	"testing"

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

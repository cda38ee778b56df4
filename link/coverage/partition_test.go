package coverage

import (
	"context"
	"math"
	"testing"
)

// Every cell within range belongs to one radial, and to one nearest in azimuth.
func TestPartition(t *testing.T) {
	disc, frame := made{cellM: 30, reach: 300, height: rough}.lay(t)
	for _, workers := range []int{1, 3} {
		s, err := newSweep(Spec{RangeM: 8000, StepM: 30, AglM: 20, FarAglM: 2, DeltaN: 45, LowestHz: 450e6, Workers: workers}, disc, frame)
		if err != nil {
			t.Fatal(err)
		}
		p, err := s.divide(context.Background())
		if err != nil {
			t.Fatal(err)
		}
		seen := make([]int, frame.Cols*frame.Rows)
		for radial := range s.radials {
			for _, cell := range p.cells[p.start[radial]:p.start[radial+1]] {
				seen[cell]++
				east, north := frame.Plane.At(float64(int(cell)%frame.Cols), float64(int(cell)/frame.Cols))
				off := math.Remainder(math.Atan2(east, north)-2*math.Pi*float64(radial)/float64(s.radials), 2*math.Pi)
				if math.Abs(off) > math.Pi/float64(s.radials)+2e-5 {
					t.Fatalf("cell %d is %.3g rad off radial %d", cell, off, radial)
				}
			}
		}
		for cell, count := range seen {
			east, north := frame.Plane.At(float64(cell%frame.Cols), float64(cell/frame.Cols))
			want := 0
			if east*east+north*north <= 8000*8000 {
				want = 1
			}
			if count != want {
				t.Fatalf("cell %d is listed %d times, want %d", cell, count, want)
			}
		}
	}
}

// Source: math.Atan2.
func TestAzimuth(t *testing.T) {
	for i := range 100_000 {
		want := 2 * math.Pi * float64(i) / 100_000
		got := azimuth(1000*math.Sin(want), 1000*math.Cos(want))
		if off := math.Remainder(got-want, 2*math.Pi); math.Abs(off) > 1.2e-5 || !(got >= 0 && got <= 2*math.Pi) {
			t.Fatalf("azimuth of %g rad is %g", want, got)
		}
	}
}

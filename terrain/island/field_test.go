package island

import (
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// ramp is a field that rises by steady steps; all the operations of fields keep such a surface,
// away from the frame (a quadratic B-spline and bilinear interpolation reproduce straight lines).
func ramp(cols, rows int, cellM, perCol, perRow int64) field {
	f := field{cols, rows, cellM, make([]int32, cols*rows)}
	for i := range f.v {
		f.v[i] = int32(int64(i%cols)*perCol + int64(i/cols)*perRow)
	}
	return f
}

func TestFieldsKeepRamps(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		perCol, perRow := rapid.Int64Range(-9000, 9000).Draw(t, "perCol")*4, rapid.Int64Range(-9000, 9000).Draw(t, "perRow")*4
		f := ramp(7, 6, 240, perCol, perRow)
		inside := func(g field, what string, want func(i int) int64) {
			for i, v := range g.v {
				if x, y := i%g.cols, i/g.cols; x > 0 && y > 0 && x < g.cols-1 && y < g.rows-1 && int64(v) != want(i) {
					t.Fatalf("%s: column %d row %d is %d, want %d", what, x, y, v, want(i))
				}
			}
		}
		inside(f.smooth(), "smooth", func(i int) int64 { return int64(f.v[i]) })
		// A fine cell's middle lies a quarter of a coarse cell beside the coarse one's.
		fine := f.finer()
		inside(fine, "finer", func(i int) int64 {
			return (int64(2*(i%fine.cols)-1)*perCol + int64(2*(i/fine.cols)-1)*perRow) / 4
		})
		x, y := rapid.Int64Range(120, 120+6*240).Draw(t, "x"), rapid.Int64Range(120, 120+5*240).Draw(t, "y")
		want := ((x-120)*perCol + (y-120)*perRow) / 240
		if got := int64(f.at(x, y)); got < want-1-max(abs(perCol), abs(perRow))/240 || got > want+1+max(abs(perCol), abs(perRow))/240 {
			t.Fatalf("at(%d, %d) = %d, want %d", x, y, got, want) // the last metre is cut off at the frame
		}
	})
}

func abs(v int64) int64 { return max(v, -v) }

func TestPlace(t *testing.T) {
	f := ramp(4, 3, 100, 0, 0)
	for _, tc := range []struct {
		i    int
		x, y int64
	}{{0, 50, 50}, {3, 350, 50}, {4, 50, 150}, {11, 350, 250}} {
		if x, y := f.place(tc.i); x != tc.x || y != tc.y {
			t.Errorf("place(%d) = %d, %d, want %d, %d", tc.i, x, y, tc.x, tc.y)
		}
	}
}

// The profile (1 - (d/r)^2)^2 is worked by hand; 1/1024 of the height is the arithmetic's grain.
func TestSwell(t *testing.T) {
	s := swell{1600, 1000, []point{{0, 0}, {2000, 0}, {2000, 3000}}}
	for _, tc := range []struct {
		p    point
		want int64
	}{
		{point{1000, 0}, 1600},
		{point{2000, 1500}, 1600},
		{point{1000, -500}, 900},
		{point{-500, 0}, 900},
		{point{2000, 3500}, 900},
		{point{1000, -1000}, 0},
		{point{9000, 9000}, 0},
	} {
		if got := s.at(tc.p); abs(got-tc.want) > 4 {
			t.Errorf("at(%v) = %d, want %d", tc.p, got, tc.want)
		}
		if got := sum([]swell{s, s}, tc.p); got != 2*s.at(tc.p) {
			t.Errorf("two swells at %v amount to %d, want twice %d", tc.p, got, s.at(tc.p))
		}
	}
}

// Gradient noise has mean 0 and is continuous: a metre changes it by no more than its steepest
// slope allows. With gradients of 128 in each direction, 2048 is beyond its reach.
func TestNoise(t *testing.T) {
	const wavelengthM, n = 600, 200
	for seed := range int64(8) {
		sum, largest := int64(0), int64(0)
		for i := range int64(n * n) {
			x, y := i%n*300, i/n*230
			v := noise(x, y, wavelengthM, seed)
			if d := abs(v - noise(x+1, y, wavelengthM, seed)); d > 25 {
				t.Fatalf("seed %d: noise jumps by %d within a metre at %d, %d", seed, d, x, y)
			}
			sum += v
			largest = max(largest, abs(v))
		}
		if mean := sum / (n * n); abs(mean) > 20 || largest < 700 || largest > 2048 {
			t.Errorf("seed %d: mean %d, largest %d; want about 0 and 700 to 2048", seed, mean, largest)
		}
	}
}

func TestEase(t *testing.T) {
	for t0, want := range map[int64]int64{0: 0, 512: 512, 1024: 1024} {
		if got := ease(t0); got != want {
			t.Errorf("ease(%d) = %d, want %d", t0, got, want)
		}
	}
	var steps []int64
	for i := range int64(1025) {
		steps = append(steps, ease(i))
	}
	for i := 1; i < len(steps); i++ {
		if steps[i] < steps[i-1]-1 { // the grain of the arithmetic
			t.Errorf("ease falls from %d to %d at %d", steps[i-1], steps[i], i)
		}
	}
	if slices.Max(steps) > 1024 {
		t.Errorf("ease reaches %d, want 1024", slices.Max(steps))
	}
}

package coverage

import (
	"context"
	"math"

	"golang.org/x/sync/errgroup"
)

// A partition gives every cell within range to the radial nearest in azimuth.
type partition struct {
	cells []int32 // radial after radial, within each in the order of the map
	start []int32 // the first of each radial, and the end
}

// stripes is the number of parts of the map that are gone through at once; it does not depend on
// the machine.
const stripes = 16

// divide makes the partition: it counts the cells of each radial, lays the lists out, and fills
// them.
func (s *sweep) divide(ctx context.Context) (partition, error) {
	counts := make([][]int32, stripes)
	err := s.eachStripe(ctx, func(stripe, from, to int) {
		count := make([]int32, s.radials)
		s.eachCell(from, to, func(_ int32, radial int) { count[radial]++ })
		counts[stripe] = count
	})
	if err != nil {
		return partition{}, err
	}
	p := partition{start: make([]int32, s.radials+1)}
	total := int32(0)
	for radial := range s.radials {
		p.start[radial] = total
		for _, count := range counts {
			count[radial], total = total, total+count[radial] // from now on: where the stripe's next goes
		}
	}
	p.start[s.radials] = total
	p.cells = make([]int32, total)
	err = s.eachStripe(ctx, func(stripe, from, to int) {
		next := counts[stripe]
		s.eachCell(from, to, func(cell int32, radial int) {
			p.cells[next[radial]] = cell
			next[radial]++
		})
	})
	return p, err
}

func (s *sweep) eachStripe(ctx context.Context, f func(stripe, fromRow, toRow int)) error {
	work, ctx := errgroup.WithContext(ctx)
	work.SetLimit(max(1, s.workers))
	for stripe := range stripes {
		work.Go(func() error {
			if ctx.Err() == nil {
				f(stripe, s.frame.Rows*stripe/stripes, s.frame.Rows*(stripe+1)/stripes)
			}
			return ctx.Err()
		})
	}
	return work.Wait()
}

// eachCell calls f for the cells within range of some rows, with their radials.
func (s *sweep) eachCell(fromRow, toRow int, f func(cell int32, radial int)) {
	limit := s.RangeM * s.RangeM
	for row := fromRow; row < toRow; row++ {
		for col := range s.frame.Cols {
			east, north := s.frame.Plane.At(float64(col), float64(row))
			if east*east+north*north > limit {
				continue
			}
			f(int32(row*s.frame.Cols+col), s.radialOf(east, north))
		}
	}
}

// radialOf is the radial nearest in azimuth to a position of the plane, to within 1e-5 rad: some
// hundredths of the angle between two radials.
func (s *sweep) radialOf(east, north float64) int {
	radial := int(azimuth(east, north)*s.perRadian + 0.5)
	if radial >= s.radials {
		return 0
	}
	return radial
}

// azimuth is atan2(east, north) in [0, 2 pi], to 1e-5: a polynomial in the lesser over the greater.
// Coefficients: a minimax fit, common practice, no source; the test compares it with math.Atan2.
func azimuth(east, north float64) float64 {
	e, n := math.Abs(east), math.Abs(north)
	x := min(e, n) / max(e, n)
	if e == n {
		x = 1
	}
	x2 := x * x
	az := x * (0.99997726 + x2*(-0.33262347+x2*(0.19354346+x2*(-0.11643287+x2*(0.05265332-x2*0.01172120)))))
	if e > n {
		az = math.Pi/2 - az
	}
	if north < 0 {
		az = math.Pi - az
	}
	if east < 0 {
		az = 2*math.Pi - az
	}
	return az
}

// A place is a cell of a radial: its centre on the plane, and how many interior points its profile
// has.
type place struct {
	index, interior int32
	east, north     float64
}

// A cellList puts the cells of a radial in the order of the walk.
type cellList struct {
	found, sorted []place
	next          []int32
}

// nearestM is the least distance that a cell is taken to have: one whose centre is the site has no
// path.
const nearestM = 1

// of returns the cells of a radial by the number of interior points of their profiles.
func (l *cellList) of(s *sweep, cells []int32) []place {
	l.found = l.found[:0]
	l.next = append(l.next[:0], make([]int32, s.points+2)...)
	for _, index := range cells {
		p := place{index: index}
		p.east, p.north = s.frame.Plane.At(float64(int(index)%s.frame.Cols), float64(int(index)/s.frame.Cols))
		distM := math.Hypot(p.east, p.north)
		if distM < nearestM {
			p.east, p.north, distM = 0, nearestM, nearestM
		}
		p.interior = int32(interiorPoints(distM, s.stepM))
		l.found = append(l.found, p)
		l.next[p.interior+1]++
	}
	for i := 1; i < len(l.next); i++ {
		l.next[i] += l.next[i-1]
	}
	l.sorted = append(l.sorted[:0], l.found...)
	for _, p := range l.found {
		l.sorted[l.next[p.interior]] = p
		l.next[p.interior]++
	}
	return l.sorted
}

// interiorPoints is how many interior points a profile of that length has: its whole steps, but for
// one that would leave less than half of another.
func interiorPoints(distM, stepM float64) int { return max(0, int(distM/stepM-0.5)) }

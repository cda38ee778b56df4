package terrain

import (
	"fmt"
	"math"

	"github.com/paulmach/orb"
)

// A VoidError says where the ground under a path, or at a place, is not known.
type VoidError struct {
	From, To orb.Point // first and last point without a height
	StartKm  float64   // distance along the path of the last known height before it
	LengthM  float64   // from there to the next known height, or to the path's end; 0 for a single place
	Outside  bool      // part of it lies outside all rasters, rather than in a hole of one
	AtEnd    bool      // it holds an end of the path, so that it cannot be bridged
}

func (e *VoidError) Error() string {
	where := "at " + FormatDecimal(e.From)
	if e.LengthM > 0 {
		where = fmt.Sprintf("for %.0f m of the path from %.2f km on (%s to %s)", e.LengthM, e.StartKm, FormatDecimal(e.From), FormatDecimal(e.To))
	}
	if e.Outside {
		return "the elevation rasters do not reach: no height " + where + ": list a raster that covers it, or state beyond: sea where that is open sea"
	}
	if e.AtEnd || e.LengthM == 0 {
		return "a void in the elevation rasters: no height " + where + ": list another raster that fills it"
	}
	return fmt.Sprintf(`a void in the elevation rasters: no height %s: list another raster that fills it, or state bridge_voids: "%.0f m" to cross it with a warning`,
		where, math.Ceil(e.LengthM-lengthSlackM))
}

// lengthSlackM is what rounding may add to the length of a void that is to be bridged.
const lengthSlackM = 1e-6

// MinHeightM and MaxHeightM enclose all dry land and lake beds: the shore of the Dead Sea lies
// near -430 m, the highest summit near 8849 m (from memory).
const (
	MinHeightM = -500
	MaxHeightM = 9000
)

// A HeightError is a value in an elevation raster that is no height on Earth.
type HeightError struct {
	At      orb.Point
	HeightM float64
	File    string
}

func (e *HeightError) Error() string {
	return fmt.Sprintf("%s holds %g m at %s, which is no height on Earth (%d to %d m): declare that value as the file's nodata value, or state the right unit, scale and offset in the file",
		e.File, e.HeightM, FormatDecimal(e.At), MinHeightM, MaxHeightM)
}

// Implausible returns the first cell value that contributes to [Grid.Bilinear] at a position and
// is no height on Earth; ok is true if there is none. Voids do not count.
func (g *Grid) Implausible(col, row float64) (heightM float64, ok bool) {
	if !Inside(g.Cols, g.Rows, col, row) {
		return 0, true
	}
	c0, c1, _ := neighbours(col, g.Cols)
	r0, r1, _ := neighbours(row, g.Rows)
	for _, h := range [...]float32{g.At(c0, r0), g.At(c1, r0), g.At(c0, r1), g.At(c1, r1)} {
		if h < MinHeightM || h > MaxHeightM {
			return float64(h), false
		}
	}
	return 0, true
}

// Bridge fills the voids (NaN) of the heights along a path linearly between the known heights on
// both sides, where these are at most bridgeM metres apart, and returns a note for each. A wider
// void, or one that holds an end of the path, is a [*VoidError]; the heights before it are then
// filled already.
//
// distKm holds the distances of the heights, increasing; points their places, or nil; outside,
// or nil, says which lie beyond all rasters.
func Bridge(distKm, aslM []float64, points []orb.Point, outside []bool, bridgeM float64) (notes []string, err error) {
	for first := 0; first < len(aslM); first++ {
		if !math.IsNaN(aslM[first]) {
			continue
		}
		next := first // the known height after the void, or the path's end
		for next < len(aslM) && math.IsNaN(aslM[next]) {
			next++
		}
		gap := newVoid(distKm, points, outside, first, next)
		if gap.AtEnd || !(gap.LengthM <= bridgeM+lengthSlackM) {
			return notes, gap
		}
		fill(distKm, aslM, first, next)
		notes = append(notes, fmt.Sprintf("bridged a void of %.0f m at %.1f km", gap.LengthM, gap.StartKm))
		first = next
	}
	return notes, nil
}

// newVoid describes the void of the points from first up to, not including, next.
func newVoid(distKm []float64, points []orb.Point, outside []bool, first, next int) *VoidError {
	before, after := max(first-1, 0), min(next, len(distKm)-1)
	gap := &VoidError{
		StartKm: distKm[before],
		LengthM: (distKm[after] - distKm[before]) * 1000,
		AtEnd:   first == 0 || next == len(distKm),
	}
	if points != nil {
		gap.From, gap.To = points[first], points[next-1]
	}
	for i := first; i < next && outside != nil; i++ {
		gap.Outside = gap.Outside || outside[i]
	}
	return gap
}

// fill draws a straight line over the void of the points from first up to, not including, next.
func fill(distKm, aslM []float64, first, next int) {
	from, to := first-1, next
	slope := (aslM[to] - aslM[from]) / (distKm[to] - distKm[from])
	for i := first; i < next; i++ {
		aslM[i] = aslM[from] + slope*(distKm[i]-distKm[from])
	}
}

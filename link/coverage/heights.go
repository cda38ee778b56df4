package coverage

import "math"

const (
	heightBlock = 16
	heightSuper = 128
)

// heightBlocks hold the largest heights of a radial by blocks, so that the largest height over a
// line is found without looking at every point.
type heightBlocks struct {
	heights []float64 // at multiples of stepKm
	blocks  []float64 // of heightBlock points each
	supers  []float64 // of heightSuper points each
	stepKm  float64
}

func (b *heightBlocks) build(heights []float64, stepKm float64) {
	b.heights, b.stepKm = heights, stepKm
	b.blocks = maxima(b.blocks[:0], heights, heightBlock)
	b.supers = maxima(b.supers[:0], heights, heightSuper)
}

// maxima appends the largest of each size heights.
func maxima(into, heights []float64, size int) []float64 {
	for from := 0; from < len(heights); from += size {
		most := math.Inf(-1)
		for _, h := range heights[from:min(from+size, len(heights))] {
			if h > most {
				most = h
			}
		}
		into = append(into, most)
	}
	return into
}

// A line runs at base + slope km above sea level.
type line struct{ base, slope float64 }

func (l line) at(km float64) float64 { return l.base + l.slope*km }

// highestOver returns the largest height of the points first to last over a line, if above least.
// A block cannot hold more than its highest point over the lowest part of the line.
func (b *heightBlocks) highestOver(l line, first, last int, least float64) float64 {
	for i := first; i <= last; {
		switch {
		case i%heightSuper == 0 && i+heightSuper-1 <= last && b.most(l, b.supers[i/heightSuper], i, heightSuper) <= least:
			i += heightSuper
		case i%heightBlock == 0 && i+heightBlock-1 <= last && b.most(l, b.blocks[i/heightBlock], i, heightBlock) <= least:
			i += heightBlock
		default:
			end := min(i|(heightBlock-1), last)
			for ; i <= end; i++ {
				if over := b.heights[i] - l.at(float64(i)*b.stepKm); over > least {
					least = over
				}
			}
		}
	}
	return least
}

// most bounds the height over the line of size points from i on, the highest of which is given.
func (b *heightBlocks) most(l line, highest float64, i, size int) float64 {
	from, to := l.at(float64(i)*b.stepKm), l.at(float64(i+size-1)*b.stepKm)
	return highest - min(from, to)
}

package raster

import (
	"context"
	"fmt"
	"math"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A Summary is what the cells of a raster hold.
type Summary struct {
	Cells       int64     `json:"cells"`
	Voids       int64     `json:"voids"`
	Implausible int64     `json:"implausible"` // cells whose value is no height on Earth
	MinM        float64   `json:"min_m"`       // least height among the others; 0 if there are none
	MaxM        float64   `json:"max_m"`
	MinAt       orb.Point `json:"min_at"`
	MaxAt       orb.Point `json:"max_at"`

	worst float64 // the first value that is no height
}

// VoidShare is the share of void cells, 0 to 1.
func (s Summary) VoidShare() float64 { return float64(s.Voids) / float64(s.Cells) }

// Inspect opens an elevation raster and goes through all its cells, some rows at a time, so that
// its size does not matter. It stops with the context's error when that is done; progress, if not
// nil, is told the share of the work done, 0 to 1.
func Inspect(ctx context.Context, path string, progress func(done float64)) (Info, error) {
	f, err := openFile(path, forInspection)
	if err != nil {
		return Info{}, err
	}
	defer f.close()
	summary, err := f.summarise(ctx, progress)
	if err != nil {
		return Info{}, err
	}
	f.info.Summary = summary
	f.info.Warnings = append(f.info.Warnings, f.warnings(summary)...)
	return f.info, nil
}

// summarise reads the file window by window.
func (f *file) summarise(ctx context.Context, progress func(done float64)) (*Summary, error) {
	in := &f.info
	width, height := f.window()
	s := newSurvey()
	for row := 0; row < in.Rows; row += height {
		for col := 0; col < in.Cols; col += width {
			if err := ctx.Err(); err != nil {
				return nil, fmt.Errorf("%s: stopped at row %d of %d: %w", in.Path, row, in.Rows, err)
			}
			grid, err := f.read(col, row, min(width, in.Cols-col), min(height, in.Rows-row))
			if err != nil {
				return nil, err
			}
			s.add(grid, col, row)
		}
		if progress != nil {
			progress(float64(min(row+height, in.Rows)) / float64(in.Rows))
		}
	}
	places, err := f.places([]orb.Point{s.minAt, s.maxAt}, 0.5, 0.5)
	if err != nil || math.IsInf(s.MinM, 1) {
		s.MinM, s.MaxM = 0, 0
		return &s.Summary, err
	}
	s.MinAt, s.MaxAt = places[0], places[1]
	return &s.Summary, nil
}

// windowCells is about how many cells are read at once, 12 bytes each.
const windowCells = 1 << 20

// window returns the size of the windows to read: whole blocks of the file, so that none is
// read twice, several where they are small.
func (f *file) window() (width, height int) {
	in := &f.info
	width = min(in.Cols, in.blockCols*max(1, windowCells/(in.blockCols*in.blockRows)))
	height = in.blockRows
	if width == in.Cols {
		height *= max(1, windowCells/(width*height))
	}
	return width, min(height, max(1, windowCells/width))
}

// A survey is a summary in the making: the extremes are places in the grid as yet.
type survey struct {
	Summary
	minAt, maxAt orb.Point // column and row
}

func newSurvey() *survey {
	return &survey{Summary: Summary{MinM: math.Inf(1), MaxM: math.Inf(-1)}}
}

// add counts a window whose first cell is at col, row of the raster.
func (s *survey) add(grid *terrain.Grid, col, row int) {
	s.Cells += int64(len(grid.Cells))
	for i, v := range grid.Cells {
		h := float64(v)
		switch {
		case math.IsNaN(h):
			s.Voids++
		case h < terrain.MinHeightM || h > terrain.MaxHeightM:
			if s.Implausible == 0 {
				s.worst = h
			}
			s.Implausible++
		default:
			at := orb.Point{float64(col + i%grid.Cols), float64(row + i/grid.Cols)}
			if h < s.MinM {
				s.MinM, s.minAt = h, at
			}
			if h > s.MaxM {
				s.MaxM, s.maxAt = h, at
			}
		}
	}
}

// warnings tells what in a file is likely to be wrong.
func (f *file) warnings(s *Summary) []string {
	var all []string
	if s.Implausible > 0 {
		declared := "the file declares no nodata value"
		if f.info.NoData != nil {
			declared = fmt.Sprintf("the declared nodata value is %g", *f.info.NoData)
		}
		all = append(all, fmt.Sprintf("%d cells hold values such as %g m, no height on Earth; %s", s.Implausible, s.worst, declared))
	}
	if s.Voids == s.Cells {
		all = append(all, "every cell is void")
	}
	return all
}

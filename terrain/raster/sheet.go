package raster

import "sync"

// The nearness of the sea is worked out in blocks of cells, and blocks are kept by the sheet.
const (
	// blockM is the greatest side of a block at the middle of the raster, unless one cell is
	// larger. Places are told apart no finer, so that the coast's 50 km are good to about a block's
	// diagonal, 0.7 km.
	blockM = 500

	// sheetBlocks is the side of a sheet in blocks: about 16 km.
	sheetBlocks = 32

	// maxSheets bounds the sheets that are kept of a kind, 1 KB each; beyond it the table starts
	// afresh. As many cover a million square kilometres.
	maxSheets = 4096
)

// A sheetKey names a sheet: its column and row, counted from the raster's first cell on; sheets
// outside the raster have keys too, below zero to the west and north of it.
type sheetKey struct{ col, row int }

// A blockSet marks blocks of a sheet, row by row.
type blockSet [sheetBlocks][sheetBlocks]bool

// A seaSheet holds, for each row of blocks, how many of its first blocks hold sea: one entry more
// than there are blocks.
type seaSheet [sheetBlocks][sheetBlocks + 1]uint8

func newSeaSheet(sea *blockSet) *seaSheet {
	var s seaSheet
	for row := range sea {
		for col, holds := range sea[row] {
			s[row][col+1] = s[row][col]
			if holds {
				s[row][col+1]++
			}
		}
	}
	return &s
}

// has says whether a row of blocks holds sea from one block to another, both included; they may
// lie beyond the sheet.
func (s *seaSheet) has(row, first, last int) bool {
	first, last = max(first, 0), min(last, sheetBlocks-1)
	return first <= last && s[row][last+1] > s[row][first]
}

// A sheetTable makes sheets on demand, each once, and keeps them. Many goroutines may use it.
type sheetTable[T any] struct {
	create func(sheetKey) (*T, error)

	mutex  sync.Mutex
	sheets map[sheetKey]func() (*T, error)
}

func newSheetTable[T any](create func(sheetKey) (*T, error)) *sheetTable[T] {
	return &sheetTable[T]{create: create, sheets: map[sheetKey]func() (*T, error){}}
}

// get returns a sheet. One that could not be made is forgotten, so that the next to ask tries
// again.
func (t *sheetTable[T]) get(key sheetKey) (*T, error) {
	sheet, err := t.find(key)()
	if err != nil {
		t.mutex.Lock()
		delete(t.sheets, key)
		t.mutex.Unlock()
	}
	return sheet, err
}

func (t *sheetTable[T]) find(key sheetKey) func() (*T, error) {
	t.mutex.Lock()
	defer t.mutex.Unlock()
	sheet := t.sheets[key]
	if sheet == nil {
		if len(t.sheets) >= maxSheets {
			clear(t.sheets)
		}
		sheet = sync.OnceValues(func() (*T, error) { return t.create(key) })
		t.sheets[key] = sheet
	}
	return sheet
}

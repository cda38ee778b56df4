package raster

import (
	"container/list"
	"math"
	"sync"

	"fellreach/terrain"
)

const (
	// tileCells is the side of a tile. Each holds one column and one row more, those of its
	// neighbours, so that a bilinear sample needs one tile alone.
	tileCells = 256
	tileBytes = (tileCells + 1) * (tileCells + 1) * 4

	// cacheBytes bounds the tiles that a [Ground] keeps in memory, of all its files together.
	cacheBytes = 512 << 20
)

// A tileKey names a tile: its file and its column and row among the file's tiles.
type tileKey struct {
	file     *file
	col, row int
}

// A tile is a square piece of a raster.
type tile struct {
	key   tileKey
	ready chan struct{} // closed when the rest is there
	grid  *terrain.Grid
	err   error
	check bool // some cell is no height on Earth
}

// A tileCache reads tiles on demand and keeps those used last. The lock is held to look a tile up,
// never to read one; two who ask for the same tile wait for one reading.
type tileCache struct {
	maxTiles int

	mutex sync.Mutex
	tiles map[tileKey]*list.Element // of *tile
	order *list.List                // the one used last at the front
}

func newTileCache(bytes int) *tileCache {
	return &tileCache{maxTiles: max(bytes/tileBytes, 1), tiles: map[tileKey]*list.Element{}, order: list.New()}
}

// get returns a tile, reading it if it is not there.
func (c *tileCache) get(key tileKey) (*tile, error) {
	t, isNew := c.find(key)
	if isNew {
		t.load()
		if t.err != nil {
			c.drop(t)
		}
		close(t.ready)
	}
	<-t.ready
	return t, t.err
}

// find looks a tile up, or makes an empty one and throws out the one unused for longest.
func (c *tileCache) find(key tileKey) (t *tile, isNew bool) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	if element, found := c.tiles[key]; found {
		c.order.MoveToFront(element)
		return element.Value.(*tile), false
	}
	t = &tile{key: key, ready: make(chan struct{})}
	c.tiles[key] = c.order.PushFront(t)
	if c.order.Len() > c.maxTiles {
		c.remove(c.order.Back())
	}
	return t, true
}

// drop forgets a tile that could not be read, so that the next to ask tries again.
func (c *tileCache) drop(t *tile) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	if element, found := c.tiles[t.key]; found && element.Value == t {
		c.remove(element)
	}
}

func (c *tileCache) remove(element *list.Element) {
	delete(c.tiles, element.Value.(*tile).key)
	c.order.Remove(element)
}

// load reads the tile's cells.
func (t *tile) load() {
	col, row := t.key.col*tileCells, t.key.row*tileCells
	in := &t.key.file.info
	t.grid, t.err = t.key.file.read(col, row, min(tileCells+1, in.Cols-col), min(tileCells+1, in.Rows-row))
	if t.err != nil {
		return
	}
	for _, v := range t.grid.Cells {
		t.check = t.check || v < terrain.MinHeightM || v > terrain.MaxHeightM
	}
}

// A sampler reads values of one file for one goroutine. It holds the last tile, so that the
// cache is asked once for a stretch of neighbouring places.
type sampler struct {
	cache *tileCache
	file  *file
	last  *tile
}

// at returns the tile that holds all cells around a position inside the file, and the position
// within it.
func (s *sampler) at(col, row float64) (t *tile, tileCol, tileRow float64, err error) {
	in := &s.file.info
	col, row = min(max(col, 0), float64(in.Cols-1)), min(max(row, 0), float64(in.Rows-1))
	key := tileKey{s.file, int(col) / tileCells, int(row) / tileCells}
	if s.last == nil || s.last.key != key {
		if s.last, err = s.cache.get(key); err != nil {
			s.last = nil
			return nil, 0, 0, err
		}
	}
	return s.last, col - float64(key.col*tileCells), row - float64(key.row*tileCells), nil
}

// height returns the bilinear height at a position inside the file, NaN for a void. ok is false
// where a cell around it is no height on Earth; it is then what is returned.
func (s *sampler) height(col, row float64) (aslM float64, ok bool, err error) {
	t, col, row, err := s.at(col, row)
	if err != nil {
		return math.NaN(), true, err
	}
	if t.check {
		if bad, ok := t.grid.Implausible(col, row); !ok {
			return bad, false, nil
		}
	}
	return t.grid.Bilinear(col, row), true, nil
}

// class returns the class of the cell at a position inside the file; known is false for a void.
func (s *sampler) class(col, row float64) (class int, known bool, err error) {
	t, col, row, err := s.at(col, row)
	if err != nil {
		return 0, false, err
	}
	v := t.grid.Nearest(col, row)
	return int(v), !math.IsNaN(v), nil
}

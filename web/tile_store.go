package web

import (
	"bytes"
	"container/list"
	"net/http"
	"sync"
	"time"
)

// tileStoreBytes bounds the tiles that are kept in memory.
const tileStoreBytes = 64 << 20

// A tileStore keeps the tiles asked last. Tiles never change, so they are never too old.
type tileStore struct {
	most int // bytes

	mutex sync.Mutex
	bytes int
	order *list.List // of storedTile, the one asked last at the front
	tiles map[tileAddress]*list.Element
}

type storedTile struct {
	address tileAddress
	png     []byte
}

func newTileStore(bytes int) *tileStore {
	return &tileStore{most: bytes, order: list.New(), tiles: map[tileAddress]*list.Element{}}
}

// get returns a tile, drawing it where it is not kept. Two who ask for it at once may both draw it.
func (s *tileStore) get(a tileAddress, draw func() ([]byte, error)) ([]byte, error) {
	if tile := s.find(a); tile != nil {
		return tile, nil
	}
	tile, err := draw()
	if err == nil {
		s.put(a, tile)
	}
	return tile, err
}

func (s *tileStore) find(a tileAddress) []byte {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	e := s.tiles[a]
	if e == nil {
		return nil
	}
	s.order.MoveToFront(e)
	return e.Value.(storedTile).png
}

func (s *tileStore) put(a tileAddress, tile []byte) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	if s.tiles[a] != nil {
		return
	}
	s.tiles[a] = s.order.PushFront(storedTile{a, tile})
	s.bytes += len(tile)
	for s.bytes > s.most {
		last := s.order.Remove(s.order.Back()).(storedTile)
		delete(s.tiles, last.address)
		s.bytes -= len(last.png)
	}
}

// serveBytes answers with bytes in memory, or that the client has them already.
func serveBytes(w http.ResponseWriter, r *http.Request, data []byte) {
	http.ServeContent(w, r, "", time.Time{}, bytes.NewReader(data))
}

package web

const tileStoreBytes = 64 << 20

type tileStore struct{}

func newTileStore(int) *tileStore { return &tileStore{} }

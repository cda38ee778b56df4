package wire

import "sync"

// A memo makes a value for each key once, and remembers it. It is safe for concurrent use: whoever
// asks for a value that is being made waits for it.
type memo[K comparable, V any] struct {
	mu      sync.Mutex
	entries map[K]func() (V, error)
}

func (m *memo[K, V]) get(key K, make func() (V, error)) (V, error) {
	m.mu.Lock()
	if m.entries == nil {
		m.entries = map[K]func() (V, error){}
	}
	entry, ok := m.entries[key]
	if !ok {
		entry = sync.OnceValues(make)
		m.entries[key] = entry
	}
	m.mu.Unlock()
	return entry()
}

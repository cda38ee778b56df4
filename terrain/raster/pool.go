package raster

// maxLent is how many of a pool's objects there may be; more borrowers wait.
const maxLent = 8

// A pool lends objects of the C libraries, each of which serves one goroutine at a time. It makes
// them as they are needed.
type pool[T any] struct {
	create func() (T, error)
	idle   chan T        // those that nobody uses
	free   chan struct{} // one for each that may yet be made
}

func newPool[T any](create func() (T, error)) *pool[T] {
	p := &pool[T]{create, make(chan T, maxLent), make(chan struct{}, maxLent)}
	for range maxLent {
		p.free <- struct{}{}
	}
	return p
}

// with lends an object to f.
func (p *pool[T]) with(f func(T) error) error {
	object, err := p.take()
	if err != nil {
		return err
	}
	defer func() { p.idle <- object }()
	return f(object)
}

func (p *pool[T]) take() (object T, err error) {
	select { // rather an idle one than a new one
	case object = <-p.idle:
		return object, nil
	default:
	}
	select {
	case object = <-p.idle:
		return object, nil
	case <-p.free:
	}
	if object, err = p.create(); err != nil {
		p.free <- struct{}{}
	}
	return object, err
}

// drain hands all idle objects to dispose. None may be lent any more.
func (p *pool[T]) drain(dispose func(T)) {
	for {
		select {
		case object := <-p.idle:
			dispose(object)
		default:
			return
		}
	}
}

package wire

import (
	"runtime"
	"sync"
	"sync/atomic"
)

// parallel calls do for 0 to n-1 on all cores, each once, in no fixed order. Whatever do writes
// must belong to its index alone, so that results do not depend on the number of cores.
func parallel(n int, do func(i int)) {
	workers := min(n, runtime.GOMAXPROCS(0))
	if workers <= 1 {
		for i := range n {
			do(i)
		}
		return
	}
	var next atomic.Int64
	var group sync.WaitGroup
	for range workers {
		group.Go(func() {
			for i := int(next.Add(1)) - 1; i < n; i = int(next.Add(1)) - 1 {
				do(i)
			}
		})
	}
	group.Wait()
}

package engine

import (
	"context"
	"sync"
)

// each runs work for 0 to n-1 on the engine's workers and returns when all
// are done, or the context's error; what has not begun by then is left out.
// Work must not call each: it holds a slot.
func (e *Engine) each(ctx context.Context, n int, work func(i int)) error {
	var group sync.WaitGroup
	next := make(chan int)
	for range min(n, e.options.Workers) {
		group.Go(func() {
			for i := range next {
				select {
				case e.slots <- struct{}{}:
					work(i)
					<-e.slots
				case <-ctx.Done():
				}
			}
		})
	}
	for i := 0; i < n && ctx.Err() == nil; i++ {
		select {
		case next <- i:
		case <-ctx.Done():
		}
	}
	close(next)
	group.Wait()
	return ctx.Err()
}

// shielded runs code that is not ours to trust, and returns what it panicked
// with.
func shielded(do func()) (cause any) {
	defer func() { cause = recover() }()
	do()
	return nil
}

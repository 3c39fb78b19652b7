package optimize

import (
	"context"
	"fmt"
	"runtime/debug"
	"sync"
	"sync/atomic"
)

// guard carries the first panic of other goroutines to the goroutine that waits for them.
type guard struct {
	tripped atomic.Bool
	once    sync.Once
	text    string
}

// do calls f and keeps its panic.
func (g *guard) do(f func()) {
	defer func() {
		if v := recover(); v != nil {
			g.once.Do(func() { g.text = fmt.Sprintf("%v\n\nin a callback of optimize.Minimize:\n%s", v, debug.Stack()) })
			g.tripped.Store(true)
		}
	}()
	f()
}

// rethrow panics with what was kept, if anything. Call it when the guarded goroutines have ended.
func (g *guard) rethrow() {
	if g.tripped.Load() {
		panic(g.text)
	}
}

// each calls f(0) ... f(n-1) from up to the given number of goroutines, each index once, and waits. When ctx ends it
// starts no further call and returns ctx.Err.
func each(ctx context.Context, workers, n int, f func(i int)) error {
	if workers = min(workers, n); workers <= 1 {
		for i := 0; i < n && ctx.Err() == nil; i++ {
			f(i)
		}
		return ctx.Err()
	}
	var (
		next   atomic.Int64
		wait   sync.WaitGroup
		caught guard
	)
	work := func() {
		for ctx.Err() == nil && !caught.tripped.Load() {
			i := int(next.Add(1)) - 1
			if i >= n {
				return
			}
			f(i)
		}
	}
	for range workers {
		wait.Go(func() { caught.do(work) })
	}
	wait.Wait()
	caught.rethrow()
	return ctx.Err()
}

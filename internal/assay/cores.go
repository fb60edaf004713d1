package assay

import (
	"context"
	"runtime"
	"sync"
)

// onAllCores calls do with each number below n once, on all cores, and progress
// after each, one call at a time. It stops at the first error, of do or of ctx.
func onAllCores(ctx context.Context, n int, progress func(done int), do func(ctx context.Context, i int) error) error {
	ctx, cancel := context.WithCancelCause(ctx)
	defer cancel(nil)
	var (
		mu         sync.Mutex
		next, done int
		wait       sync.WaitGroup
	)
	take := func() (int, bool) {
		mu.Lock()
		defer mu.Unlock()
		next++
		return next - 1, next <= n && ctx.Err() == nil
	}
	for range min(n, runtime.GOMAXPROCS(0)) {
		wait.Go(func() {
			for i, ok := take(); ok; i, ok = take() {
				if err := do(ctx, i); err != nil {
					cancel(err)
					return
				}
				mu.Lock()
				done++
				if progress != nil {
					progress(done)
				}
				mu.Unlock()
			}
		})
	}
	wait.Wait()
	return context.Cause(ctx)
}

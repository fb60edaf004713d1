package main

import (
	"context"
	"iter"
	"runtime"
)

// inOrder works on items on all cores and passes each result to emit in the order
// of the items, as soon as it is there. It reads a few items ahead, no more, and
// stops at the first error, of items, work, emit or ctx.
func inOrder[T, R any](ctx context.Context, items iter.Seq2[T, error], work func(context.Context, T) (R, error), emit func(R) error) error {
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	type result struct {
		value R
		err   error
	}
	workers := runtime.GOMAXPROCS(0)
	free := make(chan struct{}, workers)
	queue := make(chan chan result, 4*workers)
	go func() {
		defer close(queue)
		for item, err := range items {
			done := make(chan result, 1)
			select {
			case queue <- done:
			case <-ctx.Done():
				return
			}
			if err != nil {
				done <- result{err: err}
				return
			}
			select {
			case free <- struct{}{}:
			case <-ctx.Done():
				return
			}
			go func() {
				value, err := work(ctx, item)
				done <- result{value, err}
				<-free
			}()
		}
	}()
	for done := range queue {
		select {
		case r := <-done:
			if r.err != nil {
				return r.err
			}
			if err := emit(r.value); err != nil {
				return err
			}
		case <-ctx.Done():
			return ctx.Err()
		}
	}
	return ctx.Err()
}

// withoutError makes items that cannot fail fit for inOrder.
func withoutError[T any](items []T) iter.Seq2[T, error] {
	return func(yield func(T, error) bool) {
		for _, item := range items {
			if !yield(item, nil) {
				return
			}
		}
	}
}

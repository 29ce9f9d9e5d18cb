package study

import (
	"context"
	"sync"
)

// InOrder draws pieces of work one after another, does them on several workers
// and hands on what they give in the order that they were drawn in. At most
// ahead pieces a worker are under way or wait to be handed on, so that memory
// does not grow with their number. next and emit are each called by one
// goroutine at a time; next says false at the end. The first error of next, of
// the work, or of emit, in that order of the pieces, ends it, as does the end of
// the context.
func InOrder[T, U any](ctx context.Context, workers int, next func() (T, bool, error), worker func() func(T) (U, error), emit func(U) error) error {
	ctx, stop := context.WithCancel(ctx)
	type slot struct {
		in   T
		out  U
		err  error
		done chan struct{}
	}
	workers = max(1, workers)
	queue, jobs := make(chan *slot, ahead*workers), make(chan *slot)
	var all sync.WaitGroup
	defer all.Wait()
	defer stop()
	all.Go(func() {
		defer close(queue)
		defer close(jobs)
		for {
			in, ok, err := next()
			if !ok && err == nil {
				return
			}
			s := &slot{in: in, err: err, done: make(chan struct{})}
			select {
			case queue <- s:
			case <-ctx.Done():
				return
			}
			if err != nil {
				close(s.done)
				return
			}
			select {
			case jobs <- s:
			case <-ctx.Done():
				return
			}
		}
	})
	for range workers {
		all.Go(func() {
			do := worker()
			for s := range jobs {
				s.out, s.err = do(s.in)
				close(s.done)
			}
		})
	}
	for s := range queue {
		select {
		case <-s.done:
		case <-ctx.Done():
			return ctx.Err()
		}
		if s.err != nil {
			return s.err
		}
		if err := emit(s.out); err != nil {
			return err
		}
	}
	return ctx.Err()
}

// ahead is how many pieces of work a worker may be ahead of what is handed on.
const ahead = 4

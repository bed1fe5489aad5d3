package blocks

import (
	"context"
	"runtime"
	"sync"
	"sync/atomic"
)

// Workers returns the number of goroutines that stands for n: itself, or what the
// machine runs at once if n < 1.
func Workers(n int) int {
	if n < 1 {
		return runtime.GOMAXPROCS(0)
	}
	return n
}

// Run calls do for every block of [0, count), each once, on at most workers
// goroutines, the calling one among them; worker is below workers and tells them
// apart. Blocks start in order. One worker needs no goroutine and allocates nothing.
//
// ctx is looked at before every block. Run returns when all goroutines have ended,
// with ctx.Err() if blocks were left out.
func Run(ctx context.Context, workers, count int, do func(worker, block int)) error {
	if workers = min(workers, count); workers <= 1 {
		for block := range count {
			if err := ctx.Err(); err != nil {
				return err
			}
			do(0, block)
		}
		return nil
	}
	return share(ctx, workers, count, do)
}

// share is Run with more than one goroutine.
func share(ctx context.Context, workers, count int, do func(worker, block int)) error {
	var next, done atomic.Int64
	work := func(worker int) {
		for ctx.Err() == nil {
			block := int(next.Add(1)) - 1
			if block >= count {
				return
			}
			do(worker, block)
			done.Add(1)
		}
	}
	var others sync.WaitGroup
	for worker := 1; worker < workers; worker++ {
		others.Go(func() { work(worker) })
	}
	work(0)
	others.Wait()
	if int(done.Load()) < count {
		return ctx.Err()
	}
	return nil
}

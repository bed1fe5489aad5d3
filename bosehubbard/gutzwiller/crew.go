package gutzwiller

import (
	"context"
	"sync/atomic"
)

// crew is a set of goroutines that share the blocks of one pass after another.
// It allocates when it starts and never again.
type crew struct {
	job    func(worker, block int)
	count  int
	next   atomic.Int64
	done   atomic.Int64
	ctx    context.Context
	start  []chan struct{} // of the others, by worker-1
	finish chan struct{}
}

// newCrew starts workers-1 goroutines that wait for work until stop.
func newCrew(workers int) *crew {
	c := &crew{finish: make(chan struct{}, workers)}
	for worker := 1; worker < workers; worker++ {
		start := make(chan struct{}, 1)
		c.start = append(c.start, start)
		go func() {
			for range start {
				c.work(worker)
				c.finish <- struct{}{}
			}
			c.finish <- struct{}{}
		}()
	}
	return c
}

// stop ends the goroutines and waits for them.
func (c *crew) stop() {
	for _, start := range c.start {
		close(start)
	}
	for range c.start {
		<-c.finish
	}
}

// run does job for every block of [0, count), each once, and waits. ctx is looked
// at before every block; it returns ctx.Err() if blocks were left out.
func (c *crew) run(ctx context.Context, count int, job func(worker, block int)) error {
	c.ctx, c.job, c.count = ctx, job, count
	c.next.Store(0)
	c.done.Store(0)
	helpers := min(len(c.start), count-1)
	for _, start := range c.start[:helpers] {
		start <- struct{}{}
	}
	c.work(0)
	for range helpers {
		<-c.finish
	}
	if int(c.done.Load()) < count {
		return ctx.Err()
	}
	return nil
}

func (c *crew) work(worker int) {
	for c.ctx.Err() == nil {
		block := int(c.next.Add(1)) - 1
		if block >= c.count {
			return
		}
		c.job(worker, block)
		c.done.Add(1)
	}
}

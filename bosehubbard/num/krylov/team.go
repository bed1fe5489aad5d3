package krylov

import (
	"sync"
	"sync/atomic"
)

// blockLength is the number of components in one block of the vector sums. It is
// fixed, so that sums are the same for any number of workers; two parts of three
// vectors of it fit the first cache.
const blockLength = 1024

// job is work on numbered blocks that do not depend on each other.
type job interface{ block(number int) }

// team is a fixed set of goroutines that share the blocks of one job after
// another. A team of one has none and works on the caller's.
type team struct {
	helpers int
	start   chan struct{}
	done    sync.WaitGroup // of the job
	gone    sync.WaitGroup // of the goroutines

	job  job
	next atomic.Int64
	end  int64
}

func newTeam(workers int) *team {
	t := &team{helpers: max(workers, 1) - 1}
	if t.helpers == 0 {
		return t
	}
	t.start = make(chan struct{})
	t.gone.Add(t.helpers)
	for range t.helpers {
		go func() {
			defer t.gone.Done()
			for range t.start {
				t.work()
				t.done.Done()
			}
		}()
	}
	return t
}

// run does the blocks from first to end-1 of a job and returns when they are done.
func (t *team) run(j job, first, end int) {
	if t.helpers == 0 || end-first < 4 { // waking a helper takes as long as a few blocks
		for b := first; b < end; b++ {
			j.block(b)
		}
		return
	}
	t.job, t.end = j, int64(end)
	t.next.Store(int64(first))
	t.done.Add(t.helpers)
	for range t.helpers {
		t.start <- struct{}{}
	}
	t.work()
	t.done.Wait()
}

func (t *team) work() {
	for b := t.next.Add(1) - 1; b < t.end; b = t.next.Add(1) - 1 {
		t.job.block(int(b))
	}
}

// close ends the goroutines and waits for them.
func (t *team) close() {
	if t.start != nil {
		close(t.start)
		t.gone.Wait()
		t.start = nil
	}
	t.helpers = 0
}

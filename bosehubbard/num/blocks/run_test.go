package blocks

import (
	"context"
	"errors"
	"runtime"
	"sync/atomic"
	"testing"
	"time"
)

// Every block is done once, by a worker in range, for any numbers of both.
func TestRunDoesEveryBlockOnce(t *testing.T) {
	for _, workers := range []int{-1, 0, 1, 2, 3, 8} {
		for _, count := range []int{0, 1, 2, 7, 1000} {
			calls := make([]atomic.Int32, count)
			err := Run(context.Background(), workers, count, func(worker, block int) {
				if worker < 0 || worker > 0 && worker >= workers {
					t.Errorf("worker %d of %d", worker, workers)
				}
				calls[block].Add(1)
			})
			if err != nil {
				t.Errorf("%d workers, %d blocks: %v", workers, count, err)
			}
			for block := range calls {
				if n := calls[block].Load(); n != 1 {
					t.Errorf("%d workers: block %d of %d done %d times", workers, block, count, n)
				}
			}
		}
	}
}

func TestRunStops(t *testing.T) {
	for _, workers := range []int{1, 3} {
		ctx, cancel := context.WithCancel(context.Background())
		var calls atomic.Int32
		err := Run(ctx, workers, 1000, func(_, _ int) {
			if calls.Add(1) == 5 {
				cancel()
			}
		})
		if n := calls.Load(); !errors.Is(err, context.Canceled) || n < 5 || n > 8 {
			t.Errorf("%d workers: %v after %d blocks, want context.Canceled soon after 5", workers, err, n)
		}
	}
}

// A stop that comes in the last block leaves nothing undone.
func TestRunStoppedAtTheEndIsDone(t *testing.T) {
	for _, workers := range []int{1, 3} {
		ctx, cancel := context.WithCancel(context.Background())
		var calls atomic.Int32
		err := Run(ctx, workers, 10, func(_, _ int) {
			if calls.Add(1) == 10 {
				cancel()
			}
		})
		if err != nil {
			t.Errorf("%d workers: %v, want nil", workers, err)
		}
	}
}

func TestRunLeavesNoGoroutine(t *testing.T) {
	before := runtime.NumGoroutine()
	for range 100 {
		if err := Run(context.Background(), 8, 16, func(_, _ int) {}); err != nil {
			t.Fatal(err)
		}
	}
	// A goroutine that has said it is done may take a moment to end.
	for deadline := time.Now().Add(2 * time.Second); runtime.NumGoroutine() > before && time.Now().Before(deadline); {
		time.Sleep(time.Millisecond)
	}
	if after := runtime.NumGoroutine(); after > before {
		t.Errorf("%d goroutines, %d before", after, before)
	}
}

func TestRunWithOneWorkerAllocatesNothing(t *testing.T) {
	sum := 0
	do := func(_, block int) { sum += block }
	if n := testing.AllocsPerRun(20, func() { _ = Run(context.Background(), 1, 10, do) }); n != 0 {
		t.Errorf("%g allocations, want 0", n)
	}
}

func TestWorkers(t *testing.T) {
	if Workers(0) != runtime.GOMAXPROCS(0) || Workers(-2) != runtime.GOMAXPROCS(0) || Workers(3) != 3 {
		t.Errorf("Workers(0), (-2), (3) = %d, %d, %d", Workers(0), Workers(-2), Workers(3))
	}
}

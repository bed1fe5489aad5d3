package gutzwiller

import (
	"runtime"
	"time"
)

// task is one stage of a step for one block.
type task struct{ stage, block int }

// schedule is the order of the tasks of a step. Stages come in groups; within a group
// a stage follows the one before it by a lag of some blocks, so that a block is still
// in the cache when its next stage comes: what is not in the cache costs more than
// the arithmetic.
type schedule struct {
	tasks []task
	reach int  // blocks to either side that hold neighbours of a block
	ring  bool // the first block may be a neighbour of the last
}

// cacheBytes is what a group of stages may need of the cache that the processors
// share.
const cacheBytes = 8 << 20

// newSchedule orders the tasks of a step on a grid; blockBytes is the memory that a
// block needs.
func newSchedule(g *Grid, stages, blockBytes int) schedule {
	count := g.padded / width
	direct, around := g.reach()
	s := schedule{reach: direct}
	lag := direct + 2
	group := min(stages, max(1, cacheBytes/(lag*blockBytes)))
	if lag >= count { // small, or closed along the slowest axis
		group, s.reach, s.ring = 1, around, true
	}
	for first := 0; first < stages; first += group {
		last := min(first+group, stages)
		for front := range count + (last-first-1)*lag {
			for stage := first; stage < last; stage++ {
				if block := front - (stage-first)*lag; block >= 0 && block < count {
					s.tasks = append(s.tasks, task{stage, block})
				}
			}
		}
	}
	return s
}

// reach returns how many blocks away the neighbours of a block are at most, straight
// on and on a ring of blocks.
func (g *Grid) reach() (direct, around int) {
	count := g.padded / width
	for _, s := range g.sides {
		straight := (max(s.offset, -s.offset) + width - 1) / width // also what values copies
		direct, around = max(direct, straight), max(around, min(straight, count-1))
		for block := range count {
			for _, to := range s.to[s.first[block]:s.first[block+1]] {
				if int(to) == g.padded {
					continue
				}
				d := int(to)/width - block
				d = max(d, -d)
				direct, around = max(direct, d), max(around, min(d, count-d))
			}
		}
	}
	return direct, around
}

// task runs one task of a step when those that it needs are done: the stage before,
// of all blocks with neighbours, which also no longer read what this one writes.
func (e *Engine) task(worker, index int) {
	t := e.order.tasks[index]
	count := len(e.reached)
	for d := -e.order.reach; t.stage > 0 && d <= e.order.reach; d++ {
		near := t.block + d
		if e.order.ring {
			near = (near + count) % count
		}
		if near >= 0 && near < count && !e.await(near, t.stage) {
			return
		}
	}
	e.pass(worker, t.stage, t.block)
	e.reached[t.block].Store(int32(t.stage + 1))
}

// await waits until a block has done so many stages; it returns false if the run was
// stopped. Tasks start in order, so somebody is at work on what is missing: for some
// microseconds, or longer if the system has taken the processor away from him.
func (e *Engine) await(block, stages int) bool {
	for tries := 0; int(e.reached[block].Load()) < stages; tries++ {
		if e.ctx.Err() != nil {
			return false
		}
		if tries < 20 {
			runtime.Gosched()
		} else {
			time.Sleep(20 * time.Microsecond)
		}
	}
	return true
}

package gutzwiller

import (
	"context"
	"fmt"
	"math"
	"slices"
	"sync/atomic"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/num/blocks"
)

// Options of an Engine. The zero value works.
type Options struct {
	Tolerance float64 // of the amplitudes of every site, per step, from 1e-14; 0: 1e-8

	// TopLimit is the largest probability that a site may have in its last level
	// before the cut-off is called too small; 0: 1e-4; 1: no limit.
	TopLimit float64

	// PlainStep > 0 asks for the classical Runge-Kutta method with this fixed step,
	// s, on the equations as they stand: no error control, no correction of the
	// norm. It is there to be compared with.
	PlainStep float64

	Workers     int    // goroutines; 0: one per processor. The result is the same for any number
	MemoryBytes uint64 // memory that may be used; 0: what the machine has available

	// Progress, if not nil, is called on the computing goroutine with the time done
	// in thousandths of the run; done never falls.
	Progress func(done, total int)
}

// checked fills in the defaults.
func (o Options) checked() (Options, error) {
	if o.Tolerance == 0 {
		o.Tolerance = 1e-8
	}
	if o.TopLimit == 0 {
		o.TopLimit = 1e-4
	}
	if o.MemoryBytes == 0 {
		o.MemoryBytes = fock.AvailableMemory()
	}
	o.Workers = blocks.Workers(o.Workers)
	switch {
	case !(o.Tolerance >= 1e-14 && o.Tolerance <= 0.1):
		return o, fmt.Errorf("gutzwiller: tolerance %g, want 1e-14 to 0.1", o.Tolerance)
	case !(o.TopLimit > 0 && o.TopLimit <= 1):
		return o, fmt.Errorf("gutzwiller: limit %g of the last level, want above 0 to 1", o.TopLimit)
	case !(o.PlainStep >= 0) || math.IsInf(o.PlainStep, 1):
		return o, fmt.Errorf("gutzwiller: step %g s, want at least 0", o.PlainStep)
	}
	return o, nil
}

// Engine follows states of one system in time. It owns all scratch: a step
// allocates nothing. One run at a time.
type Engine struct {
	system  *System
	options Options
	method  *tableau
	rows    []weights // of the stages, then of the sum
	fifth   weights
	third   weights
	sampler *sampler

	next   []float64   // the amplitudes of the next stage, then of the next step
	k      [][]float64 // rates, by slot
	phi    [2]wave     // <b> of the stages in turn; that of the state comes first
	turn   wave        // exp(-i theta_V) of the stage that is known
	shapes [][]float64 // padded
	large  []float64   // the largest |value| of every shape

	stages  []stage
	final   []factor // exp(-i theta_U n(n-1)/2) at the end of the step, by n
	plain   []factor // sqrt(n+1)
	order   schedule
	reached []atomic.Int32 // by block: stages done in this step
	tallies []tally        // by block
	scratch []scratch      // by worker

	// What the pass that runs now works on.
	state  *State
	step   float64 // s
	ctx    context.Context
	known  bool    // the rate of the first stage is left from a rejected step
	turned float64 // share of the interaction that the frame turns with
	jobs   struct{ begin, task, correct func(worker, block int) }
	scale  float64 // of the correction of the number of atoms

	proposed float64 // step for the next run, s; 0: none yet
}

// weights are the entries of one row of a tableau that are not zero.
type weights struct {
	c      []float64
	stages []int
}

// wave is one complex number per site, padded, and a 0 at the end.
type wave struct{ re, im []float64 }

func newWave(padded int) wave {
	return wave{make([]float64, padded+1), make([]float64, padded+1)}
}

// block returns the lanes of one block.
func (w wave) block(b int) (re, im *lane) {
	return (*lane)(w.re[b*width:]), (*lane)(w.im[b*width:])
}

// scratch is what one worker needs for a block.
type scratch struct {
	psiRe, psiIm, powerRe, powerIm, a, b lane
	sides                                [6]lane
	block                                []float64
	picked                               [12][]float64
	scaled                               [12]float64
}

// NewEngine allocates what runs on a system need: some 12 states.
//
// It returns an error if an option makes no sense or the memory is too small.
func NewEngine(s *System, opt Options) (*Engine, error) {
	opt, err := opt.checked()
	if err != nil {
		return nil, err
	}
	e := &Engine{system: s, options: opt, method: &dop853}
	if opt.PlainStep > 0 {
		e.method = &classical
	}
	slots := slices.Max(e.method.slots) + 1
	size := s.Grid.padded * 2 * s.Levels
	if bytes := 8 * (float64(size)*float64(slots+1) + 10*float64(s.Grid.padded)); bytes > float64(opt.MemoryBytes) {
		return nil, fmt.Errorf("gutzwiller: %d sites of %d levels need %.3g bytes, %d are available",
			s.Grid.Sites, s.Levels, bytes, opt.MemoryBytes)
	}
	e.next = make([]float64, size)
	for range slots {
		e.k = append(e.k, make([]float64, size))
	}
	e.phi = [2]wave{newWave(s.Grid.padded), newWave(s.Grid.padded)}
	e.turn = newWave(s.Grid.padded)
	e.order = newSchedule(s.Grid, len(e.method.nodes), (slots+2)*2*width*8*s.Levels)
	e.reached = make([]atomic.Int32, s.Grid.padded/width)
	e.tallies = make([]tally, s.Grid.padded/width)
	e.scratch = make([]scratch, opt.Workers)
	for i := range e.scratch {
		e.scratch[i].block = make([]float64, 2*width*s.Levels)
	}
	e.prepareMethod()
	e.prepareShapes()
	e.jobs.begin, e.jobs.task, e.jobs.correct = e.begin, e.task, e.correct
	return e, nil
}

// prepareMethod unpacks the tableau and makes room for the terms of its stages.
func (e *Engine) prepareMethod() {
	levels, shapes := e.system.Levels, len(e.system.Shapes)
	for _, row := range slices.Concat(e.method.rows[1:], [][]float64{e.method.sum}) {
		var w weights
		w.c, w.stages = compact(row)
		e.rows = append(e.rows, w)
	}
	e.fifth.c, e.fifth.stages = compact(e.method.fifth)
	e.third.c, e.third.stages = compact(e.method.third)
	e.sampler = newSampler(e.method.nodes, shapes)
	for range len(e.method.nodes) + 1 {
		e.stages = append(e.stages, stage{
			factors: make([]factor, levels-1), left: make([]float64, levels), angles: make([]float64, shapes), weights: make([]float64, shapes),
		})
	}
	e.final = make([]factor, levels)
	e.plain = make([]factor, levels-1)
	for n := range e.plain {
		e.plain[n] = factor{re: math.Sqrt(float64(n + 1))}
	}
}

// prepareShapes copies the shapes to whole blocks.
func (e *Engine) prepareShapes() {
	for _, shape := range e.system.Shapes {
		padded := make([]float64, e.system.Grid.padded)
		copy(padded, shape)
		e.shapes = append(e.shapes, padded)
		largest := 0.0
		for _, v := range shape {
			largest = max(largest, math.Abs(v))
		}
		e.large = append(e.large, largest)
	}
}

package passage

import (
	"context"
	"fmt"
	"math"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/sequence"
)

// Options of Simulate. The zero value works.
type Options struct {
	Samples   int     // points of the trace, about; 0: 60
	Tolerance float64 // of the estimated error of the state, shared by the stages that change H; 0: exact.DefaultTolerance

	Overlaps bool // find the weight of the wanted end at the end of each stage

	MostStates  int    // refuse more; 0: MostStates
	MemoryBytes uint64 // memory that may be used; 0: what the machine has available
	Workers     int    // goroutines that share the work; 0: what the machine runs at once
	Seed        uint64 // of the search for ends

	// Progress, if not nil, is called on the computing goroutine; done never falls.
	Progress func(done, total int)
}

// Result is a simulated passage.
type Result struct {
	Trace []Point    // from the beginning to the end
	Ends  []StageEnd // of each stage
	Final StageEnd   // the last of them, or the start where there is no stage

	Dimension int // number of states
	Parity    int // of the mirror sector that was used; 0: none
	Errors    exact.ErrorBudget
	Steps     int // in which H changed
	Products  int // with H

	BuildSeconds, SolveSeconds float64
}

// Point is the state at one time. Energies are per atom.
type Point struct {
	Time  float64 // s, of the whole sequence
	Stage int     // that the time lies in; a boundary belongs to the earlier one

	Model bosehubbard.Model // at that time

	Energy, Kinetic, Interaction, Potential float64 // Hz per atom

	Pairs      float64 // sum of <n_i (n_i - 1)>/2, per atom
	NormDefect float64 // | |psi|^2 - 1 |

	Occupation, SquaredOccupation []float64 // <n_i>, <n_i^2> of each site
}

// StageEnd is the state at the end of a stage.
type StageEnd struct {
	Name           string
	Time           float64        // s
	CornerFraction float64        // share of the atoms at the corner of the zone, see exact.CornerFraction
	Overlap        *exact.Overlap // nil unless asked for
	Correlations   []float64      // real part of <b_i^+ b_j> at [i*sites+j]
}

// Simulate carries a state through a sequence.
//
// It returns a *TooManyStatesError or a *fock.TooLargeError before it allocates
// anything large, an error for a sequence that makes no sense, ctx.Err() if
// stopped, within 50 ms, and the errors of exact.Evolution.
func Simulate(ctx context.Context, s Sequence, opt Options) (*Result, error) {
	if err := s.check(); err != nil {
		return nil, err
	}
	if opt.Samples == 0 {
		opt.Samples = 60
	}
	if opt.Tolerance == 0 {
		opt.Tolerance = exact.DefaultTolerance
	}
	if !(opt.Tolerance > 0 && opt.Tolerance < 1) || opt.Samples < 0 {
		return nil, fmt.Errorf("passage: tolerance %g and %d samples, want a tolerance above 0 and below 1, and no negative number", opt.Tolerance, opt.Samples)
	}
	if err := CheckSize(s.Lattice.Sites, s.Atoms, opt); err != nil {
		return nil, err
	}
	begin := time.Now()
	p := &passage{Sequence: s, opt: opt}
	if err := p.start(ctx); err != nil {
		return nil, err
	}
	built := time.Now()
	if err := p.run(ctx); err != nil {
		return nil, err
	}
	r := &p.result
	r.Dimension, r.Parity = p.evolution.Dimension(), p.evolution.Parity()
	r.Errors, r.Products = p.evolution.Errors(), p.evolution.Products()
	r.Steps, _ = p.evolution.Steps()
	r.BuildSeconds, r.SolveSeconds = built.Sub(begin).Seconds(), time.Since(built).Seconds()
	return r, nil
}

// passage is a simulation on its way.
type passage struct {
	Sequence
	opt       Options
	evolution *exact.Evolution
	result    Result
}

// start builds the first state.
func (p *passage) start(ctx context.Context) (err error) {
	opt := exact.EvolutionOptions{
		MemoryBytes: p.opt.MemoryBytes, Workers: p.opt.Workers, Seed: p.opt.Seed, Whole: p.tilted(),
	}
	if p.Fock != nil {
		p.evolution, err = exact.NewEvolution(ctx, p.Lattice, p.Start, p.Fock, opt)
	} else {
		p.evolution, err = exact.NewEvolutionFromEnd(ctx, p.Lattice, p.Start, p.Atoms, p.End, opt)
	}
	return err
}

// tilted reports whether any of the models breaks the mirror.
func (p *passage) tilted() bool {
	models := []bosehubbard.Model{p.Start}
	for _, s := range p.Stages {
		models = append(models, s.End)
	}
	for _, m := range models {
		for _, a := range m.Axes {
			if a.Tilt != 0 {
				return true
			}
		}
	}
	return false
}

// run goes through the stages.
func (p *passage) run(ctx context.Context) error {
	first, err := p.evolution.Observe(ctx)
	if err != nil {
		return err
	}
	p.add(first, 0, p.Start)
	from, whole := p.Start, p.Duration()
	for i := range p.Stages {
		if err := p.stage(ctx, i, from, whole); err != nil {
			return err
		}
		from = p.Stages[i].End
	}
	if n := len(p.result.Ends); n > 0 {
		p.result.Final = p.result.Ends[n-1]
		return nil
	}
	p.result.Final, err = p.describe(ctx, "start")
	return err
}

// stage passes one stage and describes its end.
func (p *passage) stage(ctx context.Context, i int, from bosehubbard.Model, whole float64) error {
	s := &p.Stages[i]
	drive := s.drive(from)
	segment := exact.Segment{Duration: s.Duration, Drive: drive, Tolerance: p.opt.Tolerance / float64(len(p.Stages))}
	if whole > 0 {
		segment.Every = whole / float64(p.opt.Samples)
	}
	if p.opt.Progress != nil {
		done := p.evolution.Time()
		segment.Progress = func(now, of int) {
			const total = 1000
			p.opt.Progress(int(total*(done+s.Duration*float64(now)/float64(of))/whole), total)
		}
	}
	if s.Shape == sequence.Hold {
		jump := exact.Segment{Drive: drive}
		if _, err := p.evolution.Run(ctx, jump); err != nil {
			return err
		}
		segment.Drive = nil
	}
	if s.Duration == 0 {
		segment.Every = 1 // one sample, at the end
	}
	begin := p.evolution.Time()
	samples, err := p.evolution.Run(ctx, segment)
	if err != nil {
		return err
	}
	for _, sample := range samples {
		m := bosehubbard.Model{Axes: make([]bosehubbard.AxisTerms, len(s.End.Axes))}
		drive(&m, math.Min(sample.Time-begin, s.Duration))
		p.add(sample, i, m)
	}
	end, err := p.describe(ctx, s.Name)
	p.result.Ends = append(p.result.Ends, end)
	return err
}

// add puts a sample into the trace.
func (p *passage) add(s exact.Sample, stage int, m bosehubbard.Model) {
	n := float64(p.Atoms)
	pairs := 0.0
	for i := range s.Occupation {
		pairs += (s.SquaredOccupation[i] - s.Occupation[i]) / 2
	}
	p.result.Trace = append(p.result.Trace, Point{
		Time: p.Begin + s.Time, Stage: stage, Model: m,
		Energy: s.Energy / n, Kinetic: s.Kinetic / n, Interaction: s.Interaction / n, Potential: s.Potential / n,
		Pairs: pairs / n, NormDefect: s.NormDefect, Occupation: s.Occupation, SquaredOccupation: s.SquaredOccupation,
	})
}

// describe looks closer at the state as it is.
func (p *passage) describe(ctx context.Context, name string) (end StageEnd, err error) {
	end = StageEnd{Name: name, Time: p.Begin + p.evolution.Time()}
	if end.Correlations, err = p.evolution.Correlations(ctx); err != nil {
		return end, err
	}
	end.CornerFraction = exact.CornerFraction(p.Lattice, p.Periodic, end.Correlations)
	if p.opt.Overlaps {
		overlap, err := p.evolution.Overlap(ctx, p.End)
		if err != nil {
			return end, err
		}
		end.Overlap = &overlap
	}
	return end, nil
}

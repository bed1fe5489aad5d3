package gutzwiller

import (
	"context"
	"fmt"
	"math"
)

// Advance follows a state from one time to another, in seconds, under a drive that
// is smooth in between. Cut the run at every jump or kink of the drive: one inside
// costs many small steps if the step is seen to reach over it, and some accuracy if
// it hides near the end of one.
//
// The state is changed in place. On any error it is the one of the last good step
// and the report ends there. Cost O(Sites Levels) per step. It stops within 50 ms
// of ctx.
//
// It returns an error if the times or the terms are not finite or the end lies
// before the start, a *CutoffError, a *StepError or ctx.Err(). It panics if the
// state belongs to another system.
func (e *Engine) Advance(ctx context.Context, state *State, drive Drive, from, to float64) (Report, error) {
	if state.System != e.system {
		panic("gutzwiller: the state belongs to another system")
	}
	if !(to >= from) || math.IsInf(from, 0) || math.IsInf(to, 0) {
		return Report{}, fmt.Errorf("gutzwiller: run from %g s to %g s, want a duration of at least 0", from, to)
	}
	r := &run{Engine: e, drive: drive, from: from, to: to, now: from, crew: newCrew(e.options.Workers)}
	defer r.crew.stop()
	e.state, e.ctx = state, ctx
	defer func() { e.state, e.ctx = nil, nil }()
	err := r.start()
	for err == nil && r.now < r.to {
		err = r.advance()
		if err == nil && e.options.Progress != nil {
			e.options.Progress(int(1000*(r.now-from)/(to-from)), 1000)
		}
	}
	return r.report, err
}

// run is one call of Advance.
type run struct {
	*Engine
	drive         Drive
	from, to, now float64
	crew          *crew
	report        Report
	atoms         float64 // at the start
}

// start takes stock of the state and chooses the first step.
func (r *run) start() error {
	if err := r.crew.run(r.ctx, len(r.tallies), r.jobs.begin); err != nil {
		return err
	}
	total := r.total()
	r.atoms = total.number
	if err := r.watch(total); err != nil {
		return err
	}
	if r.options.PlainStep > 0 {
		steps := max(1, math.Ceil((r.to-r.from)/r.options.PlainStep-1e-9))
		r.step = (r.to - r.from) / steps
		return nil
	}
	if r.proposed == 0 {
		return r.firstStep()
	}
	return nil
}

// firstStep is short against everything that moves at the start; without tunnelling
// it is the whole run.
func (r *run) firstStep() error {
	if err := r.sampler.read(r.system, r.drive, r.from, r.to-r.from); err != nil {
		return err
	}
	tunnelling := 0.0
	fastest := math.Abs(r.sampler.terms[0].Interaction)
	for axis := range r.system.Grid.Axes {
		for i := range r.sampler.terms {
			tunnelling = max(tunnelling, math.Abs(r.sampler.terms[i].Tunnelling[axis]))
		}
		fastest += 4 * math.Abs(r.sampler.terms[0].Tunnelling[axis])
	}
	r.proposed = r.to - r.from
	if tunnelling > 0 {
		r.proposed = min(r.proposed, 0.02/fastest)
	}
	return nil
}

// total adds the tallies in the order of the blocks.
func (r *run) total() tally {
	sum := tally{}
	for i := range r.tallies {
		t := &r.tallies[i]
		sum.err, sum.norm = max(sum.err, t.err), max(sum.norm, t.norm)
		sum.number += t.number
		sum.spread += t.spread
		if t.top > sum.top {
			sum.top, sum.topSite = t.top, t.topSite
		}
	}
	return sum
}

// watch looks at the last level.
func (r *run) watch(t tally) error {
	if t.top > r.report.TopWeight {
		r.report.TopWeight, r.report.TopSite = t.top, t.topSite
	}
	if t.top > r.options.TopLimit {
		return &CutoffError{Seconds: r.now, Site: t.topSite, Levels: r.system.Levels, Weight: t.top, Limit: r.options.TopLimit}
	}
	return nil
}

// advance takes one step, smaller and smaller until its error is small enough.
func (r *run) advance() error {
	r.known = false
	for {
		last := r.chooseStep()
		miss, err := r.attempt()
		if err != nil {
			return err
		}
		estimate := miss
		if miss <= r.options.Tolerance {
			if err := r.stagesOf(); err != nil {
				return err
			}
			total := r.total()
			estimate = max(miss, total.err)
			if r.options.PlainStep > 0 || estimate <= r.options.Tolerance {
				return r.accept(total, estimate, last)
			}
		}
		r.report.Rejected++
		if r.propose(estimate, false); r.proposed < 1e-13*(r.to-r.from) || r.now+r.proposed == r.now {
			return &StepError{Seconds: r.now, Step: r.step, Estimate: estimate, Tolerance: r.options.Tolerance}
		}
	}
}

// chooseStep sets the step and says whether it is the last. Two equal steps end a
// run better than a long and a tiny one.
func (r *run) chooseStep() bool {
	left := r.to - r.now
	if r.options.PlainStep > 0 {
		return left < 1.5*r.step
	}
	switch {
	case r.proposed >= left:
		r.step = left
		return true
	case 2*r.proposed > left:
		r.step = left / 2
	default:
		r.step = r.proposed
	}
	return false
}

// attempt reads the drive for the step and returns the error of the amplitudes that
// its polynomial makes.
func (r *run) attempt() (float64, error) {
	if err := r.sampler.read(r.system, r.drive, r.now, r.step); err != nil {
		return 0, err
	}
	if r.options.PlainStep > 0 {
		return 0, nil
	}
	return 2 * math.Pi * r.step * r.sampler.miss(r.large), nil
}

// stagesOf goes through the stages of the step. Their number is even, so that the
// field of the new state is where that of the old one was.
func (r *run) stagesOf() error {
	r.setStages(r.step)
	for i := range r.reached {
		r.reached[i].Store(0)
	}
	if err := r.crew.run(r.ctx, len(r.order.tasks), r.jobs.task); err != nil {
		return err
	}
	if err := r.ctx.Err(); err != nil { // a task may have given up
		return err
	}
	r.known = true
	return nil
}

// accept takes the step over into the state.
func (r *run) accept(total tally, estimate float64, last bool) error {
	if math.IsNaN(total.number) {
		return &StepError{Seconds: r.now, Step: r.step, Estimate: math.Inf(1), Tolerance: r.options.Tolerance}
	}
	r.state.amplitudes, r.next = r.next, r.state.amplitudes
	r.now += r.step
	if last {
		r.now = r.to
	}
	r.report.Steps++
	r.report.LargestError = max(r.report.LargestError, estimate)
	r.report.NormDrift += total.norm
	if err := r.keepNumber(total, last); err != nil {
		return err
	}
	r.propose(estimate, true)
	return r.watch(total)
}

// numberSlack is the relative change of the number of atoms that is left alone.
const numberSlack = 1e-12

// keepNumber sets the number of atoms right when it has drifted.
func (r *run) keepNumber(total tally, last bool) error {
	if r.atoms == 0 {
		return nil
	}
	drift := math.Abs(total.number-r.atoms) / r.atoms
	r.report.NumberDefect = drift
	if r.options.PlainStep > 0 || drift < numberSlack || total.spread <= 0 {
		return nil
	}
	r.scale = (r.atoms - total.number) / (2 * total.spread)
	if err := r.crew.run(context.Background(), len(r.tallies), r.jobs.correct); err != nil {
		return err
	}
	r.report.NumberDrift += drift
	r.report.NumberDefect = math.Abs(r.total().number-r.atoms) / r.atoms
	return nil
}

// propose chooses the next step from the error of this one, of order 8 in the step.
func (r *run) propose(estimate float64, good bool) {
	if r.options.PlainStep > 0 {
		return
	}
	factor := 1000.0 // nothing happens
	if estimate > 0 {
		factor = min(8, max(0.2, 0.9*math.Pow(r.options.Tolerance/estimate, 1./8)))
	}
	next := factor * r.step
	if good && r.step < r.proposed { // it was cut to end the run
		next = max(next, r.proposed)
	}
	r.proposed = next
}

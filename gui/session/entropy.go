package session

import (
	"context"
	"fmt"
	"time"

	"hilltop/bosehubbard/figure"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/thermo"
)

// EntropyJob is the key of S(E); its result is a *SmallSystem.
const EntropyJob = "entropy"

// EntropyState is S(E) of a small system that stands for the cloud at the end of the
// last stage: what sizes can be had, what they cost, and the last result.
type EntropyState struct {
	Sizes  []EntropySize
	Chosen int    // index of Sizes, -1 where there are none
	Why    string // why there are none
	Runs   bool   // the chosen size follows the plan by itself
	Held   bool   // stopped by the user
	Job    Job
	Result *SmallSystem // the last good one of this document; nil before it
}

// EntropySize is a size with what it costs.
type EntropySize struct {
	Sites, Atoms int
	Shape        []int
	Dimension    string // decimal
	Bytes        float64
	Seconds      float64 // expected
	Fits         bool    // the memory
	Text         string  // "10: 92,378 states, 7 MB, 0.5 s"
}

// SmallSystem is S(E) of a size.
type SmallSystem struct {
	Sites, Atoms int
	Curve        *figure.EntropyCurve
	State        *float64 // energy per atom of the Fock state the plan gives, Hz; nil where there is none
	Seconds      float64  // it took

	pace float64 // s per hop
}

// autoStates is the largest dimension that is computed without being asked: 10 atoms
// on 10 sites.
const autoStates = 100_000

// settleTime is how long the plan has to rest before a computation that nobody asked
// for begins.
const settleTime = 60 * time.Millisecond

// smallState is what the session knows of the small system. It is guarded by
// Session.mu.
type smallState struct {
	sites   int    // chosen by the user, 0 for the session's choice
	asked   bool   // the user has started the chosen size
	held    bool   // stopped
	version uint64 // of the plan whose computation was started last
	started int    // the size of it

	pace       float64 // s per hop on this machine, 0 before it is known
	calibrated bool    // or about to be
}

// forget drops what belongs to another document; the size and the pace of the machine
// stay.
func (e *smallState) forget() {
	*e = smallState{sites: e.sites, pace: e.pace, calibrated: e.calibrated}
}

// entropy returns what a view shows of S(E). The caller holds mu.
func (s *Session) entropy(j Job) EntropyState {
	e := EntropyState{Chosen: -1, Held: s.small.held, Job: j}
	if s.work.report == nil {
		return e
	}
	kind, err := smallKind(s.doc.now.Plan(), s.work.report)
	if err != nil {
		e.Why = err.Error()
		return e
	}
	e.Sizes = s.sizes(kind)
	e.Chosen = s.small.choice(e.Sizes)
	if e.Chosen >= 0 {
		e.Runs = s.runsAlone(e.Sizes[e.Chosen])
	}
	if old := s.jobs[EntropyJob]; old != nil && old.version >= s.doc.first {
		e.Result, _ = old.result.(*SmallSystem)
	}
	return e
}

// choice is the index of the chosen size: the user's, else the largest that follows
// by itself, else the first.
func (e *smallState) choice(sizes []EntropySize) int {
	best := -1
	for i, size := range sizes {
		if size.Sites == e.sites {
			return i
		}
		if best < 0 || size.automatic() {
			best = i
		}
	}
	return best
}

// automatic reports whether a size is computed without being asked.
func (z *EntropySize) automatic() bool { return z.Fits && z.states() <= autoStates }

func (s *Session) runsAlone(z EntropySize) bool {
	return !s.small.held && z.Fits && (s.small.asked || z.automatic())
}

// ChooseEntropySize takes another size. One of up to 100,000 states begins at the
// next FollowEntropy, a larger one with StartEntropy.
func (s *Session) ChooseEntropySize(sites int) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.stopEntropy()
	s.small.sites, s.small.asked, s.small.held = sites, false, false
	s.changed(urgent)
}

// StartEntropy computes the chosen size, and again after every change of the plan
// until StopEntropy or another choice.
func (s *Session) StartEntropy() {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.small.asked, s.small.held, s.small.version = true, false, 0
	s.changed(urgent)
	s.followEntropy(0)
}

// StopEntropy stops the computation and keeps it from following the plan.
func (s *Session) StopEntropy() {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.stopEntropy()
	s.small.held = true
	s.changed(urgent)
}

func (s *Session) stopEntropy() {
	if j := s.jobs[EntropyJob]; j != nil {
		j.cancel()
	}
	s.small.version = 0
}

// FollowEntropy is called by a view that shows S(E), with every State: it starts the
// computation when the plan has changed and rests, and stops one of an older plan.
// The newest wins.
func (s *Session) FollowEntropy() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc != nil {
		s.followEntropy(settleTime)
	}
}

func (s *Session) followEntropy(settle time.Duration) {
	s.calibrate()
	w, e := &s.work, &s.small
	if e.version != 0 && e.version != w.version {
		s.stopEntropy()
	}
	if w.report == nil || w.reported != w.version || s.drag != nil || e.held {
		return
	}
	r, p := w.report, s.doc.now.Plan()
	kind, err := smallKind(p, r)
	if err != nil {
		return
	}
	sizes := s.sizes(kind)
	i := e.choice(sizes)
	if i < 0 || !s.runsAlone(sizes[i]) || e.version == w.version && e.started == sizes[i].Sites {
		return
	}
	e.version, e.started = w.version, sizes[i].Sites
	size := sizes[i]
	s.start(EntropyJob, func(ctx context.Context, p *plan.Plan, progress func(done, total int)) (any, error) {
		if err := pause(ctx, settle); err != nil {
			return nil, err
		}
		result, err := kind.solve(ctx, size, progress)
		if err != nil {
			return nil, err
		}
		s.learn(result.pace)
		return result, nil
	})
}

func pause(ctx context.Context, d time.Duration) error {
	timer := time.NewTimer(d)
	defer timer.Stop()
	select {
	case <-ctx.Done():
		return ctx.Err()
	case <-timer.C:
		return ctx.Err()
	}
}

// solve computes S(E) of a size.
//
// It returns the errors of thermo.Entropy.
func (k *smallPlan) solve(ctx context.Context, z EntropySize, progress func(done, total int)) (*SmallSystem, error) {
	system, err := k.system(z)
	if err != nil {
		return nil, err
	}
	opt := z.options()
	opt.Progress = progress
	begin := time.Now()
	c, err := thermo.Entropy(ctx, system, opt)
	if err != nil {
		return nil, err
	}
	n := float64(z.Atoms)
	out := &SmallSystem{Sites: z.Sites, Atoms: z.Atoms, Curve: &figure.EntropyCurve{Name: k.name(z), Beta: c.Beta}, State: k.state(z, system)}
	for i, energy := range c.Energy {
		out.Curve.Energy = append(out.Curve.Energy, energy/n)
		out.Curve.Entropy = append(out.Curve.Entropy, c.Entropy[i]/n)
	}
	out.Seconds = time.Since(begin).Seconds()
	if hops := z.hops(); hops > leastHops {
		out.pace = out.Seconds / hops
	}
	return out, nil
}

// name is what the curve is of.
func (k *smallPlan) name(z EntropySize) string {
	return fmt.Sprintf("%s sites, %d atoms", shapeText(z.Shape), z.Atoms)
}

package thermo

import (
	"context"
	"errors"
	"fmt"
	"math"
	"time"
)

// CanonicalOptions are the options of Canonical. The zero value works.
type CanonicalOptions struct {
	Vectors int // random vectors, at least 2; 0: 16, up to 128 below 10,000 states
	Steps   int // of the Lanczos run of each vector, 10 to 240; 0: 100
	Levels  int // sought at each end of each sector, 1 to 50; 0: 3

	Observables bool // fill Observables: one more run for each 8 values of beta

	Seed        uint64 // of the random vectors
	Workers     int    // goroutines; below 1: what the machine runs at once
	MemoryBytes uint64 // memory that may be used; 0: what the machine has available

	// Progress, if not nil, is called on the computing goroutine; done never falls.
	Progress func(done, total int)
}

// Averages are the canonical averages of a system, one for each beta asked for.
type Averages struct {
	Dimension int
	Points    []Average

	Exact          bool // the spectrum is known in full: the next three are 0
	Vectors, Steps int
	Levels         int // found at both ends and left out of the random vectors
	Seed           uint64

	BuildSeconds, SolveSeconds float64
}

// Average is the canonical ensemble at one beta. Errors are half widths of 95 %
// confidence from the spread of the random vectors, and the change over the last
// tenth of the Lanczos steps; they are 0 where the spectrum is known in full.
type Average struct {
	Beta float64 // 1/Hz

	Energy, EnergyError     float64 // Hz, of all atoms together
	Entropy, EntropyError   float64 // kB
	Variance, VarianceError float64 // of the energy, Hz^2

	Observables *Observables // nil unless asked for
}

// Canonical computes energy, entropy and energy variance, and on request where the
// atoms are, at inverse temperatures [1/Hz] of either sign, answered in order:
// Z = Tr exp(-beta H), E = <H>, S = ln Z + beta E. It stops within 50 ms of ctx.
//
// Up to 500 states of each sector of a mirror, 250 with Observables, all levels are
// found. Beyond, some at both ends are, and the rest is averaged over random vectors;
// see doc.go. Cost: Steps products with each vector and some 500 before; 2 vectors
// for each goroutine, 10 with Observables, and 8 Levels.
//
// It returns a *fock.TooLargeError before it allocates anything large, an error
// for a beta that is not finite or a bad option, and ctx.Err() if stopped.
func Canonical(ctx context.Context, s System, betas []float64, opt CanonicalOptions) (*Averages, error) {
	begin := time.Now()
	if err := opt.check(betas); err != nil {
		return nil, err
	}
	e, err := s.ensemble(ctx, opt)
	if err != nil {
		return nil, err
	}
	built := time.Now()
	if err := e.solve(ctx, len(betas)); err != nil {
		return nil, err
	}
	a := &Averages{Dimension: e.dimension, Points: make([]Average, len(betas)), Seed: opt.Seed, Exact: e.exact}
	if !e.exact {
		a.Vectors, a.Steps, a.Levels = len(e.runs), e.opt.Steps, e.edgeCount()
	}
	for i, beta := range betas {
		a.Points[i] = e.average(beta)
	}
	if opt.Observables {
		if err := e.observe(ctx, s.Lattice, s.Atoms, a.Points); err != nil {
			return nil, err
		}
	}
	if opt.Progress != nil {
		opt.Progress(e.total, e.total)
	}
	a.BuildSeconds, a.SolveSeconds = built.Sub(begin).Seconds(), time.Since(built).Seconds()
	return a, nil
}

// check refuses options and betas that make no sense.
func (o CanonicalOptions) check(betas []float64) error {
	if len(betas) == 0 {
		return errors.New("thermo: no beta, want at least one")
	}
	for i, b := range betas {
		if math.IsNaN(b) || math.IsInf(b, 0) {
			return fmt.Errorf("thermo: beta %g per Hz, number %d of the list, want a finite one", b, i+1)
		}
	}
	switch {
	case o.Vectors != 0 && (o.Vectors < 2 || o.Vectors > mostVectors):
		return fmt.Errorf("thermo: %d random vectors, want 2 to %d", o.Vectors, mostVectors)
	case o.Steps != 0 && (o.Steps < 10 || o.Steps > mostRuleSteps):
		return fmt.Errorf("thermo: %d Lanczos steps, want 10 to %d", o.Steps, mostRuleSteps)
	case o.Levels != 0 && (o.Levels < 1 || o.Levels > 50):
		return fmt.Errorf("thermo: %d levels at each end, want 1 to 50", o.Levels)
	}
	return nil
}

func (o CanonicalOptions) withDefaults(dimension int) CanonicalOptions {
	if o.Vectors == 0 {
		o.Vectors = 8 * min(max(2, (20_000+dimension-1)/dimension), 16)
	}
	if o.Steps == 0 {
		o.Steps = 100
	}
	if o.Levels == 0 {
		o.Levels = 3
	}
	return o
}

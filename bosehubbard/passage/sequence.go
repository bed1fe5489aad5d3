package passage

import (
	"errors"
	"fmt"
	"math"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/sequence"
)

// Sequence is a model with its stages.
type Sequence struct {
	Lattice  *lattice.Lattice
	Periodic []bool // which axes of the lattice, a box, are rings; nil: none
	Atoms    int

	Start bosehubbard.Model // before the first stage
	Fock  []int             // atoms per site to start from; nil: the end of Start
	End   exact.End         // that the state is meant to sit at: the ceiling for T < 0

	Begin  float64 // time at which the first stage begins, s
	Stages []Stage
}

// Stage is one step of a sequence.
type Stage struct {
	Name     string
	Duration float64 // s
	Shape    sequence.Shape
	End      bosehubbard.Model // at the end of the stage
}

// From returns the sequence that begins with the given stage: from the values at
// which that stage starts, and from the same kind of state as the whole sequence,
// which has been frozen until then.
//
// It panics if there is no such stage.
func (s Sequence) From(stage int) Sequence {
	for _, before := range s.Stages[:stage] {
		s.Begin += before.Duration
		s.Start = before.End
	}
	s.Stages = s.Stages[stage:]
	return s
}

// Duration returns the sum of the durations, s.
func (s *Sequence) Duration() float64 {
	sum := 0.0
	for _, stage := range s.Stages {
		sum += stage.Duration
	}
	return sum
}

// check refuses what cannot be simulated. What is wrong with a model itself is for
// package exact to say.
func (s *Sequence) check() error {
	if s.Lattice == nil || s.Atoms < 1 {
		return fmt.Errorf("passage: %d atoms, want at least 1 on a lattice", s.Atoms)
	}
	if s.Fock != nil {
		sum := 0
		for _, n := range s.Fock {
			sum += n
		}
		if len(s.Fock) != s.Lattice.Sites || sum != s.Atoms {
			return fmt.Errorf("passage: start with %d atoms on %d sites, want %d on %d", sum, len(s.Fock), s.Atoms, s.Lattice.Sites)
		}
	}
	for _, stage := range s.Stages {
		if !(stage.Duration >= 0) || math.IsInf(stage.Duration, 1) {
			return fmt.Errorf("passage: stage %q of %g s, want a finite duration of at least 0", stage.Name, stage.Duration)
		}
		if len(stage.End.Axes) != len(s.Start.Axes) {
			return fmt.Errorf("passage: stage %q with %d axes after %d, want as many", stage.Name, len(stage.End.Axes), len(s.Start.Axes))
		}
	}
	return nil
}

// drive goes from one model to another with the shape of a stage.
func (s *Stage) drive(from bosehubbard.Model) func(m *bosehubbard.Model, t float64) {
	return func(m *bosehubbard.Model, t float64) {
		w := 1.0
		if s.Duration > 0 {
			w = s.Shape.At(t / s.Duration)
		}
		m.Interaction = between(from.Interaction, s.End.Interaction, w)
		for a := range m.Axes {
			x, y := from.Axes[a], s.End.Axes[a]
			m.Axes[a] = bosehubbard.AxisTerms{
				Tunnelling: between(x.Tunnelling, y.Tunnelling, w),
				Curvature:  between(x.Curvature, y.Curvature, w),
				Tilt:       between(x.Tilt, y.Tilt, w),
			}
		}
	}
}

// between hits both ends exactly.
func between(from, to, w float64) float64 {
	if w == 1 {
		return to
	}
	return from + (to-from)*w
}

// MostStates is the largest dimension that is simulated exactly.
const MostStates = 2_000_000

// TooManyStatesError says that a system is too large to be simulated exactly. It
// wraps a *fock.TooLargeError with the memory that it would need.
type TooManyStatesError struct {
	Most int
	Size *fock.TooLargeError
}

func (e *TooManyStatesError) Error() string {
	return fmt.Sprintf("passage: %d atoms on %d sites make %s states; up to %d are simulated exactly, and there is no mean-field passage yet; the largest size at this filling is %d sites",
		e.Size.Atoms, e.Size.Sites, e.Size.Dimension, e.Most, e.Size.LargestSites)
}

// Unwrap returns the *fock.TooLargeError.
func (e *TooManyStatesError) Unwrap() error { return e.Size }

// bytesPerState is what the vectors of an evolution take.
const bytesPerState = 8 * 84

// CheckSize refuses more states than opt.MostStates, in no time, for any numbers.
//
// It returns a *TooManyStatesError, or an error if there are no sites or no atoms.
func CheckSize(sites, atoms int, opt Options) error {
	most, memory := opt.MostStates, opt.MemoryBytes
	if most == 0 {
		most = MostStates
	}
	if fock.LogDimension(sites, atoms) <= math.Log(float64(most))*(1+1e-12) {
		return nil
	}
	if memory == 0 {
		memory = fock.AvailableMemory()
	}
	var size *fock.TooLargeError
	if _, err := fock.Fit(sites, atoms, fock.Options{MemoryBytes: 1}); !errors.As(err, &size) {
		return err
	}
	size.BytesWanted = min(bytesPerState*math.Exp(fock.LogDimension(sites, atoms)), 1e300)
	size.BytesAvailable = memory
	size.LargestSites = 0
	for l := 1; l < sites; l++ {
		n := int(math.Ceil(float64(atoms) * (float64(l) / float64(sites))))
		if fock.LogDimension(l, n) > math.Log(float64(most)) {
			break
		}
		size.LargestSites = l
	}
	return &TooManyStatesError{Most: most, Size: size}
}

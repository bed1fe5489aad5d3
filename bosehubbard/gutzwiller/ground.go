package gutzwiller

import (
	"context"
	"fmt"
	"math"
)

// GroundOptions of Ground. The zero value works and asks for mu = 0.
type GroundOptions struct {
	Ceiling           bool    // the upper end of the spectrum instead of the floor
	ChemicalPotential float64 // Hz; not read if Atoms is set
	Atoms             float64 // mean number of atoms, met to 1e-9; 0: as mu gives
	Tolerance         float64 // of phi from sweep to sweep, from 1e-14; 0: 1e-10
	MaxSweeps         int     // in all; 0: 20000

	// Progress, if not nil, is called on the computing goroutine with the sweeps done.
	Progress func(done, total int)
}

// Grounded is an end of the mean-field spectrum.
type Grounded struct {
	State             *State
	ChemicalPotential float64 // Hz
	Sweeps            int
	Residual          float64 // largest change of phi in the last sweep
}

// NotConvergedError says that the sweeps ran out.
type NotConvergedError struct {
	Sweeps              int
	Residual, Tolerance float64
}

func (e *NotConvergedError) Error() string {
	return fmt.Sprintf("gutzwiller: phi still changes by %.3g after %d sweeps, want %.3g", e.Residual, e.Sweeps, e.Tolerance)
}

// Ground finds the product state at an end of the spectrum: the lowest H - mu N at
// the floor, the highest at the ceiling.
//
// It goes from site to site with implicit steps in imaginary time, as long as the
// site allows, so that the energy falls with every one. A cloud of L sites across
// that is held by tunnelling alone takes some L^2 sweeps. Cost O(Sites Levels) each.
//
// It returns an error if an option makes no sense, if U has the wrong sign for the
// end (attraction has no floor, repulsion no ceiling), if no chemical potential
// gives the atoms or more fit the levels, *CutoffError, ctx.Err(), and the last
// iterate with a *NotConvergedError.
func Ground(ctx context.Context, s *System, terms Terms, opt GroundOptions) (*Grounded, error) {
	opt, err := opt.checked(s, terms)
	if err != nil {
		return nil, err
	}
	signs, err := s.Grid.order(terms, opt.Ceiling)
	if err != nil {
		return nil, err
	}
	r := newRelaxation(ctx, s, terms, opt)
	if opt.Atoms > 0 {
		err = r.findAtoms()
	} else {
		r.begin(r.mirror * opt.ChemicalPotential)
		err = r.relax(opt.Tolerance)
	}
	if _, short := err.(*NotConvergedError); err != nil && !short {
		return nil, err
	}
	out := &Grounded{State: r.state(signs), ChemicalPotential: r.mirror * r.mu, Sweeps: r.sweeps, Residual: r.residual}
	if err == nil {
		err = r.watch()
	}
	return out, err
}

func (o GroundOptions) checked(s *System, terms Terms) (GroundOptions, error) {
	if err := s.check(terms); err != nil {
		return o, err
	}
	if o.Tolerance == 0 {
		o.Tolerance = 1e-10
	}
	if o.MaxSweeps == 0 {
		o.MaxSweeps = 20000
	}
	most := float64(s.Grid.Sites * (s.Levels - 2))
	switch {
	case !(o.Tolerance >= 1e-14 && o.Tolerance < 1):
		return o, fmt.Errorf("gutzwiller: tolerance %g, want 1e-14 to 1", o.Tolerance)
	case o.MaxSweeps < 1:
		return o, fmt.Errorf("gutzwiller: %d sweeps, want at least 1", o.MaxSweeps)
	case !(o.Atoms >= 0 && o.Atoms <= most):
		return o, fmt.Errorf("gutzwiller: %g atoms on %d sites of %d levels, want 0 to %g", o.Atoms, s.Grid.Sites, s.Levels, most)
	case !(math.Abs(o.ChemicalPotential) <= maxHz):
		return o, fmt.Errorf("gutzwiller: mu = %g Hz, want a finite number", o.ChemicalPotential)
	case o.Ceiling && terms.Interaction > 0:
		return o, fmt.Errorf("gutzwiller: U = %g Hz has no ceiling, want U <= 0", terms.Interaction)
	case !o.Ceiling && terms.Interaction < 0:
		return o, fmt.Errorf("gutzwiller: U = %g Hz has no floor, want U >= 0", terms.Interaction)
	}
	return o, nil
}

// relaxation is one search, mirrored so that it looks for the floor with J, U >= 0.
type relaxation struct {
	ctx      context.Context
	system   *System
	opt      GroundOptions
	mirror   float64
	j        [3]float64
	u, mu    float64
	v        []float64 // potential
	f        []float64 // amplitudes, site after site
	phi      []float64 // one more, 0, at padded
	levels   int
	sweeps   int
	residual float64
	roots    []float64 // sqrt(n)
	diagonal []float64
	pivots   []float64
	trial    []float64
}

func newRelaxation(ctx context.Context, s *System, terms Terms, opt GroundOptions) *relaxation {
	m := s.Levels
	r := &relaxation{
		ctx: ctx, system: s, opt: opt, mirror: 1, levels: m, v: s.potential(terms),
		f: make([]float64, s.Grid.Sites*m), phi: make([]float64, s.Grid.padded+1), roots: make([]float64, m),
		diagonal: make([]float64, m), pivots: make([]float64, m), trial: make([]float64, m),
	}
	if opt.Ceiling {
		r.mirror = -1
		for i := range r.v {
			r.v[i] = -r.v[i]
		}
	}
	r.u = math.Abs(terms.Interaction)
	for a := range s.Grid.Axes {
		r.j[a] = math.Abs(terms.Tunnelling[a])
	}
	for n := range r.roots {
		r.roots[n] = math.Sqrt(float64(n))
	}
	return r
}

// state returns the amplitudes with the signs of phi that belong to the end.
func (r *relaxation) state(signs []float64) *State {
	out := NewState(r.system)
	for site, sign := range signs {
		for n := range r.levels {
			v := r.f[site*r.levels+n]
			if n%2 == 1 {
				v *= sign
			}
			out.amplitudes[out.offset(site, n)] = v
		}
	}
	return out
}

// watch looks at the last level.
func (r *relaxation) watch() error {
	for site := range r.v {
		last := r.f[(site+1)*r.levels-1]
		if w := last * last; w > coherentTail {
			return &CutoffError{Site: site, Levels: r.levels, Weight: w, Limit: coherentTail}
		}
	}
	return nil
}

package gutzwiller

import (
	"context"
	"errors"
	"math"
	"slices"
	"strings"
	"testing"
	"time"
)

func mustGround(t testing.TB, s *System, terms Terms, opt GroundOptions) *Grounded {
	t.Helper()
	out, err := Ground(context.Background(), s, terms, opt)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// A ring without potential is the single site of T = 0, in both phases, at the floor
// and at the ceiling.
func TestGroundIsTheSite(t *testing.T) {
	g := mustGrid(t, []int{6, 4}, []bool{true, true})
	s := mustSystem(t, g, 16)
	for _, tc := range []struct{ mu, j float64 }{{0.5, 0.02}, {1.4, 0.01}, {0.3, 0.1}, {-0.2, 0.3}, {1, 0.05}} {
		for _, sign := range []float64{1, -1} {
			want := mustSolve(t, Site{ChemicalPotential: sign * tc.mu, Interaction: sign, Coupling: 4 * tc.j})
			terms := Terms{Tunnelling: [3]float64{tc.j, tc.j}, Interaction: sign}
			got := mustGround(t, s, terms, GroundOptions{Ceiling: sign < 0, ChemicalPotential: sign * tc.mu, Tolerance: 1e-13})
			m, err := got.State.Measure(terms)
			if err != nil {
				t.Fatal(err)
			}
			near(t, "filling", m.Atoms/24, want.Filling, 1e-10)
			near(t, "kinetic energy", m.Kinetic*m.Atoms/24, want.Kinetic, 1e-10)
			near(t, "interaction energy", m.Interaction*m.Atoms/24, want.Interaction, 1e-10)
			peak, none := m.Centre, m.Corner
			if sign < 0 {
				peak, none = none, peak
			}
			near(t, "peak", peak*m.Atoms, 576*want.Order*want.Order, 1e-6)
			near(t, "other peak", none, 0, 1e-12)
		}
	}
}

// cloud is a trapped system at one end of the spectrum: 1 floor, -1 ceiling.
func cloud(t testing.TB, sign float64) (*System, Terms) {
	t.Helper()
	g := mustGrid(t, []int{15, 11}, []bool{false, false})
	s := mustSystem(t, g, 8, g.Squares(0), g.Squares(1), g.Coordinates(0))
	return s, Terms{Tunnelling: [3]float64{20, 12}, Interaction: sign * 150, Weights: []float64{sign * 3, sign * 5, sign * 2}}
}

// The number of atoms is met, and mu is the cost of one more: dE/dN.
func TestGroundOfAtoms(t *testing.T) {
	for _, sign := range []float64{1, -1} {
		s, terms := cloud(t, sign)
		energy := func(atoms float64) (*Grounded, float64) {
			got := mustGround(t, s, terms, GroundOptions{Ceiling: sign < 0, Atoms: atoms, Tolerance: 1e-12})
			m, err := got.State.Measure(terms)
			if err != nil {
				t.Fatal(err)
			}
			near(t, "atoms", m.Atoms, atoms, 1e-12*atoms)
			return got, m.Energy() * m.Atoms
		}
		for _, atoms := range []float64{3.3, 41, 77.7} {
			energy(atoms)
		}
		middle, _ := energy(50)
		_, low := energy(49.9)
		_, high := energy(50.1)
		// The difference is off by 0.1^2/6 of the third derivative, about mu/N^2.
		near(t, "dE/dN", (high-low)/0.2, middle.ChemicalPotential, 1e-4*math.Abs(middle.ChemicalPotential))
	}
}

// The ceiling of the mirrored system is the floor with alternating signs of phi.
func TestGroundMirror(t *testing.T) {
	s, terms := cloud(t, 1)
	_, mirrored := cloud(t, -1)
	floor := mustGround(t, s, terms, GroundOptions{Atoms: 60})
	ceiling := mustGround(t, s, mirrored, GroundOptions{Atoms: 60, Ceiling: true})
	if floor.ChemicalPotential != -ceiling.ChemicalPotential {
		t.Errorf("mu %g and %g, want opposite", floor.ChemicalPotential, ceiling.ChemicalPotential)
	}
	f, h := make([]complex128, 8), make([]complex128, 8)
	for site, sign := range s.Grid.Stagger() {
		floor.State.Site(f, site)
		ceiling.State.Site(h, site)
		for n := 1; n < 8; n += 2 {
			h[n] *= complex(sign, 0)
		}
		if !slices.Equal(f, h) {
			t.Fatalf("site %d: %v at the floor, %v at the ceiling", site, f, h)
		}
	}
}

// An end of the spectrum does not move in time; the phases turn with mu.
func TestGroundIsStationary(t *testing.T) {
	for _, sign := range []float64{1, -1} {
		s, terms := cloud(t, sign)
		ground := mustGround(t, s, terms, GroundOptions{Atoms: 70, Ceiling: sign < 0, Tolerance: 1e-13})
		const seconds = 0.05 // J t = 1
		out, _ := mustAdvance(t, ground.State, Constant(terms), seconds, Options{Tolerance: 1e-10})
		before, after := make([]float64, s.Grid.Sites), make([]float64, s.Grid.Sites)
		ground.State.Filling(before)
		out.Filling(after)
		a, b := make([]complex128, s.Grid.Sites), make([]complex128, s.Grid.Sites)
		ground.State.Field(a)
		out.Field(b)
		angle := -2 * math.Pi * ground.ChemicalPotential * seconds
		turn := complex(math.Cos(angle), math.Sin(angle))
		for site := range before {
			near(t, "filling", after[site], before[site], 2e-6) // trimming leaves 1e-7 of the atoms
			near(t, "turned field", math.Sqrt(norm(b[site]-turn*a[site])), 0, 2e-6)
		}
	}
}

// Without tunnelling the cloud is a cake with whole numbers; numbers in between have
// no chemical potential.
func TestGroundWithoutTunnelling(t *testing.T) {
	g := mustGrid(t, []int{9}, []bool{false})
	s := mustSystem(t, g, 6, g.Squares(0))
	terms := Terms{Interaction: 10, Weights: []float64{1}}
	got := mustGround(t, s, terms, GroundOptions{ChemicalPotential: 12})
	filling := make([]float64, 9)
	got.State.Filling(filling)
	// n is the smallest whole number with U n > mu - V: V = 16, 9, 4, 1, 0, ...
	cake := []float64{0, 1, 1, 2, 2, 2, 1, 1, 0}
	for site, want := range cake {
		near(t, "filling", filling[site], want, 1e-12)
	}
	terms.Tunnelling[0] = 1e-4 // the search has to empty and fill insulating sites
	got = mustGround(t, s, terms, GroundOptions{Atoms: 10})
	got.State.Filling(filling)
	for site, want := range cake {
		near(t, "filling with 10 atoms", filling[site], want, 1e-6)
	}
	terms.Tunnelling[0] = 0
	if _, err := Ground(context.Background(), s, terms, GroundOptions{Atoms: 4.5}); err == nil || !strings.Contains(err.Error(), "no chemical potential") {
		t.Errorf("4.5 atoms without tunnelling: got %v, want an error", err)
	}
}

func TestGroundRefuses(t *testing.T) {
	g := mustGrid(t, []int{5}, []bool{true})
	s := mustSystem(t, g, 4)
	floor, ceiling := Terms{Tunnelling: [3]float64{1}, Interaction: 1}, Terms{Tunnelling: [3]float64{1}, Interaction: -1}
	for _, tc := range []struct {
		terms Terms
		opt   GroundOptions
		want  string
	}{
		{floor, GroundOptions{Ceiling: true}, "no ceiling"},
		{ceiling, GroundOptions{}, "no floor"},
		{ceiling, GroundOptions{Ceiling: true}, "ring of 5 sites along axis 0 is frustrated"},
		{Terms{Tunnelling: [3]float64{-1}, Interaction: 1}, GroundOptions{}, "frustrated"},
		{floor, GroundOptions{Atoms: 11}, "11 atoms"},
		{floor, GroundOptions{Atoms: -1}, "-1 atoms"},
		{floor, GroundOptions{Atoms: math.NaN()}, "NaN atoms"},
		{floor, GroundOptions{ChemicalPotential: math.NaN()}, "mu = NaN"},
		{floor, GroundOptions{Tolerance: 1e-20}, "tolerance 1e-20"},
		{floor, GroundOptions{MaxSweeps: -1}, "-1 sweeps"},
		{Terms{Interaction: math.NaN()}, GroundOptions{}, "NaN"},
		{Terms{Weights: []float64{1}}, GroundOptions{}, "1 weights for 0"},
	} {
		if _, err := Ground(context.Background(), s, tc.terms, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v, %+v: got %v, want an error with %q", tc.terms, tc.opt, err, tc.want)
		}
	}
}

// What was reached comes with the error.
func TestGroundFallsShort(t *testing.T) {
	s, terms := cloud(t, 1)
	got, err := Ground(context.Background(), s, terms, GroundOptions{MaxSweeps: 3})
	var short *NotConvergedError
	if !errors.As(err, &short) || short.Sweeps != 3 || got == nil || got.Sweeps != 3 || !(got.Residual > 1e-10) {
		t.Errorf("three sweeps: %+v, %v, want a *NotConvergedError", got, err)
	}
	small := mustSystem(t, s.Grid, 3, s.Shapes...)
	got, err = Ground(context.Background(), small, terms, GroundOptions{ChemicalPotential: 300})
	var cut *CutoffError
	if !errors.As(err, &cut) || cut.Levels != 3 || got == nil {
		t.Errorf("three levels: %v, want a *CutoffError with a state", err)
	}
}

func TestGroundStops(t *testing.T) {
	g := mustGrid(t, []int{300, 300}, []bool{false, false})
	s := mustSystem(t, g, 6)
	best := time.Hour
	for range 3 {
		ctx, cancel := context.WithCancel(context.Background())
		var begin time.Time
		opt := GroundOptions{ChemicalPotential: 0.1, Tolerance: 1e-14, Progress: func(done, total int) {
			if done == 2 {
				begin = time.Now()
				cancel()
			}
		}}
		if _, err := Ground(ctx, s, Terms{Tunnelling: [3]float64{1, 1}, Interaction: 1}, opt); !errors.Is(err, context.Canceled) {
			t.Fatalf("got %v, want context.Canceled", err)
		}
		best = min(best, time.Since(begin))
	}
	if best > 50*time.Millisecond {
		t.Errorf("a stop took %v, want under 50 ms", best)
	}
}

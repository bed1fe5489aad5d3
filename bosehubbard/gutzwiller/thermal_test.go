package gutzwiller

import (
	"context"
	"errors"
	"math"
	"math/cmplx"
	"slices"
	"strings"
	"testing"
)

func mustThermal(t testing.TB, s *System, terms Terms, heat Heat) *State {
	t.Helper()
	state, err := Thermal(context.Background(), s, terms, heat)
	if err != nil {
		t.Fatal(err)
	}
	return state
}

// Over many equal sites both draws show the thermal distribution and the order
// parameter of the single site, at either sign of T, to five standard deviations; the
// variance of a probability between 0 and 1 of mean p is at most p(1-p).
func TestThermalIsTheSite(t *testing.T) {
	const count = 20000
	g := mustGrid(t, []int{count}, []bool{false})
	s := mustSystem(t, g, 14)
	for _, tc := range []struct{ mu, j, temperature float64 }{{0.4, 0, 0.2}, {0.4, 0.05, 0.15}, {0.6, 0.4, 0.4}} {
		for _, sign := range []float64{1, -1} {
			want := mustSolve(t, Site{sign * tc.mu, sign, 2 * tc.j, sign * tc.temperature})
			for _, draw := range []Draw{Phases, Levels} {
				terms := Terms{Tunnelling: [3]float64{tc.j}, Interaction: sign}
				state := mustThermal(t, s, terms, Heat{sign * tc.mu, sign * tc.temperature, draw, 11})
				p := make([]float64, count)
				for n := range 4 {
					state.Occupation(p, n)
					mean, wanted := 0.0, want.Distribution[n]
					for _, w := range p {
						mean += w / count
					}
					near(t, "probability", mean, wanted, 5*math.Sqrt(wanted*(1-wanted)/count)+3./count)
				}
				field := make([]complex128, count)
				state.Field(field)
				sum, square := complex(0, 0), 0.0
				for site, phase := range g.Stagger() {
					if sign > 0 {
						phase = 1
					}
					sum += complex(phase/count, 0) * field[site]
					square += norm(field[site]) / count
				}
				near(t, "order", cmplx.Abs(sum-complex(want.Order, 0)), 0, 5*math.Sqrt(square/count)+1e-12)
			}
		}
	}
}

// In a trap every site has the distribution of its own chemical potential: the weights
// of random phases are exact without tunnelling.
func TestThermalInATrap(t *testing.T) {
	g := mustGrid(t, []int{31}, []bool{false})
	s := mustSystem(t, g, 10, g.Squares(0))
	for _, sign := range []float64{1, -1} {
		terms := Terms{Interaction: sign * 100, Weights: []float64{sign}}
		state := mustThermal(t, s, terms, Heat{sign * 120, sign * 15, Phases, 3})
		if !slices.Equal(state.Seeds, []uint64{3}) {
			t.Errorf("seeds %v, want 3", state.Seeds)
		}
		p := make([]float64, 31)
		for site, x := range g.Squares(0) {
			want := mustSolve(t, Site{sign * (120 - x), sign * 100, 0, sign * 15})
			for n := range 4 {
				state.Occupation(p, n)
				near(t, "probability", p[site], want.Distribution[n], 1e-12)
			}
		}
	}
}

// Levels picks Fock states where nothing moves.
func TestThermalPicksLevels(t *testing.T) {
	g := mustGrid(t, []int{200}, []bool{false})
	s := mustSystem(t, g, 8)
	terms := Terms{Interaction: 1}
	heat := Heat{ChemicalPotential: 0.5, Temperature: 0.2, Draw: Levels, Seed: 1}
	a := mustThermal(t, s, terms, heat)
	m, err := a.Measure(terms)
	if err != nil {
		t.Fatal(err)
	}
	if m.Coherent != 0 || math.Abs(m.Atoms-math.Round(m.Atoms)) > 1e-12 || m.SiteShares[0] == 0 || m.SiteShares[2] == 0 {
		t.Errorf("%+v, want whole atoms with holes and pairs", m)
	}
	if b := mustThermal(t, s, terms, heat); !slices.Equal(a.amplitudes, b.amplitudes) {
		t.Error("one seed gave two states")
	}
	heat.Seed = 2
	if b := mustThermal(t, s, terms, heat); slices.Equal(a.amplitudes, b.amplitudes) {
		t.Error("two seeds gave one state")
	}
}

func TestThermalRefuses(t *testing.T) {
	g := mustGrid(t, []int{5}, []bool{true})
	s := mustSystem(t, g, 4)
	good := Heat{ChemicalPotential: 0.5, Temperature: 0.1}
	for _, tc := range []struct {
		terms Terms
		heat  Heat
		want  string
	}{
		{Terms{Interaction: 1}, Heat{0.5, -0.1, Phases, 0}, "no bound"},
		{Terms{}, good, "no bound"},
		{Terms{Interaction: 1}, Heat{2.5, 0.1, Phases, 0}, "4 levels are too few"},
		{Terms{Interaction: 1}, Heat{math.NaN(), 0.1, Phases, 0}, "finite"},
		{Terms{Interaction: 1}, Heat{0.5, 0.1, 2, 0}, "draw 2"},
		{Terms{Interaction: -1, Tunnelling: [3]float64{1}}, Heat{-0.5, -0.1, Phases, 0}, "frustrated"},
		{Terms{Interaction: 1, Weights: []float64{1}}, good, "1 weights for 0"},
	} {
		if _, err := Thermal(context.Background(), s, tc.terms, tc.heat); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v, %+v: got %v, want an error with %q", tc.terms, tc.heat, err, tc.want)
		}
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Thermal(ctx, s, Terms{Interaction: 1}, good); !errors.Is(err, context.Canceled) {
		t.Errorf("stopped: got %v, want context.Canceled", err)
	}
}

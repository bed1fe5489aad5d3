package gutzwiller

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"sort"
)

// Draw says how a thermal mixture becomes pure states. The mean of |f><f| over the
// seeds is the thermal state of the site for both.
type Draw int

const (
	// Phases gives every eigenstate of a site its thermal weight and a random phase.
	Phases Draw = iota

	// Levels picks one eigenstate per site with its thermal probability; frozen
	// insulators become Fock states with defects, and their number of atoms fluctuates.
	Levels
)

// Heat is what Thermal draws from.
type Heat struct {
	ChemicalPotential float64 // Hz, from the centre of the band where the potential is 0
	Temperature       float64 // kT/h, Hz; of the sign of the interaction
	Draw              Draw
	Seed              uint64
}

// Thermal draws a state from the thermal distribution of every site by itself, at the
// chemical potential mu - V_i and with the order parameter that the site would have
// among equals; its phase is the one that belongs to the end of the spectrum.
//
// Good where the potential changes slowly or the tunnelling is small, and as poor as
// the single site in the superfluid. Sites of equal potential are solved once.
//
// It returns the errors of Solver.Solve, of terms that do not fit, an error if the
// system has too few levels, so that one would be above 1e-4 in the last, or if the
// end of the spectrum does not fit the grid, and ctx.Err().
func Thermal(ctx context.Context, s *System, terms Terms, heat Heat) (*State, error) {
	if err := s.check(terms); err != nil {
		return nil, err
	}
	signs, err := s.Grid.order(terms, terms.Interaction < 0)
	if err != nil {
		return nil, err
	}
	if heat.Draw != Phases && heat.Draw != Levels {
		return nil, fmt.Errorf("gutzwiller: draw %d, want Phases or Levels", heat.Draw)
	}
	site := Site{Interaction: terms.Interaction, Temperature: heat.Temperature}
	for a := range s.Grid.Axes {
		site.Coupling += 2 * math.Abs(terms.Tunnelling[a])
	}
	v := s.potential(terms)
	state := NewState(s)
	state.Seeds = []uint64{heat.Seed}
	solver, f := NewSolver(), make([]complex128, s.Levels)
	last := math.NaN()
	for _, at := range byValue(v) {
		if v[at] != last {
			if err := ctx.Err(); err != nil {
				return nil, err
			}
			last, site.ChemicalPotential = v[at], heat.ChemicalPotential-v[at]
			if err := solver.solveFor(site, s.Levels); err != nil {
				return nil, fmt.Errorf("%w (site %d)", err, at)
			}
		}
		solver.draw(f, signs[at], heat.Draw, rand.New(rand.NewPCG(heat.Seed, thermalStream+uint64(at))))
		if err := state.SetSite(at, f); err != nil {
			return nil, err
		}
	}
	return state, nil
}

// byValue returns the indices of v in the order of its values.
func byValue(v []float64) []int {
	list := make([]int, len(v))
	for i := range list {
		list[i] = i
	}
	sort.SliceStable(list, func(i, j int) bool { return v[list[i]] < v[list[j]] })
	return list
}

// solveFor is Solve with a look at what is above the levels of a system.
func (w *Solver) solveFor(site Site, levels int) error {
	if _, err := w.Solve(site); err != nil {
		return err
	}
	above := 0.0
	for n := levels - 1; n < w.levels; n++ {
		above += w.distribution[n]
	}
	if above > coherentTail {
		return fmt.Errorf("gutzwiller: probability %.2g of more than %d atoms, want at most %g: %d levels are too few",
			above, levels-2, coherentTail, levels)
	}
	return nil
}

// draw writes a state of the mixture to f; sign is that of phi.
func (w *Solver) draw(f []complex128, sign float64, draw Draw, random *rand.Rand) {
	clear(f)
	if draw == Levels {
		w.addState(f, w.pick(random.Float64()), 1)
	} else {
		for k, p := range w.weights {
			sin, cos := math.Sincos(2 * math.Pi * random.Float64())
			w.addState(f, k, complex(math.Sqrt(p)*cos, math.Sqrt(p)*sin))
		}
	}
	for n := 1; n < len(f); n += 2 {
		f[n] *= complex(sign, 0)
	}
}

// pick returns the state at which the sum of the weights passes a number in [0, 1).
func (w *Solver) pick(sum float64) int {
	last := 0
	for k, p := range w.weights {
		if p > 0 {
			last = k
		}
		if sum < p {
			return k
		}
		sum -= p
	}
	return last // the weights add up to 1 but for rounding
}

// addState adds c times the eigenstate k to f.
func (w *Solver) addState(f []complex128, k int, c complex128) {
	for n := range min(len(f), w.levels) {
		f[n] += c * complex(w.vectors[n*w.levels+k], 0)
	}
}

// order returns the sign of phi at every site at one end of the spectrum: neighbours
// along an axis agree if J > 0 at the floor or J < 0 at the ceiling, and differ
// otherwise.
//
// It returns an error if signs cannot differ around an odd periodic axis.
func (g *Grid) order(terms Terms, ceiling bool) ([]float64, error) {
	signs := make([]float64, g.Sites)
	for i := range signs {
		signs[i] = 1
	}
	for a := range g.Axes {
		j := terms.Tunnelling[a]
		if j == 0 || j > 0 != ceiling {
			continue
		}
		if n := g.length[a]; g.periodic[a] && n > 1 && n%2 == 1 {
			return nil, fmt.Errorf("gutzwiller: ring of %d sites along axis %d is frustrated at this end of the spectrum, want an even number", n, a)
		}
		for i := range signs {
			if g.index(i)[a]%2 == 1 {
				signs[i] = -signs[i]
			}
		}
	}
	return signs, nil
}

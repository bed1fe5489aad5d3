package exact

import (
	"context"
	"errors"
	"fmt"
	"math"
	"testing"

	"hilltop/bosehubbard/fock"
)

// With a limit of the occupation both ends move inwards, and an eigenvalue of the
// whole lies within the bound; where the end stands apart it is the end.
func TestCutoffBoundsItsError(t *testing.T) {
	for _, s := range []system{
		chain(6, 6, false, 4, 0.1), chain(6, 6, true, 4, 0), chain(7, 6, false, 2, 0), chain(6, 5, false, -4, -0.3),
		{[]int{2, 3}, []bool{false, false}, 5, plane()},
	} {
		whole := s.solve(t, Options{EndStates: true})
		last := math.Inf(1)
		for most := (s.atoms+s.sites[0]-1)/s.sites[0] + 1; most <= s.atoms; most++ {
			ends := s.solve(t, Options{MaxOccupation: most})
			name := fmt.Sprintf("%v sites, U = %g, at most %d", s.sites, s.model.Interaction, most)
			rounding := 1e-12 * (1 + math.Abs(whole.Ceiling) + math.Abs(whole.Floor))
			if ends.Floor < whole.Floor-rounding || ends.Ceiling > whole.Ceiling+rounding {
				t.Errorf("%s: %g to %g, outside of %g to %g", name, ends.Floor, ends.Ceiling, whole.Floor, whole.Ceiling)
			}
			if s.model.Interaction > 0 { // the floor stands apart
				if bound := math.Hypot(ends.FloorCutoff, ends.FloorResidual); ends.Floor-whole.Floor > bound+rounding {
					t.Errorf("%s: floor %g too high, bound %g", name, ends.Floor-whole.Floor, bound)
				}
				if ends.FloorCutoff > last {
					t.Errorf("%s: bound %g, more than %g with a tighter limit", name, ends.FloorCutoff, last)
				}
				last = ends.FloorCutoff
			}
			if most == s.atoms && (ends.FloorCutoff != 0 || ends.CeilingCutoff != 0 || ends.Dimension != whole.Dimension) {
				t.Errorf("%s: bounds %g and %g where nothing is cut off", name, ends.FloorCutoff, ends.CeilingCutoff)
			}
			if most < s.atoms && !(ends.FloorCutoff > 0) {
				t.Errorf("%s: bound %g, want it positive", name, ends.FloorCutoff)
			}
		}
	}
}

// The bound is at most sqrt(z) times what H really takes out of the space, which is
// measured in the whole space.
func TestCutoffIsTight(t *testing.T) {
	s := chain(6, 6, false, 4, 0.1)
	h := operator(t, s, fock.Options{})
	ends, vector := truncated(t, s, 3)
	x, y := make([]float64, h.Len()), make([]float64, h.Len())
	for state, amplitude := range vector {
		x[h.Rank(state[:])] = amplitude
	}
	h.ApplyTo(y, x, h.NewWorkspace(1))
	outside := 0.0
	state := make([]int, 6)
	for rank, v := range y {
		h.State(state, rank)
		for _, n := range state {
			if n > 3 {
				outside += v * v
				break
			}
		}
	}
	exact := math.Sqrt(outside)
	if !(ends.FloorCutoff >= exact*(1-1e-9) && ends.FloorCutoff <= math.Sqrt2*exact*(1+1e-9)) {
		t.Errorf("bound %g, H takes %g out of the space", ends.FloorCutoff, exact)
	}
}

func operator(t *testing.T, s system, opt fock.Options) *fock.Operator {
	t.Helper()
	h, err := fock.NewOperatorOf(context.Background(), s.terms(t), s.atoms, opt)
	if err != nil {
		t.Fatal(err)
	}
	return h
}

// truncated returns the floor with a limit and its vector by state.
func truncated(t *testing.T, s system, most int) (Ends, map[[6]int]float64) {
	t.Helper()
	solve := &solver{ctx: context.Background(), terms: s.terms(t), atoms: s.atoms, opt: Options{MaxOccupation: most, Sector: SectorWhole}}
	ends, err := solve.run()
	if err != nil {
		t.Fatal(err)
	}
	vector := map[[6]int]float64{}
	state := make([]int, 6)
	for rank, v := range solve.floor.vector {
		solve.floor.operator.State(state, rank)
		vector[[6]int(state)] = v
	}
	return ends, vector
}

func TestCutoffRefuses(t *testing.T) {
	l, m := mustChain(t, 4)
	for most, want := range map[int]bool{1: true, 2: false, -1: true} {
		_, err := Solve(context.Background(), l, m, 5, Options{MaxOccupation: most})
		if (err != nil) != want || errors.Is(err, context.Canceled) {
			t.Errorf("5 atoms on 4 sites, at most %d: %v", most, err)
		}
	}
}

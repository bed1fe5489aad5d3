package fock

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"testing"
)

// Expectation values in random vectors, in the space and in both sectors, against
// sums over all states.
func TestObservables(t *testing.T) {
	for _, s := range systems(t) {
		for _, parity := range []int{0, 1, -1} {
			if _, ok := s.terms.Mirror(); parity != 0 && !ok {
				continue
			}
			h := mustOperator(t, s.terms, s.atoms, Options{Parity: parity})
			x := make([]float64, h.Len())
			h.RandomTo(x, 3, 1)
			checkObservables(t, fmt.Sprintf("%s, parity %d", s.name, parity), h, x)
		}
	}
}

func checkObservables(t *testing.T, name string, h *Operator, x []float64) {
	t.Helper()
	sites := h.terms.Sites
	full := plainVector(h, newPlainBasis(sites, h.atoms), x)
	states := everyState(sites, h.atoms)
	rank := map[string]int{}
	for r, state := range states {
		rank[fmt.Sprint(state)] = r
	}
	n, square, correlations := make([]float64, sites), make([]float64, sites), make([]float64, sites*sites)
	w := h.NewWorkspace(2)
	err := errors.Join(h.Occupations(context.Background(), n, square, x, w),
		h.Correlations(context.Background(), correlations, x, make([]float64, len(x)), w))
	if err != nil {
		t.Errorf("%s: %v", name, err)
	}
	tolerance := 1e-13 * (1 + float64(h.atoms*h.atoms)*dot(x, x))
	for i := range sites {
		want, wantSquare := 0.0, 0.0
		for r, state := range states {
			k := float64(state[i])
			want += full[r] * full[r] * k
			wantSquare += full[r] * full[r] * k * k
		}
		if math.Abs(n[i]-want) > tolerance || math.Abs(square[i]-wantSquare) > tolerance {
			t.Errorf("%s, site %d: <n> = %.15g, <n^2> = %.15g, want %.15g, %.15g", name, i, n[i], square[i], want, wantSquare)
		}
		for j := range sites {
			want := 0.0
			for r, state := range states {
				if state[j] == 0 {
					continue
				}
				moved := slices.Clone(state)
				moved[j]--
				moved[i]++
				want += full[rank[fmt.Sprint(moved)]] * full[r] * math.Sqrt(float64(state[j]*moved[i]))
			}
			if got := correlations[i*sites+j]; math.Abs(got-want) > tolerance {
				t.Errorf("%s: <b_%d^+ b_%d> = %.15g, want %.15g", name, i, j, got, want)
			}
		}
	}
}

func TestObservablesStop(t *testing.T) {
	h := mustOperator(t, systems(t)[10].terms, 5, Options{})
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	x := make([]float64, h.Len())
	if err := h.Correlations(ctx, make([]float64, h.terms.Sites*h.terms.Sites), x, make([]float64, len(x)), h.NewWorkspace(1)); !errors.Is(err, context.Canceled) {
		t.Errorf("stopped: %v, want context.Canceled", err)
	}
}

package report

import (
	"context"
	"math"
	"slices"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/plan"
)

// growLimit is the largest number of states solved while judging.
const growLimit = 10_000

// grow solves smaller copies of the model at the same filling, and the model
// itself, while they have at most growLimit states, so that one sees whether
// E_max/N converges. V is scaled as N^(-2/d).
func grow(ctx context.Context, m *plan.Model, end bosehubbard.Model) ([]Grown, error) {
	var list []Grown
	for _, sites := range smaller(m.Sites) {
		atoms := int(math.Round(float64(m.Atoms) * float64(product(sites)) / float64(product(m.Sites))))
		if atoms == 0 || fock.LogDimension(product(sites), atoms) > math.Log(growLimit) {
			continue
		}
		box, err := lattice.Box(sites, periodicOf(m))
		if err != nil {
			return nil, err
		}
		ends, err := exact.Solve(ctx, box, scaled(end, float64(m.Atoms)/float64(atoms)), atoms, exact.Options{})
		if err != nil {
			return nil, err
		}
		list = append(list, Grown{
			Sites: sites, Atoms: atoms,
			Floor: ends.Floor / float64(atoms), Ceiling: ends.Ceiling / float64(atoms),
		})
	}
	return list, nil
}

// smaller lists boxes of the same shape, from small to the given one.
func smaller(sites []int) [][]int {
	var list [][]int
	const steps = 6
	for k := 1; k <= steps; k++ {
		box := make([]int, len(sites))
		for i, n := range sites {
			box[i] = max(1, int(math.Round(float64(n)*float64(k)/steps)))
		}
		if len(list) == 0 || !slices.Equal(list[len(list)-1], box) {
			list = append(list, box)
		}
	}
	return list
}

func product(sites []int) int {
	p := 1
	for _, n := range sites {
		p *= n
	}
	return p
}

func periodicOf(m *plan.Model) []bool {
	if m.Periodic != nil {
		return m.Periodic
	}
	return make([]bool, len(m.Sites))
}

// scaled is the model with V multiplied by ratio^(2/d).
func scaled(m bosehubbard.Model, ratio float64) bosehubbard.Model {
	factor := math.Pow(ratio, 2/float64(len(m.Axes)))
	out := bosehubbard.Model{Interaction: m.Interaction, Axes: append([]bosehubbard.AxisTerms(nil), m.Axes...)}
	for i := range out.Axes {
		out.Axes[i].Curvature *= factor
	}
	return out
}

package thermo

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"
)

// ErrOutOfRange says that no state of the levels has the energy asked for.
var ErrOutOfRange = errors.New("energy out of the range of the levels")

// Levels are many independent bodies, each with the same few levels: the spins of
// a crystal in a field, say.
type Levels struct {
	Energies     []float64 // E/h of each level, Hz, in any order
	Degeneracies []float64 // of each level; nil: 1 each
	Bodies       float64   // how many bodies; 0: without end

	InnerTime float64 // in which the bodies reach equilibrium among themselves, s
	OuterTime float64 // in which they reach it with everything else, s
	Unbounded bool    // the list goes on upwards without end
}

// check refuses what is no list of levels.
func (l Levels) check() error {
	if len(l.Energies) < 1 {
		return fmt.Errorf("thermo: no levels, want at least 1")
	}
	for i, e := range l.Energies {
		if math.IsNaN(e) || !(math.Abs(e) <= 1e150) { // squares stay finite
			return fmt.Errorf("thermo: energy %g Hz of level %d, want a finite number up to 1e150", e, i)
		}
	}
	if l.Degeneracies != nil && len(l.Degeneracies) != len(l.Energies) {
		return fmt.Errorf("thermo: %d degeneracies for %d levels, want one each", len(l.Degeneracies), len(l.Energies))
	}
	for i, g := range l.Degeneracies {
		if !(g > 0) || math.IsInf(g, 1) {
			return fmt.Errorf("thermo: degeneracy %g of level %d, want a number above 0", g, i)
		}
	}
	if !(l.Bodies >= 0) || math.IsInf(l.Bodies, 1) {
		return fmt.Errorf("thermo: %g bodies, want a finite number, or 0 for no end", l.Bodies)
	}
	return nil
}

// degeneracy returns the states of level i.
func (l Levels) degeneracy(i int) float64 {
	if l.Degeneracies == nil {
		return 1
	}
	return l.Degeneracies[i]
}

// ladder holds the distinct energies in ascending order with their weights.
type ladder struct {
	energy []float64 // Hz
	weight []float64 // states per energy
	rung   []int     // rung[i] is the place of level i in energy
}

// ladder sorts the levels and merges those of equal energy.
func (l Levels) ladder() (ladder, error) {
	if err := l.check(); err != nil {
		return ladder{}, err
	}
	order := make([]int, len(l.Energies))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Compare(l.Energies[a], l.Energies[b]) })
	out := ladder{rung: make([]int, len(order))}
	for _, i := range order {
		last := len(out.energy) - 1
		if last < 0 || out.energy[last] != l.Energies[i] {
			out.energy = append(out.energy, l.Energies[i])
			out.weight = append(out.weight, 0)
			last++
		}
		out.weight[last] += l.degeneracy(i)
		out.rung[i] = last
	}
	return out, nil
}

func (r ladder) lowest() float64  { return r.energy[0] }
func (r ladder) highest() float64 { return r.energy[len(r.energy)-1] }

// spacing returns the smallest distance of two energies, 0 if there is one.
func (r ladder) spacing() float64 {
	if len(r.energy) < 2 {
		return 0
	}
	least := math.Inf(1)
	for i := 1; i < len(r.energy); i++ {
		least = min(least, r.energy[i]-r.energy[i-1])
	}
	return least
}

// mean returns the energy per body at beta = 0, Hz.
func (r ladder) mean() float64 {
	sum, states := 0.0, 0.0
	for i, e := range r.energy {
		sum += r.weight[i] * e
		states += r.weight[i]
	}
	return sum / states
}

// mirrored is the ladder of -E.
func (r ladder) mirrored() ladder {
	out := ladder{energy: slices.Clone(r.energy), weight: slices.Clone(r.weight)}
	slices.Reverse(out.energy)
	slices.Reverse(out.weight)
	for i := range out.energy {
		out.energy[i] = -out.energy[i]
	}
	return out
}

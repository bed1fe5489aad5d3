package fock

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// Terms is a Bose-Hubbard Hamiltonian written out site by site and bond by bond,
//
//	H = sum_hops A (b_i^+ b_j + b_j^+ b_i) + (U/2) sum_i n_i (n_i - 1) + sum_i P_i n_i
//
// for couplings that a Model cannot hold: a tunnelling per bond, further
// neighbours, any potential. Energies are E/h in Hz.
type Terms struct {
	Sites       int
	Hops        []Hop
	Potential   []float64 // P_i, Hz, of length Sites; nil: none
	Interaction float64   // U, Hz

	// Mirrors are permutations of the sites that may be symmetries, such as the
	// reflections of the lattice; what is none is passed over.
	Mirrors [][]int

	// Translations that may be symmetries, for the sectors of quasi-momentum.
	Translations []lattice.Translation
}

// Hop lets an atom go from either of two sites to the other. Its Amplitude is the
// matrix element, -J. Hops between the same two sites add up.
type Hop struct {
	From, To  int
	Amplitude float64 // Hz
}

// TermsOf writes out a model on a lattice, with -J of its axis for every bond.
// Bonds along an axis without tunnelling are dropped.
//
// It returns an error if the model has not the lattice's axes.
func TermsOf(l *lattice.Lattice, m bosehubbard.Model) (*Terms, error) {
	if len(m.Axes) != l.Axes {
		return nil, fmt.Errorf("fock: model of %d axes on a lattice of %d, want the same", len(m.Axes), l.Axes)
	}
	t := &Terms{
		Sites: l.Sites, Interaction: m.Interaction,
		Potential: make([]float64, l.Sites), Mirrors: l.Reflections(), Translations: l.Translations,
	}
	for site, p := range l.Positions {
		for a, terms := range m.Axes {
			t.Potential[site] += (terms.Curvature*p[a] + terms.Tilt) * p[a]
		}
	}
	for _, b := range l.Bonds {
		if j := m.Axes[b.Axis].Tunnelling; j != 0 {
			t.Hops = append(t.Hops, Hop{From: b.From, To: b.To, Amplitude: -j})
		}
	}
	return t, nil
}

// AddTunnelling adds -J of its axis for every bond in a list, such as the second
// neighbours of lattice.SecondBonds with J2 of each axis in Hz.
//
// It returns an error if a bond has an axis without a value.
func (t *Terms) AddTunnelling(bonds []lattice.Bond, tunnelling []float64) error {
	for _, b := range bonds {
		if b.Axis < 0 || b.Axis >= len(tunnelling) {
			return fmt.Errorf("fock: bond along axis %d, want one of the %d with a tunnelling", b.Axis, len(tunnelling))
		}
		t.Hops = append(t.Hops, Hop{From: b.From, To: b.To, Amplitude: -tunnelling[b.Axis]})
	}
	return nil
}

// check refuses what is no Hamiltonian of that many atoms, and energies that are
// not finite or could overflow in a sum.
func (t *Terms) check(atoms int) error {
	if err := check(t.Sites, atoms); err != nil {
		return err
	}
	if t.Potential != nil && len(t.Potential) != t.Sites {
		return fmt.Errorf("fock: %d potentials for %d sites, want one each", len(t.Potential), t.Sites)
	}
	n := float64(atoms)
	bound := math.Abs(t.Interaction) * n * n
	for site, v := range t.Potential {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return fmt.Errorf("fock: potential %g Hz on site %d, want a finite number", v, site)
		}
		bound = max(bound, math.Abs(v)*n)
	}
	for _, hop := range t.Hops {
		if hop.From < 0 || hop.From >= t.Sites || hop.To < 0 || hop.To >= t.Sites || hop.From == hop.To {
			return fmt.Errorf("fock: hop from site %d to %d, want two different ones of %d", hop.From, hop.To, t.Sites)
		}
		bound = max(bound, math.Abs(hop.Amplitude)*n*float64(len(t.Hops)))
	}
	if !(bound < math.MaxFloat64/8) {
		return fmt.Errorf("fock: interaction %g Hz and energies up to %g Hz for %d atoms, want finite ones", t.Interaction, bound, atoms)
	}
	return nil
}

// potential returns P of one site.
func (t *Terms) potential(site int) float64 {
	if t.Potential == nil {
		return 0
	}
	return t.Potential[site]
}

// bond is a hop between two different numbers, of sites or of places in a part.
type bond struct {
	low, high int
	amplitude float64 // Hz
}

// bonds adds up the hops between the same two sites and leaves out those without
// amplitude, in the order of the sites.
func (t *Terms) bonds() []bond {
	all := make([]bond, 0, len(t.Hops))
	for _, h := range t.Hops {
		all = append(all, bond{min(h.From, h.To), max(h.From, h.To), h.Amplitude})
	}
	slices.SortStableFunc(all, func(a, b bond) int {
		return cmp.Or(cmp.Compare(a.low, b.low), cmp.Compare(a.high, b.high))
	})
	merged := all[:0]
	for _, b := range all {
		if n := len(merged); n > 0 && merged[n-1].low == b.low && merged[n-1].high == b.high {
			merged[n-1].amplitude += b.amplitude
		} else {
			merged = append(merged, b)
		}
	}
	return slices.DeleteFunc(merged, func(b bond) bool { return b.amplitude == 0 })
}

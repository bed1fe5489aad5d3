package eos

import (
	"context"
	"fmt"
	"math"

	"gonum.org/v1/gonum/mat"
)

// clusterAtoms is the largest number of atoms on a cluster: 455 states on four sites.
const clusterAtoms = 12

// spectrum holds all states of a graph with up to clusterAtoms atoms.
type spectrum struct {
	sites  int
	energy []float64
	atoms  []float64
	pairs  []float64 // sum over the sites of n(n-1)/2
	counts []float64 // sites with k atoms, Occupations for each state

	weight []float64
}

// solve diagonalises a graph, calling step after each number of atoms.
func solve(ctx context.Context, g graph, tunnelling []float64, u float64, step func()) (*spectrum, error) {
	s := &spectrum{sites: g.sites}
	for atoms := range clusterAtoms + 1 {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		if err := s.sector(g, tunnelling, u, atoms); err != nil {
			return nil, err
		}
		step()
	}
	s.weight = make([]float64, len(s.energy))
	return s, nil
}

// sector adds the states of one number of atoms, those that a swap of sites leaves as
// they are and those whose sign it changes apart.
func (s *spectrum) sector(g graph, tunnelling []float64, u float64, atoms int) error {
	for _, parity := range []float64{1, -1} {
		b := newBasis(g, atoms, parity)
		if len(b.states) == 0 {
			continue
		}
		var eig mat.EigenSym
		if !eig.Factorize(b.hamiltonian(g, tunnelling, u), true) {
			return fmt.Errorf("eos: %d atoms on %d sites could not be diagonalised", atoms, g.sites)
		}
		var vectors mat.Dense
		eig.VectorsTo(&vectors)
		s.collect(b.states, eig.Values(nil), vectors.RawMatrix().Data, g.sites, atoms)
	}
	return nil
}

// collect appends the averages of the states with the columns of vectors.
func (s *spectrum) collect(states []occupied, values, vectors []float64, sites, atoms int) {
	n := len(states)
	first := len(s.counts)
	s.counts = append(s.counts, make([]float64, n*Occupations)...)
	for k, e := range values {
		pairs := 0.0
		counts := s.counts[first+k*Occupations:]
		for i, state := range states {
			p := vectors[i*n+k] * vectors[i*n+k]
			pairs += p * pairsOf(state)
			for _, occupation := range state[:sites] {
				counts[min(int(occupation), Occupations-1)] += p
			}
		}
		s.energy, s.atoms, s.pairs = append(s.energy, e), append(s.atoms, float64(atoms)), append(s.pairs, pairs)
	}
}

// sums are grand canonical averages of a cluster, all of them extensive.
type sums struct {
	filling, entropy, energy, pairs float64
	counts                          [Occupations]float64
	top                             float64 // probability of clusterAtoms atoms
}

// average returns the averages of a cluster at a chemical potential and beta > 0.
func (s *spectrum) average(mu, beta float64) sums {
	lowest := math.Inf(1)
	for i, e := range s.energy {
		s.weight[i] = e - mu*s.atoms[i]
		lowest = min(lowest, s.weight[i])
	}
	total, heat := 0.0, 0.0
	for i, h := range s.weight {
		p := 1.0
		if h > lowest {
			p = math.Exp(-beta * (h - lowest))
			if p > 0 {
				heat += p * beta * (h - lowest)
			}
		}
		s.weight[i] = p
		total += p
	}
	out := sums{entropy: math.Log(total) + heat/total}
	for i, p := range s.weight {
		if p == 0 {
			continue
		}
		p /= total
		out.filling += p * s.atoms[i]
		out.energy += p * s.energy[i]
		out.pairs += p * s.pairs[i]
		for k, c := range s.counts[i*Occupations : (i+1)*Occupations] {
			out.counts[k] += p * c
		}
		if s.atoms[i] == clusterAtoms {
			out.top += p
		}
	}
	return out
}

// add adds times the sums of another cluster.
func (s *sums) add(o sums, times float64) {
	s.filling += times * o.filling
	s.entropy += times * o.entropy
	s.energy += times * o.energy
	s.pairs += times * o.pairs
	for k := range s.counts {
		s.counts[k] += times * o.counts[k]
	}
	s.top = max(s.top, o.top)
}

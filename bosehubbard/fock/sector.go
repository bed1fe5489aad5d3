package fock

import (
	"context"
	"slices"
)

// sector is the part of the Hamiltonian inside one half of the sites, for a fixed
// number of atoms there: the energies of its states and the hops between them.
//
// The hops of a state stand together in pairs, those of states with equally many
// pairs one after the other, so that a loop over all of them has few surprises for
// the processor.
type sector struct {
	count    int
	energy   []float64 // of each state without its hops, Hz
	span     []span    // where the pairs of each state stand
	order    []int32   // the states by their number of pairs
	classEnd []int32   // order[:classEnd[k]] have at most k pairs
	pairs    []hopPair
}

// hopPair are two hops to one state; a single one has a second element of 0.
type hopPair struct {
	first, second         float64 // matrix elements, Hz
	fromFirst, fromSecond uint32  // states that the hops come from
}

// span is a stretch of pairs.
type span struct{ begin, length int32 }

// part is one half: its basis and the terms inside it, by place in its own order.
type part struct {
	*space
	bonds       []bond // between places of the part
	potential   []float64
	interaction float64
}

// newPart collects the terms among the given sites.
func newPart(t *Terms, sites []int, atoms, most int) *part {
	p := &part{space: newSpace(len(sites), atoms, most), interaction: t.Interaction}
	place := make(map[int]int, len(sites))
	for k, i := range sites {
		place[i] = k
		p.potential = append(p.potential, t.potential(i))
	}
	for _, b := range t.bonds() {
		low, here := place[b.low]
		if high, ok := place[b.high]; here && ok {
			p.bonds = append(p.bonds, bond{low, high, b.amplitude})
		}
	}
	return p
}

// numberOfHops counts the hops of all states of t atoms: each hop of the part
// leads both ways from every state with an atom to give and room to take it.
func (p *part) numberOfHops(t int) int {
	if t < 1 || len(p.bonds) == 0 {
		return 0
	}
	if p.most >= t {
		return 2 * len(p.bonds) * p.ways[p.sites][t-1]
	}
	pairs := 0 // states of the two sites of a hop, with the others free
	for low := 1; low <= min(t, p.most); low++ {
		for high := 0; high < p.most && low+high <= t; high++ {
			pairs += p.ways[p.sites-2][t-low-high]
		}
	}
	return 2 * len(p.bonds) * pairs
}

// build computes the sector of t atoms, looking at ctx between stretches of states.
// It takes the memory of old, a sector of as many states, if that is not nil.
func (p *part) build(ctx context.Context, t int, old *sector) (*sector, error) {
	s := old
	if s == nil {
		n := p.count(t)
		s = &sector{count: n, energy: make([]float64, n), span: make([]span, n), order: make([]int32, n)}
	}
	if err := p.sort(ctx, s, t); err != nil {
		return nil, err
	}
	state := make([]int, p.sites)
	for k, i := range s.order {
		if k%stretch == 0 && ctx.Err() != nil {
			return nil, ctx.Err()
		}
		p.state(state, t, int(i))
		s.energy[i] = p.energyOf(state)
		begin := len(s.pairs)
		p.appendHops(s, state)
		s.span[i] = span{int32(begin), int32(len(s.pairs) - begin)}
	}
	return s, nil
}

// stretch is the number of states handled between two looks at a context.
const stretch = 1 << 12

// sort orders the states by their number of pairs, keeping the order of equals, and
// makes room for the pairs.
func (p *part) sort(ctx context.Context, s *sector, t int) error {
	state := make([]int, p.sites)
	p.first(state, t)
	pairs, total := make([]int32, s.count), 0
	for i := range pairs {
		if i%stretch == 0 && ctx.Err() != nil {
			return ctx.Err()
		}
		hops := int32(0)
		for _, b := range p.bonds {
			hops += p.way(state[b.low], state[b.high]) + p.way(state[b.high], state[b.low])
		}
		pairs[i] = (hops + 1) / 2
		total += int(pairs[i])
		p.next(state)
	}
	if s.count == 0 {
		return nil
	}
	s.pairs = slices.Grow(s.pairs[:0], total)
	s.classEnd = make([]int32, slices.Max(pairs)+1)
	for _, k := range pairs {
		s.classEnd[k]++
	}
	begin := int32(0)
	for k, n := range s.classEnd {
		s.classEnd[k] = begin
		begin += n
	}
	for i, k := range pairs {
		s.order[s.classEnd[k]] = int32(i)
		s.classEnd[k]++
	}
	return nil
}

// way is 1 if an atom can go from a site with `from` atoms to one with `to`.
func (p *part) way(from, to int) int32 {
	if from > 0 && to < p.most {
		return 1
	}
	return 0
}

// energyOf returns the energy of a state without hops.
func (p *part) energyOf(state []int) float64 {
	sum := 0.0
	for i, n := range state {
		if n > 0 {
			sum += float64(n) * (p.interaction/2*float64(n-1) + p.potential[i])
		}
	}
	return sum
}

package fock

import (
	"context"
	"math"
	"slices"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard/num/blocks"
)

// Bloch is the Hamiltonian in the sector of one quasi-momentum, E/h in Hz: the
// states
//
//	|k> = (|G| S)^(-1/2) sum_g chi_g^* g |n>
//
// with one state n of each orbit of the |G| translations g, S of which keep it, and
// the characters chi_g = exp(2 pi i sum_a m_a j_a / L_a). It lists its hops, which is
// the price for a space that is smaller by the number of translations. Where the
// quasi-momentum is not 0 or pi, the amplitudes are complex; a vector then holds
// all real parts and after them all imaginary ones, and every level comes twice.
type Bloch struct {
	space     *space
	group     *group
	bonds     []bond
	atoms     int
	rank      []int     // of the first states of the orbits, in order
	weight    []float64 // of each, see group.weight
	diagonal  []float64
	rows      []blochRows
	dimension int
	workers   int
	sums      []float64
}

// blochRows are the hops to a stretch of states.
type blochRows struct {
	first    []int32 // row r of the stretch has the hops first[r] to first[r+1]-1
	from     []int32
	re, im   []float64 // im is nil if it is 0
	from0, n int
}

// blochLength is the number of states in a stretch.
const blochLength = 1 << 12

// NewBloch builds the sector of quasi-momentum 2 pi m_a / L_a along each of the
// translations of the terms. opt.Parity must be 0. Cost: for each state of the
// space some comparisons with its images, for each of the sector its hops.
//
// It returns the errors of NewOperatorOf, and one if the terms have not as many
// translations, or one that is no symmetry.
func NewBloch(ctx context.Context, t *Terms, atoms int, m []int, workers int, opt Options) (*Bloch, error) {
	if err := t.check(atoms); err != nil {
		return nil, err
	}
	opt, err := opt.checked(t.Sites, atoms)
	if err != nil {
		return nil, err
	}
	g, err := newGroup(t, m)
	if err != nil {
		return nil, err
	}
	if err := opt.fitBloch(t, atoms, g); err != nil {
		return nil, err
	}
	most := atoms
	if opt.MaxOccupation > 0 {
		most = min(most, opt.MaxOccupation)
	}
	b := &Bloch{space: newSpace(t.Sites, atoms, most), group: g, bonds: t.bonds(), atoms: atoms, workers: blocks.Workers(workers)}
	if err := b.findOrbits(ctx); err != nil {
		return nil, err
	}
	return b, b.build(ctx, t)
}

// fitBloch refuses what does not fit, before it is built: the orbits are about as
// many as the states over the translations.
func (o Options) fitBloch(t *Terms, atoms int, g *group) error {
	size := float64(len(g.back))
	states := math.Exp(LogDimension(t.Sites, atoms)) / size
	hops := 2 * float64(len(t.bonds())) * math.Exp(LogDimension(t.Sites, max(atoms-1, 0))) / size
	if o.MaxOccupation > 0 && o.MaxOccupation < atoms {
		if err := o.fitTables(t.Sites, atoms); err != nil {
			return err
		}
		states = float64(newSpace(t.Sites, atoms, o.MaxOccupation).count(atoms)) / size
		hops = 2 * float64(len(t.bonds())) * states // at most
	}
	if atoms == 0 {
		hops = 0
	}
	perHop, perVector := 12.0, 8.0
	if !g.isReal {
		perHop, perVector = 20, 16
	}
	wanted := min(states*(28+perVector*float64(o.Vectors))+hops*perHop+tableBytes(t.Sites, atoms), maxBytes)
	if wanted > float64(o.MemoryBytes) || states > math.MaxInt32 {
		return tooLarge(t.Sites, atoms, wanted, o)
	}
	return nil
}

// findOrbits lists the first states of the orbits that have a part in the sector.
func (b *Bloch) findOrbits(ctx context.Context) error {
	states := b.space.count(b.atoms)
	count := (states + blochLength - 1) / blochLength
	ranks, weights := make([][]int, count), make([][]float64, count)
	err := blocks.Run(ctx, b.workers, count, func(_, i int) {
		state := make([]int, b.space.sites)
		b.space.state(state, b.atoms, i*blochLength)
		for rank := i * blochLength; rank < min((i+1)*blochLength, states); rank++ {
			if w := b.group.weight(state); w > 0 {
				ranks[i] = append(ranks[i], rank)
				weights[i] = append(weights[i], w)
			}
			b.space.next(state)
		}
	})
	b.rank, b.weight = slices.Concat(ranks...), slices.Concat(weights...)
	b.dimension = len(b.rank)
	return err
}

// build lists the hops of all stretches.
func (b *Bloch) build(ctx context.Context, t *Terms) error {
	b.diagonal = make([]float64, b.dimension)
	b.rows = make([]blochRows, (b.dimension+blochLength-1)/blochLength)
	b.sums = make([]float64, len(b.rows))
	whole := newPart(t, numbering(t.Sites), 0, 0) // for the energies
	return blocks.Run(ctx, b.workers, len(b.rows), func(_, i int) {
		r := &b.rows[i]
		r.from0, r.n = i*blochLength, min(blochLength, b.dimension-i*blochLength)
		r.first = append(r.first, 0)
		state, moved, first := make([]int, t.Sites), make([]int, t.Sites), make([]int, t.Sites)
		for k := r.from0; k < r.from0+r.n; k++ {
			b.space.state(state, b.atoms, b.rank[k])
			b.diagonal[k] = whole.energyOf(state)
			for _, hop := range b.bonds {
				for _, way := range [2][2]int{{hop.low, hop.high}, {hop.high, hop.low}} {
					if from, to := way[0], way[1]; state[from] > 0 && state[to] < b.space.most {
						copy(moved, state)
						moved[from]--
						moved[to]++
						b.addHop(r, k, moved, first, hop.amplitude*math.Sqrt(float64(state[from]*moved[to])))
					}
				}
			}
			r.first = append(r.first, int32(len(r.from)))
		}
		r.from, r.re, r.im = slices.Clip(r.from), slices.Clip(r.re), slices.Clip(r.im)
	})
}

// addHop adds the element between orbit k and the one of a state that a hop leads
// to: with state = g^-1 first, <k|H|a> is h chi_g (S_a/S_k)^(1/2), conjugated twice.
func (b *Bloch) addHop(r *blochRows, k int, state, first []int, h float64) {
	g := b.group.first(first, state)
	a, ok := slices.BinarySearch(b.rank, b.space.rank(first))
	if !ok {
		return // no part in the sector
	}
	value := complex(h*math.Sqrt(b.weight[a]/b.weight[k]), 0) * b.group.character[g]
	r.from = append(r.from, int32(a))
	r.re = append(r.re, real(value))
	if !b.group.isReal {
		r.im = append(r.im, imag(value))
	}
}

// Len returns the length of the vectors: the dimension, or twice that where the
// amplitudes are complex.
func (b *Bloch) Len() int {
	if b.group.isReal {
		return b.dimension
	}
	return 2 * b.dimension
}

// Dimension returns the number of states of the sector.
func (b *Bloch) Dimension() int { return b.dimension }

// Project does nothing: every vector belongs to the sector.
func (b *Bloch) Project(context.Context, []float64) error { return nil }

// Combine sets dst = a H x + c dst and returns x.dst; with c = 0 what stands in
// dst does not matter. Every number of workers gives the same bits.
//
// It returns ctx.Err() if stopped. It panics if a length is wrong.
func (b *Bloch) Combine(ctx context.Context, dst, x []float64, a, c float64) (float64, error) {
	if len(dst) != b.Len() || len(x) != b.Len() {
		panic("fock: vectors of another length than the sector's")
	}
	err := blocks.Run(ctx, b.workers, len(b.rows), func(_, i int) {
		r := &b.rows[i]
		lo, hi := r.from0, r.from0+r.n
		if c == 0 {
			clear(dst[lo:hi])
		}
		r.apply(dst[lo:hi], x[:b.dimension], b.diagonal[lo:hi], a, c)
		b.sums[i] = floats.Dot(x[lo:hi], dst[lo:hi])
		if !b.group.isReal {
			d := b.dimension
			if c == 0 {
				clear(dst[d+lo : d+hi])
			}
			r.apply(dst[d+lo:d+hi], x[d:], b.diagonal[lo:hi], a, c)
			r.cross(dst[lo:hi], x[d:], -a)
			r.cross(dst[d+lo:d+hi], x[:d], a)
			b.sums[i] = floats.Dot(x[lo:hi], dst[lo:hi]) + floats.Dot(x[d+lo:d+hi], dst[d+lo:d+hi])
		}
	})
	return floats.Sum(b.sums), err
}

// apply computes y = a (Re H) x + c y for a stretch.
func (r *blochRows) apply(y, x, diagonal []float64, a, c float64) {
	for k := range y {
		sum := diagonal[k] * x[r.from0+k]
		for i := r.first[k]; i < r.first[k+1]; i++ {
			sum += r.re[i] * x[r.from[i]]
		}
		y[k] = a*sum + c*y[k]
	}
}

// cross computes y += a (Im H) x for a stretch.
func (r *blochRows) cross(y, x []float64, a float64) {
	for k := range y {
		sum := 0.0
		for i := r.first[k]; i < r.first[k+1]; i++ {
			sum += r.im[i] * x[r.from[i]]
		}
		y[k] += a * sum
	}
}

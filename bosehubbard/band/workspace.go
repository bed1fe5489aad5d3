package band

import (
	"errors"
	"fmt"
	"math"
)

// ErrDepth marks a lattice depth that is negative, not finite or beyond MaxDepth.
var ErrDepth = errors.New("lattice depth out of range")

// Bands is what one lattice axis gives at one depth. Energies are in Er.
type Bands struct {
	Depth               float64       // s, Er
	Mean, MeanSlope     float64       // mean energy of the lowest band eps(s), Er, and d eps/ds
	Tunnelling          [3]float64    // J1, J2, J3, Er
	Edges               [3][2]float64 // band n at q = 0 and at q = 1, Er
	Width               float64       // of the lowest band, E0(1) - E0(0), Er
	Gap                 float64       // smallest, E1(1) - E0(1), Er
	WannierFourthMoment float64       // int w^4 dxi; multiply by k for int w^4 dx
}

// Workspace holds the scratch of the band solver and the last few answers. It
// belongs to one goroutine.
type Workspace struct {
	rules    rules
	matrix   jacobi
	zone     zone
	bottom   []float64 // coefficients at q = 0, row l + top
	vector   []float64
	inverse  []float64 // (-1)^m/(2m+q), row m + 2 top
	cell     cell
	kept     [8]Bands
	keptNext int
	keptUsed int
}

// NewWorkspace returns the scratch for every depth up to MaxDepth.
func NewWorkspace() *Workspace {
	const n = 2*maxRungs + 1
	return &Workspace{
		rules:   newRules(),
		matrix:  jacobi{make([]float64, n+MaxBands), make([]float64, n+MaxBands)},
		bottom:  make([]float64, n),
		vector:  make([]float64, n),
		inverse: make([]float64, 4*maxRungs+1),
		cell:    newCell(maxPoints),
		zone:    newZone(),
	}
}

// Solve returns the bands at a depth in Er, 0 to MaxDepth.
//
// Energies are good to 1e-15 (4 + s) Er; J1 to a fraction of 1e-13 up to 60 Er,
// 1e-8 at 300 and 2e-7 at MaxDepth, J2 and J3 to that fraction of J1; the fourth
// moment to 1e-12 above 0.1 Er and to 3e-8 towards 0, where the values are those of
// the free band. Cost 20 to 150 us; no allocation. The last eight depths are kept.
//
// It returns ErrDepth if the depth is out of range.
func (w *Workspace) Solve(depth float64) (Bands, error) {
	if err := checkDepth(depth); err != nil {
		return Bands{}, err
	}
	for i := range w.kept[:w.keptUsed] {
		if w.kept[i].Depth == depth {
			return w.kept[i], nil
		}
	}
	b := w.solve(depth)
	w.kept[w.keptNext] = b
	w.keptNext = (w.keptNext + 1) % len(w.kept)
	w.keptUsed = min(w.keptUsed+1, len(w.kept))
	return b, nil
}

func checkDepth(depth float64) error {
	if !(depth >= 0) || depth > MaxDepth {
		return fmt.Errorf("band: depth %g Er, want 0 to %g: %w", depth, MaxDepth, ErrDepth)
	}
	return nil
}

func (w *Workspace) solve(depth float64) Bands {
	if depth < almostFree {
		return freeBands(depth)
	}
	b := Bands{Depth: depth}
	w.edges(&b)
	w.sweep(w.rules.at(depth), &b)
	w.integrals(&b)
	b.WannierFourthMoment = w.fourthMoment(depth)
	return b
}

// edges finds the three bands at both ends of the zone and the vector at q = 0.
func (w *Workspace) edges(b *Bands) {
	top := rungs(b.Depth)
	at := func(p parity, index, band int) float64 {
		w.matrix.fillBlock(p, b.Depth, top)
		return w.matrix.level(b.Depth, index, band, w.vector)
	}
	b.Edges[2] = [2]float64{at(evenCentre, 1, 2), at(evenEdge, 1, 2)}
	b.Edges[1] = [2]float64{at(oddCentre, 0, 1), at(oddEdge, 0, 1)}
	b.Edges[0][0] = at(evenCentre, 0, 0)
	w.bottom = w.bottom[:2*top+1]
	for l := -top; l <= top; l++ {
		w.bottom[l+top] = w.vector[max(l, -l)] / math.Sqrt2
	}
	w.bottom[top] = w.vector[0]
	at(evenEdge, 0, 0)
	b.Width = w.climb(1, w.edgeVector(top))
	b.Edges[0][1] = b.Edges[0][0] + b.Width
	b.Gap = b.Edges[1][1] - b.Edges[0][1]
}

// edgeVector unfolds the even block at q = 1 into plane waves: cos (2l+1)xi is
// half of l and of -l-1.
func (w *Workspace) edgeVector(top int) []float64 {
	c := w.zone.vector[:2*top+1]
	for l := -top; l <= top; l++ {
		c[l+top] = w.vector[max(l, -l-1)] / math.Sqrt2
	}
	return c
}

// sweep follows the lowest band from q = 0 to q = 1 over the points of a rule.
func (w *Workspace) sweep(r *rule, b *Bands) {
	top := rungs(b.Depth)
	z := &w.zone
	z.place(r, b.Depth)
	z.width = 2*top + 1
	energy, slope, last := b.Edges[0][0], 0.0, 0.0
	for i, q := range z.q {
		w.matrix.fill(b.Depth, q, top)
		c := z.row(i)
		energy = w.matrix.eigen(search{
			row: top, guess: energy + slope*(q-last),
			low: energy - 1, high: b.Edges[0][1] + 1,
		}, c)
		z.rise[i] = w.climb(q, c)
		slope, last = velocity(q, c), q
	}
}

// velocity returns dE0/dq = sum_l 2(2l+q) c_l^2, by Hellmann and Feynman.
func velocity(q float64, c []float64) float64 {
	sum := 0.0
	k := q - float64(len(c)-1)
	for _, x := range c {
		sum += 2 * k * x * x
		k += 2
	}
	return sum
}

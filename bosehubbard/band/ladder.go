package band

import "math"

// MaxDepth is the deepest lattice, in Er, that this package solves.
const MaxDepth = 500.0

// maxRungs is rungs(MaxDepth).
const maxRungs = 24

// MaxBands is the largest number of bands Energies gives.
const MaxBands = 8

// rungs returns the largest |l| of the plane waves. At 5 + 4 s^(1/4) the
// coefficients of the lowest three bands have fallen below 1e-17: they follow the
// harmonic exp(-k^2/2 sqrt(s)) at first and fall faster than (s/4k^2)^l beyond.
func rungs(depth float64) int {
	return int(math.Ceil(5 + 4*math.Sqrt(math.Sqrt(depth))))
}

// fill makes t the matrix at quasi-momentum q with |l| <= top; row l + top
// belongs to plane wave l.
func (t *jacobi) fill(depth, q float64, top int) {
	n := 2*top + 1
	t.diag, t.off = t.diag[:n], t.off[:n-1]
	for i := range t.diag {
		k := float64(2*(i-top)) + q
		t.diag[i] = k*k + depth/2
	}
	for i := range t.off {
		t.off[i] = -depth / 4
	}
}

// parity names the four blocks into which H falls at q = 0 and q = 1.
type parity int

const (
	evenCentre parity = iota // q = 0: 1, cos 2xi, cos 4xi, ...
	oddCentre                // q = 0: sin 2xi, sin 4xi, ...
	evenEdge                 // q = 1: cos xi, cos 3xi, ...
	oddEdge                  // q = 1: sin xi, sin 3xi, ...
)

// fillBlock makes t the block of one parity with wave numbers up to 2 top + 1.
func (t *jacobi) fillBlock(p parity, depth float64, top int) {
	first := [...]int{evenCentre: 0, oddCentre: 2, evenEdge: 1, oddEdge: 1}[p]
	n := (2*top+1-first)/2 + 1
	t.diag, t.off = t.diag[:n], t.off[:n-1]
	for i := range t.diag {
		k := float64(first + 2*i)
		t.diag[i] = k*k + depth/2
	}
	for i := range t.off {
		t.off[i] = -depth / 4
	}
	switch p {
	case evenCentre:
		t.off[0] *= math.Sqrt2 // 1 and sqrt(2) cos 2xi
	case evenEdge:
		t.diag[0] -= depth / 4
	case oddEdge:
		t.diag[0] += depth / 4
	}
}

// level returns the energy of one band from its block, where it is number index,
// and writes its vector.
func (t *jacobi) level(depth float64, index, band int, z []float64) float64 {
	n := float64(2 * band)
	harmonic := (n+1)*math.Sqrt(depth) - (n*n/2+n+1)/4
	return t.eigen(search{
		index: index,
		guess: math.Min(harmonic, t.diag[index]),
		low:   -1, high: t.diag[index] + depth + 1, // Gershgorin, and H >= 0
	}, z[:len(t.diag)])
}

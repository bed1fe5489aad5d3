package eos

import (
	"fmt"
	"math"
)

// maxHops is the largest number of tunnelling amplitudes of one axis.
const maxHops = 16

// Terms are those of an endless square lattice of one to three axes that move.
//
//	E(q) = -2 sum_a sum_r Hops[a][r-1] cos(r q_a)
type Terms struct {
	Hops        [][]float64 // of each axis: to the next site, the one after it, ..., Hz
	Interaction float64     // U, Hz
}

// Cosine returns the terms of the tight-binding band with one tunnelling in Hz per
// axis.
func Cosine(tunnelling []float64, interaction float64) Terms {
	t := Terms{Interaction: interaction}
	for _, j := range tunnelling {
		t.Hops = append(t.Hops, []float64{j})
	}
	return t
}

// FromBand returns up to hops tunnelling amplitudes of an axis whose band has the
// energies given, in Hz, evenly spaced from the centre of the zone to its edge with
// both of them.
//
//	J_r = -(1/2N) [E_0 + (-1)^r E_N + 2 sum_{0<i<N} E_i cos(pi r i/N)]
//
// Cost O(hops len(energies)). It returns an error unless there are more than hops
// energies, all finite, and 1 to 16 hops.
//
// Source: derived; the trapezoidal rule of a periodic even function is exact up to
// the harmonic N.
func FromBand(energies []float64, hops int) ([]float64, error) {
	last := len(energies) - 1
	if hops < 1 || hops > maxHops || last < hops {
		return nil, fmt.Errorf("eos: %d amplitudes of %d energies, want 1 to %d and fewer than energies", hops, len(energies), maxHops)
	}
	out := make([]float64, hops)
	for i, e := range energies {
		if !(math.Abs(e) < maxHz) {
			return nil, fmt.Errorf("eos: energy %d of the band is %g Hz, want a finite number", i, e)
		}
		if i == 0 || i == last {
			e /= 2
		}
		for r := range out {
			out[r] -= e * math.Cos(math.Pi*float64((r+1)*i)/float64(last)) / float64(last)
		}
	}
	return out, nil
}

// rising is a band with its lowest point at q = 0 and its highest at q = pi.
type rising struct {
	hops   [][]float64 // of each axis
	bottom float64     // Hz, from the centre
	equal  bool        // all axes are the same
}

// check says what is wrong with the terms.
func (t Terms) check() error {
	if len(t.Hops) < 1 || len(t.Hops) > 3 {
		return fmt.Errorf("eos: %d axes that move, want 1 to 3", len(t.Hops))
	}
	if !(math.Abs(t.Interaction) < maxHz) {
		return fmt.Errorf("eos: U = %g Hz, want a finite number", t.Interaction)
	}
	for a, hops := range t.Hops {
		if len(hops) < 1 || len(hops) > maxHops {
			return fmt.Errorf("eos: axis %d has %d tunnelling amplitudes, want 1 to %d", a, len(hops), maxHops)
		}
		for r, j := range hops {
			if !(math.Abs(j) < maxHz) {
				return fmt.Errorf("eos: axis %d, tunnelling %d is %g Hz, want a finite number", a, r+1, j)
			}
		}
	}
	return nil
}

// band returns the band seen from its floor, or from its ceiling with mirror = -1:
// of every axis in the direction in which it rises.
func (t Terms) band(mirror float64) (rising, error) {
	b := rising{equal: true}
	for a, hops := range t.Hops {
		own := make([]float64, len(hops))
		turn := mirror*hops[0] < 0 // shift by pi: (-1)^r
		for r, j := range hops {
			own[r] = mirror * j
			if turn && r%2 == 0 {
				own[r] = -own[r]
			}
			b.bottom -= 2 * own[r]
		}
		if !rises(own) {
			return rising{}, fmt.Errorf("eos: band of axis %d with tunnelling %g Hz does not rise from one end of the zone to the other", a, hops)
		}
		b.hops = append(b.hops, own)
		for r := range own {
			b.equal = b.equal && len(own) == len(b.hops[0]) && own[r] == b.hops[0][r]
		}
	}
	return b, nil
}

// rises reports whether a band grows all the way, looked at in 64 steps.
func rises(hops []float64) bool {
	last := 0.0
	for i := 1; i <= 64; i++ {
		e := rise(hops, math.Pi*float64(i)/64)
		if !(e > last) {
			return false
		}
		last = e
	}
	return true
}

// rise returns the energy of one axis above its lowest, without cancellation.
//
//	sum_r 4 J_r sin^2(r q/2)
func rise(hops []float64, q float64) float64 {
	sum := 0.0
	for r, j := range hops {
		s := math.Sin(float64(r+1) * q / 2)
		sum += 4 * j * s * s
	}
	return sum
}

// squares returns the sum of J^2 over the bonds of a site, each counted once.
func (t Terms) squares() float64 {
	sum := 0.0
	for _, hops := range t.Hops {
		for _, j := range hops {
			sum += j * j
		}
	}
	return sum
}

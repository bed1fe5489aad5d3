package gutzwiller

import (
	"fmt"
	"math"
	"math/rand/v2"
)

// Fock returns the state with atoms[i] atoms on site i and no others: a Mott
// insulator if all are equal. It stays as it is in time until it gets a seed
// (State.AddNoise).
//
// It returns an error unless there is one number per site, each from 0 to
// Levels-2, so that the last level stays empty.
func Fock(s *System, atoms []int) (*State, error) {
	if len(atoms) != s.Grid.Sites {
		return nil, fmt.Errorf("gutzwiller: atoms on %d sites of %d", len(atoms), s.Grid.Sites)
	}
	state := NewState(s)
	for site, n := range atoms {
		if n < 0 || n > s.Levels-2 {
			return nil, fmt.Errorf("gutzwiller: %d atoms on site %d, want 0 to %d with %d levels", n, site, s.Levels-2, s.Levels)
		}
		state.amplitudes[state.offset(site, 0)] = 0
		state.amplitudes[state.offset(site, n)] = 1
	}
	return state, nil
}

// coherentTail is the largest probability that a coherent state may have above the
// levels.
const coherentTail = 1e-4

// Coherent returns the coherent state with the mean filling of every site and one
// quasi-momentum,
//
//	f_n = e^(-nbar/2) alpha^n / sqrt(n!)    alpha_i = sqrt(nbar_i) e^(i q.x_i)
//
// filling has length Grid.Sites; q is in rad per site, (pi, pi, pi) at the corner of
// the zone, and x is the index along each axis. What lies above the levels is
// cut off and the rest set to norm 1.
//
// It returns an error if a number is negative or not finite, or if the part cut off
// exceeds a probability of 1e-4.
func Coherent(s *System, filling []float64, momentum [3]float64) (*State, error) {
	if len(filling) != s.Grid.Sites {
		return nil, fmt.Errorf("gutzwiller: filling of %d sites of %d", len(filling), s.Grid.Sites)
	}
	for axis, q := range momentum {
		if math.IsNaN(q) || math.IsInf(q, 0) {
			return nil, fmt.Errorf("gutzwiller: quasi-momentum %g along axis %d, want a finite number", q, axis)
		}
	}
	state := NewState(s)
	f := make([]complex128, s.Levels)
	for site, n := range filling {
		if !(n >= 0) || math.IsInf(n, 1) {
			return nil, fmt.Errorf("gutzwiller: filling %g at site %d, want at least 0", n, site)
		}
		if tail := poisson(f, n, momentum, s.Grid.index(site)); tail > coherentTail {
			return nil, fmt.Errorf("gutzwiller: %d levels cut off %.2g of a coherent state of %g atoms at site %d, want at most %g",
				s.Levels, tail, n, site, coherentTail)
		}
		if err := state.SetSite(site, f); err != nil {
			return nil, err
		}
	}
	return state, nil
}

// index returns the index of a site along each axis.
func (g *Grid) index(site int) [3]int {
	return [3]int{site % g.length[0], site / g.length[0] % g.length[1], site / (g.length[0] * g.length[1])}
}

// poisson fills in the amplitudes of a coherent state and returns the probability
// that they leave out.
func poisson(f []complex128, mean float64, momentum [3]float64, at [3]int) float64 {
	angle := 0.0
	for axis, q := range momentum {
		angle += q * float64(at[axis])
	}
	sum := 0.0
	for n := range f {
		size := math.Exp(-mean / 2)
		if n > 0 {
			lg, _ := math.Lgamma(float64(n + 1))
			size = math.Exp((float64(n)*math.Log(mean) - mean - lg) / 2)
		}
		sin, cos := math.Sincos(angle * float64(n))
		f[n] = complex(size*cos, size*sin)
		sum += size * size
	}
	return max(0, 1-sum)
}

// noiseStream and thermalStream keep the random numbers of different uses of one
// seed apart.
const (
	noiseStream   = 0x6e6f697365
	thermalStream = 0x746865726d
)

// AddNoise adds fluctuations of one particle and one hole to every site, a seed from
// which an insulator can move,
//
//	f -> f + size (xi b^+ + zeta b) f, set to norm 1
//
// with complex normal xi, zeta of variance 1, independent from site to site; the
// last level gets nothing. A site of n atoms comes to hold another number with a
// probability of (2n+1) size^2 on average. The seed is noted in the state.
//
// It returns an error unless 0 <= size <= 1.
func (s *State) AddNoise(size float64, seed uint64) error {
	if !(size >= 0 && size <= 1) {
		return fmt.Errorf("gutzwiller: noise of size %g, want 0 to 1", size)
	}
	s.Seeds = append(s.Seeds, seed)
	random := rand.New(rand.NewPCG(seed, noiseStream))
	levels := s.System.Levels
	old, f := make([]complex128, levels), make([]complex128, levels)
	for site := range s.System.Grid.Sites {
		xi := complex(random.NormFloat64()*size/math.Sqrt2, random.NormFloat64()*size/math.Sqrt2)
		zeta := complex(random.NormFloat64()*size/math.Sqrt2, random.NormFloat64()*size/math.Sqrt2)
		s.Site(old, site)
		copy(f, old)
		for n := range levels - 1 {
			root := complex(math.Sqrt(float64(n+1)), 0)
			if n+1 < levels-1 {
				f[n+1] += xi * root * old[n]
			}
			f[n] += zeta * root * old[n+1]
		}
		if err := s.SetSite(site, f); err != nil {
			return err
		}
	}
	return nil
}

package gutzwiller

import (
	"fmt"
	"math"
	"slices"
)

// width is the number of sites of a block. The amplitudes of a block lie together,
// level by level, the real parts of its sites before the imaginary parts.
const width = 64

// lane is one row of a block.
type lane = [width]float64

// State is a product state: one vector of amplitudes per site.
type State struct {
	System *System
	Seeds  []uint64 // of all random numbers that went into it, in order

	amplitudes []float64 // by block, level, part, site of the block
}

// NewState returns the state with no atoms.
func NewState(s *System) *State {
	state := &State{System: s, amplitudes: make([]float64, s.Grid.padded*2*s.Levels)}
	for site := range s.Grid.Sites {
		state.amplitudes[state.offset(site, 0)] = 1
	}
	return state
}

// Clone returns a copy that shares nothing but the system.
func (s *State) Clone() *State {
	return &State{System: s.System, Seeds: slices.Clone(s.Seeds), amplitudes: slices.Clone(s.amplitudes)}
}

// offset is the place of the real part of an amplitude; the imaginary part stands
// width further.
func (s *State) offset(site, level int) int {
	return (site/width*s.System.Levels+level)*2*width + site%width
}

// Site writes the amplitudes f_0, f_1, ... of a site to dst, which has length
// System.Levels.
func (s *State) Site(dst []complex128, site int) {
	for n := range s.System.Levels {
		at := s.offset(site, n)
		dst[n] = complex(s.amplitudes[at], s.amplitudes[at+width])
	}
}

// SetSite gives a site the amplitudes f, scaled to norm 1. Missing levels are 0.
//
// It returns an error if f is longer than System.Levels, not finite or zero, or if
// there is no such site.
func (s *State) SetSite(site int, f []complex128) error {
	if site < 0 || site >= s.System.Grid.Sites {
		return fmt.Errorf("gutzwiller: site %d of %d", site, s.System.Grid.Sites)
	}
	if len(f) > s.System.Levels {
		return fmt.Errorf("gutzwiller: %d amplitudes for %d levels at site %d", len(f), s.System.Levels, site)
	}
	largest := 0.0
	for _, a := range f {
		largest = max(largest, math.Abs(real(a)), math.Abs(imag(a)))
	}
	if !(largest > 0) || math.IsInf(largest, 1) {
		return fmt.Errorf("gutzwiller: amplitudes %v at site %d, want finite ones, not all zero", f, site)
	}
	sum := 0.0
	for _, a := range f {
		re, im := real(a)/largest, imag(a)/largest
		sum += re*re + im*im
	}
	scale := 1 / math.Sqrt(sum)
	for n := range s.System.Levels {
		at := s.offset(site, n)
		s.amplitudes[at], s.amplitudes[at+width] = 0, 0
		if n < len(f) {
			s.amplitudes[at], s.amplitudes[at+width] = real(f[n])/largest*scale, imag(f[n])/largest*scale
		}
	}
	return nil
}

// Filling writes the mean number of atoms <n> of every site to dst, of length
// Grid.Sites.
func (s *State) Filling(dst []float64) {
	for site := range dst {
		sum := 0.0
		for n := 1; n < s.System.Levels; n++ {
			sum += float64(n) * s.weight(site, n)
		}
		dst[site] = sum
	}
}

// Occupation writes the probability of n atoms on every site to dst, of length
// Grid.Sites; it is 0 for n outside the levels.
func (s *State) Occupation(dst []float64, n int) {
	for site := range dst {
		dst[site] = 0
		if n >= 0 && n < s.System.Levels {
			dst[site] = s.weight(site, n)
		}
	}
}

func (s *State) weight(site, n int) float64 {
	at := s.offset(site, n)
	re, im := s.amplitudes[at], s.amplitudes[at+width]
	return re*re + im*im
}

// Field writes phi = <b> of every site to dst, of length Grid.Sites.
func (s *State) Field(dst []complex128) {
	for site := range dst {
		dst[site] = s.field(site)
	}
}

func (s *State) field(site int) complex128 {
	var sumRe, sumIm float64
	for n := 1; n < s.System.Levels; n++ {
		low, high := s.offset(site, n-1), s.offset(site, n)
		a, b := s.amplitudes[low], s.amplitudes[low+width]
		c, d := s.amplitudes[high], s.amplitudes[high+width]
		root := math.Sqrt(float64(n))
		sumRe += root * (a*c + b*d)
		sumIm += root * (a*d - b*c)
	}
	return complex(sumRe, sumIm)
}

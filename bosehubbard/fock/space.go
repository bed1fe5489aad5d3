package fock

import "math"

// space is the number basis of some sites, at most `most` atoms on each, for any
// number of atoms up to `atoms`.
//
// States of t atoms are in descending lexicographic order. So adding an atom to
// the first site keeps the order, and the place too where most is no limit.
type space struct {
	sites, atoms, most int

	// ways[m][t] is the number of states of t atoms on the last m sites, or
	// math.MaxInt where it is beyond that.
	ways [][]int
}

// newSpace fills the table of numbers of states.
func newSpace(sites, atoms, most int) *space {
	reach := atoms // the most that the sites can hold
	if most < atoms && sites < atoms {
		reach = min(atoms, sites*most)
	}
	if sites == 0 {
		reach = 0
	}
	s := &space{sites: sites, atoms: reach, most: min(most, reach)}
	if sites > 1 { // the only states of one site need no table
		s.fill()
	}
	return s
}

func (s *space) fill() {
	s.ways = make([][]int, s.sites+1)
	table := make([]int, (s.sites+1)*(s.atoms+1))
	for m := range s.ways {
		row := table[m*(s.atoms+1) : (m+1)*(s.atoms+1)]
		s.ways[m] = row
		if m == 0 {
			row[0] = 1
			continue
		}
		// One site more, with 0 to most atoms on it.
		before, sum := s.ways[m-1], 0
		for t := range row {
			if s.most == s.atoms {
				sum = saturatingSum(sum, before[t])
			} else {
				sum = 0
				for k := range min(t, s.most) + 1 {
					sum = saturatingSum(sum, before[t-k])
				}
			}
			row[t] = sum
		}
	}
}

// saturatingSum adds two numbers that are not negative; math.MaxInt is the most.
func saturatingSum(a, b int) int {
	if a > math.MaxInt-b {
		return math.MaxInt
	}
	return a + b
}

// count returns the number of states of t atoms, 0 if t is out of range.
func (s *space) count(t int) int {
	if t < 0 || t > s.atoms {
		return 0
	}
	if s.sites <= 1 {
		return 1
	}
	return s.ways[s.sites][t]
}

// rank returns the place of a state among those with as many atoms.
func (s *space) rank(state []int) int {
	if s.sites <= 1 {
		return 0
	}
	left := 0
	for _, n := range state {
		left += n
	}
	rank := 0
	for i, n := range state {
		behind := s.ways[s.sites-1-i] // states with more atoms here come first
		for k := n + 1; k <= min(left, s.most); k++ {
			rank += behind[left-k]
		}
		left -= n
	}
	return rank
}

// state writes the state of t atoms with the given rank to dst.
func (s *space) state(dst []int, t, rank int) {
	if s.sites == 1 {
		dst[0] = t
		return
	}
	for i := range dst {
		behind := s.ways[s.sites-1-i]
		n := min(t, s.most)
		for rank >= behind[t-n] {
			rank -= behind[t-n]
			n--
		}
		dst[i] = n
		t -= n
	}
}

// first writes the first state of t atoms: as many as possible on the first sites.
func (s *space) first(dst []int, t int) {
	for i := range dst {
		dst[i] = min(t, s.most)
		t -= dst[i]
	}
}

// next replaces a state by the one that follows it, and reports whether there is
// one. The last site that can lose an atom to those behind it does, and all that
// stood behind it moves up. Cost O(1) on average for most sites.
func (s *space) next(state []int) bool {
	behind, room := 0, 0 // atoms and free places to the right of site i
	for i := len(state) - 1; i >= 0; i-- {
		if state[i] > 0 && room > 0 {
			state[i]--
			s.first(state[i+1:], behind+1)
			return true
		}
		behind += state[i]
		room += s.most - state[i]
	}
	return false
}

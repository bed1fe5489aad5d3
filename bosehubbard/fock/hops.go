package fock

import "math"

// appendHops adds the hops that lead to a state, which H being symmetric are those
// that lead away from it.
func (p *part) appendHops(s *sector, state []int) {
	isOpen := false // whether the last pair has room
	for _, b := range p.bonds {
		for _, way := range [2][2]int{{b.low, b.high}, {b.high, b.low}} {
			from, to := way[0], way[1]
			if p.way(state[from], state[to]) == 0 {
				continue
			}
			element := b.amplitude * math.Sqrt(float64(state[from])*float64(state[to]+1))
			state[from]--
			state[to]++
			rank := uint32(p.rank(state))
			state[from]++
			state[to]--
			if isOpen {
				last := &s.pairs[len(s.pairs)-1]
				last.second, last.fromSecond = element, rank
			} else {
				s.pairs = append(s.pairs, hopPair{first: element, fromFirst: rank, fromSecond: rank})
			}
			isOpen = !isOpen
		}
	}
}

// ladder is b or b^+ of one site of a part: for every state of some number of
// atoms, the one state that the operator takes there.
type ladder struct {
	from    []int32   // its rank among those of one atom more or less; -1: none
	element []float64 // sqrt of the larger number of atoms on the site
	runs    []run     // the same by stretches along which from rises by one
}

// run is a stretch of states that come from a stretch.
type run struct{ to, from, length int32 }

// newLadder builds the ladder that leads to the states of t atoms from those with
// step more on one site: b for step 1, b^+ for step -1.
func (p *part) newLadder(site, t, step int) *ladder {
	n := p.count(t)
	l := &ladder{from: make([]int32, n), element: make([]float64, n)}
	state := make([]int, p.sites)
	p.first(state, t)
	for i := range l.from {
		l.from[i] = -1
		if now := state[site] + step; now >= 0 && now <= p.most {
			l.element[i] = math.Sqrt(float64(max(now, state[site])))
			state[site] += step
			l.from[i] = int32(p.rank(state))
			state[site] -= step
		}
		l.extend(int32(i))
		p.next(state)
	}
	return l
}

// extend adds a state to the runs.
func (l *ladder) extend(to int32) {
	from := l.from[to]
	if from < 0 {
		return
	}
	if n := len(l.runs); n > 0 {
		last := &l.runs[n-1]
		if last.to+last.length == to && last.from+last.length == from {
			last.length++
			return
		}
	}
	l.runs = append(l.runs, run{to: to, from: from, length: 1})
}

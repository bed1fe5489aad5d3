package ceiling

import "math"

// Term is one term of the energy with its bounds.
type Term struct {
	Name   string // kinetic, interaction, trap_x, trap_y, trap_z
	Bounds Interval
	Motion Motion // of the axis of a trap term; Moving for the others
	Reason string // why an axis adds no bound
}

// terms lists every term; only those that move enter the total.
func (s *System) terms(motions []Motion) ([]Term, Interval) {
	list := []Term{s.kinetic(motions), s.interaction()}
	total := list[0].Bounds.plus(list[1].Bounds)
	for i, a := range s.Axes {
		term := s.trap(i, a)
		term.Motion = motions[i]
		if motions[i] == Moving {
			total = total.plus(term.Bounds)
		} else {
			term.Reason = s.stillness(a, motions[i])
		}
		list = append(list, term)
	}
	return list, total
}

func (s *System) stillness(a Axis, m Motion) string {
	if m == Layered {
		return say("layered: tilt %v Hz per site is at least 4J = %v Hz", math.Abs(a.Tilt), 4*math.Abs(a.Tunnelling))
	}
	return say("frozen: J hold / ħ = %v is at most 0.1", 2*math.Pi*math.Abs(a.Tunnelling)*s.Hold)
}

// kinetic sums the band edges over the moving axes.
func (s *System) kinetic(motions []Motion) Term {
	var sum Interval
	for i, a := range s.Axes {
		if motions[i] == Moving {
			sum = sum.plus(a.Band)
		}
	}
	return Term{Name: "kinetic", Bounds: sum, Motion: Moving}
}

// interaction bounds (U/2N) sum n(n-1): from the most even filling, which costs
// nothing where there are sites enough, to all atoms on one site, U(N-1)/2,
// which grows without end.
func (s *System) interaction() Term {
	u := s.Interaction
	if !s.HasInteraction {
		u = s.ScatteringLength
	}
	even := 0.0
	if s.Box != nil {
		even = u * EvenPairs(s.Box.sites(), s.Box.Atoms)
	}
	t := Term{Name: "interaction", Motion: Moving}
	switch {
	case u > 0:
		t.Bounds = Interval{even, math.Inf(1)}
	case u < 0:
		t.Bounds = Interval{math.Inf(-1), even}
	}
	return t
}

// EvenPairs returns the smallest possible sum of n(n-1)/2 per atom, that of the
// most even filling of the sites. It is 0 for no atoms.
func EvenPairs(sites, atoms int) float64 {
	if atoms == 0 {
		return 0
	}
	low, over := atoms/sites, atoms%sites
	pairs := float64(sites-over)*pairsOf(low) + float64(over)*pairsOf(low+1)
	return pairs / float64(atoms)
}

func pairsOf(n int) float64 { return float64(n) * float64(n-1) / 2 }

func (b *Box) sites() int {
	product := 1
	for _, n := range b.Sites {
		product *= n
	}
	return product
}

// trap bounds V x^2 + F x about its own summit (or lowest point). In a box the
// sites nearest to the middle of an even axis stand half a site off it.
func (s *System) trap(i int, a Axis) Term {
	middle := 0.0
	if s.Box != nil && s.Box.Sites[i]%2 == 0 {
		middle = a.Curvature / 4
	}
	t := Term{Name: "trap_" + a.Name}
	switch {
	case a.Curvature > 0:
		t.Bounds = Interval{middle, math.Inf(1)}
	case a.Curvature < 0:
		t.Bounds = Interval{math.Inf(-1), middle}
	case a.Tilt != 0:
		t.Bounds = Interval{math.Inf(-1), math.Inf(1)}
	}
	return t
}

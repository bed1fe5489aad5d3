package ceiling

// energy: the state must lie on the wanted side of infinite temperature. At
// beta = 0 bosons at mean filling n have <n(n-1)> = 2 n^2 and no kinetic energy,
// so T < 0 wants
//
//	E_kin + U <n(n-1)>/2 per site > U n^2
//
// and T > 0 the reverse. The trap is left out: at beta = 0 it has no lower end.
// In a trap n is sum n^2 / sum n over occupied sites. A Fock state has E_kin = 0.
// It is judged only where a state is given.
func (s *System) energy([]Motion) (Criterion, bool) {
	if s.Box == nil || s.Box.Fock == nil || s.Interaction == 0 {
		return Criterion{}, false
	}
	var atoms, squares, pairs, occupied float64
	for _, n := range s.Box.Fock {
		if n > 0 {
			occupied++
		}
		atoms += float64(n)
		squares += float64(n) * float64(n)
		pairs += pairsOf(n)
	}
	if atoms == 0 {
		return Criterion{}, false
	}
	sites := float64(len(s.Box.Fock))
	filling := atoms / sites
	if s.trapped() {
		sites, filling = occupied, squares/atoms
	}
	have, infinite := s.Interaction*pairs/sites, s.Interaction*filling*filling
	margin := -s.wanted(have - infinite)
	return Criterion{
		Name: "energy", Passed: margin > 0, Margin: margin, Unit: "Hz", Breaks: Astray,
		Detail: say("energy %v Hz per site against %v Hz at infinite temperature", have, infinite),
	}, true
}

func (s *System) trapped() bool {
	for _, a := range s.Axes {
		if a.Curvature != 0 {
			return true
		}
	}
	return false
}

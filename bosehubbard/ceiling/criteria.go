package ceiling

import (
	"math"

	"hilltop/bosehubbard/si"
)

// Verdict says what becomes of a state of the wanted sign.
type Verdict string

// The verdicts, from best to worst.
const (
	Sealed Verdict = "sealed" // bounded with margin for the whole hold
	Leaky  Verdict = "leaky"  // bounded, but a channel drains it or nothing holds it
	Astray Verdict = "astray" // bounded, but on the other side of infinite temperature
	Open   Verdict = "open"   // some term is unbounded: no equilibrium there
)

var severity = map[Verdict]int{Sealed: 0, Leaky: 1, Astray: 2, Open: 3}

// Worse reports whether v is a worse verdict than w.
func (v Verdict) Worse(w Verdict) bool { return severity[v] > severity[w] }

// Criterion is one condition with the room left to it.
type Criterion struct {
	Name   string
	Passed bool
	Margin float64 // in Unit; not negative where passed, not positive where broken
	Unit   string
	Breaks Verdict // what a broken one makes of the verdict
	Detail string  // the numbers in words
}

// criterion passes where margin >= 0.
func criterion(name string, margin float64, unit string, breaks Verdict, detail string) Criterion {
	return Criterion{Name: name, Passed: margin >= 0, Margin: margin, Unit: unit, Breaks: breaks, Detail: detail}
}

// Assessment is the answer for one System.
type Assessment struct {
	Verdict  Verdict
	Motions  []Motion
	Terms    []Term
	Total    Interval
	Criteria []Criterion
}

// Criterion returns the named criterion; ok is false where it was not computed.
func (a *Assessment) Criterion(name string) (c Criterion, ok bool) {
	for _, c := range a.Criteria {
		if c.Name == name {
			return c, true
		}
	}
	return Criterion{}, false
}

// Broken lists the names of the criteria that do not hold.
func (a *Assessment) Broken() []string {
	var names []string
	for _, c := range a.Criteria {
		if !c.Passed {
			names = append(names, c.Name)
		}
	}
	return names
}

// Assess bounds every term and judges every criterion that can be judged.
//
// It returns an error only if the scan for the edge fails.
func Assess(s *System) (*Assessment, error) {
	a := &Assessment{Motions: s.Motions(), Verdict: Sealed}
	a.Terms, a.Total = s.terms(a.Motions)
	a.Criteria = append(a.Criteria, s.interactionCriterion())
	a.Criteria = append(a.Criteria, s.trapCriteria(a.Motions)...)
	for _, judge := range []func([]Motion) (Criterion, bool){s.tilt, s.oneBand, s.layers, s.held, s.energy} {
		if c, ok := judge(a.Motions); ok {
			a.Criteria = append(a.Criteria, c)
		}
	}
	c, ok, err := s.edge(a.Motions)
	if err != nil {
		return nil, err
	}
	if ok {
		a.Criteria = append(a.Criteria, c)
	}
	for _, c := range a.Criteria {
		if !c.Passed && c.Breaks.Worse(a.Verdict) {
			a.Verdict = c.Breaks
		}
	}
	return a, nil
}

// wanted is v counted positive where it helps the wanted sign of T; never -0.
func (s *System) wanted(v float64) float64 {
	if v == 0 {
		return 0
	}
	return float64(s.Sign) * v
}

// interactionCriterion: for T < 0 the energy of N atoms on one site, U(N-1)/2
// per atom, must not grow upwards, so U <= 0; the reverse for T > 0.
func (s *System) interactionCriterion() Criterion {
	if !s.HasInteraction {
		a := s.ScatteringLength / si.BohrRadius
		return criterion("interaction", s.wanted(a), "a0", Open, say("a = %v a0; too shallow for an on-site U", plus(a)))
	}
	return criterion("interaction", s.wanted(s.Interaction), "Hz", Open,
		say("U = %v Hz, %v", plus(s.Interaction), attraction(s.Interaction)))
}

func attraction(u float64) string {
	switch {
	case u < 0:
		return "attractive"
	case u > 0:
		return "repulsive"
	}
	return "none"
}

// trapCriteria judges each moving axis; one that does not move needs no bound.
func (s *System) trapCriteria(motions []Motion) []Criterion {
	var list []Criterion
	for i, a := range s.Axes {
		value, unit := s.steepness(a)
		if motions[i] != Moving {
			continue
		}
		detail := say("%v %v %v along %v", confinement(value), plus(value), unit, a.Name)
		list = append(list, criterion("trap_"+a.Name, s.wanted(value), unit, Open, detail))
	}
	return list
}

// steepness is the signed trap frequency of an apparatus, V of a model.
func (s *System) steepness(a Axis) (value float64, unit string) {
	if s.Box == nil {
		return a.Trap, "Hz"
	}
	return a.Curvature, "Hz/site2"
}

func confinement(v float64) string {
	switch {
	case v < 0:
		return "anti-trap"
	case v > 0:
		return "trap"
	}
	return "no trap,"
}

// tilt: a linear tilt along a moving axis is bounded only where a curvature of
// the right sign stops it. Along a layered axis it only localises.
func (s *System) tilt(motions []Motion) (Criterion, bool) {
	margin, detail, any := math.Inf(1), "", false
	for i, a := range s.Axes {
		if a.Tilt == 0 {
			continue
		}
		any = true
		if motions[i] != Moving {
			continue
		}
		value, unit := s.steepness(a)
		room := s.wanted(value)
		if room == 0 {
			room = -math.Abs(a.Tilt)
		}
		if room < margin {
			margin, detail = room, say("%v Hz per site along %v against %v %v", a.Tilt, a.Name, plus(value), unit)
		}
	}
	if !any {
		return Criterion{}, false
	}
	if math.IsInf(margin, 1) {
		margin, detail = s.localisation(motions)
	}
	return criterion("tilt", margin, "Hz", Open, detail), true
}

// localisation is the room |F| - 4J of tilted axes that do not move, or |F| of a
// frozen one.
func (s *System) localisation(motions []Motion) (margin float64, detail string) {
	margin = math.Inf(1)
	for i, a := range s.Axes {
		if a.Tilt == 0 {
			continue
		}
		room := math.Abs(a.Tilt)
		if motions[i] == Layered {
			room -= 4 * math.Abs(a.Tunnelling)
		}
		if room < margin {
			margin = room
			detail = say("%v Hz per site along %v, which is %v", a.Tilt, a.Name, motions[i])
		}
	}
	return margin, detail
}

// oneBand: two atoms cannot lift one of them out of the band if the smallest gap
// exceeds the widths of the moving bands + |U| + the tilt per site.
// Source: derived; energy conservation for two atoms.
func (s *System) oneBand(motions []Motion) (Criterion, bool) {
	gap, need, moves := math.Inf(1), math.Abs(s.Interaction), false
	for i, a := range s.Axes {
		gap = math.Min(gap, a.Gap)
		need += math.Abs(a.Tilt)
		if motions[i] == Moving {
			need += a.Band.Width()
			moves = true
		}
	}
	if math.IsInf(gap, 1) || (!moves && need == 0) || (s.Sign == Positive && gap == 0) {
		return Criterion{}, false
	}
	return criterion("one_band", gap-need, "Hz", Leaky,
		say("gap %v Hz against band widths + |U| + tilt = %v Hz", gap, need)), true
}

// held: V = 0 is bounded but holds nothing, unless a box has walls. An axis
// whose curvature has the wrong sign is open already and is left out.
func (s *System) held(motions []Motion) (Criterion, bool) {
	if s.Box != nil {
		return Criterion{}, false
	}
	weakest, name := math.Inf(1), ""
	for i, a := range s.Axes {
		room := s.wanted(a.Trap)
		if motions[i] == Moving && room >= 0 && room < weakest {
			weakest, name = room, a.Name
		}
	}
	if name == "" {
		return Criterion{}, false
	}
	c := criterion("held", weakest, "Hz", Leaky, say("weakest along %v, |f| = %v Hz", name, weakest))
	c.Passed = weakest > 0
	return c, true
}

// edge: the potential must go on falling (T < 0) or rising (T > 0) for more than
// the kinetic range and the interaction, 2zJ + |U|, before the beams end.
func (s *System) edge(motions []Motion) (Criterion, bool, error) {
	if s.EdgeDrop == nil || len(s.Axes) != 3 {
		return Criterion{}, false, nil
	}
	var moving [3]bool
	need, any := math.Abs(s.Interaction), false
	for i, a := range s.Axes {
		if motions[i] != Moving {
			continue
		}
		if s.wanted(a.Trap) <= 0 {
			return Criterion{}, false, nil
		}
		moving[i], any = true, true
		need += 4 * math.Abs(a.Tunnelling)
	}
	if !any {
		return Criterion{}, false, nil
	}
	drop, err := s.EdgeDrop(moving)
	if err != nil {
		return Criterion{}, false, err
	}
	return criterion("edge", drop-need, "Hz", Leaky,
		say("%v Hz to the edge of the beams against 2zJ + |U| = %v Hz", drop, need)), true, nil
}

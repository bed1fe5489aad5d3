package gui

import (
	"hilltop/bosehubbard/figure"
)

// entropySteps is about how many places of S(E) the keys lead through.
const entropySteps = 16

// entropy has the places of S(E) that are in the range, from below, its peak and the
// state.
func (g *termGuide) entropy() [][]stop {
	e := g.geometry.Entropy
	if e == nil || e.Stale {
		return nil
	}
	add := func(list [][]stop, name string, p figure.EntropyPoint) [][]stop {
		r, ok := g.geometry.Read(p.At)
		if !ok {
			return list
		}
		return append(list, []stop{{p.At, name + ": " + r.Text}})
	}
	var seen []figure.EntropyPoint
	for _, p := range e.Points {
		if g.geometry.Scale.Holds(p.Hz) {
			seen = append(seen, p)
		}
	}
	var list [][]stop
	for i := 0; i < len(seen); i += max(len(seen)/entropySteps, 1) {
		list = add(list, "S(E)", seen[i])
	}
	list = add(list, "Largest S", e.Peak)
	if e.State != nil {
		list = add(list, "State", *e.State)
	}
	return list
}

// rungs are the levels of a ladder.
func (g *termGuide) rungs() [][]stop {
	var list [][]stop
	for _, r := range g.geometry.Rungs {
		text := "Level: " + figure.Signed(r.Hz, 4) + " Hz, degeneracy " + figure.Number(r.Degeneracy, 4) +
			", " + figure.Number(100*r.Part, 3) + " % of the bodies"
		list = append(list, []stop{{figure.Point{X: r.X1, Y: r.Y}, text}})
	}
	return list
}

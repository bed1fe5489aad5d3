package gui

import (
	"math"

	"hilltop/bosehubbard/figure"
)

// stop is one place of a picture that can be read.
type stop struct {
	at   figure.Point
	text string
}

// stopGuide reads a picture at places of its own: the keys lead right and left from
// one group to the next, up and down within a group, whose highest stop comes
// first.
type stopGuide struct{ stops [][]stop }

func (g stopGuide) at(group, i int) (reading, bool) {
	if group < 0 || group >= len(g.stops) || len(g.stops[group]) == 0 {
		return reading{}, false
	}
	i = min(max(i, 0), len(g.stops[group])-1)
	s := g.stops[group][i]
	return reading{at: s.at, text: s.text, curve: group, point: i}, true
}

func (g stopGuide) first() (reading, bool) { return g.at(0, 0) }

func (g stopGuide) again(r reading) (reading, bool) { return g.at(r.curve, r.point) }

func (g stopGuide) step(from reading, right, up int) reading {
	if from.curve < 0 {
		return g.nearest(from)
	}
	group := min(max(from.curve+right, 0), len(g.stops)-1)
	point := from.point
	if right == 0 {
		point -= up
	}
	if r, ok := g.at(group, point); ok {
		return r
	}
	return from
}

// nearest goes from where the pointer was to a stop.
func (g stopGuide) nearest(from reading) reading {
	best, distance := from, math.Inf(1)
	for group := range g.stops {
		for i, s := range g.stops[group] {
			if d := math.Hypot(s.at.X-from.at.X, s.at.Y-from.at.Y); d < distance {
				distance = d
				best, _ = g.at(group, i)
			}
		}
	}
	return best
}

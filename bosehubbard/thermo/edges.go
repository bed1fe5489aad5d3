package thermo

import (
	"context"
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard/num/quadrature"
)

const (
	nearLevels = 1e-7 // of the width: residual of a level found, and levels that count as one
	edgeSteps  = 120  // of the first run in search of levels
)

// side is an end of a spectrum.
type side int

const (
	bottom side = iota
	top
)

// edge is a level near an end of the spectrum of one sector.
type edge struct {
	energy float64   // Hz
	vector []float64 // of unit length; nil if only the level is wanted
	side   side
}

func (e *ensemble) edgeCount() int {
	n := 0
	for _, edges := range e.edges {
		n += len(edges)
	}
	return n
}

// projector takes levels out of the vectors of a Lanczos run.
func projector(out []edge) func(w []float64) {
	if len(out) == 0 {
		return nil
	}
	return func(w []float64) { project(w, out) }
}

func project(w []float64, out []edge) {
	for _, level := range out {
		floats.AddScaled(w, -floats.Dot(level.vector, w), level.vector)
	}
}

// edgeSearch finds levels of one sector by Lanczos runs, each off what the ones
// before have found, so that degenerate levels come one after the other.
type edgeSearch struct {
	*ensemble
	lane, sector int
	found        []edge
}

// search runs twice, and further while the level at an end turns up again. Each end
// gets at most twice the levels asked for. An end without any that stand apart,
// as in the crowd at the edge of a band, stays without.
func (s *edgeSearch) search(ctx context.Context) error {
	for round := range 2 * s.opt.Levels {
		found, again, err := s.round(ctx, round)
		if err != nil {
			return err
		}
		s.found = append(s.found, found...)
		if len(found) == 0 || round > 0 && !again {
			return nil
		}
	}
	return nil
}

// round does one search; again says that an end turned up once more.
func (s *edgeSearch) round(ctx context.Context, round int) (found []edge, again bool, err error) {
	for steps := edgeSteps; ; steps = mostRuleSteps {
		t, err := s.lanczos(ctx, round, steps, nil)
		if err != nil || len(t.Diagonal) == 0 {
			return nil, false, err
		}
		rule, err := t.Rule(steps)
		if err != nil {
			return nil, false, fmt.Errorf("thermo: %w", err)
		}
		low, lowAgain := s.choose(t, &rule, bottom)
		high, highAgain := s.choose(t, &rule, top)
		if (len(low) == 0 || len(high) == 0) && round == 0 && steps < mostRuleSteps {
			continue
		}
		found, err = s.rebuild(ctx, round, steps, append(low, high...))
		return found, lowAgain || highAgain, err
	}
}

// lanczos repeats the same run for each round.
func (s *edgeSearch) lanczos(ctx context.Context, round, steps int, visit func(step int, v [][]float64) error) (*quadrature.Tridiagonal, error) {
	v := s.vectors(s.sector, s.lane)
	s.sectors[s.sector].RandomTo(v[0], s.opt.Seed, stream(edgeStream, s.sector, round))
	r := quadrature.Recurrence{
		Product: s.product(ctx, s.sector, s.lane), Steps: steps, Project: projector(s.found), Visit: visit,
	}
	t := make([]quadrature.Tridiagonal, 1)
	err := r.Run(t, make([]float64, 1), v[:1], v[1:2])
	return &t[0], err
}

// pick is a level taken from a rule.
type pick struct {
	side  side
	parts []float64 // components of its vector on the Lanczos vectors
}

// choose picks the levels that have converged at one end, from there inwards; again
// says that the end found before turned up once more, and it is then picked alone.
// Nodes that lie together are one level: rounding makes copies. A level picked at
// both ends is found once by rebuild.
func (s *edgeSearch) choose(t *quadrature.Tridiagonal, rule *quadrature.Rule, at side) (picks []pick, again bool) {
	m := len(rule.Node)
	near := nearLevels * (rule.Node[m-1] - rule.Node[0])
	had := s.have(at)
	most := min(s.opt.Levels, 2*s.opt.Levels-had)
	for begin, end := 0, 0; begin < m && len(picks) < most; begin = end {
		for end = begin; end < m && math.Abs(node(rule, end, at)-node(rule, begin, at)) <= near; end++ {
		}
		from, to := begin, end // begin and end count from this side
		if at == top {
			from, to = m-end, m-begin
		}
		p := pick{side: at, parts: make([]float64, m)}
		rule.PartTo(p.parts, from, to)
		if t.Next(m)*math.Abs(p.parts[m-1]) > near {
			break
		}
		picks = append(picks, p)
		if begin == 0 && had > 0 && math.Abs(node(rule, 0, at)-s.extreme(at)) <= near {
			return picks, true
		}
	}
	return picks, false
}

// node counts nodes from one side.
func node(rule *quadrature.Rule, k int, at side) float64 {
	if at == top {
		k = len(rule.Node) - 1 - k
	}
	return rule.Node[k]
}

// have counts the levels found at an end.
func (s *edgeSearch) have(at side) int {
	n := 0
	for _, level := range s.found {
		if level.side == at {
			n++
		}
	}
	return n
}

// extreme returns the outermost energy found at an end.
func (s *edgeSearch) extreme(at side) float64 {
	energy := s.found[0].energy
	for _, level := range s.found {
		if at == top {
			energy = max(energy, level.energy)
		} else {
			energy = min(energy, level.energy)
		}
	}
	return energy
}

// rebuild adds up the vectors of the picks in a second run.
func (s *edgeSearch) rebuild(ctx context.Context, round, steps int, picks []pick) ([]edge, error) {
	if len(picks) == 0 {
		return nil, nil
	}
	found := make([]edge, len(picks))
	for n, p := range picks {
		found[n] = edge{vector: make([]float64, s.sectors[s.sector].Len()), side: p.side}
	}
	_, err := s.lanczos(ctx, round, steps, func(step int, v [][]float64) error {
		for n := range found {
			if step < len(picks[n].parts) {
				floats.AddScaled(found[n].vector, picks[n].parts[step], v[0])
			}
		}
		return ctx.Err()
	})
	if err != nil {
		return nil, err
	}
	var kept []edge
	for _, level := range found {
		project(level.vector, s.found)
		project(level.vector, kept)
		norm := math.Sqrt(floats.Dot(level.vector, level.vector))
		if norm < 0.5 { // nothing new
			continue
		}
		floats.Scale(1/norm, level.vector)
		v := s.vectors(s.sector, s.lane)
		energy := make([]float64, 1)
		if err := s.product(ctx, s.sector, s.lane)(1, 0, 0, v[:1], [][]float64{level.vector}, energy, nil); err != nil {
			return nil, err
		}
		level.energy = energy[0]
		kept = append(kept, level)
	}
	return kept, nil
}

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

// edge is a level near an end of the spectrum of one sector.
type edge struct {
	energy float64   // Hz
	vector []float64 // of unit length
	top    bool      // near the highest
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
		picks, again, ends := s.choose(t, &rule)
		if ends < 2 && round == 0 && steps < mostRuleSteps {
			continue
		}
		if len(picks) == 0 {
			return nil, false, nil
		}
		found, err = s.rebuild(ctx, round, steps, &rule, picks)
		return found, again, err
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

// pick is a node of a rule taken for a level.
type pick struct {
	node int
	top  bool
}

// choose picks the nodes that have converged from both ends inwards and counts the
// ends that have any. A node next to the one before is a copy that rounding made.
// A node next to the end found before is that end again, and picked alone.
func (s *edgeSearch) choose(t *quadrature.Tridiagonal, rule *quadrature.Rule) (picks []pick, again bool, ends int) {
	last := len(rule.Node) - 1
	near := nearLevels * (rule.Node[last] - rule.Node[0])
	low := 0
	for _, top := range []bool{false, true} {
		had, most := s.have(top), s.opt.Levels
		before := math.Inf(1)
		taken := 0
		for n := low; n <= last && taken < min(most, 2*s.opt.Levels-had); n++ {
			k := n
			if top {
				k = last - (n - low)
			}
			if t.Residual(rule, k) > near {
				break
			}
			if math.Abs(rule.Node[k]-before) <= near {
				continue
			}
			if taken == 0 && had > 0 && math.Abs(rule.Node[k]-s.extreme(top)) <= near {
				again, most = true, 1
			}
			before = rule.Node[k]
			picks = append(picks, pick{k, top})
			taken++
			if !top {
				low = k + 1
			}
		}
		if taken > 0 {
			ends++
		}
	}
	return picks, again, ends
}

// have counts the levels found at an end.
func (s *edgeSearch) have(top bool) int {
	n := 0
	for _, level := range s.found {
		if level.top == top {
			n++
		}
	}
	return n
}

// extreme returns the outermost energy found at an end.
func (s *edgeSearch) extreme(top bool) float64 {
	energy := math.Inf(1)
	if top {
		energy = math.Inf(-1)
	}
	for _, level := range s.found {
		if top {
			energy = max(energy, level.energy)
		} else {
			energy = min(energy, level.energy)
		}
	}
	return energy
}

// rebuild adds up the vectors of the picks in a second run.
func (s *edgeSearch) rebuild(ctx context.Context, round, steps int, rule *quadrature.Rule, picks []pick) ([]edge, error) {
	length := s.sectors[s.sector].Len()
	found, parts := make([]edge, len(picks)), newRows(len(picks), len(rule.Node))
	for n, p := range picks {
		found[n] = edge{vector: make([]float64, length), top: p.top}
		rule.VectorTo(parts[n], p.node)
	}
	_, err := s.lanczos(ctx, round, steps, func(step int, v [][]float64) error {
		for n := range found {
			if step < len(parts[n]) {
				floats.AddScaled(found[n].vector, parts[n][step], v[0])
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

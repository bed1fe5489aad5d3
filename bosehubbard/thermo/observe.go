package thermo

import (
	"context"
	"math"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/stat"

	"hilltop/bosehubbard/lattice"
)

// observe fills in the observables of the points, some betas at a time.
func (e *ensemble) observe(ctx context.Context, l *lattice.Lattice, atoms int, points []Average) error {
	m := &meter{lattice: l, corner: corner(l)}
	edges, err := e.measureEdges(ctx, m)
	if err != nil {
		return err
	}
	for from := 0; from < len(points); from += chunk {
		part := points[from:min(from+chunk, len(points))]
		drawn, err := e.measureRuns(ctx, m, part)
		if err != nil {
			return err
		}
		for b := range part {
			mean, half := e.mean(m, part[b].Beta, edges, drawn[b])
			part[b].Observables = m.observables(mean, half, atoms)
		}
	}
	return nil
}

// measureEdges measures the levels found at the ends, by sector.
func (e *ensemble) measureEdges(ctx context.Context, m *meter) ([][][]float64, error) {
	out := make([][][]float64, len(e.sectors))
	for i, h := range e.sectors {
		for _, level := range e.edges[i] {
			list, err := m.measure(ctx, h, level.vector, e.vectors(i, 0)[0], e.works[0][i])
			if err != nil {
				return nil, err
			}
			out[i] = append(out[i], list)
		}
	}
	return out, nil
}

// measureRuns repeats the run of every random vector r, adds up the thermal vectors
// exp(-beta (H-end)/2) r of the points, and measures them in units of states. The
// answer is by point and vector, with the sectors added up.
func (e *ensemble) measureRuns(ctx context.Context, m *meter, points []Average) ([][][]float64, error) {
	out := make([][][]float64, len(points))
	count := len(e.runs)
	if count == 0 {
		return out, nil
	}
	lists := make([][][]float64, len(e.sectors)*count) // by run and point
	err := e.each(ctx, count, func(ctx context.Context, lane, i, k int) (err error) {
		lists[i*count+k], err = e.measureRun(ctx, m, points, lane, i, k)
		return err
	})
	if err != nil {
		return nil, err
	}
	for b := range points {
		out[b] = newRows(count, m.length())
		for n, list := range lists {
			if list != nil {
				floats.Add(out[b][n%count], list[b])
			}
		}
	}
	return out, nil
}

// measureRun measures the thermal vectors of one run, by point; nil if no states
// are left to the run.
func (e *ensemble) measureRun(ctx context.Context, m *meter, points []Average, lane, i, k int) ([][]float64, error) {
	states := e.left(i)
	t, err := e.run(ctx, lane, i, k, nil)
	if err != nil || states == 0 || len(t.Diagonal) == 0 {
		return nil, err
	}
	rule, err := t.Rule(e.opt.Steps)
	if err != nil {
		return nil, err
	}
	thermal := e.vectors(i, lane)[2 : 2+len(points)]
	parts, f := newRows(len(points), len(rule.Node)), make([]float64, len(rule.Node))
	for b, p := range points {
		clear(thermal[b])
		for n, energy := range rule.Node {
			d := energy - e.end(p.Beta)
			if math.Abs(d) <= e.close {
				d = 0
			}
			f[n] = math.Exp(-p.Beta / 2 * d)
		}
		rule.CoefficientsTo(parts[b], f)
	}
	_, err = e.run(ctx, lane, i, k, func(step int, v []float64) {
		for b := range points {
			if step < len(parts[b]) {
				floats.AddScaled(thermal[b], parts[b][step], v)
			}
		}
	})
	if err != nil {
		return nil, err
	}
	out := make([][]float64, len(points))
	for b := range points {
		if out[b], err = m.measure(ctx, e.sectors[i], thermal[b], e.vectors(i, lane)[0], e.works[lane][i]); err != nil {
			return nil, err
		}
		floats.Scale(states, out[b])
	}
	return out, nil
}

// mean divides the sums of the observables by Z.
func (e *ensemble) mean(m *meter, beta float64, edges [][][]float64, drawn [][]float64) (mean, half []float64) {
	mean, half = make([]float64, m.length()), make([]float64, m.length())
	samples := e.drawn(e.runs, beta)
	z := e.base(beta).z
	for _, s := range samples {
		z += s.z / float64(len(samples))
	}
	for i := range edges {
		for n, list := range edges[i] {
			d := e.edges[i][n].energy - e.end(beta)
			if math.Abs(d) <= e.close {
				d = 0
			}
			floats.AddScaled(mean, math.Exp(-beta*d)/z, list)
		}
	}
	for _, list := range drawn {
		floats.AddScaled(mean, 1/z/float64(len(drawn)), list)
	}
	if len(samples) < 2 {
		return mean, half
	}
	response := make([]float64, len(samples))
	for n := range mean {
		for k, list := range drawn {
			response[k] = (list[n] - mean[n]*samples[k].z) / z
		}
		half[n] = halfWidth(len(samples)) * stat.StdDev(response, nil)
	}
	return mean, half
}

package gui

import (
	"math"

	"hilltop/bosehubbard/figure"
)

// mapSubject is the map of the verdict, read cell by cell.
type mapSubject struct{ verdicts *figure.VerdictMap }

var _ subject = (*mapSubject)(nil)

func (m *mapSubject) units() []figure.Unit { return nil }
func (m *mapSubject) scales() []string     { return nil }

func (m *mapSubject) picture(v view) figure.Picture {
	chart := m.verdicts.Chart()
	chart.View = v.chart
	return chart
}

func (m *mapSubject) guide(p figure.Picture, f figure.Frame, s figure.Style) guide {
	return &cellGuide{viewOf(p.(*figure.Chart), f, s), m.verdicts}
}

// cellGuide reads the cell under the pointer; the keys lead from cell to cell,
// beginning at the plan.
type cellGuide struct {
	chartView
	verdicts *figure.VerdictMap
}

func (g *cellGuide) read(p figure.Point) (reading, bool) {
	verdict := ""
	if g.Contains(p) {
		verdict = g.verdicts.At(g.Data(p))
	}
	if verdict == "" {
		return reading{}, false
	}
	return reading{at: p, text: g.Read(p).Text + ": " + verdict, curve: -1}, true
}

// cell reads the middle of a cell, if it is in sight.
func (g *cellGuide) cell(column, row int) (reading, bool) {
	if column < 0 || column >= g.verdicts.Columns || row < 0 || row >= g.verdicts.Rows {
		return reading{}, false
	}
	r, ok := g.read(g.Pixel(g.verdicts.Cell(column, row)))
	r.curve, r.point = column, row
	return r, ok
}

// at is the cell that holds a place.
func (g *cellGuide) at(p figure.Point) (reading, bool) {
	u, v := g.Data(p)
	part := func(r figure.Range, x float64, n int) int {
		return int(math.Floor((x - r.Low) / (r.High - r.Low) * float64(n)))
	}
	return g.cell(part(g.verdicts.U, u, g.verdicts.Columns), part(g.verdicts.V, v, g.verdicts.Rows))
}

func (g *cellGuide) first() (reading, bool) {
	if r, ok := g.at(g.Pixel(g.verdicts.AtU, g.verdicts.AtV)); ok {
		return r, true
	}
	return g.at(figure.Point{X: (g.X0 + g.X1) / 2, Y: (g.Y0 + g.Y1) / 2})
}

func (g *cellGuide) again(r reading) (reading, bool) {
	if r.curve < 0 {
		return g.read(r.at)
	}
	return g.cell(r.curve, r.point)
}

func (g *cellGuide) step(from reading, right, up int) reading {
	if from.curve < 0 {
		from, _ = g.at(from.at)
	}
	if r, ok := g.cell(from.curve+right, from.point+up); ok {
		return r
	}
	return from
}

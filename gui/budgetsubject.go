package gui

import (
	"hilltop/bosehubbard/figure"
)

// budgetSubject is the budget of the trap, read bar by bar.
type budgetSubject struct{ budget *figure.Budget }

var _ subject = (*budgetSubject)(nil)

func (b *budgetSubject) units() []figure.Unit { return nil }
func (b *budgetSubject) scales() []string     { return nil }

func (b *budgetSubject) picture(v view) figure.Picture {
	shown := *b.budget
	if before, ok := v.pinned.(*budgetSubject); ok {
		shown.Pinned = before.budget
	}
	chart := shown.Chart()
	chart.View = v.chart
	return chart
}

func (b *budgetSubject) guide(p figure.Picture, f figure.Frame, s figure.Style) guide {
	area := viewOf(p.(*figure.Chart), f, s)
	row := 0
	var stops []stop
	add := func(f float64, text string) {
		stops = append(stops, stop{area.Pixel(f, -float64(row)-0.5), text + " " + figure.Signed(f, 4) + " Hz, " + trapWord(f)})
		row++
	}
	for _, axis := range b.budget.Axes {
		for _, part := range axis.Contributions {
			add(part.Frequency, part.Source+" along "+axis.Axis+":")
		}
		add(axis.Net, "Net trap along "+axis.Axis+":")
	}
	return &rowGuide{area, stopGuide{[][]stop{stops}}}
}

// trapWord says the sign of a trap frequency.
func trapWord(f float64) string {
	switch {
	case f < 0:
		return "anti-trap"
	case f > 0:
		return "trap"
	}
	return "no trap"
}

// rowGuide reads the bar in whose row the pointer is.
type rowGuide struct {
	chartView
	stopGuide
}

func (g *rowGuide) read(p figure.Point) (reading, bool) {
	if !g.Contains(p) {
		return reading{}, false
	}
	_, y := g.Data(p)
	return g.at(0, int(-y))
}

// step goes on row by row: right and down are the next one.
func (g *rowGuide) step(from reading, right, up int) reading {
	return g.stopGuide.step(from, 0, up-right)
}

package figure

import (
	"math"

	"gonum.org/v1/plot"

	"hilltop/bosehubbard/report"
)

// Budget shows who adds what to the trap along each axis, as signed frequencies:
// sign(w^2) sqrt|w^2| / 2 pi. Their squares add, so the axis is spaced by f|f| and
// the lengths of the bars add up.
type Budget struct {
	Stage  string
	Axes   []AxisBudget
	Pinned *Budget // before a change: dashed outlines; nil for none
}

// AxisBudget is one axis.
type AxisBudget struct {
	Axis          string
	Contributions []Part
	Net           float64 // Hz
}

// Part is what one beam or coil adds, Hz.
type Part struct {
	Source    string
	Frequency float64
}

// NewBudget takes the budget of a stage from a report; -1 is the start. Sources
// that add nothing along an axis are left out there. ok is false where the report
// has none, as that of a model.
func NewBudget(r *report.Report, stage int) (b *Budget, ok bool) {
	s := r.Start
	if stage >= 0 && stage < len(r.Stages) {
		s = &r.Stages[stage]
	}
	if s == nil || len(s.Budget) == 0 {
		return nil, false
	}
	b = &Budget{Stage: s.Name}
	for i := range 3 {
		axis := AxisBudget{Axis: "xyz"[i : i+1]}
		sum := 0.0
		for _, c := range s.Budget {
			f := c.TrapHz[i]
			if f != 0 {
				axis.Contributions = append(axis.Contributions, Part{c.Source, f})
			}
			sum += Square.forward(f)
		}
		axis.Net = Square.back(sum)
		b.Axes = append(b.Axes, axis)
	}
	return b, true
}

// row is one line of the chart.
type budgetRow struct {
	axis  int
	part  Part
	isNet bool
}

func (b *Budget) lines() []budgetRow {
	var list []budgetRow
	for i, axis := range b.Axes {
		for _, p := range axis.Contributions {
			list = append(list, budgetRow{axis: i, part: p})
		}
		list = append(list, budgetRow{axis: i, part: Part{"net " + axis.Axis, axis.Net}, isNet: true})
	}
	return list
}

// Chart draws a bar per contribution, left of zero for an anti-trap, and the sum
// of each axis as a tick through all of its bars.
func (b *Budget) Chart() *Chart {
	lines := b.lines()
	reach := 0.0
	for _, line := range lines {
		reach = math.Max(reach, math.Abs(line.part.Frequency))
	}
	if reach == 0 {
		reach = 1
	}
	reach *= 1.1
	n := float64(len(lines))
	c := &Chart{
		Name:  "budget",
		Title: "Trap at the end of '" + b.Stage + "'",
		X:     Axis{Label: "f, spaced as f|f| so that bars add", Unit: "Hz", Kind: Square, Range: Range{-reach, reach}},
		Y:     Axis{Range: Range{-n, 0}},
		rows:  b.table,
		head:  true,
	}
	for _, net := range [...]bool{true, false} {
		for i, line := range lines {
			if line.isNet == net {
				c.Y.names = append(c.Y.names, plot.Tick{Value: -float64(i) - 0.5, Label: line.part.Source + " "})
			}
		}
	}
	c.under = func(p *pen, a Area) { b.draw(p, a, lines) }
	return c
}

// Height is how high a chart must be for all names, px.
func (b *Budget) Height(s Style) float64 {
	return float64(len(b.lines()))*words.height(s) + 100*s.text()
}

func (b *Budget) draw(p *pen, a Area, lines []budgetRow) {
	place := placer{style: p.style, bounds: Rect{a.X0, 0, a.X1, a.Y1}}
	zero := a.Pixel(0, 0).X
	place.put(Word, "← anti-trap", anchor{Point{zero - 12, a.Y0 - 2}, 1, 1})
	place.put(Word, "trap →", anchor{Point{zero + 12, a.Y0 - 2}, 0, 1})
	for i, line := range lines {
		mid := a.Pixel(0, -float64(i)-0.5).Y
		if mid < a.Y0 || mid > a.Y1 {
			continue
		}
		if line.isNet {
			b.drawNet(p, a, lines, i, &place)
			continue
		}
		b.drawBar(p, a, line.part.Frequency, mid)
		if before, ok := b.Pinned.find(b.Axes[line.axis].Axis, line.part.Source); ok {
			b.drawPinned(p, a, before, mid, &place)
		}
	}
	if zero >= a.X0 && zero <= a.X1 {
		p.line(stroke{width: 1, color: p.style.Palette.Ink}, Point{zero, a.Y0}, Point{zero, a.Y1})
	}
	for _, net := range [...]bool{true, false} {
		for i, line := range lines {
			if end := a.Pixel(line.part.Frequency, -float64(i)-0.5); line.isNet == net && end.Y >= a.Y0 && end.Y <= a.Y1 {
				b.name(&place, line, zero, end)
			}
		}
	}
	p.drawLabels(place.labels)
}

// half is half the height of a bar.
func (b *Budget) half(a Area) float64 {
	return math.Min(8, 0.36*(a.Pixel(0, -1).Y-a.Pixel(0, 0).Y))
}

// drawBar draws the part of a bar that lies inside the area.
func (b *Budget) drawBar(p *pen, a Area, f, mid float64) {
	half := b.half(a)
	zero, end := a.Pixel(0, 0).X, a.Pixel(f, 0).X
	bar := Rect{math.Max(math.Min(zero, end), a.X0), mid - half, math.Min(math.Max(zero, end), a.X1), mid + half}
	if bar.X1 > bar.X0 {
		p.fill(bar, p.style.Palette.grey())
		p.frame(stroke{width: 1, color: p.style.Palette.Ink}, bar)
	}
}

// drawPinned outlines what a source added before.
func (b *Budget) drawPinned(p *pen, a Area, f, mid float64, place *placer) {
	half := b.half(a)
	zero, end := a.Pixel(0, 0).X, a.Pixel(f, 0).X
	x0, x1 := math.Max(math.Min(zero, end), a.X0), math.Min(math.Max(zero, end), a.X1)
	s := stroke{width: 1, color: p.style.Palette.Soft, dash: dashes[Pinned]}
	top, bottom := mid-half-2, mid+half+2
	p.line(s, Point{x0, top}, Point{x1, top})
	p.line(s, Point{x0, bottom}, Point{x1, bottom})
	if end == x0 || end == x1 {
		p.line(s, Point{end, top}, Point{end, bottom})
		place.taken = append(place.taken, boxOf(Point{end, top}, Point{end, bottom}, 1))
	}
}

// find returns what a source adds along an axis; ok is false on a nil budget.
func (b *Budget) find(axis, source string) (f float64, ok bool) {
	if b == nil {
		return 0, false
	}
	for _, a := range b.Axes {
		for _, p := range a.Contributions {
			if a.Axis == axis && p.Source == source {
				return p.Frequency, true
			}
		}
	}
	return 0, false
}

// name writes the frequency at the far end of a bar, with the word for its sign at
// the net ones.
func (b *Budget) name(place *placer, line budgetRow, zero float64, end Point) {
	text := Signed(line.part.Frequency, 3) + " Hz"
	role := SoftNumber
	if line.isNet {
		text, role = text+", "+confinement(line.part.Frequency), Quantity
	}
	outward := anchor{Point{end.X + 8, end.Y}, 0, 0.5}
	inward := anchor{Point{zero - 8, end.Y}, 1, 0.5}
	if end.X < zero {
		outward, inward = anchor{Point{end.X - 8, end.Y}, 1, 0.5}, anchor{Point{zero + 8, end.Y}, 0, 0.5}
	}
	place.put(role, text, outward, inward)
}

func confinement(f float64) string {
	switch {
	case f < 0:
		return "anti-trap"
	case f > 0:
		return "trap"
	}
	return "no trap"
}

// drawNet draws the sum through the bars of its axis, and a line below them.
func (b *Budget) drawNet(p *pen, a Area, lines []budgetRow, i int, place *placer) {
	ink := p.style.Palette
	first := i
	for first > 0 && lines[first-1].axis == lines[i].axis {
		first--
	}
	top, bottom := a.Pixel(0, -float64(first)-0.08), a.Pixel(0, -float64(i)-0.92)
	if x := a.Pixel(lines[i].part.Frequency, 0).X; x >= a.X0 && x <= a.X1 {
		from, to := Point{x, math.Max(top.Y, a.Y0)}, Point{x, math.Min(bottom.Y, a.Y1)}
		p.line(stroke{width: 2, color: ink.Ink, dash: dashes[Pinned]}, from, to)
		place.taken = append(place.taken, boxOf(from, to, 2))
		half := math.Min(8, 0.4*(a.Pixel(0, -1).Y-a.Pixel(0, 0).Y))
		y := a.Pixel(0, -float64(i)-0.5).Y
		p.line(stroke{width: 4, color: ink.Ink}, Point{x, y - half}, Point{x, y + half})
	}
	if y := a.Pixel(0, -float64(i)-1).Y; y < a.Y1-1 {
		p.line(stroke{width: 1, color: ink.Edge}, Point{a.X0, y}, Point{a.X1, y})
	}
}

// table lists frequencies and what adds: f|f|.
func (b *Budget) table() Table {
	t := Table{Columns: []Column{{"axis", ""}, {"source", ""}, {"signed frequency f", "Hz"}, {"f|f|", "Hz²"}}}
	for _, line := range b.lines() {
		name := line.part.Source
		if line.isNet {
			name = "net"
		}
		t.row(b.Axes[line.axis].Axis, name, line.part.Frequency, Square.forward(line.part.Frequency))
	}
	return t
}

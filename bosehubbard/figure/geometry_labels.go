package figure

import (
	"math"
	"strings"
)

// label places every text, the most important first; one that finds no room
// without overlap is left out, and stands in the table all the same.
func (b *builder) label() {
	b.placer = placer{style: b.style, bounds: b.g.Frame}
	b.labelAxis()
	b.labelNames()
	b.labelCeiling()
	b.labelRuler()
	b.keepBarsFree()
	b.labelFlag()
	b.labelRungs()
	b.keepEntropyFree()
	b.labelState()
	b.keepLinesFree()
	b.labelEnds()
	b.labelHill()
	b.labelEntropy()
	b.labelUnbounded()
	b.labelSizes()
	b.g.Labels = b.placer.labels
}

// keepBarsFree keeps labels off bars, lids, strips, arrows and the carry line.
func (b *builder) keepBarsFree() {
	b.keepLineFree(b.g.Carry)
	for _, bar := range append(append([]Bar(nil), b.g.Bars...), b.g.Total) {
		b.placer.taken = append(b.placer.taken, b.reach(&bar))
	}
}

// keepLinesFree keeps labels off the axes and the hill.
func (b *builder) keepLinesFree() {
	g := b.g
	b.keepLineFree([]Point{{g.Plot.X0, g.Scale.zero()}, {g.Terms.X1, g.Scale.zero()}})
	b.keepLineFree([]Point{{g.Plot.X0, g.Sky.Y1}, {g.Plot.X0, g.Ground.Y0}})
	b.keepLineFree([]Point{{g.Ruler.X0, g.Sky.Y1}, {g.Ruler.X0, g.Ground.Y0}})
	if s := g.Slope; s != nil {
		upper, lower := g.hillEdges()
		for _, edge := range [...][]Point{upper, lower} {
			bands(edge, g.Plot.Y0, g.Plot.Y1, b.keepLineFree)
		}
	}
}

// keepLineFree keeps labels off a line.
func (b *builder) keepLineFree(points []Point) {
	for i := 0; i+1 < len(points); i++ {
		b.placer.taken = append(b.placer.taken, boxOf(points[i], points[i+1], 1.5))
	}
}

// reach is the room that a bar takes with its lids, strips and arrow.
func (b *builder) reach(bar *Bar) Rect {
	body := bar.Body()
	if bar.Still {
		return body
	}
	body = Rect{body.X0 - bar.Overhang, body.Y0 - 4, body.X1 + bar.Overhang, body.Y1 + 4}
	for _, end := range [...]End{bar.Upper, bar.Lower} {
		switch {
		case end.Kind == Strips && end.Hz > 0:
			body.Y0 = b.g.Sky.Y0
		case end.Kind == Strips:
			body.Y1 = b.g.Ground.Y1
		}
	}
	switch {
	case bar.Fill == Drained && b.g.Upwards:
		body.Y0 -= stemHigh + 6
	case bar.Fill == Drained:
		body.Y1 += stemHigh + 6
	}
	return body
}

// labelAxis writes the unit and the numbers left of the plot.
func (b *builder) labelAxis() {
	g := b.g
	right := g.Plot.X0 - 8
	for _, tick := range g.Ticks {
		text := Signed(tick.Hz/b.unit.hz, 4)
		b.placer.put(SoftNumber, text, anchor{Point{right, tick.Y}, 1, 0.5})
	}
	b.placer.put(SoftWord, "E/N, "+b.unit.name, anchor{Point{right, g.Sky.Y0 + 6}, 1, 0}, anchor{Point{4, g.Sky.Y0 + 6}, 0, 0})
}

// labelNames writes what stands in which column, below the plot.
func (b *builder) labelNames() {
	g, row := b.g, 15*b.style.text()
	letters, names := b.names+2, b.names+2+row
	pitch := g.Terms.Width() / 4
	put := func(x float64, texts ...string) {
		for _, text := range texts {
			if width, _ := b.placer.box(Word, text); width <= pitch-4 &&
				b.placer.put(Word, text, anchor{Point{x, names}, 0.5, 0}) {
				return
			}
		}
	}
	first, last := math.Inf(1), math.Inf(-1)
	for _, bar := range g.Bars {
		switch axis := axisOf(bar.Term); {
		case axis != "":
			first, last = math.Min(first, bar.X0), math.Max(last, bar.X1)
			b.placer.put(Word, axis, anchor{Point{bar.Centre(), letters}, 0.5, 0})
		case bar.Term == "kinetic":
			put(bar.Centre(), "kinetic", "kin.", "K")
		default:
			put(bar.Centre(), bar.Term, "inter.", "U")
		}
	}
	if last > first {
		put((first+last)/2, "trap", "V")
	}
	if b.options.Ladder != nil {
		put(g.Total.Centre(), "levels")
	} else {
		put(g.Total.Centre(), "total", "sum")
	}
	for i, note := range b.notes {
		y := b.names + 2*row + 6 + float64(i)*row
		b.placer.put(SoftWord, note, anchor{Point{8, y}, 0, 0})
	}
}

// labelCeiling writes the value of the ceiling (or floor) beside the ruler.
func (b *builder) labelCeiling() {
	g := b.g
	if g.Open || g.Total.Counting().Kind == Strips {
		return
	}
	text := b.unit.signed(g.Ceiling.Hz, 4)
	left, above, below := g.Ruler.X0+8, g.Ceiling.Y-2, g.Ceiling.Y+2
	b.placer.put(Quantity, text,
		anchor{Point{left, above}, 0, 1}, anchor{Point{left, below}, 0, 0})
	word := "ceiling"
	if !g.Upwards {
		word = "floor"
	}
	b.placer.put(SoftWord, word,
		anchor{Point{left, below}, 0, 0}, anchor{Point{left, above}, 0, 1})
	b.ends()
}

// ends writes the ends of the −1/T ruler.
func (b *builder) ends() {
	g := b.g
	x, row := g.Ruler.X0+8, 15*b.style.text()
	name := "−1/T"
	if g.Entropy != nil {
		name += ", " + g.Entropy.Unit
	}
	b.placer.put(SoftWord, name, anchor{Point{x, g.Sky.Y0 + 6}, 0, 0})
	if g.Total.Upper.Kind != Strips {
		b.placer.put(SoftNumber, "−0", anchor{Point{x, g.Sky.Y0 + 6 + row}, 0, 0})
	}
	if g.Total.Lower.Kind != Strips {
		b.placer.put(SoftNumber, "+0", anchor{Point{x, g.Ground.Y1 - 6}, 0, 1})
	}
}

// labelFlag says that an open plan has no state.
func (b *builder) labelFlag() {
	g := b.g
	if !g.Open {
		return
	}
	text := "no equilibrium at T < 0"
	if !g.Upwards {
		text = "no equilibrium at T > 0"
	}
	right := g.Frame.X1 - 4
	b.placer.put(Flag, text,
		anchor{Point{right, g.Sky.Y1 + 6}, 1, 0}, anchor{Point{right, g.Ground.Y0 - 6}, 1, 1},
		anchor{Point{right, g.Sky.Y0 + 4}, 1, 0}, anchor{Point{right, g.Ground.Y1 - 4}, 1, 1},
		anchor{Point{g.Plot.X0 + 4, g.Sky.Y0 + 4}, 0, 0}, anchor{Point{g.Plot.X0 + 4, g.Ground.Y1 - 4}, 0, 1},
		anchor{Point{right, b.names + 4}, 1, 0})
}

// labelEnds writes the numbers of the bars, first those that count.
func (b *builder) labelEnds() {
	for i := range b.g.Bars {
		bar := &b.g.Bars[i]
		if axisOf(bar.Term) == "" {
			b.labelEnd(bar, bar.Counting(), Quantity)
		}
	}
	b.labelTraps()
	b.labelDrain()
	for i := range b.g.Bars {
		bar := &b.g.Bars[i]
		if axisOf(bar.Term) == "" {
			b.labelEnd(bar, b.other(bar), SoftNumber)
		}
	}
	if b.options.Ladder == nil {
		b.labelEnd(&b.g.Total, b.other(&b.g.Total), SoftNumber)
	}
}

func (b *builder) other(bar *Bar) *End {
	if bar.Upper.Counts {
		return &bar.Lower
	}
	return &bar.Upper
}

// labelEnd writes the number of one end beside its lid.
func (b *builder) labelEnd(bar *Bar, end *End, role Role) {
	if bar.Still || end.Kind == Strips {
		return
	}
	text := b.unit.signed(end.Hz, 4)
	right, left := bar.X1+bar.Overhang+4, bar.X0-bar.Overhang-4
	anchors := []anchor{
		{Point{right, end.Y - 3}, 0, 1}, {Point{right, end.Y + 3}, 0, 0},
		{Point{left, end.Y - 3}, 1, 1}, {Point{left, end.Y + 3}, 1, 0},
		{Point{bar.Centre(), end.Y - 7}, 0.5, 1}, {Point{bar.Centre(), end.Y + 7}, 0.5, 0},
	}
	// Digits go before the unit, which stands above the axis as well.
	_ = b.placer.put(role, text, anchors...) ||
		b.placer.put(role, b.unit.signed(end.Hz, 2), anchors...) ||
		b.placer.put(role, Signed(end.Hz/b.unit.hz, 3), anchors...)
}

// labelTraps writes the ends of the trap bars as a list right of them, above the
// zero line.
func (b *builder) labelTraps() {
	right, rows := 0.0, 0
	for _, bar := range b.g.Bars {
		if axisOf(bar.Term) != "" {
			right = math.Max(right, bar.X1+8)
			rows++
		}
	}
	row := 15 * b.style.text()
	y := b.g.Scale.zero() - 2 - row*(float64(rows)-0.5)
	for i := range b.g.Bars {
		bar := &b.g.Bars[i]
		axis := axisOf(bar.Term)
		if axis == "" {
			continue
		}
		anchors := near(Point{right, y}, 0, row, 3*row)
		y += row
		switch hz := bar.Counting().Hz; {
		case bar.Still:
			b.placer.put(SoftWord, axis+" "+b.motion(bar.Term), anchors...)
		case bar.Counting().Kind == Strips:
			_ = b.placer.put(Word, axis+" unbounded", anchors...) || b.placer.put(Word, axis+" ∞", anchors...)
		default:
			_ = b.placer.put(Quantity, axis+" "+b.unit.signed(hz, 3), anchors...) ||
				b.placer.put(Quantity, axis+" "+b.unit.signed(hz, 1), anchors...) ||
				b.placer.put(Quantity, axis+" "+Signed(hz/b.unit.hz, 3), anchors...)
		}
	}
}

// motion is what the atoms do along the axis of a trap term.
func (b *builder) motion(term string) string {
	for _, t := range b.report.Ceiling.Terms {
		if t.Term == term {
			return t.Motion
		}
	}
	return ""
}

// drainWords says where the energy goes when a criterion is broken.
var drainWords = map[string]string{
	"one_band": "out of the band", "layers": "between layers", "held": "nothing holds",
	"edge": "past the beams", "lifetime": "loss",
}

// labelDrain names the channels beside the arrow of the total.
func (b *builder) labelDrain() {
	bar := &b.g.Total
	if bar.Fill != Drained {
		return
	}
	tip := bar.Counting().Y - stemHigh
	if !b.g.Upwards {
		tip = bar.Counting().Y + stemHigh
	}
	step := 15 * b.style.text()
	for _, c := range b.report.Ceiling.Criteria {
		if c.Passed || c.Breaks != "leaky" {
			continue
		}
		text := drainWords[c.Name]
		if text == "" {
			text = c.Name
		}
		full := text
		if c.Margin != 0 && c.Name != "held" {
			full += " by " + Number(-c.Margin, 3) + " " + strings.Replace(c.Unit, "site2", "site²", 1)
		}
		anchors := append(near(Point{bar.X1 + 10, tip}, 0, step, 3*step), near(Point{bar.X0 - 10, tip}, 1, step, 3*step)...)
		_ = b.placer.put(Word, full, anchors...) || b.placer.put(Word, text, anchors...)
	}
}

// labelUnbounded says in words what the strips show.
func (b *builder) labelUnbounded() {
	text := "no ceiling"
	y, fy := b.g.Sky.Y0+6, 0.0
	if !b.g.Upwards {
		text, y, fy = "no floor", b.g.Ground.Y1-6, 1
	}
	for _, bar := range append(append([]Bar(nil), b.g.Bars...), b.g.Total) {
		if bar.Still || bar.Counting().Kind != Strips {
			continue
		}
		b.placer.put(Word, text,
			anchor{Point{bar.X1 + bar.Overhang + 4, y}, 0, fy},
			anchor{Point{bar.X0 - bar.Overhang - 4, y}, 1, fy})
	}
}

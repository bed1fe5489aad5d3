package figure

import "math"

// Ladder is the list of levels of independent bodies, drawn in place of the bars.
type Ladder struct {
	Energies     []float64 // Hz per body
	Degeneracies []float64 // nil: 1 each
	Shares       []float64 // of the bodies in each level; nil where not known
}

// Rung is one level of the ladder.
type Rung struct {
	Line
	Degeneracy float64
	Share      Rect    // as long as the part of the bodies in it; no width where not known
	Part       float64 // of the bodies, 0 to 1
}

// Sizes of the ladder in px.
const (
	ladderWidth = 112.0
	shareHigh   = 7.0
	shareOff    = 2.0 // from the rung, towards the middle
	railWidth   = 4.0
)

// ladder places the levels as rungs between two rails, with a lid at both ends.
func (b *builder) ladder() {
	g, l, t := b.g, b.options.Ladder, b.style.text()
	width := math.Min(ladderWidth*t, g.Terms.Width()/3)
	g.Total = b.bar("total", b.report.Ceiling.Total, g.Terms.X0+0.5*g.Terms.Width(), width)
	g.Total.Overhang = overhang
	g.Total.drain(b.drained()["total"])
	g.Open = g.Total.Fill == Unbounded
	left, right := g.Total.X0+railWidth, g.Total.X1-railWidth
	for i, hz := range l.Energies {
		if !g.Scale.Holds(hz) {
			continue
		}
		r := Rung{Line: Line{Hz: hz, X0: left, X1: right, Y: g.Scale.Y(hz)}, Degeneracy: 1}
		if i < len(l.Degeneracies) {
			r.Degeneracy = l.Degeneracies[i]
		}
		if i < len(l.Shares) {
			r.Part = l.Shares[i]
			r.Share = Rect{left, r.Y + shareOff, left + r.Part*(right-left), r.Y + shareOff + shareHigh}
			if r.Y > g.Scale.zero() {
				r.Share.Y0, r.Share.Y1 = r.Y-shareOff-shareHigh, r.Y-shareOff
			}
		}
		g.Rungs = append(g.Rungs, r)
	}
}

// drawLadder draws rails in the colour of the fill, shares and rungs.
func (g *Geometry) drawLadder(p *pen) {
	ink, body := p.style.Palette, g.Total.Body()
	for _, x := range [...]float64{body.X0, body.X1 - railWidth} {
		rail := Rect{x, body.Y0, x + railWidth, body.Y1}
		p.fill(rail, ink.of(g.Total.Fill))
		p.frame(stroke{width: 1, color: ink.Ink}, rail)
	}
	for _, r := range g.Rungs {
		if r.Share.Width() > 0 {
			p.fill(r.Share, ink.grey())
			p.frame(stroke{width: 1, color: ink.Ink}, r.Share)
		}
		p.line(stroke{width: 1.5, color: ink.Ink}, Point{r.X0, r.Y}, Point{r.X1, r.Y})
	}
	for _, end := range [...]End{g.Total.Upper, g.Total.Lower} {
		if end.Kind == Strips {
			shade := ink.Soft
			if end.Counts {
				shade = ink.of(g.Total.Fill)
			}
			g.drawStrips(p, &g.Total, end.Hz > 0, shade)
		}
	}
}

// labelRungs writes energies left of the ladder, degeneracies and shares right of it,
// those at the ends first.
func (b *builder) labelRungs() {
	rungs := b.g.Rungs
	left, right := b.g.Total.X0-overhang-6, b.g.Total.X1+overhang+6
	for k := range rungs {
		i := k / 2
		if k%2 == 1 {
			i = len(rungs) - 1 - k/2
		}
		r := rungs[i]
		b.placer.put(Quantity, b.unit.signed(r.Hz, 4), anchor{Point{left, r.Y}, 1, 0.5}, anchor{Point{left, r.Y - 2}, 1, 1})
		text := "×" + Number(r.Degeneracy, 3)
		if b.options.Ladder.Shares != nil {
			text += ", " + Number(100*r.Part, 3) + " %"
		}
		b.placer.put(SoftNumber, text, anchor{Point{right, r.Y - 3}, 0, 1}, anchor{Point{right, r.Y + 3}, 0, 0})
	}
}

// rows are energy, degeneracy and share of every level; NaN where not known.
func (l *Ladder) rows() [][3]float64 {
	rows := make([][3]float64, len(l.Energies))
	for i, hz := range l.Energies {
		rows[i] = [3]float64{hz, 1, math.NaN()}
		if i < len(l.Degeneracies) {
			rows[i][1] = l.Degeneracies[i]
		}
		if i < len(l.Shares) {
			rows[i][2] = l.Shares[i]
		}
	}
	return rows
}

// drawLids gives a ladder a lid at both ends; only the one that counts can drain.
func (g *Geometry) drawLids(p *pen, b Bar) {
	for i, end := range [...]End{b.Upper, b.Lower} {
		lid, inward := b, float64(1-2*i)
		if !end.Counts {
			lid.Fill = Bounded
		}
		end.Counts = true
		g.drawEnd(p, &lid, end, inward)
	}
}

package figure

import (
	"math"

	"hilltop/bosehubbard/si"
)

// labelEntropy writes the scale of S/N and what the curve is of.
func (b *builder) labelEntropy() {
	e := b.g.Entropy
	if e == nil {
		return
	}
	row := 15 * b.style.text()
	letters, names := b.names+2, b.names+2+row
	b.placer.put(SoftNumber, "0", anchor{Point{e.X(0), letters}, 0.5, 0})
	b.placer.put(SoftNumber, Number(e.Largest, 3), anchor{Point{e.X(e.Largest), letters}, 0.5, 0})
	centre := (e.Box.X0 + e.Box.X1) / 2
	texts := []string{"S/N in kB, " + e.Name, "S/N, " + e.Name, "S/N in kB", "S/N"}
	if e.Stale {
		texts = []string{"S/N in kB, from before", "from before", "before"}
	}
	for _, text := range texts {
		if width, _ := b.placer.box(Word, text); width <= e.Box.Width() && b.placer.put(Word, text, anchor{Point{centre, names}, 0.5, 0}) {
			break
		}
	}
}

// labelRuler writes the values of -1/T; T is infinite at its zero.
func (b *builder) labelRuler() {
	e := b.g.Entropy
	if e == nil {
		return
	}
	x := b.g.Ruler.X0 + 8
	for _, t := range e.Ticks {
		if t.Value == 0 {
			b.placer.put(SoftNumber, "±∞", anchor{Point{x, t.Y}, 0, 0.5})
		}
	}
	for _, t := range e.Ticks {
		if t.Value != 0 {
			b.placer.put(SoftNumber, Signed(t.Value, 2), anchor{Point{x, t.Y}, 0, 0.5})
		}
	}
}

// labelState writes -1/T and T of the state as an inverse flag.
func (b *builder) labelState() {
	e := b.g.Entropy
	if e == nil || e.State == nil {
		return
	}
	cold := "−1/T " + Signed(-e.State.Beta*e.PerUnit, 3) + " " + e.Unit
	at := e.State.At
	step := 15 * b.style.text()
	var anchors []anchor
	for d := 8.0; d < 12*step; d += step / 2 {
		for _, x := range [...]float64{0, 1} {
			place := Point{e.Box.X0 + 4 + x*(e.Box.Width()-4), at.Y}
			anchors = append(anchors, anchor{place.below(d), x, 0}, anchor{place.below(-d), x, 1})
		}
	}
	_ = b.placer.put(Flag, cold+", T "+Temperature(e.State.Beta, 3), anchors...) || b.placer.put(Flag, cold, anchors...)
}

// Temperature writes T of a beta in 1/Hz, in nK or with the prefix that suits it;
// both infinities are one temperature, the two zeros are not.
func Temperature(beta float64, digits int) string {
	switch {
	case beta == 0:
		return "±∞"
	case math.IsInf(beta, 1):
		return "+0"
	case math.IsInf(beta, -1):
		return "−0"
	}
	nano := si.KelvinFromHz(1/beta) * 1e9
	m := measureOf{NanoKelvin.String(), 1}.prefixed(math.Abs(nano))
	return Signed(nano/m.hz, digits) + " " + m.name
}

// Says is what a place of the curve means: S/N, -1/T and T.
func (e *EntropyPanel) Says(p EntropyPoint) string {
	return "S/N " + Number(p.Entropy, 3) + " kB, −1/T " + Signed(-p.Beta*e.PerUnit, 3) + " " + e.Unit + ", T " + Temperature(p.Beta, 3)
}

// below is the point so far down.
func (p Point) below(d float64) Point { return Point{p.X, p.Y + d} }

// keepEntropyFree keeps labels off S(E), its tangent and the line of the state.
func (b *builder) keepEntropyFree() {
	g := b.g
	if g.Entropy == nil {
		return
	}
	bands(g.Entropy.line(), g.Sky.Y1, g.Ground.Y0, b.keepLineFree)
	if g.Entropy.State != nil {
		b.keepLineFree(g.Entropy.Tangent[:])
		b.keepLineFree([]Point{{g.State.X0, g.State.Y}, {g.State.X1, g.State.Y}})
	}
}

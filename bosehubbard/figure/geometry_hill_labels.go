package figure

import "strings"

// labelHill writes the hill's scale and what V is.
func (b *builder) labelHill() {
	s := b.g.Slope
	if s == nil {
		return
	}
	row := 15 * b.style.text()
	letters, names := b.names+2, b.names+2+row
	for _, site := range [...]float64{0, -s.Reach, s.Reach, -s.Reach / 2, s.Reach / 2} {
		b.placer.put(SoftNumber, Number(site, 3), anchor{Point{s.X(site), letters}, 0.5, 0})
	}
	centre := (s.Box.X0 + s.Box.X1) / 2
	_ = b.placer.put(Word, "sites along "+s.Axis, anchor{Point{centre, names}, 0.5, 0}) ||
		b.placer.put(Word, s.Axis, anchor{Point{centre, names}, 0.5, 0})
	b.labelCurvature(centre)
	if s.Turn == 0 {
		return
	}
	for _, site := range [...]float64{-s.Turn, s.Turn} {
		at := Point{s.X(site), b.g.Scale.Y(s.edge(site, b.g.hillEdge()))}
		if at.Y < b.g.Plot.Y0+8 || at.Y > b.g.Plot.Y1-8 {
			continue
		}
		var anchors []anchor
		for _, d := range [...]float64{8, 16, 24, 36} {
			anchors = append(anchors, anchor{Point{at.X - d, at.Y}, 1, 0.5}, anchor{Point{at.X + d, at.Y}, 0, 0.5})
		}
		if site > 0 { // outside first
			anchors[0], anchors[1] = anchors[1], anchors[0]
		}
		b.placer.put(SoftNumber, "2zJ", anchors...)
	}
}

// labelCurvature writes V with its sign and its word where the hill leaves room:
// first in the sky of a hill, in the ground of a bowl.
func (b *builder) labelCurvature(centre float64) {
	s := b.g.Slope
	word := "no trap"
	sky, ground := Point{centre, b.g.Sky.Y0 + 6}, Point{centre, b.g.Ground.Y1 - 6}
	anchors := []anchor{{sky, 0.5, 0}, {ground, 0.5, 1}}
	if s.Curvature > 0 {
		word = "trap"
		anchors[0], anchors[1] = anchors[1], anchors[0]
	} else if s.Curvature < 0 {
		word = "anti-trap"
	}
	for _, y := range [...]float64{b.g.Sky.Y1 + 6, b.g.Ground.Y0 - 24} {
		anchors = append(anchors, anchor{Point{s.Box.X1, y}, 1, 0}, anchor{Point{s.Box.X0, y}, 0, 0})
	}
	value := "V " + Signed(s.Curvature, 3)
	_ = b.placer.put(Quantity, value+" Hz/site², "+word, anchors...) ||
		b.placer.put(Quantity, value+", "+word, anchors...) ||
		b.placer.put(Quantity, value, anchors...)
}

// labelSizes writes the energies on the size line, above and below in turn.
func (b *builder) labelSizes() {
	line := &b.g.Size
	side := 0
	for _, m := range line.Marks {
		text := m.Name + " " + Number(m.Hz, 3) + " Hz"
		if m.Name == "|V|" {
			text += "/site²"
		}
		width, _ := b.placer.box(Quantity, text)
		above, below := line.Y-4, line.Y+4
		var anchors []anchor
		for _, shift := range [...]float64{0, -0.4, 0.4} {
			up := anchor{Point{m.X + shift*width, above}, 0.5, 1}
			down := anchor{Point{m.X + shift*width, below}, 0.5, 0}
			if side%2 == 1 {
				up, down = down, up
			}
			anchors = append(anchors, up, down)
		}
		if b.placer.put(Quantity, text, anchors...) {
			side++
		}
	}
	if len(line.Zero) > 0 {
		text := strings.Join(line.Zero, ", ") + ": 0"
		b.placer.put(SoftNumber, text, anchor{Point{8, line.Y - 4}, 0, 1}, anchor{Point{8, line.Y + 4}, 0, 0})
	}
}

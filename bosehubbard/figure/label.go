package figure

import (
	"math"
	"strings"
)

// Label is a text of a picture and the box it fills.
type Label struct {
	Text string
	Box  Rect
	Role Role
	// Base is the left end of the base line.
	Base Point
}

// Role says what a label is, and with that its typeface and colour.
type Role int

// The roles of labels.
const (
	Word       Role = iota // sans, ink
	Quantity               // mono, ink
	SoftWord               // sans, soft ink
	SoftNumber             // mono, soft ink
	Flag                   // sans, paper on an ink box
)

func (r Role) face() typeface {
	if r == Quantity || r == SoftNumber {
		return numbers
	}
	return words
}

// anchor is where a label would go: a point and which part of the box stands on
// it, from 0 (left, top) to 1 (right, bottom).
type anchor struct {
	at     Point
	fx, fy float64
}

// placer puts labels where they overlap nothing that is already there.
type placer struct {
	style  Style
	bounds Rect
	taken  []Rect
	labels []Label
}

// flagPad is the ink around the text of a flag.
const flagPad = 4

// apart is the least room between labels side by side, px.
const apart = 5

// box is the room of a text whose upper left corner is at the origin.
func (p *placer) box(role Role, text string) (width, height float64) {
	face := role.face()
	width, height = math.Ceil(face.measure(p.style, text)), face.height(p.style)
	if role == Flag {
		width, height = width+2*flagPad, height+2*flagPad
	}
	return width, height
}

// put places a text at the first anchor that is free and reports whether there is
// one.
func (p *placer) put(role Role, text string, anchors ...anchor) bool {
	if text == "" {
		return false
	}
	width, height := p.box(role, text)
	for _, a := range anchors {
		x, y := a.at.X-a.fx*width, a.at.Y-a.fy*height
		box := Rect{x, y, x + width, y + height}
		if box.Within(p.bounds) && p.free(box) {
			p.add(role, text, box)
			return true
		}
	}
	return false
}

func (p *placer) add(role Role, text string, box Rect) {
	face := role.face()
	base := Point{box.X0, box.Y0 + ascent*face.size*p.style.text()}
	if role == Flag {
		base.X, base.Y = base.X+flagPad, base.Y+flagPad
	}
	p.taken = append(p.taken, Rect{box.X0 - apart, box.Y0, box.X1 + apart, box.Y1})
	p.labels = append(p.labels, Label{Text: text, Box: box, Role: role, Base: base})
}

func (p *placer) free(box Rect) bool {
	for _, t := range p.taken {
		if box.Overlaps(t) {
			return false
		}
	}
	return true
}

// near lists anchors at a point and then further and further up and down from it,
// within span.
func near(at Point, fx, step, span float64) []anchor {
	list := []anchor{{at, fx, 0.5}}
	for d := step; d <= span; d += step {
		list = append(list, anchor{Point{at.X, at.Y - d}, fx, 0.5}, anchor{Point{at.X, at.Y + d}, fx, 0.5})
	}
	return list
}

// drawLabels draws what was placed.
func (p *pen) drawLabels(labels []Label) {
	for _, l := range labels {
		ink := p.style.Palette.Ink
		switch l.Role {
		case SoftWord, SoftNumber:
			ink = p.style.Palette.Soft
		case Flag:
			p.fill(l.Box, p.style.Palette.Ink)
			ink = p.style.Palette.Paper
		}
		p.text(l.Role.face(), ink, l.Base, l.Text)
	}
}

// wrap breaks a text between words into lines no wider than width.
func wrap(s Style, face typeface, text string, width float64) []string {
	var lines []string
	line := ""
	for _, word := range strings.Fields(text) {
		longer := word
		if line != "" {
			longer = line + " " + word
		}
		if line != "" && face.measure(s, longer) > width {
			lines = append(lines, line)
			longer = word
		}
		line = longer
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}

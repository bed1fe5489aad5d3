package gui

import (
	"fyne.io/fyne/v2"
)

// barGap is the room between the buttons, and between them and the line.
const barGap = space4

// leastReadout is the least width of the line beside the buttons, at 100 % text.
const leastReadout = 200

// readOut says what the crosshair reads, why the picture is old, or how to read it.
func (p *Plot) readOut() {
	text, color := p.sheet.reading.text, ColorInk
	if !p.sheet.reads {
		color = ColorSoftInk
		switch {
		case p.stale != "":
			text = "from before: " + p.stale
		case p.sheet.focused:
			text = "Arrows read, + and − zoom, Shift and arrows move, 0 resets, P pins."
		case p.view.pinned != nil:
			text = "Dashed: the pinned reference."
		default:
			text = ""
		}
	}
	if p.readout.Text != text || p.readout.Color != color {
		p.readout.Text, p.readout.Color = text, color
		p.readout.Refresh()
	}
}

// label words the buttons.
func (p *Plot) label() {
	var units, scales int
	if p.sheet.drawn != nil {
		units, scales = len(p.sheet.drawn.subject.units()), len(p.sheet.drawn.subject.scales())
	}
	changed := p.unit.Visible() != (units > 1) || p.scale.Visible() != (scales > 1)
	show(p.unit, units > 1)
	show(p.scale, scales > 1)
	p.unit.SetText("in " + p.view.unit.String())
	scale := "all"
	if p.view.scale != "" {
		scale = screenName(p.view.scale)
	}
	p.scale.SetText("Range: " + scale)
	if p.view.pinned != nil {
		p.pin.SetText("Unpin")
	} else {
		p.pin.SetText("Pin")
	}
	p.whole.setDisabled(p.view.whole())
	if changed {
		p.Refresh()
	}
}

// buttons are those in sight.
func (p *Plot) buttons() []*Button {
	var list []*Button
	for _, b := range []*Button{p.unit, p.scale, p.pin, p.whole, p.save} {
		if b.Visible() {
			list = append(list, b)
		}
	}
	return list
}

// buttonWidth has room for the longest text that a button can have.
func (p *Plot) buttonWidth(b *Button) float32 {
	widest := b.MinSize().Width
	switch b {
	case p.pin:
		widest = max(widest, p.widthOf("Unpin"))
	case p.unit:
		widest = max(widest, p.widthOf("in nK"))
	case p.scale:
		widest = max(widest, p.widthOf("Range: Trap along x"))
	}
	return widest
}

func (p *Plot) widthOf(text string) float32 {
	return NewProse(text, textAxis, 1).Width() + 2*px(space12)
}

func (p *Plot) buttonsWidth() float32 {
	total := float32(0)
	for _, b := range p.buttons() {
		total += p.buttonWidth(b) + px(barGap)
	}
	return total
}

// stacked reports whether the line stands above the buttons.
func (p *Plot) stacked(width float32) bool { return width-p.buttonsWidth() < px(leastReadout) }

// readoutHeight is that of two lines of text.
func (p *Plot) readoutHeight() float32 { return max(2*p.readout.lineHeight(), px(rowHeight)) }

// places puts the buttons into rows, each at the right edge of the width, and returns
// their boxes and the height of all rows.
func (p *Plot) places(width float32) (boxes []box, high float32) {
	row, used := 0, float32(0)
	flush := func() { // moves the row to the right
		for i := row; i < len(boxes); i++ {
			boxes[i].at.X += width - used + px(barGap)
		}
		row, used = len(boxes), 0
	}
	for _, b := range p.buttons() {
		wide := min(p.buttonWidth(b), width)
		if used > 0 && used+wide > width {
			flush()
			high += px(rowHeight + barGap)
		}
		boxes = append(boxes, box{fyne.NewPos(used, high), fyne.NewSize(wide, px(rowHeight))})
		used += wide + px(barGap)
	}
	flush()
	return boxes, high + px(rowHeight)
}

// BarHeight is the height of what stands below the picture.
func (p *Plot) BarHeight(width float32) float32 {
	if p.stacked(width) {
		_, high := p.places(width)
		return p.readoutHeight() + high + 2*px(barGap)
	}
	return p.readoutHeight() + px(barGap)
}

// HeightFor is the height of picture and bar in a width.
func (p *Plot) HeightFor(width float32) float32 { return p.high(width) + p.BarHeight(width) }

// CreateRenderer implements [fyne.Widget].
func (p *Plot) CreateRenderer() fyne.WidgetRenderer {
	p.ExtendBaseWidget(p)
	return newPainting(p)
}

func (p *Plot) least() fyne.Size { return fyne.NewSize(0, p.HeightFor(p.Size().Width)) }

func (p *Plot) paint(size fyne.Size) []fyne.CanvasObject {
	bar := p.BarHeight(size.Width)
	p.sheet.Resize(fyne.NewSize(size.Width, max(size.Height-bar, 0)))
	y, line := size.Height-bar+px(barGap), p.readoutHeight()
	wide := size.Width - p.buttonsWidth()
	if p.stacked(size.Width) {
		wide = size.Width
	}
	p.readout.Move(fyne.NewPos(0, y))
	p.readout.Resize(fyne.NewSize(wide, line))
	p.failure.SetText(p.fault)
	p.failure.Move(fyne.NewPos(0, y))
	p.failure.Resize(fyne.NewSize(wide, line))
	show(p.failure, p.fault != "")
	show(p.readout, p.fault == "")
	if p.stacked(size.Width) {
		y += line + px(barGap)
	}
	parts := []fyne.CanvasObject{p.sheet, p.readout, p.failure}
	boxes, _ := p.places(size.Width)
	for i, b := range p.buttons() {
		b.Move(boxes[i].at.AddXY(0, y))
		b.Resize(boxes[i].size)
		parts = append(parts, b)
	}
	return parts
}

package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/widget"
)

// Verdicts as the report writes them.
const (
	sealed = "sealed"
	leaky  = "leaky"
	astray = "astray"
	open   = "open"
)

// Badge is the verdict as a shape: a bar under a whole lid where the energy is
// bounded, under a split lid where it is drained, thinning into strips where it is
// unbounded, and a lid with the state detached from it where that is astray. An
// unknown verdict is a dashed outline. For a wanted T > 0 the bound is the floor,
// and the shape hangs upside down.
type Badge struct {
	widget.BaseWidget

	Verdict string
	Floor   bool    // the bound that counts is the floor
	Stale   bool    // the verdict is of before: dashed, in soft ink
	Side    float32 // at 100 % text
}

var _ fyne.Accessible = (*Badge)(nil)

// NewBadge returns a badge without a verdict; side is at 100 % text.
func NewBadge(side float32) *Badge {
	b := &Badge{Side: side}
	b.ExtendBaseWidget(b)
	return b
}

// set changes the shape.
func (b *Badge) set(verdict string, floor, stale bool) {
	if b.Verdict != verdict || b.Floor != floor || b.Stale != stale {
		b.Verdict, b.Floor, b.Stale = verdict, floor, stale
		b.Refresh()
	}
}

// AccessibilityLabel is the verdict.
func (b *Badge) AccessibilityLabel() string { return b.Verdict }

// AccessibilityRole is text.
func (b *Badge) AccessibilityRole() fyne.AccessibleRole { return fyne.AccessibleRoleText }

// CreateRenderer implements [fyne.Widget].
func (b *Badge) CreateRenderer() fyne.WidgetRenderer {
	b.ExtendBaseWidget(b)
	return newPainting(b)
}

func (b *Badge) least() fyne.Size { return fyne.NewSquareSize(px(b.Side)) }

// The shape is drawn on a square of 48 units, the bar 20 wide in its middle.
const (
	badgeUnits = 48
	barLeft    = 13
	barRight   = 35
	barBottom  = 46
	lidLeft    = 5 // 8 beyond the bar
	lidRight   = 43
	lidTop     = 8
	lidDeep    = 4
	barTop     = 15
	lidTurn    = 8 // how far its ends turn inward
)

func (b *Badge) paint(size fyne.Size) []fyne.CanvasObject {
	var parts []fyne.CanvasObject
	pen := pen{unit: min(size.Width, size.Height) / badgeUnits, units: badgeUnits, flip: b.Floor, stale: b.Stale, stroke: lineNormal,
		add: func(o fyne.CanvasObject) { parts = append(parts, o) }}
	if pen.unit < 2./3 {
		pen.stroke = lineThin // an outline must not fill the bar of a small mark
	}
	switch b.Verdict {
	case sealed:
		pen.bar(barTop, barBottom, ColorBlue)
		pen.lid(lidLeft, lidRight)
	case leaky:
		pen.bar(barTop, barBottom, ColorYellow)
		pen.splitLid()
	case astray:
		pen.bar(barTop, 24, ColorBlue)
		pen.lid(lidLeft, lidRight)
		pen.diamond(24, 37, 8)
	case open:
		pen.bar(30, barBottom, ColorRed)
		pen.strips()
	default:
		pen.dashes(lidTop, barBottom)
	}
	return parts
}

// pen adds shapes in units from the top of a square, turned over where flip is
// set.
type pen struct {
	unit  float32
	units float32
	flip  bool
	stale bool
	// stroke is the width of an outline, in pixels.
	stroke float32
	add    func(fyne.CanvasObject)
}

// rect fills a rectangle.
func (p pen) rect(left, top, right, bottom float32, fill fyne.ThemeColorName) {
	if p.flip {
		top, bottom = p.units-bottom, p.units-top
	}
	if p.stale {
		fill = ColorSoftInk
	}
	p.add(filled(fyne.NewPos(left*p.unit, top*p.unit), fyne.NewSize((right-left)*p.unit, (bottom-top)*p.unit), fill))
}

// bar is a filled bar with an ink outline.
func (p pen) bar(top, bottom float32, fill fyne.ThemeColorName) {
	if p.stale {
		p.dashes(top, bottom)
		return
	}
	edge := p.stroke / p.unit
	p.rect(barLeft, top, barRight, bottom, ColorInk)
	p.rect(barLeft+edge, top+edge, barRight-edge, bottom-edge, fill)
}

// dashes is the outline of a bar of which nothing is known now.
func (p pen) dashes(top, bottom float32) {
	if p.flip {
		top, bottom = p.units-bottom, p.units-top
	}
	at, size := fyne.NewPos(barLeft*p.unit, top*p.unit), fyne.NewSize((barRight-barLeft)*p.unit, (bottom-top)*p.unit)
	for _, o := range dashed(at, size, 1, 3, 3, ColorSoftInk) {
		p.add(o)
	}
}

// lid is a whole lid whose ends turn inward.
func (p pen) lid(left, right float32) {
	p.rect(left, lidTop, right, lidTop+lidDeep, ColorInk)
	p.rect(left, lidTop, left+lidDeep, lidTop+lidTurn+lidDeep, ColorInk)
	p.rect(right-lidDeep, lidTop, right, lidTop+lidTurn+lidDeep, ColorInk)
}

// splitLid is a lid with a gap of 12 and a stem that rises through it to an open
// arrow.
func (p pen) splitLid() {
	p.rect(lidLeft, lidTop, 18, lidTop+lidDeep, ColorInk)
	p.rect(30, lidTop, lidRight, lidTop+lidDeep, ColorInk)
	p.rect(lidLeft, lidTop, lidLeft+lidDeep, lidTop+lidTurn+lidDeep, ColorInk)
	p.rect(lidRight-lidDeep, lidTop, lidRight, lidTop+lidTurn+lidDeep, ColorInk)
	p.line(24, barTop, 24, 1, 2)
	p.line(20, 5, 24, 1, 2)
	p.line(28, 5, 24, 1, 2)
}

// strips is the upper end of a bar without a bound: strips that thin out from 7 to
// 1 while the gaps between them grow from 2 to 8, in proportion.
func (p pen) strips() {
	bottom := float32(30)
	for i, deep := range []float32{6, 4.5, 3, 2} {
		bottom -= 1.5 + float32(i)
		p.rect(barLeft, bottom-deep, barRight, bottom, ColorRed)
		bottom -= deep
	}
}

// diamond is the mark of the state.
func (p pen) diamond(x, y, half float32) {
	p.line(x-half, y, x, y-half, lineCurve)
	p.line(x, y-half, x+half, y, lineCurve)
	p.line(x+half, y, x, y+half, lineCurve)
	p.line(x, y+half, x-half, y, lineCurve)
}

func (p pen) line(x1, y1, x2, y2, width float32) {
	if p.flip {
		y1, y2 = p.units-y1, p.units-y2
	}
	ink := ColorInk
	if p.stale {
		ink = ColorSoftInk
	}
	o := canvas.NewLine(tint(ink))
	o.StrokeWidth = width
	o.Position1 = fyne.NewPos(x1*p.unit, y1*p.unit)
	o.Position2 = fyne.NewPos(x2*p.unit, y2*p.unit)
	p.add(o)
}

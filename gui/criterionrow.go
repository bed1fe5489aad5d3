package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// CriterionRow is one condition: a mark, its name, the margin, the numbers behind
// it, and for a broken one the button that mends it.
type CriterionRow struct {
	widget.BaseWidget
	mark   *Badge
	name   *Prose
	margin *Number
	detail *Prose
	button *Button
	advice session.Advice // what the button does
	shown  *criterion
}

var _ fyne.Widget = (*CriterionRow)(nil)

// newCriterionRow returns a row of a page.
func newCriterionRow(tools pageTools) *CriterionRow {
	r := &CriterionRow{mark: NewBadge(24), name: NewProse("", textBody, 1), detail: NewProse("", textBody, 0).soft()}
	r.margin = NewNumber(tools.explain, tools.key)
	r.button = NewButton("", func() {
		tools.apply(r.advice)
	})
	r.button.OnKey = tools.key
	r.ExtendBaseWidget(r)
	return r
}

// criterion is what a row shows.
type criterion struct {
	name, detail, margin, verdict string
	floor, stale                  bool
	mend                          string // on the button; "" for none
	first                         string // which knob breaks it before all others; "" for none
}

// set shows a criterion.
func (r *CriterionRow) set(c criterion) {
	if r.shown != nil && *r.shown == c {
		return
	}
	r.shown = &c
	r.mark.set(c.verdict, c.floor, c.stale)
	ink := ColorInk
	if c.stale {
		ink = ColorSoftInk
	}
	r.name.Color, r.margin.text.Color = ink, ink
	r.name.Text = screenName(c.name)
	r.name.Bold = c.verdict != sealed || c.first != ""
	r.margin.Set(c.margin, c.name)
	r.detail.Text, r.detail.Color = c.detail, ColorSoftInk
	if c.first != "" {
		r.detail.Text, r.detail.Color = c.first, ink
	}
	show(r.button, c.mend != "")
	r.button.SetText(c.mend)
	r.Refresh()
}

// criterionColumns are the widths at 100 % text, before the detail.
const (
	markWide   = 24
	nameWide   = 136
	marginWide = 128
	mendWide   = 230
)

// criterionPlan is where the parts of a row go in a width: detail and button stand
// behind the margin, in a narrower row below it, and in a still narrower one below
// each other.
type criterionPlan struct {
	left, room    float32 // of the detail
	below         bool    // the detail stands below the margin
	buttonBelow   bool    // the button stands below the detail
	detail, total float32 // heights
}

// leastDetail is the least width of a detail beside something, at 100 % text.
const leastDetail = 160

func (r *CriterionRow) plan(width float32) criterionPlan {
	button := float32(0)
	if r.button.Visible() {
		button = px(mendWide + space12)
	}
	p := criterionPlan{left: px(markWide + nameWide + marginWide + 3*space12)}
	p.room = width - p.left - button
	if p.room < px(leastDetail) {
		p.left, p.below = px(markWide+space12), true
		p.room = width - p.left - button
	}
	if p.room < px(leastDetail) {
		p.room, p.buttonBelow = width-p.left, true
	}
	p.detail = r.detail.HeightFor(p.room)
	return r.heights(p)
}

// heights adds up the lines of a row.
func (r *CriterionRow) heights(p criterionPlan) criterionPlan {
	button := float32(0)
	if r.button.Visible() {
		button = r.button.HeightFor(px(mendWide)) + px(space4)
	}
	p.total = max(p.detail, button)
	if p.buttonBelow {
		p.total = p.detail + button
	}
	if p.below {
		p.total += px(rowHeight)
	}
	p.total = max(p.total+px(space4), px(rowHeight))
	return p
}

// HeightFor is that of the row in a width.
func (r *CriterionRow) HeightFor(width float32) float32 { return r.plan(width).total }

// CreateRenderer implements [fyne.Widget].
func (r *CriterionRow) CreateRenderer() fyne.WidgetRenderer {
	r.ExtendBaseWidget(r)
	return newPainting(r)
}

func (r *CriterionRow) least() fyne.Size { return fyne.NewSize(0, r.HeightFor(r.Size().Width)) }

func (r *CriterionRow) paint(size fyne.Size) []fyne.CanvasObject {
	p := r.plan(size.Width)
	first := size.Height
	if p.below {
		first = px(rowHeight)
	}
	r.placeHead(first)
	top, high := float32(0), size.Height
	if p.below {
		top, high = first, size.Height-first
	}
	button := r.button.HeightFor(px(mendWide))
	at := fyne.NewPos(size.Width-px(mendWide), top+(high-button)/2)
	if p.buttonBelow {
		high = p.detail
		at = fyne.NewPos(p.left, top+p.detail+px(space4)/2)
	}
	r.button.Move(at)
	r.button.Resize(fyne.NewSize(min(px(mendWide), size.Width-at.X), button))
	r.detail.Move(fyne.NewPos(p.left, top+(high-p.detail)/2))
	r.detail.Resize(fyne.NewSize(p.room, p.detail))
	parts := []fyne.CanvasObject{r.mark, r.name, r.margin, r.detail, r.button}
	if r.shown != nil && r.shown.first != "" {
		parts = append([]fyne.CanvasObject{filled(fyne.Position{}, size, ColorPanel)}, parts...)
	}
	return parts
}

// placeHead places mark, name and margin in the middle of a height.
func (r *CriterionRow) placeHead(height float32) {
	x := float32(0)
	for _, part := range []struct {
		object      fyne.CanvasObject
		width, high float32
	}{
		{r.mark, px(markWide), px(markWide)},
		{r.name, px(nameWide), r.name.lineHeight()},
		{r.margin, px(marginWide), r.margin.MinSize().Height},
	} {
		part.object.Move(fyne.NewPos(x, (height-part.high)/2))
		part.object.Resize(fyne.NewSize(part.width, part.high))
		x += part.width + px(space12)
	}
}

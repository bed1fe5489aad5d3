package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// KnobRow is one number of the plan: its label, its field, below them what the
// text in the field means or why it was refused, and for the knob at hand the
// slider.
type KnobRow struct {
	widget.BaseWidget
	FieldWidth float32

	label  *KnobLabel
	field  *ValueField
	note   *Prose
	fault  *Fault
	slider *KnobSlider
}

var _ fyne.Widget = (*KnobRow)(nil)

// knobHigh is the height of label and field at 100 % text.
const knobHigh = 36

// NewKnobRow returns a row without a value.
func NewKnobRow(label *KnobLabel, field *ValueField, slider *KnobSlider) *KnobRow {
	r := &KnobRow{label: label, field: field, slider: slider, FieldWidth: px(120),
		note: NewProse("", textAxis, 2).soft().right(), fault: NewFault("", textAxis, 0)}
	r.note.Hide()
	r.fault.Hide()
	r.slider.Hide()
	r.ExtendBaseWidget(r)
	return r
}

// Set shows a value. What the text in the field means is in preview; slider and
// track are shown for the knob at hand.
func (r *KnobRow) Set(f session.Field, preview string, track *session.Track, atHand bool) {
	r.label.Set(f.Label, origin(f))
	r.field.Set(f)
	r.fault.SetText(f.Reason)
	show(r.fault, f.Reason != "")
	r.SetNote(preview)
	show(r.slider, atHand && f.Slider)
	if r.slider.Visible() {
		r.slider.Set(f, track)
	}
	r.Refresh()
}

// SetNote changes what the text in the field means.
func (r *KnobRow) SetNote(text string) {
	r.note.SetText(text)
	show(r.note, text != "" && !r.fault.Visible())
}

// origin says where a value comes from, or in which other stage an edit sets it,
// and what its sign means.
func origin(f session.Field) string {
	from := ""
	switch {
	case f.SetsIn != "":
		from = "sets '" + f.SetsIn + "'"
	case f.Inherited && f.From != "":
		from = "from " + f.From
	}
	if f.Word == "" || from == "" {
		return f.Word + from
	}
	return f.Word + ", " + from
}

// show makes an object visible or not.
func show(o fyne.CanvasObject, visible bool) {
	if visible {
		o.Show()
	} else {
		o.Hide()
	}
}

// HeightFor is that of the parts that are shown.
func (r *KnobRow) HeightFor(width float32) float32 {
	height := px(knobHigh)
	if r.note.Visible() {
		height += r.note.HeightFor(width)
	}
	if r.fault.Visible() {
		height += px(space4) + r.fault.HeightFor(width)
	}
	if r.slider.Visible() {
		height += px(space4) + r.slider.MinSize().Height
	}
	return height
}

// CreateRenderer implements [fyne.Widget].
func (r *KnobRow) CreateRenderer() fyne.WidgetRenderer {
	r.ExtendBaseWidget(r)
	return newPainting(r)
}

func (r *KnobRow) least() fyne.Size {
	return fyne.NewSize(r.FieldWidth, r.HeightFor(r.Size().Width))
}

func (r *KnobRow) paint(size fyne.Size) []fyne.CanvasObject {
	field := min(r.FieldWidth, size.Width)
	r.label.Move(fyne.NewPos(0, 0))
	r.label.Resize(fyne.NewSize(size.Width-field-px(space8), px(knobHigh)))
	r.field.Move(fyne.NewPos(size.Width-field, (px(knobHigh)-px(rowHeight))/2))
	r.field.Resize(fyne.NewSize(field, px(rowHeight)))
	y := px(knobHigh)
	if r.note.Visible() {
		y = place(r.note, y, size.Width)
	}
	if r.fault.Visible() {
		y = place(r.fault, y+px(space4), size.Width)
	}
	if r.slider.Visible() {
		place(r.slider, y+px(space4), size.Width)
	}
	return []fyne.CanvasObject{r.label, r.field, r.note, r.fault, r.slider}
}

// place puts an object at a height, over a width, and returns where it ends.
func place(o fyne.CanvasObject, y, width float32) float32 {
	height := heightFor(o, width)
	o.Move(fyne.NewPos(0, y))
	o.Resize(fyne.NewSize(width, height))
	return y + height
}

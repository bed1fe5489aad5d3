package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// KnobRow is one value of the plan: its label, its field beside it, or below it
// where the text may be long, then what the text in the field means or why it was
// refused, and for the knob at hand the slider.
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
	r.label.Set(f.Short, origin(f))
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

// headHeight is the height of label and field.
func (r *KnobRow) headHeight(width float32) float32 {
	if r.field.Long {
		return r.label.HeightFor(width) + px(space4) + r.field.HeightFor(width)
	}
	return max(px(knobHigh), r.label.HeightFor(r.labelWidth(width)))
}

// labelWidth is the room for the label beside the field.
func (r *KnobRow) labelWidth(width float32) float32 {
	return width - min(r.FieldWidth, width) - px(space8)
}

// HeightFor is that of the parts that are shown.
func (r *KnobRow) HeightFor(width float32) float32 {
	height := r.headHeight(width)
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
	y := r.headHeight(size.Width)
	if r.field.Long {
		put(r.field, 0, place(r.label, 0, size.Width)+px(space4), size.Width, r.field.HeightFor(size.Width))
	} else {
		field := min(r.FieldWidth, size.Width)
		put(r.label, 0, 0, r.labelWidth(size.Width), y)
		put(r.field, size.Width-field, (y-px(rowHeight))/2, field, px(rowHeight))
	}
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

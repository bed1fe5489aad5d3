package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// Fault is a sentence about something that went wrong, behind an inverse tag with
// an exclamation mark.
type Fault struct {
	widget.BaseWidget
	prose *Prose
}

var _ fyne.Widget = (*Fault)(nil)

// NewFault returns a fault in a text size at 100 %, on at most the given lines; 0
// draws all.
func NewFault(text string, size float32, lines int) *Fault {
	f := &Fault{prose: NewProse(text, size, lines)}
	f.ExtendBaseWidget(f)
	return f
}

// SetText changes the sentence.
func (f *Fault) SetText(text string) {
	if f.prose.Text != text {
		f.prose.Text = text
		f.Refresh()
	}
}

// tagWidth is the width of the tag and the gap behind it.
func (f *Fault) tagWidth() float32 { return px(f.prose.TextSize + space8) }

// HeightFor is that of the sentence beside the tag.
func (f *Fault) HeightFor(width float32) float32 { return f.prose.HeightFor(width - f.tagWidth()) }

// CreateRenderer implements [fyne.Widget].
func (f *Fault) CreateRenderer() fyne.WidgetRenderer {
	f.ExtendBaseWidget(f)
	return newPainting(f)
}

func (f *Fault) least() fyne.Size {
	text := f.prose.MinSize()
	return fyne.NewSize(text.Width+f.tagWidth(), text.Height)
}

func (f *Fault) paint(size fyne.Size) []fyne.CanvasObject {
	height := f.prose.lineHeight()
	tag := filled(fyne.NewPos(0, 1), fyne.NewSize(px(f.prose.TextSize), height-2), ColorInk)
	mark := NewProse("!", f.prose.TextSize, 1).bold().once()
	mark.Color = ColorPaper
	mark.Resize(mark.MinSize())
	mark.Move(fyne.NewPos((tag.Size().Width-mark.Width())/2, 0))
	f.prose.Move(fyne.NewPos(f.tagWidth(), 0))
	f.prose.Resize(fyne.NewSize(size.Width-f.tagWidth(), size.Height))
	return []fyne.CanvasObject{tag, mark, f.prose}
}

package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// Strip stands above the status line and explains one number on two lines: its
// formula, then its inputs and their source.
type Strip struct {
	widget.BaseWidget
	topic           string
	formula, inputs *Prose
	close           *Button
}

var _ fyne.Widget = (*Strip)(nil)

// NewStrip returns a hidden strip; closed runs when it is shut.
func NewStrip(closed func()) *Strip {
	s := &Strip{formula: NewProse("", textBody, 0), inputs: NewProse("", textAxis, 0).soft()}
	s.close = NewButton("Close", func() {
		s.Hide()
		closed()
	})
	s.Hide()
	s.ExtendBaseWidget(s)
	return s
}

// Explain says what a number is; the same topic again shuts the strip.
func (s *Strip) Explain(topic string, e session.Explanation) {
	if s.Visible() && s.topic == topic {
		s.Hide()
		return
	}
	s.topic = topic
	s.formula.Text, s.inputs.Text = e.Lines()
	s.Show()
	s.Refresh()
}

// HeightFor is that of the lines and the room around them.
func (s *Strip) HeightFor(width float32) float32 {
	text := s.textWidth(width)
	return s.formula.HeightFor(text) + s.inputs.HeightFor(text) + 2*px(space8)
}

func (s *Strip) textWidth(width float32) float32 {
	return width - s.close.MinSize().Width - 3*px(space12)
}

// CreateRenderer implements [fyne.Widget].
func (s *Strip) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return newPainting(s)
}

func (s *Strip) least() fyne.Size { return fyne.NewSize(0, s.HeightFor(s.Size().Width)) }

func (s *Strip) paint(size fyne.Size) []fyne.CanvasObject {
	width := s.textWidth(size.Width)
	s.formula.Move(fyne.NewPos(px(space12), px(space8)))
	s.formula.Resize(fyne.NewSize(width, s.formula.HeightFor(width)))
	s.inputs.Move(fyne.NewPos(px(space12), px(space8)+s.formula.Size().Height))
	s.inputs.Resize(fyne.NewSize(width, s.inputs.HeightFor(width)))
	button := s.close.MinSize()
	s.close.Move(fyne.NewPos(size.Width-button.Width-px(space12), (size.Height-button.Height)/2))
	s.close.Resize(button)
	return []fyne.CanvasObject{
		filled(fyne.Position{}, size, ColorPanel),
		filled(fyne.Position{}, fyne.NewSize(size.Width, lineThin), ColorEdge),
		s.formula, s.inputs, s.close,
	}
}

package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// StatusLine is the last line of the window: what happened or what runs, with a
// bar and a way to stop it, and the document.
type StatusLine struct {
	widget.BaseWidget
	Metrics Metrics

	left, right *Prose
	said        string // goes before the notice of a state
	notice      string
	stop        *Button
	busy        bool
	part        float32 // of the work that is done; 0 where that is not known
}

var _ fyne.Widget = (*StatusLine)(nil)

// NewStatusLine returns an empty line.
func NewStatusLine(stop func()) *StatusLine {
	l := &StatusLine{Metrics: metrics[fullFold], left: NewProse("", textAxis, 1), right: NewProse("", textAxis, 1).soft().right()}
	l.stop = NewButton("Stop", stop)
	l.stop.text.TextSize = textAxis
	l.stop.Hide()
	l.ExtendBaseWidget(l)
	return l
}

// Set shows what a state says. Work shows its bar only where it tells how far it
// is: short work would only flicker.
func (l *StatusLine) Set(s session.State) {
	l.busy = s.Busy && s.Progress.Total > 0
	l.part = 0
	l.notice = s.Notice
	l.left.Text = l.words()
	if l.busy {
		l.part = float32(s.Progress.Done) / float32(s.Progress.Total)
		l.left.Text = "Judging: " + s.Progress.Text
	}
	show(l.stop, l.busy)
	l.right.Text = documentLine(s)
	l.Refresh()
}

// Say shows a sentence until another is said; "" makes room for the states' own.
func (l *StatusLine) Say(text string) {
	l.said = oneLine(text)
	l.left.Text = l.words()
	l.Refresh()
}

func (l *StatusLine) words() string {
	if l.said != "" {
		return l.said
	}
	return l.notice
}

// documentLine names the document and says whether it is saved.
func documentLine(s session.State) string {
	switch {
	case s.Plan == nil:
		return "no plan"
	case s.OnDisk == session.Changed:
		return s.Name + ", changed on disk"
	case s.OnDisk == session.Missing && s.Path != "":
		return s.Name + ", file is gone"
	case s.Dirty:
		return s.Name + ", not saved"
	case s.Path == "":
		return s.Name + ", a template"
	}
	return s.Name + ", saved"
}

// CreateRenderer implements [fyne.Widget].
func (l *StatusLine) CreateRenderer() fyne.WidgetRenderer {
	l.ExtendBaseWidget(l)
	return newPainting(l)
}

func (l *StatusLine) least() fyne.Size { return fyne.NewSize(0, l.Metrics.Status) }

func (l *StatusLine) paint(size fyne.Size) []fyne.CanvasObject {
	parts := []fyne.CanvasObject{
		filled(fyne.Position{}, size, ColorPanel),
		filled(fyne.Position{}, fyne.NewSize(size.Width, lineThin), ColorEdge),
	}
	if l.busy {
		parts = append(parts, filled(fyne.Position{}, fyne.NewSize(size.Width*l.part, space4), ColorInk))
	}
	pad, high := px(space12), l.left.lineHeight()
	right := min(l.right.Width(), size.Width/2)
	l.right.Move(fyne.NewPos(size.Width-pad-right, (size.Height-high)/2))
	l.right.Resize(fyne.NewSize(right, high))
	room := size.Width - 3*pad - right
	if l.stop.Visible() {
		width := l.stop.MinSize().Width
		room -= width + pad
		l.stop.Move(fyne.NewPos(pad+room, 0))
		l.stop.Resize(fyne.NewSize(width, size.Height))
	}
	l.left.Move(fyne.NewPos(pad, (size.Height-high)/2))
	l.left.Resize(fyne.NewSize(room, high))
	return append(parts, l.left, l.right, l.stop)
}

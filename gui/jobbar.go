package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// JobBar shows a page's own computation: a line with how far it is and a button that
// stops it, or why it failed and a button that tries again. There is nothing to be
// seen while there is neither.
type JobBar struct {
	widget.BaseWidget
	text   *Prose
	fault  *Fault
	button *Button
	stop   func()
	again  func()
	job    session.Job
}

// NewJobBar returns a bar for the work of a name.
func NewJobBar(stop, again func(), key func(*fyne.KeyEvent)) *JobBar {
	b := &JobBar{text: NewProse("", textAxis, 1), fault: NewFault("", textAxis, 0), stop: stop, again: again}
	b.button = NewButton("", b.press)
	b.button.text.TextSize = textAxis
	b.button.OnKey = key
	b.ExtendBaseWidget(b)
	b.Set(session.Job{}, false)
	return b
}

func (b *JobBar) press() {
	if b.job.Running {
		b.stop()
	} else {
		b.again()
	}
}

// Set shows how a job stands. stopped says that the user stopped it, so that there
// is a button to go on.
func (b *JobBar) Set(j session.Job, stopped bool) {
	b.job = j
	b.text.Text = "Stopped."
	if j.Running {
		b.text.Text = "Computing: " + j.Progress.Text
	}
	b.button.SetText("Compute again")
	if j.Running {
		b.button.SetText("Stop")
	}
	failed := j.Err != nil && !j.Running
	if failed {
		b.fault.SetText(j.Err.Error())
	}
	show(b.fault, failed)
	show(b.text, !failed)
	show(b, j.Running || failed || stopped)
	b.Refresh()
}

// HeightFor is the height in a width.
func (b *JobBar) HeightFor(width float32) float32 {
	return max(px(rowHeight), b.fault.HeightFor(width-b.buttonWidth()-px(space12))) + space4
}

func (b *JobBar) buttonWidth() float32 {
	return NewProse("Compute again", textAxis, 1).Width() + 2*px(space12)
}

// CreateRenderer implements [fyne.Widget].
func (b *JobBar) CreateRenderer() fyne.WidgetRenderer {
	b.ExtendBaseWidget(b)
	return newPainting(b)
}

func (b *JobBar) least() fyne.Size { return fyne.NewSize(0, b.HeightFor(b.Size().Width)) }

func (b *JobBar) paint(size fyne.Size) []fyne.CanvasObject {
	parts := []fyne.CanvasObject{b.text, b.fault, b.button}
	if b.job.Running && b.job.Total > 0 {
		part := float32(b.job.Done) / float32(b.job.Total)
		parts = append(parts, filled(fyne.Position{}, fyne.NewSize(size.Width*part, space4), ColorInk))
	}
	room := size.Width - b.buttonWidth() - px(space12)
	high := size.Height - space4
	put(b.text, 0, space4+(high-b.text.lineHeight())/2, room, b.text.lineHeight())
	put(b.fault, 0, space4, room, high)
	put(b.button, size.Width-b.buttonWidth(), space4, b.buttonWidth(), px(rowHeight))
	return parts
}

package gui

import (
	"cmp"
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// KnobSlider drags the value of a knob along a track that shows the verdict at
// every place: solid where it is sealed, outlined where it is leaky, in strips
// where it is open, dotted where it is astray, a thin line where it is unknown.
//
// It takes no focus: the keys of its field step the value.
type KnobSlider struct {
	widget.BaseWidget
	On SliderEvents

	min, max, value  float64
	lowText, topText string
	track            *session.Track
	dragging         bool
}

// SliderEvents are what a slider tells of. None may be nil.
type SliderEvents struct {
	Begin func()
	Drag  func(value float64)
	End   func()
}

var (
	_ fyne.Widget        = (*KnobSlider)(nil)
	_ fyne.Draggable     = (*KnobSlider)(nil)
	_ desktop.Mouseable  = (*KnobSlider)(nil)
	_ desktop.Cursorable = (*KnobSlider)(nil)
)

// NewKnobSlider returns a slider without a range.
func NewKnobSlider(events SliderEvents) *KnobSlider {
	s := &KnobSlider{On: events}
	s.ExtendBaseWidget(s)
	return s
}

// Set shows a field and, where it is known, the verdict along its range.
func (s *KnobSlider) Set(f session.Field, track *session.Track) {
	s.min, s.max, s.value = f.Min, f.Max, f.Value
	s.lowText, s.topText = session.Digits(f.Min, 4), session.Digits(f.Max, 4)
	s.track = nil
	if track != nil && track.Field == f.ID && track.Unit == f.Unit {
		s.track = track
	}
	s.Refresh()
}

// MouseDown moves the value to the pointer.
func (s *KnobSlider) MouseDown(e *desktop.MouseEvent) {
	if e.Button == desktop.MouseButtonPrimary {
		s.dragTo(e.Position.X)
	}
}

// MouseUp ends the drag.
func (s *KnobSlider) MouseUp(*desktop.MouseEvent) { s.DragEnd() }

// Dragged moves the value along.
func (s *KnobSlider) Dragged(e *fyne.DragEvent) { s.dragTo(e.Position.X) }

func (s *KnobSlider) dragTo(x float32) {
	if !(s.max > s.min) {
		return
	}
	if !s.dragging {
		s.dragging = true
		s.On.Begin()
	}
	left, right := s.ends()
	part := float64((x - left) / (right - left))
	s.value = s.min + min(max(part, 0), 1)*(s.max-s.min)
	s.On.Drag(s.value)
}

// DragEnd ends the drag.
func (s *KnobSlider) DragEnd() {
	if s.dragging {
		s.dragging = false
		s.On.End()
	}
}

// Cursor is a hand.
func (s *KnobSlider) Cursor() desktop.Cursor { return desktop.PointerCursor }

// ends are where the range begins and ends.
func (s *KnobSlider) ends() (left, right float32) {
	return px(handleWide), s.Size().Width - px(handleWide)
}

// x is the place of a value.
func (s *KnobSlider) x(value float64) float32 {
	left, right := s.ends()
	if !(s.max > s.min) {
		return left
	}
	part := (value - s.min) / (s.max - s.min)
	return left + float32(min(max(part, 0), 1))*(right-left)
}

// stretch is a part of the track with one verdict.
type stretch struct {
	from, to float64
	verdict  string
}

// stretches joins neighbouring points of one verdict. A point reaches half way to
// the next; the outer ones reach the ends of a track that is done.
func stretches(t *session.Track) []stretch {
	points := slices.SortedFunc(slices.Values(t.Points), func(a, b session.TrackPoint) int {
		return cmp.Compare(a.Value, b.Value)
	})
	var list []stretch
	for i, p := range points {
		from, to := p.Value, p.Value
		if i > 0 {
			from = (points[i-1].Value + p.Value) / 2
		} else if t.Done {
			from = t.Min
		}
		if i < len(points)-1 {
			to = (p.Value + points[i+1].Value) / 2
		} else if t.Done {
			to = t.Max
		}
		if n := len(list); n > 0 && list[n-1].verdict == p.Verdict {
			list[n-1].to = to
			continue
		}
		list = append(list, stretch{from, to, p.Verdict})
	}
	return list
}

const (
	trackTop    = 8
	trackHeight = 8
	handleWide  = 6
	handleHigh  = 24
	sliderHigh  = 24 + 18 // handle, then the ends of the range in words
)

// CreateRenderer implements [fyne.Widget].
func (s *KnobSlider) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return newPainting(s)
}

func (s *KnobSlider) least() fyne.Size { return fyne.NewSize(px(space24), px(sliderHigh)) }

func (s *KnobSlider) paint(fyne.Size) []fyne.CanvasObject {
	left, right := s.ends()
	middle := px(trackTop + trackHeight/2)
	parts := []fyne.CanvasObject{filled(fyne.NewPos(left, middle), fyne.NewSize(right-left, lineThin), ColorEdge)}
	if s.track != nil {
		for _, part := range stretches(s.track) {
			parts = append(parts, s.paintStretch(part)...)
		}
	}
	parts = append(parts, framed(fyne.NewPos(s.x(s.value)-px(handleWide)/2, 0), fyne.NewSize(px(handleWide), px(handleHigh)), ColorInk, lineThin, ColorPaper)...)
	low := NewProse(s.lowText, textAxis, 1).soft().once()
	low.Resize(low.MinSize())
	top := NewProse(s.topText, textAxis, 1).soft().once()
	top.Resize(top.MinSize())
	low.Move(fyne.NewPos(left, px(handleHigh)))
	top.Move(fyne.NewPos(right-top.Width(), px(handleHigh)))
	return append(parts, low, top)
}

// paintStretch draws one part of the track.
func (s *KnobSlider) paintStretch(part stretch) []fyne.CanvasObject {
	from, to := s.x(part.from), s.x(part.to)
	at, size := fyne.NewPos(from, px(trackTop)), fyne.NewSize(to-from, px(trackHeight))
	switch part.verdict {
	case sealed:
		return []fyne.CanvasObject{filled(at, size, ColorBlue)}
	case leaky:
		return framed(at, size, ColorYellow, lineNormal, ColorInk)
	case open:
		return pattern(at, size, 2.5, 5, ColorRed)
	case astray:
		return pattern(at.AddXY(0, size.Height/2-1), fyne.NewSize(size.Width, 2), 2, 6, ColorInk)
	}
	return nil
}

// pattern fills a stretch with marks of a width, each so far behind the one before.
func pattern(at fyne.Position, size fyne.Size, wide, every float32, fill fyne.ThemeColorName) []fyne.CanvasObject {
	var marks []fyne.CanvasObject
	for x := float32(0); x < size.Width; x += every {
		marks = append(marks, filled(at.AddXY(x, 0), fyne.NewSize(min(wide, size.Width-x), size.Height), fill))
	}
	return marks
}

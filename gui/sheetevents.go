package gui

import (
	"math"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"

	"hilltop/bosehubbard/figure"
)

// grip is the hand that holds the picture.
type grip struct {
	from, to figure.Point
	box      bool // it draws a box to zoom into; else it moves the picture
	guide    guide
	view     view // when it took hold
}

// rect is the box between the two ends of the way.
func (g *grip) rect() figure.Rect {
	return figure.Rect{
		X0: math.Min(g.from.X, g.to.X), X1: math.Max(g.from.X, g.to.X),
		Y0: math.Min(g.from.Y, g.to.Y), Y1: math.Max(g.from.Y, g.to.Y),
	}
}

// MouseIn reads the place under the pointer.
func (s *pictureSheet) MouseIn(e *desktop.MouseEvent) { s.MouseMoved(e) }

// MouseMoved reads the place under the pointer.
func (s *pictureSheet) MouseMoved(e *desktop.MouseEvent) {
	if s.drawn != nil {
		s.read(s.drawn.guide.read(point(e.Position)))
		s.pointed = true
	}
}

// MouseOut drops what the pointer read; what the keys lead to stays.
func (s *pictureSheet) MouseOut() {
	if s.pointed {
		s.read(reading{}, false)
	}
}

// MouseDown takes the focus and takes hold of the picture; with Shift it begins a
// box.
func (s *pictureSheet) MouseDown(e *desktop.MouseEvent) {
	s.held = true // under the hand nothing may scroll
	s.plot.focus()
	s.held = false
	if s.drawn == nil || e.Button != desktop.MouseButtonPrimary {
		return
	}
	at := point(e.Position)
	s.grip = &grip{from: at, to: at, box: e.Modifier&fyne.KeyModifierShift != 0, guide: s.drawn.guide, view: s.plot.view}
}

// Dragged moves the picture along with the pointer, or the corner of the box.
func (s *pictureSheet) Dragged(e *fyne.DragEvent) {
	if s.grip == nil {
		return
	}
	s.grip.to = point(e.Position)
	if s.grip.box {
		s.placeMarks()
		return
	}
	s.plot.look(s.grip.guide.pan(s.grip.view, s.grip.to.X-s.grip.from.X, s.grip.to.Y-s.grip.from.Y))
}

// DragEnd lets go.
func (s *pictureSheet) DragEnd() { s.letGo() }

// MouseUp lets go.
func (s *pictureSheet) MouseUp(*desktop.MouseEvent) { s.letGo() }

// leastBox is how wide and high a box must be to be meant, in px.
const leastBox = 8

func (s *pictureSheet) letGo() {
	g := s.grip
	s.grip = nil
	if g == nil || !g.box {
		return
	}
	s.placeMarks()
	if r := g.rect(); r.Width() >= leastBox && r.Height() >= leastBox {
		s.plot.look(g.guide.box(g.view, r))
	}
}

// DoubleTapped scales the range to the term under the pointer where the picture has
// terms, and shows the whole picture elsewhere.
func (s *pictureSheet) DoubleTapped(e *fyne.PointEvent) {
	if s.drawn == nil {
		return
	}
	if terms, ok := s.drawn.guide.(*termGuide); ok {
		if term := terms.geometry.At(point(e.Position)); term != "" {
			s.plot.scaleTo(term)
			return
		}
	}
	s.plot.look(s.plot.view.reset())
}

// Scrolled zooms the picture that has the focus; any other scrolls with its page.
func (s *pictureSheet) Scrolled(e *fyne.ScrollEvent) {
	switch {
	case !s.focused:
		s.plot.tools.scroll(e)
	case e.Scrolled.DY > 0:
		s.zoom(point(e.Position), zoomBy)
	case e.Scrolled.DY < 0:
		s.zoom(point(e.Position), 1/zoomBy)
	}
}

func (s *pictureSheet) zoom(at figure.Point, by float64) {
	if s.drawn != nil {
		s.plot.look(s.drawn.guide.zoom(s.plot.view, at, by))
	}
}

// centre is where keys zoom: at the crosshair, or in the middle.
func (s *pictureSheet) centre() figure.Point {
	if s.reads {
		return s.reading.at
	}
	if s.drawn == nil {
		return figure.Point{}
	}
	area := s.drawn.guide.area()
	return figure.Point{X: (area.X0 + area.X1) / 2, Y: (area.Y0 + area.Y1) / 2}
}

// KeyDown notes that Shift is held.
func (s *pictureSheet) KeyDown(e *fyne.KeyEvent) { s.shift = s.shift || isShift(e) }

// KeyUp notes that Shift is let go.
func (s *pictureSheet) KeyUp(e *fyne.KeyEvent) { s.shift = s.shift && !isShift(e) }

// TypedRune zooms, pins, changes the unit or the range.
func (s *pictureSheet) TypedRune(r rune) {
	switch r {
	case '+', '=':
		s.zoom(s.centre(), zoomBy)
	case '-', '−':
		s.zoom(s.centre(), 1/zoomBy)
	case '0':
		s.plot.look(s.plot.view.reset())
	case 'p', 'P':
		s.plot.togglePin()
	case 'u', 'U':
		s.plot.nextUnit()
	case 's', 'S':
		s.plot.nextScale()
	}
}

// farSteps is how many points the page keys go on.
const farSteps = 10

// TypedKey leads the crosshair, or with Shift moves the picture.
func (s *pictureSheet) TypedKey(e *fyne.KeyEvent) {
	ways := map[fyne.KeyName][2]int{
		fyne.KeyRight: {1, 0}, fyne.KeyLeft: {-1, 0}, fyne.KeyUp: {0, 1}, fyne.KeyDown: {0, -1},
		fyne.KeyPageDown: {farSteps, 0}, fyne.KeyPageUp: {-farSteps, 0}, fyne.KeyEnd: {1e6, 0}, fyne.KeyHome: {-1e6, 0},
	}
	way, ok := ways[e.Name]
	switch {
	case e.Name == fyne.KeyEscape && s.reads:
		s.read(reading{}, false)
	case !ok:
		s.unused(e)
	case s.drawn == nil:
	case s.shift:
		s.pan(way[0], way[1])
	case !s.reads:
		s.read(s.drawn.guide.first())
	default:
		s.read(s.drawn.guide.step(s.reading, way[0], way[1]), true)
	}
}

// pan moves the picture by an eighth of its area, so that what lies to the right or
// above comes into sight.
func (s *pictureSheet) pan(right, up int) {
	area := s.drawn.guide.area()
	dx, dy := -float64(right)*area.Width()/8, float64(up)*area.Height()/8
	s.plot.look(s.drawn.guide.pan(s.plot.view, dx, dy))
}

// FocusLost drops the crosshair.
func (s *pictureSheet) FocusLost() {
	s.shift = false
	s.control.FocusLost()
	s.read(reading{}, false)
}

// FocusGained makes this the plot that the menu acts on.
func (s *pictureSheet) FocusGained() {
	s.control.FocusGained()
	s.plot.chosen()
	s.plot.readOut()
}

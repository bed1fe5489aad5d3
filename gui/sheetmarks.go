package gui

import (
	"image/color"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"

	"hilltop/bosehubbard/figure"
)

// read shows a reading, or none.
func (s *pictureSheet) read(r reading, ok bool) {
	s.reading, s.reads, s.pointed = r, ok, false
	s.placeMarks()
	s.plot.readOut()
}

// dotSize is the width of the mark in the crosshair, in pixels.
const dotSize = 9

// placeMarks puts the crosshair over the reading, and the box over what the hand
// has drawn.
func (s *pictureSheet) placeMarks() {
	crosshair := s.reads && s.drawn != nil
	if crosshair {
		area, at := s.drawn.guide.area(), s.reading.at
		x, y := float32(at.X), float32(at.Y)
		left, right := min(float32(area.X0), x), max(float32(area.X1), x)
		top, bottom := min(float32(area.Y0), y), max(float32(area.Y1), y)
		s.line(s.across, fyne.NewPos(left, y), fyne.NewPos(right, y))
		s.line(s.down, fyne.NewPos(x, top), fyne.NewPos(x, bottom))
		s.dot.FillColor, s.dot.StrokeColor, s.dot.StrokeWidth = tint(ColorPaper), tint(ColorInk), 2
		s.dot.Resize(fyne.NewSquareSize(dotSize))
		s.dot.Move(fyne.NewPos(x-dotSize/2., y-dotSize/2.))
	}
	for _, o := range []fyne.CanvasObject{s.across, s.down, s.dot} {
		show(o, crosshair)
	}
	boxed := s.grip != nil && s.grip.box
	if boxed {
		r := s.grip.rect()
		s.frame.FillColor, s.frame.StrokeColor, s.frame.StrokeWidth = color.Transparent, tint(ColorInk), lineNormal
		s.frame.Move(fyne.NewPos(float32(r.X0), float32(r.Y0)))
		s.frame.Resize(fyne.NewSize(float32(r.Width()), float32(r.Height())))
	}
	show(s.frame, boxed)
	for _, o := range s.marks() {
		canvas.Refresh(o)
	}
}

func (s *pictureSheet) line(l *canvas.Line, from, to fyne.Position) {
	l.StrokeColor, l.StrokeWidth = tint(ColorInk), lineThin
	l.Position1, l.Position2 = from, to
}

// point is a place of the window in the picture's measure.
func point(at fyne.Position) figure.Point {
	return figure.Point{X: float64(at.X), Y: float64(at.Y)}
}

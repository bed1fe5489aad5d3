package gui

import (
	"image"
	"image/color"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"

	"hilltop/bosehubbard/figure"
)

// pictureSheet is the picture of a plot: the last drawing, and over it the crosshair, the
// box that is drawn to zoom, and the ring of the focus.
type pictureSheet struct {
	control
	plot *Plot

	drawn   *drawing // nil before the first
	ordered wish     // the last one
	image   *canvas.Image

	reading reading
	reads   bool // there is a reading
	pointed bool // it is that of the pointer
	across  *canvas.Line
	down    *canvas.Line
	dot     *canvas.Circle
	frame   *canvas.Rectangle // of the box

	shift bool // is held
	held  bool // the focus comes from the hand
	grip  *grip
}

var (
	_ fyne.Widget         = (*pictureSheet)(nil)
	_ fyne.Focusable      = (*pictureSheet)(nil)
	_ fyne.Accessible     = (*pictureSheet)(nil)
	_ fyne.Scrollable     = (*pictureSheet)(nil)
	_ fyne.Draggable      = (*pictureSheet)(nil)
	_ fyne.DoubleTappable = (*pictureSheet)(nil)
	_ desktop.Hoverable   = (*pictureSheet)(nil)
	_ desktop.Mouseable   = (*pictureSheet)(nil)
	_ desktop.Keyable     = (*pictureSheet)(nil)
	_ desktop.Cursorable  = (*pictureSheet)(nil)
)

func newSheet(p *Plot) *pictureSheet {
	s := &pictureSheet{
		plot: p, image: canvas.NewImageFromImage(blank()),
		across: canvas.NewLine(color.Transparent), down: canvas.NewLine(color.Transparent),
		dot: canvas.NewCircle(color.Transparent), frame: canvas.NewRectangle(color.Transparent),
	}
	s.image.ScaleMode = canvas.ImageScaleFastest
	for _, o := range s.marks() {
		o.Hide()
	}
	s.ExtendBaseWidget(s)
	return s
}

// marks are what lies over the drawing.
func (s *pictureSheet) marks() []fyne.CanvasObject {
	return []fyne.CanvasObject{s.across, s.down, s.dot, s.frame}
}

// blank is an image of nothing.
func blank() image.Image { return image.NewRGBA(image.Rect(0, 0, 1, 1)) }

// scale is how many pixels the window has for one px.
func (s *pictureSheet) scale() float64 {
	c := fyne.CurrentApp().Driver().CanvasForObject(s)
	if c == nil {
		return 1
	}
	const far = 1000
	pixels, _ := c.PixelCoordinateForPosition(fyne.NewPos(far, 0))
	return max(float64(pixels)/far, 0.1)
}

// pictureStyle is the look of the window for pictures.
func pictureStyle() figure.Style {
	style := figure.Style{Palette: figure.Light(), Text: float64(textScale())}
	if r, _, _, _ := tint(ColorPaper).RGBA(); r < 0x8000 {
		style.Palette = figure.Dark()
	}
	return style
}

// wish is the drawing that would be right now.
func (s *pictureSheet) wish() wish {
	size := s.Size()
	w := wish{key: s.plot.key, view: s.plot.view, style: pictureStyle()}
	w.frame = figure.Frame{Width: float64(size.Width), Height: float64(size.Height), Scale: s.scale()}
	if s.plot.coarse && w.frame.Scale > 1 {
		w.frame.Scale = 1
	}
	if w.view.half == 0 && w.view.scale == "" {
		w.view.half = s.plot.frozen
	}
	if s.plot.stale != "" {
		w.style.Palette.Ink = w.style.Palette.Soft
	}
	return w
}

// order asks for a drawing where the last one ordered is not right.
func (s *pictureSheet) order() {
	w := s.wish()
	if s.plot.source == nil || w == s.ordered || w.frame.Width < 1 || w.frame.Height < 1 {
		return
	}
	s.ordered = w
	o := order{wish: w, make: s.plot.source}
	if s.drawn != nil && s.drawn.key == w.key && s.drawn.err == nil {
		o.ready = s.drawn.subject
	}
	s.plot.tools.easel.put(s, o)
}

// take shows a drawing. One that failed leaves the last good one.
func (s *pictureSheet) take(d *drawing) {
	if d == nil || s.plot.source == nil {
		return
	}
	if d.err == nil {
		s.drawn = d
		s.image.Image = d.image
		if s.reads {
			s.reading, s.reads = d.guide.again(s.reading)
		}
		s.placeMarks()
		canvas.Refresh(s.image)
	}
	s.plot.took(d)
}

// forget drops the drawing, say because another plan is open.
func (s *pictureSheet) forget() {
	if s.drawn == nil {
		return
	}
	s.drawn, s.ordered, s.reads = nil, wish{}, false
	s.image.Image = blank()
	s.placeMarks()
	canvas.Refresh(s.image)
}

// AccessibilityLabel is what the picture is and says.
func (s *pictureSheet) AccessibilityLabel() string {
	if s.reads {
		return s.plot.name + ": " + s.reading.text
	}
	return s.plot.name
}

// AccessibilityRole is text.
func (s *pictureSheet) AccessibilityRole() fyne.AccessibleRole { return fyne.AccessibleRoleText }

// Cursor is a crosshair.
func (s *pictureSheet) Cursor() desktop.Cursor { return desktop.CrosshairCursor }

// CreateRenderer implements [fyne.Widget].
func (s *pictureSheet) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return newPainting(s)
}

func (s *pictureSheet) least() fyne.Size { return fyne.NewSize(0, 0) }

func (s *pictureSheet) paint(size fyne.Size) []fyne.CanvasObject {
	s.image.Resize(size)
	s.order()
	s.placeMarks()
	parts := append([]fyne.CanvasObject{s.image}, s.marks()...)
	if s.plot.stale != "" {
		parts = append(parts, dashed(fyne.Position{}, size, lineNormal, 6, 4, ColorSoftInk)...)
	}
	if s.focused {
		parts = append(parts, ring(fyne.Position{}, size)...)
	}
	return parts
}

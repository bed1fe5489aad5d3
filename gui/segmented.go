package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

// Segmented lets one of a few words be chosen, by a click or the arrow keys. Its
// cells flow over as many rows as they need. The chosen one is inverse and bold.
type Segmented struct {
	control

	Cells    []string
	Chosen   int  // -1 for none
	Linked   bool // a line leads through the cells: they follow each other in time
	OnChosen func(int)
}

var (
	_ fyne.Widget        = (*Segmented)(nil)
	_ fyne.Tappable      = (*Segmented)(nil)
	_ fyne.Focusable     = (*Segmented)(nil)
	_ fyne.Accessible    = (*Segmented)(nil)
	_ desktop.Cursorable = (*Segmented)(nil)
)

// NewSegmented returns a choice without cells.
func NewSegmented(chosen func(int)) *Segmented {
	s := &Segmented{Chosen: -1, OnChosen: chosen}
	s.ExtendBaseWidget(s)
	return s
}

// Set changes the cells and which of them is chosen.
func (s *Segmented) Set(cells []string, chosen int) {
	s.Cells, s.Chosen = cells, chosen
	s.Refresh()
}

// Tapped chooses the cell under the pointer.
func (s *Segmented) Tapped(e *fyne.PointEvent) {
	for i, box := range s.boxes(s.Size().Width) {
		if box.has(e.Position) {
			s.choose(i)
		}
	}
}

// choose takes a cell, if there is one of that index.
func (s *Segmented) choose(i int) {
	if i >= 0 && i < len(s.Cells) && i != s.Chosen {
		s.OnChosen(i)
	}
}

// TypedKey chooses the next or the previous cell, the first or the last.
func (s *Segmented) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyRight, fyne.KeyDown:
		s.choose(s.Chosen + 1)
	case fyne.KeyLeft, fyne.KeyUp:
		s.choose(s.Chosen - 1)
	case fyne.KeyHome:
		s.choose(0)
	case fyne.KeyEnd:
		s.choose(len(s.Cells) - 1)
	default:
		s.unused(e)
	}
}

// AccessibilityLabel is the chosen word.
func (s *Segmented) AccessibilityLabel() string {
	if s.Chosen < 0 || s.Chosen >= len(s.Cells) {
		return ""
	}
	return s.Cells[s.Chosen]
}

// box is the place of a cell.
type box struct {
	at   fyne.Position
	size fyne.Size
}

// has reports whether a position lies in the box.
func (b box) has(at fyne.Position) bool {
	at = at.Subtract(b.at)
	return at.X >= 0 && at.Y >= 0 && at.X < b.size.Width && at.Y < b.size.Height
}

// cellHeight is the height of one cell at 100 % text.
const cellHeight = 28

// boxes places the cells in rows that are no wider than the width.
func (s *Segmented) boxes(width float32) []box {
	list := make([]box, len(s.Cells))
	gap, at := px(s.gap()), fyne.Position{}
	for i := range s.Cells {
		size := fyne.NewSize(min(s.label(i).Width()+px(space16), width), px(cellHeight))
		if i > 0 && at.X+size.Width > width {
			at = fyne.NewPos(0, at.Y+size.Height+px(space4))
		}
		list[i] = box{at, size}
		at.X += size.Width + gap
	}
	return list
}

// gap is that between two cells; the link is drawn in it.
func (s *Segmented) gap() float32 {
	if s.Linked {
		return space8
	}
	return space4
}

// label is the word of a cell, measured bold so that choosing moves nothing.
func (s *Segmented) label(i int) *Prose { return NewProse(s.Cells[i], textBody, 1).bold().once() }

// HeightFor is that of the rows the cells need.
func (s *Segmented) HeightFor(width float32) float32 {
	boxes := s.boxes(width)
	if len(boxes) == 0 {
		return 0
	}
	last := boxes[len(boxes)-1]
	return last.at.Y + last.size.Height
}

// CreateRenderer implements [fyne.Widget].
func (s *Segmented) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return newPainting(s)
}

func (s *Segmented) least() fyne.Size { return fyne.NewSize(0, px(cellHeight)) }

func (s *Segmented) paint(size fyne.Size) []fyne.CanvasObject {
	var parts []fyne.CanvasObject
	for i, box := range s.boxes(size.Width) {
		if s.Linked && i > 0 && box.at.X > 0 {
			middle := box.at.AddXY(-px(s.gap())-1, box.size.Height/2-lineNormal/2)
			parts = append(parts, filled(middle, fyne.NewSize(px(s.gap())+2, lineNormal), ColorEdge))
		}
		parts = append(parts, s.paintCell(i, box)...)
	}
	return parts
}

// paintCell draws one word in its box.
func (s *Segmented) paintCell(i int, box box) []fyne.CanvasObject {
	ground, ink := ColorPaper, ColorInk
	label := s.label(i)
	if i == s.Chosen {
		ground, ink = ColorInk, ColorPaper
	} else {
		label.Bold = false
	}
	parts := framed(box.at, box.size, ground, lineThin, ColorEdge)
	if i == s.Chosen && s.focused {
		parts = append(parts, outline(box.at.AddXY(2, 2), box.size.SubtractWidthHeight(4, 4), lineNormal, ColorPaper)...)
		parts = append(parts, ring(box.at.AddXY(-3, -3), box.size.AddWidthHeight(6, 6))...)
	}
	label.Color = ink
	width := label.Width()
	label.Resize(fyne.NewSize(width, label.lineHeight()))
	label.Move(box.at.AddXY((box.size.Width-width)/2, (box.size.Height-label.lineHeight())/2))
	return append(parts, label)
}

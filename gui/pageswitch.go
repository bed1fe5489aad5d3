package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

// PageCell is what the switch says of a page: its name over its key number.
type PageCell struct{ Name, Number string }

// PageSwitch chooses the page, by a click or the arrow keys.
type PageSwitch struct {
	control
	Metrics  Metrics
	Cells    []PageCell
	Chosen   int
	OnChosen func(int)
}

var (
	_ fyne.Widget        = (*PageSwitch)(nil)
	_ fyne.Tappable      = (*PageSwitch)(nil)
	_ fyne.Focusable     = (*PageSwitch)(nil)
	_ fyne.Accessible    = (*PageSwitch)(nil)
	_ desktop.Cursorable = (*PageSwitch)(nil)
)

// NewPageSwitch returns a switch without pages.
func NewPageSwitch(chosen func(int), key func(*fyne.KeyEvent)) *PageSwitch {
	s := &PageSwitch{Metrics: metrics[fullFold], OnChosen: chosen}
	s.OnKey = key
	s.ExtendBaseWidget(s)
	return s
}

// Set changes the cells and which of them is chosen.
func (s *PageSwitch) Set(cells []PageCell, chosen int) {
	s.Cells, s.Chosen = cells, chosen
	s.Refresh()
}

// cell is the width of one cell: all share the room where it is short.
func (s *PageSwitch) cell() float32 {
	if len(s.Cells) == 0 {
		return s.Metrics.Cell
	}
	return min(s.Metrics.Cell, s.Size().Width/float32(len(s.Cells)))
}

// Tapped chooses the page under the pointer.
func (s *PageSwitch) Tapped(e *fyne.PointEvent) { s.choose(int(e.Position.X / s.cell())) }

func (s *PageSwitch) choose(i int) {
	if i >= 0 && i < len(s.Cells) && i != s.Chosen {
		s.OnChosen(i)
	}
}

// TypedKey chooses the page beside.
func (s *PageSwitch) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyRight:
		s.choose(s.Chosen + 1)
	case fyne.KeyLeft:
		s.choose(s.Chosen - 1)
	default:
		s.unused(e)
	}
}

// AccessibilityLabel is the name of the page.
func (s *PageSwitch) AccessibilityLabel() string {
	if s.Chosen < 0 || s.Chosen >= len(s.Cells) {
		return ""
	}
	return s.Cells[s.Chosen].Name
}

// CreateRenderer implements [fyne.Widget].
func (s *PageSwitch) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return newPainting(s)
}

func (s *PageSwitch) least() fyne.Size { return fyne.NewSize(0, s.Metrics.Switch) }

// paint draws the chosen page's cell as a part of the page below it.
func (s *PageSwitch) paint(size fyne.Size) []fyne.CanvasObject {
	parts := []fyne.CanvasObject{
		filled(fyne.Position{}, size, ColorPanel),
		filled(fyne.NewPos(0, size.Height-lineThin), fyne.NewSize(size.Width, lineThin), ColorEdge),
	}
	for i := range s.Cells {
		parts = append(parts, s.paintCell(i, fyne.NewPos(float32(i)*s.cell(), 0), fyne.NewSize(s.cell(), size.Height))...)
	}
	return parts
}

func (s *PageSwitch) paintCell(i int, at fyne.Position, size fyne.Size) []fyne.CanvasObject {
	var parts []fyne.CanvasObject
	name := NewProse(s.Cells[i].Name, textBody, 1).once()
	number := NewProse(s.Cells[i].Number, textAxis, 1).soft().once()
	if i == s.Chosen {
		name.Bold = true
		parts = append(parts,
			filled(at, size, ColorPaper),
			filled(at, fyne.NewSize(size.Width, lineLid), ColorInk),
			filled(at.AddXY(size.Width-lineThin, 0), fyne.NewSize(lineThin, size.Height), ColorEdge))
	}
	if i == s.Chosen && s.focused {
		parts = append(parts, ring(at.AddXY(2, 6), size.SubtractWidthHeight(4, 8))...)
	}
	inner := size.Width - 2*px(space8)
	top := (size.Height - name.lineHeight() - number.lineHeight()) / 2
	for _, line := range []*Prose{name, number} {
		line.Move(at.AddXY(px(space8), top+lineLid/2))
		line.Resize(fyne.NewSize(inner, line.lineHeight()))
		top += line.lineHeight()
		parts = append(parts, line)
	}
	return parts
}

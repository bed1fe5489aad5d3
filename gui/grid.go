package gui

import (
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

// Grid is a table of texts. Its columns are as wide as their texts where there is
// room, else they wrap at spaces; where even that is too wide, every row is a card
// with its cells below each other. The arrow keys move a frame over its cells;
// Space, Enter or a click asks what a cell means.
type Grid struct {
	control
	Columns []GridColumn
	Rows    []GridRow
	OnCell  func(row, column int)

	faded       bool // the texts are of before: soft
	row, column int  // of the frame

	measured      *gridLayout // of the width below; nil after a change
	measuredWidth float32
}

// GridColumn is a heading.
type GridColumn struct {
	Title string
	Words bool // the cells are words: they begin at the left
}

// GridRow is one line of texts.
type GridRow struct {
	Cells  []string
	Chosen bool // the row has its ground darkened and its first cell bold
}

var (
	_ fyne.Widget        = (*Grid)(nil)
	_ fyne.Tappable      = (*Grid)(nil)
	_ fyne.Focusable     = (*Grid)(nil)
	_ desktop.Cursorable = (*Grid)(nil)
)

// NewGrid returns an empty table.
func NewGrid(cell func(row, column int)) *Grid {
	g := &Grid{OnCell: cell}
	g.ExtendBaseWidget(g)
	return g
}

// Set changes columns and rows.
func (g *Grid) Set(columns []GridColumn, rows []GridRow) {
	same := func(a, b GridRow) bool { return a.Chosen == b.Chosen && slices.Equal(a.Cells, b.Cells) }
	if slices.Equal(columns, g.Columns) && slices.EqualFunc(rows, g.Rows, same) {
		return
	}
	g.Columns, g.Rows = columns, rows
	g.moveFrame(0, 0)
	g.Refresh()
}

// Fade makes the texts soft, or not.
func (g *Grid) Fade(faded bool) {
	if g.faded != faded {
		g.faded = faded
		g.Refresh()
	}
}

// moveFrame moves the frame by rows and columns, within the table.
func (g *Grid) moveFrame(rows, columns int) {
	g.row = max(0, min(g.row+rows, len(g.Rows)-1))
	g.column = max(0, min(g.column+columns, len(g.Columns)-1))
}

// Tapped asks about the cell under the pointer.
func (g *Grid) Tapped(e *fyne.PointEvent) {
	for row, cells := range g.measure(g.Size().Width).cells {
		for column, cell := range cells {
			if cell.has(e.Position) {
				g.row, g.column = row, column
				g.Refresh()
				g.OnCell(row, column)
				return
			}
		}
	}
}

// TypedKey moves the frame or asks about its cell.
func (g *Grid) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyUp:
		g.moveFrame(-1, 0)
	case fyne.KeyDown:
		g.moveFrame(+1, 0)
	case fyne.KeyLeft:
		g.moveFrame(0, -1)
	case fyne.KeyRight:
		g.moveFrame(0, +1)
	case fyne.KeySpace, fyne.KeyReturn, fyne.KeyEnter:
		if len(g.Rows) > 0 {
			g.OnCell(g.row, g.column)
		}
		return
	default:
		g.unused(e)
		return
	}
	g.Refresh()
}

// HeightFor is that of the rows in a width.
func (g *Grid) HeightFor(width float32) float32 { return g.measure(width).height }

// Refresh measures and draws the table anew.
func (g *Grid) Refresh() {
	g.measured = nil
	g.control.Refresh()
}

// CreateRenderer implements [fyne.Widget].
func (g *Grid) CreateRenderer() fyne.WidgetRenderer {
	g.ExtendBaseWidget(g)
	return newPainting(g)
}

func (g *Grid) least() fyne.Size { return fyne.NewSize(0, g.HeightFor(g.Size().Width)) }

func (g *Grid) paint(size fyne.Size) []fyne.CanvasObject {
	var parts []fyne.CanvasObject
	l := g.measure(size.Width)
	for i, ground := range l.rows {
		if g.Rows[i].Chosen {
			parts = append(parts, filled(ground.at, fyne.NewSize(size.Width, ground.size.Height), ColorPanel))
		}
	}
	for _, y := range l.lines {
		parts = append(parts, filled(fyne.NewPos(0, y), fyne.NewSize(size.Width, lineThin), ColorEdge))
	}
	for _, text := range slices.Concat(l.titles, l.texts) {
		text.prose.Move(text.at)
		text.prose.Resize(text.size)
		parts = append(parts, text.prose)
	}
	if g.focused && len(g.Rows) > 0 {
		cell := l.cells[g.row][g.column]
		parts = append(parts, ring(cell.at, cell.size)...)
	}
	return parts
}

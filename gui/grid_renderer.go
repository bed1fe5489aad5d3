package gui

import (
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
)

// CreateRenderer implements [fyne.Widget].
func (g *Grid) CreateRenderer() fyne.WidgetRenderer {
	g.ExtendBaseWidget(g)
	r := &gridRenderer{grid: g}
	r.Layout(g.Size())
	return r
}

type gridRenderer struct {
	grid  *Grid
	parts []fyne.CanvasObject
}

var _ fyne.WidgetRenderer = (*gridRenderer)(nil)

func (r *gridRenderer) Destroy()                     {}
func (r *gridRenderer) Objects() []fyne.CanvasObject { return r.parts }

func (r *gridRenderer) MinSize() fyne.Size {
	return fyne.NewSize(0, r.grid.HeightFor(r.grid.Size().Width))
}

func (r *gridRenderer) Refresh() {
	r.grid.measured = nil
	r.Layout(r.grid.Size())
	canvas.Refresh(r.grid)
}

func (r *gridRenderer) Layout(size fyne.Size) {
	g := r.grid
	r.parts = nil
	l := g.measure(size.Width)
	for i, ground := range l.rows {
		if g.Rows[i].Chosen {
			r.parts = append(r.parts, filled(ground.at, fyne.NewSize(size.Width, ground.size.Height), ColorPanel))
		}
	}
	for _, y := range l.lines {
		r.parts = append(r.parts, filled(fyne.NewPos(0, y), fyne.NewSize(size.Width, lineThin), ColorEdge))
	}
	for _, text := range slices.Concat(l.titles, l.texts) {
		text.prose.Move(text.at)
		text.prose.Resize(text.size)
		r.parts = append(r.parts, text.prose)
	}
	if g.focused && len(g.Rows) > 0 {
		cell := l.cells[g.row][g.column]
		r.parts = append(r.parts, ring(cell.at, cell.size)...)
	}
}

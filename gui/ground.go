package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// ground is the paper below the pages. The toolkit's own ground is rounded to other
// colours than those of the pictures on it.
type ground struct{ widget.BaseWidget }

func newGround() *ground {
	g := &ground{}
	g.ExtendBaseWidget(g)
	return g
}

// CreateRenderer implements [fyne.Widget].
func (g *ground) CreateRenderer() fyne.WidgetRenderer {
	g.ExtendBaseWidget(g)
	return newPainting(g)
}

func (g *ground) least() fyne.Size { return fyne.Size{} }

func (g *ground) paint(size fyne.Size) []fyne.CanvasObject {
	return []fyne.CanvasObject{filled(fyne.Position{}, size, ColorPaper)}
}

package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// Pair sets two objects side by side where both have the room, else below each
// other.
type Pair struct {
	widget.BaseWidget
	first, second fyne.CanvasObject
}

// leastBeside is the least width of an object beside another, at 100 % text.
const leastBeside = 420

// NewPair returns a pair.
func NewPair(first, second fyne.CanvasObject) *Pair {
	p := &Pair{first: first, second: second}
	p.ExtendBaseWidget(p)
	return p
}

// beside reports whether there is room side by side.
func beside(width float32) bool { return width >= 2*px(leastBeside)+px(space16) }

// HeightFor is the height in a width.
func (p *Pair) HeightFor(width float32) float32 {
	if beside(width) {
		half := (width - px(space16)) / 2
		return max(heightFor(p.first, half), heightFor(p.second, half))
	}
	return heightFor(p.first, width) + px(space12) + heightFor(p.second, width)
}

// CreateRenderer implements [fyne.Widget].
func (p *Pair) CreateRenderer() fyne.WidgetRenderer {
	p.ExtendBaseWidget(p)
	return newPainting(p)
}

func (p *Pair) least() fyne.Size { return fyne.NewSize(0, p.HeightFor(p.Size().Width)) }

func (p *Pair) paint(size fyne.Size) []fyne.CanvasObject {
	if beside(size.Width) {
		half := (size.Width - px(space16)) / 2
		put(p.first, 0, 0, half, size.Height)
		put(p.second, half+px(space16), 0, half, size.Height)
	} else {
		first := heightFor(p.first, size.Width)
		put(p.first, 0, 0, size.Width, first)
		put(p.second, 0, first+px(space12), size.Width, size.Height-first-px(space12))
	}
	return []fyne.CanvasObject{p.first, p.second}
}

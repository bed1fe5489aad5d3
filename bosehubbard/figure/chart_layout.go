package figure

import (
	"gonum.org/v1/plot"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/text"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// layout is a chart made ready: gonum's plot for the axes and where it stands.
type layout struct {
	plot  *plot.Plot
	outer vg.Rectangle // for axes and data
	area  Area
}

// Area returns where the data stand in a frame.
func (c *Chart) Area(f Frame, s Style) Area { return c.layout(f, s).area }

func (c *Chart) layout(f Frame, s Style) layout {
	view := c.Shown()
	left := 72 * s.text() // room for most numbers, so that the data do not jump
	top, right := c.top(s), 14+c.namesWidth(s)
	p := c.axes(view, f.Width-left-right, f.Height-top-46*s.text(), s)
	outer := vg.Rectangle{
		Min: vg.Point{X: 0, Y: 4 * px},
		Max: vg.Point{X: vg.Length(f.Width-right) * px, Y: vg.Length(f.Height-top) * px},
	}
	data := p.DataCanvas(draw.Canvas{Rectangle: outer})
	if gap := vg.Length(left)*px - data.Min.X; gap > 0 {
		outer.Min.X += gap
		data = p.DataCanvas(draw.Canvas{Rectangle: outer})
	}
	return layout{plot: p, outer: outer, area: Area{
		Rect: Rect{
			X0: float64(data.Min.X / px), X1: float64(data.Max.X / px),
			Y0: f.Height - float64(data.Max.Y/px), Y1: f.Height - float64(data.Min.Y/px),
		},
		X: view.X, Y: view.Y, KindX: c.X.Kind, KindY: c.Y.Kind, xName: c.X, yName: c.Y,
	}}
}

// top is the room above the data for the title and the names of lines.
func (c *Chart) top(s Style) float64 {
	top := 10.0
	if c.Title != "" {
		top += 18 * s.text()
	}
	if c.hasRuleNames() || c.head {
		top += 16 * s.text()
	}
	return top
}

// axes makes gonum's plot with both axes for data of about this size in px.
func (c *Chart) axes(view View, width, height float64, s Style) *plot.Plot {
	p := plot.New()
	p.BackgroundColor = nil
	apart := 30 * s.text()
	if c.Y.names != nil {
		apart = words.height(s)
	}
	xTicks := c.X.marks(view.X, width, 64*s.text())
	yTicks := c.Y.marks(view.Y, height, apart)
	freeCorner(xTicks, yTicks, view, c)
	dress(&p.X, s, c.X, view.X, xTicks)
	dress(&p.Y, s, c.Y, view.Y, yTicks)
	// gonum measures the space after the numbers in one font and leaves it in
	// another; the padding makes up for it.
	if len(yTicks) > 0 {
		p.Y.Padding = p.Y.Tick.Label.Width(" ") - p.Y.Label.TextStyle.Width(" ")
	}
	p.X.Tick.Label.XAlign, p.X.Tick.Label.YAlign = draw.XCenter, draw.YTop
	p.Y.Tick.Label.XAlign, p.Y.Tick.Label.YAlign = draw.XRight, draw.YCenter
	return p
}

// freeCorner takes the number off a tick at the foot of the y axis where one of
// the x axis stands at the same corner.
func freeCorner(x, y []plot.Tick, view View, c *Chart) {
	if len(x) == 0 || len(y) == 0 || c.Y.names != nil {
		return
	}
	if c.X.Kind.Normalize(view.X.Low, view.X.High, x[0].Value) < 0.03 &&
		c.Y.Kind.Normalize(view.Y.Low, view.Y.High, y[0].Value) < 0.03 {
		y[0].Label = ""
	}
}

// dress gives an axis of gonum's our fonts, colours and numbers.
func dress(a *plot.Axis, s Style, axis Axis, shown Range, ticks []plot.Tick) {
	t := s.text()
	a.Min, a.Max = shown.Low, shown.High
	a.Scale = axis.Kind
	a.Padding = 0
	a.LineStyle = draw.LineStyle{Color: s.Palette.Edge, Width: px}
	a.Label.Text = axis.title()
	a.Label.Padding = vg.Length(4*t) * px
	a.Label.TextStyle = textStyle(words.at(s), s)
	a.Label.TextStyle.XAlign, a.Label.TextStyle.YAlign = draw.XCenter, draw.YBottom
	numerals := numbers
	if axis.names != nil {
		numerals = words
	}
	a.Tick.Label = textStyle(numerals.at(s), s)
	a.Tick.LineStyle = draw.LineStyle{Color: s.Palette.Edge, Width: px}
	a.Tick.Length = 5 * px
	a.Tick.Marker = plot.ConstantTicks(ticks)
	if len(ticks) > 0 && axis.names != nil {
		a.Tick.Length = 0
	}
}

func textStyle(f font.Font, s Style) text.Style {
	return text.Style{Color: s.Palette.Ink, Font: f, Handler: text.Plain{Fonts: faces()}}
}

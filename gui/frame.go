package gui

import "fyne.io/fyne/v2"

// frame places the parts of a window.
type frame struct{ window *Window }

var _ fyne.Layout = (*frame)(nil)

// MinSize is the least that can be worked in; the parts scroll before that.
func (f *frame) MinSize([]fyne.CanvasObject) fyne.Size { return fyne.NewSize(480, 360) }

func (f *frame) Layout(_ []fyne.CanvasObject, size fyne.Size) { f.window.arrangeIn(size) }

// arrange places the parts anew in the same window.
func (w *Window) arrange() { w.arrangeIn(w.content.Size()) }

func (w *Window) arrangeIn(size fyne.Size) {
	if m := metricsFor(size, textScale()); m != w.metrics {
		w.metrics = m
		w.measureParts()
	}
	m := w.metrics
	put(w.bar, 0, 0, size.Width, m.Verdict)
	bottom := size.Height - m.Status
	put(w.status, 0, bottom, size.Width, m.Status)
	if w.strip.Visible() {
		high := w.strip.HeightFor(size.Width)
		bottom -= high
		put(w.strip, 0, bottom, size.Width, high)
	}
	left, top := float32(0), m.Verdict
	knobs := m.Fold != drawerFold || w.drawerOpen
	show(w.column, knobs)
	if knobs {
		left = min(m.Knobs, size.Width)
		put(w.column, 0, top, left, bottom-top)
	}
	w.arrangePage(left, top, size.Width, bottom)
}

// arrangePage places the switch, with the button for the drawer before it, and the
// page below.
func (w *Window) arrangePage(left, top, right, bottom float32) {
	m := w.metrics
	show(w.drawer, m.Fold == drawerFold)
	edge := left
	if w.drawer.Visible() {
		wide := w.drawer.MinSize().Width
		put(w.drawer, left+px(space4), top+px(space4), wide, m.Switch-2*px(space4))
		edge += wide + 2*px(space4)
	}
	put(w.places, edge, top, right-edge, m.Switch)
	top += m.Switch
	put(w.sheet, left, top, right-left, bottom-top)
}

func put(o fyne.CanvasObject, x, y, width, height float32) {
	o.Move(fyne.NewPos(x, y))
	o.Resize(fyne.NewSize(max(width, 0), max(height, 0)))
}

// measureParts hands new sizes to the parts.
func (w *Window) measureParts() {
	w.bar.Metrics = w.metrics
	w.places.Metrics = w.metrics
	w.status.Metrics = w.metrics
	w.column.SetMetrics(w.metrics)
	for _, o := range []fyne.CanvasObject{w.bar, w.places, w.status, w.column} {
		o.Refresh()
	}
}

// toggleDrawer opens or shuts the knobs of a narrow window.
func (w *Window) toggleDrawer() {
	w.drawerOpen = !w.drawerOpen
	w.arrange()
}

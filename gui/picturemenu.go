package gui

import (
	"bytes"
	"path/filepath"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/dialog"
	"fyne.io/fyne/v2/storage"
	"fyne.io/fyne/v2/widget"

	"hilltop/bosehubbard/figure"
)

// pictured is a page with plots, detailed one with parts on demand.
type (
	pictured interface{ plots() []*Plot }
	detailed interface{ parts() []*Disclosure }
)

// plotAtHand is the plot of the page that had the focus last, or its first; nil
// where it has none.
func (w *Window) plotAtHand() *Plot {
	page, ok := w.pages[w.page].(pictured)
	if !ok || len(page.plots()) == 0 {
		return nil
	}
	for _, p := range page.plots() {
		if p == w.atHand {
			return p
		}
	}
	return page.plots()[0]
}

// onPlot does something with the plot at hand.
func (w *Window) onPlot(do func(*Plot)) func() {
	return func() {
		if p := w.plotAtHand(); p != nil {
			do(p)
		}
	}
}

// pictureMenu acts on the plot at hand.
func (w *Window) pictureMenu() *fyne.Menu {
	both := ctrl | fyne.KeyModifierShift
	pan := func(right, up int) func() {
		return w.onPlot(func(p *Plot) {
			if p.sheet.drawn != nil {
				p.sheet.pan(right, up)
			}
		})
	}
	items := []*fyne.MenuItem{
		item("Read the picture", fyne.KeyF6, 0, w.readPicture),
		fyne.NewMenuItemSeparator(),
		item("Pin a reference, or let it go", fyne.KeyP, ctrl, w.onPlot((*Plot).togglePin)),
		item("Next unit of the picture", fyne.KeyU, both, w.onPlot((*Plot).nextUnit)),
		item("Next range of the picture", fyne.KeyR, both, w.onPlot((*Plot).nextScale)),
		fyne.NewMenuItemSeparator(),
		item("Zoom in", fyne.KeyI, both, w.onPlot(func(p *Plot) { p.sheet.zoom(p.sheet.centre(), zoomBy) })),
		item("Zoom out", fyne.KeyO, both, w.onPlot(func(p *Plot) { p.sheet.zoom(p.sheet.centre(), 1/zoomBy) })),
		item("Reset the view", fyne.Key0, both, w.onPlot(func(p *Plot) { p.look(p.view.reset()) })),
		item("Move to the right", fyne.KeyRight, both, pan(+1, 0)),
		item("Move to the left", fyne.KeyLeft, both, pan(-1, 0)),
		item("Move up", fyne.KeyUp, both, pan(0, +1)),
		item("Move down", fyne.KeyDown, both, pan(0, -1)),
		fyne.NewMenuItemSeparator(),
	}
	for i, kind := range pictureKinds {
		items = append(items, item(kind.label, digitKey(i), both, w.onPlot(func(p *Plot) { w.savePlotAs(p, kind) })))
	}
	items = append(items, fyne.NewMenuItemSeparator())
	for i := range mostDetails {
		items = append(items, item("Show or hide part "+string(rune('1'+i))+" of the page", digitKey(i), fyne.KeyModifierAlt, func() { w.toggleDetail(i) }))
	}
	return fyne.NewMenu("Picture", items...)
}

// mostDetails is how many parts on demand a page has at most.
const mostDetails = 2

func (w *Window) toggleDetail(i int) {
	if page, ok := w.pages[w.page].(detailed); ok && i < len(page.parts()) {
		page.parts()[i].Toggle()
	}
}

// readPicture gives the focus to the plot at hand.
func (w *Window) readPicture() { w.onPlot(func(p *Plot) { p.focus() })() }

// pictureKind is a kind of file that a picture can be saved as.
type pictureKind struct {
	label, extension string
	write            func(to *bytes.Buffer, r *figure.Renderer, p figure.Picture, f figure.Frame, s figure.Style) error
}

// printScale is how many pixels of an image file stand for one on the screen.
const printScale = 3

var pictureKinds = []pictureKind{
	{"Save as PNG...", ".png", func(to *bytes.Buffer, r *figure.Renderer, p figure.Picture, f figure.Frame, s figure.Style) error {
		f.Scale = printScale
		return r.WritePNG(to, p, f, s)
	}},
	{"Save as SVG...", ".svg", func(to *bytes.Buffer, _ *figure.Renderer, p figure.Picture, f figure.Frame, s figure.Style) error {
		return figure.WriteSVG(to, p, f, s)
	}},
	{"Save as PDF...", ".pdf", func(to *bytes.Buffer, _ *figure.Renderer, p figure.Picture, f figure.Frame, s figure.Style) error {
		return figure.WritePDF(to, p, f, s)
	}},
	{"Save the numbers as CSV...", ".csv", func(to *bytes.Buffer, _ *figure.Renderer, p figure.Picture, _ figure.Frame, _ figure.Style) error {
		return figure.WriteCSV(to, p)
	}},
}

// savePlot asks as what to save a picture.
func (w *Window) savePlot(p *Plot, at fyne.Position) {
	var items []*fyne.MenuItem
	for _, kind := range pictureKinds {
		items = append(items, fyne.NewMenuItem(kind.label, func() { w.savePlotAs(p, kind) }))
	}
	widget.ShowPopUpMenuAtPosition(fyne.NewMenu("", items...), w.window.Canvas(), at)
}

// savePlotAs asks for a file and writes the picture to it, as it is looked at, in
// the colours for paper.
func (w *Window) savePlotAs(p *Plot, kind pictureKind) {
	picture, frame := p.picture()
	if picture == nil {
		return
	}
	d := dialog.NewFileSave(func(file fyne.URIWriteCloser, err error) {
		w.say(err)
		if file != nil {
			w.writePicture(file, kind, picture, frame)
		}
	}, w.window)
	d.SetFileName(w.pictureName(p, picture) + kind.extension)
	d.SetFilter(storage.NewExtensionFileFilter([]string{kind.extension}))
	w.showFileDialog(d)
}

// pictureName is that of the plan, then of the picture; one of before says so.
func (w *Window) pictureName(p *Plot, picture figure.Picture) string {
	name := strings.TrimSuffix(filepath.Base(w.state.Name), ".json") + "-" + picture.Stem()
	if p.stale != "" {
		name += "-stale"
	}
	return name
}

// writePicture draws on the easel and then writes.
func (w *Window) writePicture(file fyne.URIWriteCloser, kind pictureKind, picture figure.Picture, frame figure.Frame) {
	style := figure.Style{Palette: figure.Light(), Text: float64(textScale())}
	w.easel.run(func(r *figure.Renderer) {
		var data bytes.Buffer
		err := kind.write(&data, r, picture, frame, style)
		if err == nil {
			_, err = file.Write(data.Bytes())
		}
		if closing := file.Close(); err == nil {
			err = closing
		}
		w.easel.later(func() {
			if err != nil {
				w.tell("The picture was not saved", err.Error())
				return
			}
			w.status.Say("Saved " + file.URI().Name() + ".")
		})
	})
}

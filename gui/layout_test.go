package gui

import (
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/test"
)

// layoutComplaints is the survey of what the test driver shows.
func layoutComplaints(root fyne.CanvasObject) []string {
	return LayoutComplaints(root, func(w fyne.Widget) []fyne.CanvasObject { return test.WidgetRenderer(w).Objects() })
}

// checkLayout fails for every complaint about the window as it stands.
func (b *bench) checkLayout(when string) {
	b.Helper()
	for _, complaint := range layoutComplaints(b.window.content) {
		b.Errorf("%s: %s", when, complaint)
	}
	for _, overlay := range b.canvas().Overlays().List() {
		for _, complaint := range layoutComplaints(overlay) {
			b.Errorf("%s, in front: %s", when, complaint)
		}
	}
}

func TestLayoutComplaints(t *testing.T) {
	test.NewApp().Settings().SetTheme(NewTheme(Light, 1))
	at := func(o fyne.CanvasObject, x, y, w, h float32) fyne.CanvasObject {
		o.Move(fyne.NewPos(x, y))
		o.Resize(fyne.NewSize(w, h))
		return o
	}
	wide := NewProse("a text of some length", textBody, 1).Width()
	for _, tc := range []struct {
		name    string
		objects []fyne.CanvasObject
		want    string
	}{
		{"good", []fyne.CanvasObject{at(NewProse("a text of some length", textBody, 1), 0, 0, wide, 20), at(NewButton("press", func() {}), 0, 40, 80, 32)}, ""},
		{"cut", []fyne.CanvasObject{at(NewProse("a text of some length", textBody, 1), 0, 0, wide/2, 20)}, "is cut"},
		{"outside", []fyne.CanvasObject{at(canvas.NewText("outside", tint(ColorInk)), 290, 0, 50, 20)}, "reaches out"},
		{"text on text", []fyne.CanvasObject{at(canvas.NewText("one", tint(ColorInk)), 0, 0, 50, 20), at(canvas.NewText("two", tint(ColorInk)), 4, 4, 50, 20)}, "overlaps"},
		{"text on button", []fyne.CanvasObject{at(NewButton("press", func() {}), 0, 0, 80, 32), at(canvas.NewText("two", tint(ColorInk)), 60, 20, 50, 20)}, "overlaps"},
		{"button on button", []fyne.CanvasObject{at(NewButton("a", func() {}), 0, 0, 80, 32), at(NewButton("b", func() {}), 40, 0, 80, 32)}, "overlaps"},
	} {
		box := container.NewWithoutLayout(tc.objects...)
		box.Resize(fyne.NewSize(300, 100))
		got := strings.Join(layoutComplaints(box), "; ")
		if tc.want == "" && got != "" || !strings.Contains(got, tc.want) {
			t.Errorf("%s: got %q, want %q in it", tc.name, got, tc.want)
		}
	}
}

package gui

import (
	"errors"
	"math"
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/test"

	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// lattice is a window on page Lattice, with the bands at hand.
func latticeBench(t *testing.T) (*bench, *Plot) {
	t.Helper()
	b := newBench(t, setup{})
	b.turnTo("Lattice")
	p := b.latticePage().bands
	b.canvas().Focus(p.sheet)
	return b, p
}

// chartOf is the chart that a plot shows.
func chartOf(t *testing.T, p *Plot) *figure.Chart {
	t.Helper()
	picture, _ := p.picture()
	chart, ok := picture.(*figure.Chart)
	if !ok {
		t.Fatalf("%s shows a %T, want a chart", p.name, picture)
	}
	return chart
}

func TestKeysReadACurvePointByPoint(t *testing.T) {
	b, p := latticeBench(t)
	chart := chartOf(t, p)
	if p.sheet.reads || !strings.Contains(p.readout.Text, "Arrows") {
		t.Errorf("the line says %q before a key, want how to read", p.readout.Text)
	}
	b.press(p.sheet, fyne.KeyRight)
	if !p.sheet.reads || p.sheet.reading.curve != 0 {
		t.Fatalf("the first key reads %+v, want band 0", p.sheet.reading)
	}
	first := p.sheet.reading
	b.press(p.sheet, fyne.KeyRight, fyne.KeyRight)
	if got := p.sheet.reading.point; got != first.point+2 {
		t.Errorf("two steps lead from point %d to %d", first.point, got)
	}
	at := p.sheet.reading
	for _, part := range []string{"band 0", "kHz", "π/d", figure.Number(chart.Curves[0].Y[at.point], 4), figure.Number(chart.Curves[0].X[at.point], 4)} {
		if !strings.Contains(p.readout.Text, part) {
			t.Errorf("%q lacks %q", p.readout.Text, part)
		}
	}
	if !p.sheet.across.Visible() || p.sheet.dot.Position().Y >= p.sheet.Size().Height {
		t.Error("there is no crosshair in the picture")
	}
	b.press(p.sheet, fyne.KeyUp)
	if r := p.sheet.reading; r.curve != 1 || math.Abs(r.at.X-at.at.X) > 8 {
		t.Errorf("Up leads to %+v, want band 1 above %+v", r, at)
	}
	b.press(p.sheet, fyne.KeyDown, fyne.KeyDown, fyne.KeyHome)
	if r := p.sheet.reading; r.curve != 0 || r.point != 0 {
		t.Errorf("Home leads to %+v, want the first point of band 0", r)
	}
	b.press(p.sheet, fyne.KeyEnd, fyne.KeyRight)
	if r := p.sheet.reading; r.point != len(chart.Curves[0].X)-1 {
		t.Errorf("End leads to %+v, want the last point", r)
	}
	b.press(p.sheet, fyne.KeyEscape)
	if p.sheet.reads || p.sheet.across.Visible() {
		t.Error("Escape leaves the crosshair")
	}
}

func TestPointerReadsTheNearestCurve(t *testing.T) {
	_, p := latticeBench(t)
	guide := p.guide().(*curveGuide)
	chart := chartOf(t, p)
	at := guide.Pixel(chart.Curves[1].X[20], chart.Curves[1].Y[20])
	p.sheet.MouseMoved(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: fyne.NewPos(float32(at.X)+2, float32(at.Y)-3)}})
	if !strings.Contains(p.readout.Text, "band 1") {
		t.Errorf("near band 1 the line says %q", p.readout.Text)
	}
	p.sheet.MouseOut()
	if p.sheet.reads {
		t.Error("the crosshair stays after the pointer has left")
	}
}

// The budget is read row by row, from the pointer's row on.
func TestBudgetIsReadRowByRow(t *testing.T) {
	b := newBench(t, setup{})
	b.turnTo("Bench")
	p := b.window.pages[b.window.page].(*BenchPage).budget
	guide := p.guide().(*rowGuide)
	at := guide.Pixel(0, -1.5)
	p.sheet.MouseMoved(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: fyne.NewPos(float32(at.X), float32(at.Y))}})
	if want := "cross along x: +18.8"; !strings.HasPrefix(p.readout.Text, want) {
		t.Errorf("the second row reads %q, want %q", p.readout.Text, want)
	}
	p.sheet.MouseOut()
	if p.sheet.reads {
		t.Error("the crosshair stays after the pointer has left")
	}
	b.canvas().Focus(p.sheet)
	b.press(p.sheet, fyne.KeyRight)
	for _, want := range []string{"sheet along x", "cross along x", "lattice y along x", "lattice z along x", "Net trap along x: −34.6"} {
		if !strings.HasPrefix(p.readout.Text, want) {
			t.Errorf("%q, want %q", p.readout.Text, want)
		}
		b.press(p.sheet, fyne.KeyDown)
	}
}

func TestZoomPanAndWhole(t *testing.T) {
	b, p := latticeBench(t)
	whole := chartOf(t, p).Shown()
	if !p.whole.Disabled() {
		t.Error("there is something to reset in a fresh picture")
	}
	p.sheet.TypedRune('+')
	b.settle()
	zoomed := chartOf(t, p).Shown()
	if got, want := zoomed.X.High-zoomed.X.Low, (whole.X.High-whole.X.Low)/zoomBy; math.Abs(got-want) > 1e-9 {
		t.Errorf("after + the range is %g, want %g", got, want)
	}
	p.sheet.KeyDown(&fyne.KeyEvent{Name: desktop.KeyShiftLeft})
	b.press(p.sheet, fyne.KeyRight, fyne.KeyUp)
	p.sheet.KeyUp(&fyne.KeyEvent{Name: desktop.KeyShiftLeft})
	b.settle()
	moved := chartOf(t, p).Shown()
	if !(moved.X.Low > zoomed.X.Low && moved.Y.Low > zoomed.Y.Low) || p.sheet.reads {
		t.Errorf("Shift with Right and Up leads from %+v to %+v", zoomed, moved)
	}
	p.sheet.TypedRune('-')
	p.sheet.TypedRune('0')
	b.settle()
	if got := chartOf(t, p).Shown(); got != whole || !p.whole.Disabled() {
		t.Errorf("after 0: %+v, want %+v", got, whole)
	}
}

func TestHandZoomsAndMovesThePicture(t *testing.T) {
	b, p := latticeBench(t)
	guide, whole := p.guide().(*curveGuide), chartOf(t, p).Shown()
	event := func(x, y float64, m fyne.KeyModifier) *desktop.MouseEvent {
		e := &desktop.MouseEvent{Button: desktop.MouseButtonPrimary, Modifier: m}
		e.Position = fyne.NewPos(float32(x), float32(y))
		return e
	}
	drag := func(x, y float64) { p.sheet.Dragged(&fyne.DragEvent{PointEvent: event(x, y, 0).PointEvent}) }
	from, to := guide.Pixel(-0.5, whole.Y.High/2), guide.Pixel(0.5, whole.Y.Low)
	p.sheet.MouseDown(event(from.X, from.Y, fyne.KeyModifierShift))
	drag(to.X, to.Y)
	if !p.sheet.frame.Visible() {
		t.Error("the box is not to be seen while it is drawn")
	}
	p.sheet.DragEnd()
	b.settle()
	boxed := chartOf(t, p).Shown()
	if math.Abs(boxed.X.Low+0.5) > 0.01 || math.Abs(boxed.X.High-0.5) > 0.01 || p.sheet.frame.Visible() {
		t.Errorf("the box from -0.5 to 0.5 shows %+v", boxed.X)
	}
	p.sheet.MouseDown(event(200, 200, 0))
	drag(150, 180)
	drag(100, 200)
	p.sheet.MouseUp(nil)
	b.settle()
	if moved := chartOf(t, p).Shown(); !(moved.X.Low > boxed.X.Low) || math.Abs(moved.Y.Low-boxed.Y.Low) > 1e-9*math.Abs(boxed.Y.High) {
		t.Errorf("a drag to the left leads from %+v to %+v", boxed, moved)
	}
	p.sheet.DoubleTapped(&fyne.PointEvent{Position: fyne.NewPos(200, 200)})
	b.settle()
	if got := chartOf(t, p).Shown(); got != whole {
		t.Errorf("a double click shows %+v, want %+v", got, whole)
	}
}

// The wheel zooms the picture with the focus; over any other it scrolls the page.
func TestWheel(t *testing.T) {
	b := newBench(t, setup{width: 1024, height: 648})
	b.turnTo("Lattice")
	page := b.latticePage()
	sheet := page.bands.sheet
	up := &fyne.ScrollEvent{Scrolled: fyne.NewDelta(0, -40)}
	sheet.Scrolled(up)
	b.settle()
	if page.scroller.scroll.Offset.Y == 0 || !page.bands.view.whole() {
		t.Errorf("without the focus: offset %g, view %+v; want the page scrolled", page.scroller.scroll.Offset.Y, page.bands.view)
	}
	before := page.scroller.scroll.Offset.Y
	b.canvas().Focus(sheet)
	sheet.Scrolled(&fyne.ScrollEvent{Scrolled: fyne.NewDelta(0, 10), PointEvent: fyne.PointEvent{Position: fyne.NewPos(300, 100)}})
	b.settle()
	if page.scroller.scroll.Offset.Y != before || page.bands.view.whole() {
		t.Error("with the focus the wheel does not zoom")
	}
}

func TestUnits(t *testing.T) {
	b, p := latticeBench(t)
	var seen []string
	for range bandUnits {
		seen = append(seen, chartOf(t, p).Y.Unit)
		if !strings.Contains(p.unit.text.Text, p.view.unit.String()) {
			t.Errorf("the button says %q in %v", p.unit.text.Text, p.view.unit)
		}
		p.sheet.TypedRune('u')
		b.settle()
	}
	if strings.Join(seen, " ") != "kHz Er nK" {
		t.Errorf("units %q, want kHz, Er and nK", seen)
	}
	if p.view.unit != figure.Hertz {
		t.Error("the units do not go round")
	}
}

func TestPinKeepsAReference(t *testing.T) {
	b, p := latticeBench(t)
	before := chartOf(t, p).Curves[0].Y
	p.sheet.TypedRune('p')
	b.settle()
	b.enter(depthX, "12")
	chart := chartOf(t, p)
	if len(chart.Pinned) != bands || chart.Pinned[0].Y[0] != before[0] || chart.Curves[0].Y[0] == before[0] {
		t.Errorf("%d curves pinned; want the bands at 6 Er behind those at 12 Er", len(chart.Pinned))
	}
	if p.pin.text.Text != "Unpin" {
		t.Errorf("the button says %q", p.pin.text.Text)
	}
	test.Tap(p.pin)
	b.settle()
	if len(chartOf(t, p).Pinned) != 0 {
		t.Error("the reference stays after it was let go")
	}
}

// bands is how many bands the picture shows.
const bands = 3

func TestPlotTellsThatItIsOfBefore(t *testing.T) {
	b, p := latticeBench(t)
	b.canvas().Unfocus()
	s := b.window.state
	s.Number, s.Stale, s.Fading, s.Undo = 1<<60, true, true, "depth x"
	b.window.Show(s)
	b.until("drawn", b.window.easel.idle)
	if !strings.Contains(p.readout.Text, "from before: depth x") {
		t.Errorf("the line says %q", p.readout.Text)
	}
	if got, want := p.sheet.drawn.style.Palette.Ink, pictureStyle().Palette.Soft; got != want {
		t.Errorf("it is drawn in %v, want soft ink %v", got, want)
	}
	if b.window.pictureName(p, chartOf(t, p)) != "skerry-demo-bands-stale" {
		t.Errorf("it is saved as %q", b.window.pictureName(p, chartOf(t, p)))
	}
	b.keep("of-before")
	b.checkLayout("of before")
}

func TestPlotKeepsTheLastGoodPicture(t *testing.T) {
	b, p := latticeBench(t)
	good := p.sheet.drawn
	for _, tc := range []struct {
		key  string
		make source
		want string
	}{
		{"error", func(*session.Artist) (subject, error) { return nil, errors.New("depth 900 Er is out of range") }, "depth 900 Er is out of range"},
		{"panic", func(*session.Artist) (subject, error) { panic("index out of range") }, "the drawing broke off: index out of range"},
	} {
		p.Draw(tc.key, tc.make)
		b.settle()
		if p.fault != tc.want || !p.failure.Visible() || p.sheet.drawn != good {
			t.Errorf("%s: fault %q, want %q and the last good picture", tc.key, p.fault, tc.want)
		}
	}
	b.keep("with-a-fault")
	b.checkLayout("with a fault")
	b.window.Echo()
	b.settle()
	if p.fault != "" || p.failure.Visible() {
		t.Errorf("the fault %q stays", p.fault)
	}
}

func TestNothingToShow(t *testing.T) {
	b := newBench(t, setup{plan: "model-chain"})
	for _, name := range []string{"Bench", "Lattice"} {
		b.turnTo(name)
		if b.window.state.Report == nil {
			t.Fatal("the model is not judged")
		}
	}
	page := b.latticePage()
	if !page.none.Visible() || page.bands.Visible() && page.shown[1].Visible() || page.bands.sheet.drawn != nil {
		t.Error("page Lattice of a model shows a picture")
	}
	for _, o := range test.LaidOutObjects(page.none) {
		if button, ok := o.(*Button); ok {
			test.Tap(button)
		}
	}
	if b.window.pages[b.window.page].Name() != "Ceiling" {
		t.Error("the button of an empty page does not lead to page Ceiling")
	}
}

// The page scrolls to what gets the focus from the keyboard, and stays under the
// hand.
func TestPageFollowsTheFocus(t *testing.T) {
	b := newBench(t, setup{width: 1024, height: 648})
	page := b.ceilingPage()
	offset := func() float32 { return page.scroller.scroll.Offset.Y }
	b.canvas().Focus(page.stages)
	if offset() == 0 {
		t.Error("the page does not scroll to its last table")
	}
	down := offset()
	b.canvas().Unfocus()
	page.picture.sheet.MouseDown(&desktop.MouseEvent{Button: desktop.MouseButtonPrimary})
	if offset() != down || b.canvas().Focused() != page.picture.sheet {
		t.Error("a click scrolls the page")
	}
	b.canvas().Unfocus()
	b.canvas().Focus(page.picture.sheet)
	if offset() == down {
		t.Error("the page does not scroll back to its picture")
	}
}

package gui

import (
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/test"

	"hilltop/gui/session"
)

func TestWindowOpensOnCeiling(t *testing.T) {
	b := newBench(t, setup{})
	var names []string
	for _, p := range b.window.pages {
		names = append(names, p.Name())
	}
	if got := strings.Join(names, " "); got != "Bench Lattice Ceiling" {
		t.Errorf("pages %q", got)
	}
	if got := b.window.pages[b.window.page].Name(); got != "Ceiling" {
		t.Errorf("the window opens on %s", got)
	}
	for i, cell := range b.window.places.Cells {
		if cell.Number == "" {
			t.Errorf("page %s has no key number", names[i])
		}
	}
}

// The demo's first row says which knob would lose the verdict first.
func TestFirstToBreakIsMarked(t *testing.T) {
	b := newBench(t, setup{})
	b.settleJobs()
	page := b.ceilingPage()
	row := page.rows[0]
	if row.shown.name != "layers" || !strings.Contains(row.detail.Text, "depth z at 'lower', from 22 Er to 1") || !row.name.Bold {
		t.Errorf("the first row is %q: %q", row.shown.name, row.detail.Text)
	}
	for _, other := range page.rows[1:] {
		if other.shown != nil && other.shown.first != "" {
			t.Errorf("%q is marked as well", other.shown.name)
		}
	}
	page.details[0].Toggle()
	b.settleJobs()
	if got := len(page.room.grid.Rows); got < 6 {
		t.Errorf("%d knobs are listed, want six", got)
	}
	b.checkLayout("with the room of every knob")
	page.room.grid.OnCell(0, 0)
	if f, ok := b.canvas().Focused().(*ValueField); !ok || f != b.field("depth_er/2") {
		t.Error("a row of the list does not lead to its knob")
	}
}

func TestBrokenCriteriaStandFirst(t *testing.T) {
	b := newBench(t, setup{plan: "skerry-trapped"})
	b.settleJobs()
	rows := b.ceilingPage().rows
	if rows[0].shown.verdict != open || rows[0].shown.mend == "" {
		t.Errorf("the first row is %+v, want the broken one with its advice", rows[0].shown)
	}
	for _, r := range rows {
		if r.shown != nil && r.shown.first != "" {
			t.Error("an open plan has a criterion that breaks first")
		}
	}
}

func TestMapIsComputedOnDemand(t *testing.T) {
	b := newBench(t, setup{})
	page := b.ceilingPage()
	if page.verdicts.plot.sheet.drawn != nil {
		t.Fatal("the map is there before anybody asked")
	}
	page.details[1].Toggle()
	b.settleJobs()
	plot := page.verdicts.plot
	if plot.sheet.drawn == nil {
		t.Fatal("there is no map")
	}
	b.canvas().Focus(plot.sheet)
	b.press(plot.sheet, fyne.KeyRight)
	if !strings.Contains(plot.readout.Text, "sealed") {
		t.Errorf("at the plan the map says %q, want sealed", plot.readout.Text)
	}
	b.press(plot.sheet, fyne.KeyEnd)
	b.press(plot.sheet, fyne.KeyPageDown, fyne.KeyPageDown, fyne.KeyPageDown, fyne.KeyPageDown)
	if !strings.Contains(plot.readout.Text, "open") {
		t.Errorf("far to the right the map says %q, want open", plot.readout.Text)
	}
	before := plot.sheet.drawn
	b.enter(sheet, "100 mW")
	b.settleJobs()
	if plot.sheet.drawn == before {
		t.Error("the map is not computed anew after an edit")
	}
	b.checkLayout("with the map")
}

func TestJobBar(t *testing.T) {
	test.NewApp().Settings().SetTheme(NewTheme(Light, 1))
	var stopped, again int
	bar := NewJobBar(func() { stopped++ }, func() { again++ }, nil)
	if bar.Visible() {
		t.Error("a bar without work is to be seen")
	}
	bar.Set(session.Job{Running: true, Progress: session.Progress{Done: 63, Total: 100, Text: "63 %, about 4 s"}}, false)
	if !bar.Visible() || !strings.Contains(bar.text.Text, "63 %, about 4 s") || bar.button.text.Text != "Stop" {
		t.Errorf("running: %q with a button %q", bar.text.Text, bar.button.text.Text)
	}
	test.Tap(bar.button)
	bar.Set(session.Job{}, true)
	test.Tap(bar.button)
	if stopped != 1 || again != 1 {
		t.Errorf("stopped %d times, begun again %d times; want once each", stopped, again)
	}
}

// The keys lead through the ends of the bars; + and - step the range.
func TestCeilingPictureIsReadAndScaled(t *testing.T) {
	b := newBench(t, setup{})
	p := b.ceilingPage().picture
	b.canvas().Focus(p.sheet)
	b.press(p.sheet, fyne.KeyRight)
	if !strings.HasPrefix(p.readout.Text, "Kinetic, ceiling: E/N +1,97") {
		t.Errorf("the first bar reads %q", p.readout.Text)
	}
	b.press(p.sheet, fyne.KeyDown)
	if !strings.HasPrefix(p.readout.Text, "Kinetic, floor: E/N −1,83") {
		t.Errorf("its floor reads %q", p.readout.Text)
	}
	b.press(p.sheet, fyne.KeyRight)
	if p.readout.Text != "interaction, floor: unbounded" && p.readout.Text != "Interaction, floor: unbounded" {
		t.Errorf("the interaction's floor reads %q", p.readout.Text)
	}
	b.press(p.sheet, fyne.KeyEnd)
	if !strings.HasPrefix(p.readout.Text, "Size of gap: 27") {
		t.Errorf("the last place reads %q", p.readout.Text)
	}
	half := func() float64 { return p.guide().(*termGuide).half }
	whole := half()
	p.sheet.TypedRune('-')
	b.settle()
	wide := half()
	p.sheet.TypedRune('+')
	p.sheet.TypedRune('+')
	b.settle()
	if narrow := half(); !(wide > whole && narrow < whole) {
		t.Errorf("half-ranges %g, wider %g, narrower %g", whole, wide, narrow)
	}
	p.sheet.TypedRune('0')
	b.settle()
	if half() != whole {
		t.Errorf("after 0 the half-range is %g, want %g", half(), whole)
	}
	kinetic := p.guide().(*termGuide).geometry.Bars[0]
	p.sheet.DoubleTapped(&fyne.PointEvent{Position: fyne.NewPos(float32(kinetic.Centre()), float32(kinetic.Upper.Y)+10)})
	b.settle()
	if p.view.scale != "kinetic" || !strings.Contains(p.scale.text.Text, "Kinetic") {
		t.Errorf("a double click on the bar scales to %q", p.view.scale)
	}
}

// During a drag the range of the energy stays.
func TestRangeFreezesDuringADrag(t *testing.T) {
	b := newBench(t, setup{})
	p := b.ceilingPage().picture
	half := func() float64 { return p.guide().(*termGuide).half }
	before := half()
	b.window.desk.BeginDrag(depthX)
	b.window.desk.Drag(1)
	b.window.Echo()
	b.settle()
	if half() != before {
		t.Errorf("the half-range goes from %g to %g during a drag", before, half())
	}
	b.window.desk.EndDrag()
	b.window.Echo()
	b.settle()
	if half() == before {
		t.Error("after the drag the range is not chosen anew")
	}
}

func TestNextNice(t *testing.T) {
	for _, tc := range []struct{ x, larger, smaller float64 }{
		{1, 2, 0.5}, {2, 5, 1}, {5, 10, 2}, {3, 5, 2}, {0.05, 0.1, 0.02}, {2000, 5000, 1000},
	} {
		if got := nextNice(tc.x, true); !near(got, tc.larger) {
			t.Errorf("above %g: got %g, want %g", tc.x, got, tc.larger)
		}
		if got := nextNice(tc.x, false); !near(got, tc.smaller) {
			t.Errorf("below %g: got %g, want %g", tc.x, got, tc.smaller)
		}
	}
}

func near(x, y float64) bool { return x > y*(1-1e-9) && x < y*(1+1e-9) }

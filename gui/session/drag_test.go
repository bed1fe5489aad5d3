package session

import (
	"context"
	"testing"
	"time"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// TestDragIsOneEdit drags through many values: one entry, and undo returns the
// first bytes.
func TestDragIsOneEdit(t *testing.T) {
	s, v := newTest(t, Options{})
	settle(t, s, v)
	s.BeginDrag("power_w/sheet")
	for x := 20.0; x <= 60; x++ {
		s.Drag(x)
	}
	s.EndDrag()
	st := settle(t, s, v)
	mustBe(t, "undo", st.Undo, "Power 'sheet' at 'lower': 20 → 60 mW")
	mustBe(t, "value", field(t, st, "power_w/sheet").Text, "60")
	mustBe(t, "verdict", st.Verdict.Word, "Open")
	s.Undo()
	mustBe(t, "bytes after undo", bytesOf(s), string(demo(t)))
	s.Redo()
	mustBe(t, "value after redo", field(t, s.State(), "power_w/sheet").Text, "60")
	s.Undo()
	mustBe(t, "redo after undo", s.State().Redo, "Power 'sheet' at 'lower': 20 → 60 mW")
	mustBe(t, "undo after undo", s.State().Undo, "")
}

func TestCancelledDragLeavesNothing(t *testing.T) {
	s, v := newTest(t, Options{})
	s.BeginDrag("power_w/sheet")
	s.Drag(60)
	mustBe(t, "dragging", s.State().Dragging, true)
	s.CancelDrag()
	st := settle(t, s, v)
	mustBe(t, "bytes", bytesOf(s), string(demo(t)))
	mustBe(t, "undo", st.Undo, "")
	mustBe(t, "verdict", st.Verdict.Word, "Sealed")
}

func TestDragThatReturnsLeavesNothing(t *testing.T) {
	s, _ := newTest(t, Options{})
	s.BeginDrag("depth_er/0")
	s.Drag(9)
	s.Drag(6)
	s.EndDrag()
	mustBe(t, "bytes", bytesOf(s), string(demo(t)))
	mustBe(t, "undo", s.State().Undo, "")
}

// TestDragSkipsWhatThePlanRefuses drags over the value at which the stage would
// change nothing, and past the end of the slider.
func TestDragSkipsWhatThePlanRefuses(t *testing.T) {
	s, _ := newTest(t, Options{})
	st := s.State()
	s.SelectStage(stageNamed(t, st, "flip"))
	s.BeginDrag("field_g")
	s.Drag(300)
	s.Drag(398) // as before the stage
	mustBe(t, "value on a refused one", field(t, s.State(), "field_g").Text, "300")
	s.Drag(1e9)
	f := field(t, s.State(), "field_g")
	mustBe(t, "value beyond the end", f.Value, f.Max)
	s.CancelDrag()
	mustBe(t, "bytes", bytesOf(s), string(demo(t)))
}

// TestUpdatesAreFew drags at 1 kHz for half a second: the States stay at least an
// interval apart, they keep coming, and the last one shows the last value.
func TestUpdatesAreFew(t *testing.T) {
	s, v := newTest(t, Options{Judge: func(ctx context.Context, p *plan.Plan) (*report.Report, error) {
		time.Sleep(5 * time.Millisecond)
		return fakeJudge(ctx, p)
	}})
	settle(t, s, v)
	before, _ := v.all()
	s.BeginDrag("power_w/sheet")
	begin := time.Now()
	last := 0.0
	for i := 0; time.Since(begin) < 500*time.Millisecond; i++ {
		last = float64(200+i%250) / 10
		s.Drag(last)
		time.Sleep(time.Millisecond)
	}
	s.EndDrag()
	took := time.Since(begin)
	st := settle(t, s, v)
	states, times := v.all()
	shown := len(states) - len(before)
	if most := int(took/(40*time.Millisecond)) + 4; shown > most {
		t.Errorf("%d States in %v, want at most %d", shown, took, most)
	}
	if shown < 4 {
		t.Errorf("%d States in %v, want a live view", shown, took)
	}
	early := 0
	for i := len(before) + 1; i < len(times); i++ {
		if times[i].Sub(times[i-1]) < 20*time.Millisecond {
			early++
		}
	}
	// The screen notes the time after the session did, so that a State which the
	// scheduler delayed makes the next one seem early.
	if early > 2 {
		t.Errorf("%d of %d States came early", early, shown)
	}
	mustBe(t, "stale at the end", st.Stale, false)
	mustBe(t, "last value", field(t, st, "power_w/sheet").Value, last)
	fading := 0
	for _, one := range states[len(before):] {
		if one.Fading {
			fading++
		}
	}
	if fading > shown/4 {
		t.Errorf("%d of %d States of a live drag fade", fading, shown)
	}
}

// TestSlowViewIsNotFlooded has a view that is busy: one function waits in its
// queue, not one per edit, and it shows the newest State.
func TestSlowViewIsNotFlooded(t *testing.T) {
	queue := make(chan func(), 1000)
	var shown []State
	s := New(Options{Judge: fakeJudge, Post: func(f func()) { queue <- f }, Show: func(st State) { shown = append(shown, st) }})
	defer s.Close()
	if err := s.OpenBytes("demo", demo(t)); err != nil {
		t.Fatal(err)
	}
	s.BeginDrag("power_w/sheet")
	for i := range 100 {
		s.Drag(20 + float64(i)*0.1)
		time.Sleep(2 * time.Millisecond)
	}
	mustBe(t, "waiting functions", len(queue), 1)
	(<-queue)()
	f := field(t, shown[0], "power_w/sheet")
	mustBe(t, "value that is shown", f.Value, 29.9)
}

func TestRoundTo(t *testing.T) {
	for _, tc := range []struct{ x, step, want float64 }{
		{0.123456, 0.04, 0.12}, {123.456, 1, 123}, {1234.5, 37, 1230}, {-0.98765, 0.002, -0.988}, {5, 0, 5},
	} {
		if got := roundTo(tc.x, tc.step); got != tc.want {
			t.Errorf("%v by %v: got %v, want %v", tc.x, tc.step, got, tc.want)
		}
	}
}

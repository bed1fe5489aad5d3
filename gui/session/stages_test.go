package session

import (
	"runtime"
	"strconv"
	"strings"
	"testing"
)

func railNames(st State) string {
	names := make([]string, len(st.Rail))
	for i, stop := range st.Rail {
		names[i] = stop.Name
	}
	return strings.Join(names, " > ")
}

func TestStagesAreAddedMovedRemoved(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.AddStage(1); err != nil {
		t.Fatal(err)
	}
	st := s.State()
	mustBe(t, "rail", railNames(st), "start > load > flip > stage 6 > release > lower > wait")
	mustBe(t, "selected", st.Stage, 2)
	mustBe(t, "undo", st.Undo, "add stage 'stage 6'")
	if err := s.MoveStage(2, 10); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "rail", railNames(s.State()), "start > load > flip > release > lower > wait > stage 6")
	if err := s.RemoveStage(5); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "rail", railNames(s.State()), "start > load > flip > release > lower > wait")
	for s.State().Undo != "" {
		s.Undo()
	}
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
	for what, err := range map[string]error{"add": s.AddStage(5), "remove": s.RemoveStage(-1), "move": s.MoveStage(9, 1)} {
		if err == nil {
			t.Errorf("%s a stage that is not there: no error", what)
		}
	}
	if err := s.Edit("limit", "/limits", map[string]any{"/stages/1/field_g": map[string]any{"max": 500}}); err != nil {
		t.Fatal(err)
	}
	if err := s.AddStage(0); err == nil || !strings.Contains(err.Error(), "/stages/1/field_g") {
		t.Errorf("adding a stage under a numbered limit: %v", err)
	}
}

// TestLimitsNarrowTheSlider gives the lab's limits and looks at the slider.
func TestLimitsNarrowTheSlider(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Edit("limit", "/limits", map[string]any{"/field_g": map[string]any{"min": 100, "max": 405}}); err != nil {
		t.Fatal(err)
	}
	f := field(t, s.State(), "field_g")
	mustBe(t, "range", [2]float64{f.Min, f.Max}, [2]float64{150, 405})
}

// TestHistoryIsSmall makes 2,000 edits: the memory in use grows by little.
func TestHistoryIsSmall(t *testing.T) {
	s, v := newTest(t, Options{})
	edit := func(n int) {
		for i := range n {
			if err := s.Commit("/cloud/atoms", strconv.Itoa(1000+i)); err != nil {
				t.Fatal(err)
			}
		}
		settle(t, s, v)
		v.mu.Lock()
		v.states, v.times = v.states[len(v.states)-1:], v.times[len(v.times)-1:]
		v.mu.Unlock()
	}
	inUse := func() float64 {
		runtime.GC()
		runtime.GC()
		var m runtime.MemStats
		runtime.ReadMemStats(&m)
		return float64(m.HeapAlloc)
	}
	edit(100)
	before := inUse()
	edit(2000)
	// An entry is a name and the bytes that differ, well under 1 kB; the rest is
	// what the last State holds.
	if grown := inUse() - before; grown > 4e6 {
		t.Errorf("2,000 edits take %.0f bytes, want at most 4e6", grown)
	}
}

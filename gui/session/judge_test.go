package session

import (
	"sort"
	"testing"
	"time"
)

// TestTemplatesAreJudged runs the shipped plans through the real judge.
func TestTemplatesAreJudged(t *testing.T) {
	v := &screen{}
	s := New(Options{Show: v.show})
	defer s.Close()
	for _, one := range Templates() {
		if err := s.NewFrom(one.Name); err != nil {
			t.Fatal(err)
		}
		st := settle(t, s, v)
		if st.Failure != nil {
			t.Errorf("%s: %+v", one.Name, st.Failure)
			continue
		}
		if st.Verdict.Word == "" || len([]rune(st.Verdict.Sentence)) > sentenceLength || len(st.Rows) == 0 {
			t.Errorf("%s: verdict %+v, %d rows", one.Name, st.Verdict, len(st.Rows))
		}
		t.Logf("%s: %s (%d characters), rows %+v", one.Name, st.Verdict.Sentence, len([]rune(st.Verdict.Sentence)), st.Rows)
		if a := st.Verdict.Advice; a != nil {
			t.Logf("    [%s]", a.Text)
		}
	}
}

// BenchmarkDrag drags a knob of the demo as a mouse does, 60 times a second, and
// reports how long it takes from a step to the first State with its report.
func BenchmarkDrag(b *testing.B) {
	v := &screen{}
	s := New(Options{Show: v.show})
	defer s.Close()
	if err := s.NewFrom("skerry-demo"); err != nil {
		b.Fatal(err)
	}
	settle(b, s, v)
	s.BeginDrag("power_w/sheet")
	var delays []float64
	x := 15.0
	for b.Loop() {
		x = 15 + float64(int(10*x)%200)/10 + 0.1
		begin := time.Now()
		s.Drag(x)
		want := s.State().Plan
		for st := v.last(); st.Stale || st.Plan != want || st.Busy; st = v.last() {
			time.Sleep(200 * time.Microsecond)
		}
		delays = append(delays, time.Since(begin).Seconds()*1e3)
		time.Sleep(16 * time.Millisecond)
	}
	s.EndDrag()
	sort.Float64s(delays)
	b.ReportMetric(delays[len(delays)/2], "ms/median")
	b.ReportMetric(delays[len(delays)*95/100], "ms/p95")
}

package session

import (
	"context"
	"testing"

	"hilltop/bosehubbard/report"
)

func TestRoomOfTheKnobs(t *testing.T) {
	s, v, _ := judged(t, "skerry-demo")
	s.StartRoom()
	st := waitFor(t, v, "the room", func(st State) bool { return st.Jobs[RoomJob].Result != nil })
	rooms := st.Jobs[RoomJob].Result.([]KnobRoom)
	if len(rooms) == 0 {
		t.Fatal("no knob can lose the verdict")
	}
	for i, r := range rooms {
		t.Logf("%s, %s: down %+v, up %+v", r.Label, r.Value, r.Down, r.Up)
		if i > 0 && r.Nearest().Part < rooms[i-1].Nearest().Part {
			t.Errorf("%s comes after %s with more room", r.Label, rooms[i-1].Label)
		}
	}
	judge := report.NewJudge()
	for _, r := range rooms {
		s.SelectStage(r.Stage)
		f := field(t, s.State(), r.Field)
		for _, limit := range []KnobLimit{r.Down, r.Up} {
			if !limit.Found {
				continue
			}
			at := readNumber(t, limit.Value)
			inside := f.Value + 0.98*(at-f.Value)
			if got := verdictWith(t, s, judge, f, inside); got != "sealed" {
				t.Errorf("%s at %g %s: %s, want sealed", r.Label, inside, f.Unit, got)
			}
			outside := f.Value + 1.01*(at-f.Value)
			if got := verdictWith(t, s, judge, f, outside); got != limit.Verdict {
				t.Errorf("%s at %g %s: %s, want %s", r.Label, outside, f.Unit, got, limit.Verdict)
			}
		}
	}
}

func verdictWith(t testing.TB, s *Session, judge *report.Judge, f Field, value float64) string {
	t.Helper()
	s.mu.Lock()
	doc := s.doc.now
	s.mu.Unlock()
	if f.Unit == "mW" {
		value *= 1e-3 // the document has W
	}
	next, err := doc.With(f.SetPath, value)
	if err != nil {
		t.Fatal(err)
	}
	r, err := judge.Judge(context.Background(), next.Plan())
	if err != nil {
		t.Fatal(err)
	}
	return r.Verdict
}

package session

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
)

// walker does random things to a session, as a restless user would.
type walker struct {
	t      *testing.T
	s      *Session
	random *rand.Rand
	first  string // bytes of the document as it was opened
	log    []string
}

func (w *walker) note(format string, args ...any) {
	w.log = append(w.log, fmt.Sprintf(format, args...))
	w.log = w.log[max(0, len(w.log)-12):]
}

func (w *walker) anyField() string {
	st := w.s.State()
	all := st.Knobs
	for _, g := range st.Groups {
		all = append(all[:len(all):len(all)], g.Fields...)
	}
	if w.random.IntN(2) == 0 {
		all = st.Knobs
	}
	return all[w.random.IntN(len(all))].ID
}

var walkTexts = []string{
	"5", "12.5", "0.2 W", "31 mW", "2*1.3 mW", "−3", "200 kHz", "1,200", "", "NaN", "1e400", "22\n23", "hold", "linear",
	"smooth", "x", "87Rb", "negative", "350 G", "J", "80000", "joined to a ring", "0", "40", "sheet", "new name",
}

func (w *walker) step() {
	s, r := w.s, w.random
	id, text := w.anyField(), walkTexts[r.IntN(len(walkTexts))]
	switch action := r.IntN(21); action {
	case 0, 1, 2, 3:
		w.note("commit %s %q: %v", id, text, s.Commit(id, text))
	case 4:
		w.note("preview %s %q: %v", id, text, s.Preview(id, text).Err)
	case 5, 6:
		n, size := r.IntN(7)-3, StepSize(r.IntN(3))
		w.note("step %s %d %d: %v", id, n, size, s.Step(id, n, size))
	case 7, 8:
		f, _ := s.state0().Field(id)
		s.BeginDrag(id)
		for range 1 + r.IntN(5) {
			s.Drag(f.Min + r.Float64()*(f.Max-f.Min))
		}
		w.note("drag %s", id)
		w.letGo()
	case 9:
		w.note("clear %s: %v", id, s.Clear(id))
	case 10:
		w.note("reset %s: %v", id, s.Reset(id))
	case 11, 12, 13:
		w.note("undo %s", s.State().Undo)
		s.Undo()
	case 14:
		w.note("redo %s", s.State().Redo)
		s.Redo()
	case 15:
		s.SelectStage(r.IntN(7) - 1)
		s.Focus(id)
		w.note("select, focus %s", id)
	case 16:
		w.note("bad edit: %v", s.Edit("bad", "/stages/9/name", 5))
	case 17:
		if a := s.State().Verdict.Advice; a != nil {
			w.note("advice: %v", s.Apply(*a))
		}
	case 18:
		s.Revert(id)
		s.SetUnit(id, "mW")
		w.note("revert, unit %s", id)
	case 19:
		w.open()
	case 20:
		if actions := allActions(s.State()); len(actions) > 0 {
			id := actions[r.IntN(len(actions))]
			w.note("%s: %v", id, s.Do(id))
		}
	}
}

// letGo ends a drag in one of its ways; sometimes the next action has to.
func (w *walker) letGo() {
	switch w.random.IntN(3) {
	case 0:
		w.s.CancelDrag()
	case 1:
		w.s.EndDrag()
	}
}

func (w *walker) open() {
	names := assets.PlanNames()
	name := names[w.random.IntN(len(names))]
	data, err := assets.Plan(name)
	if err != nil {
		w.t.Fatal(err)
	}
	before := bytesOf(w.s)
	switch w.random.IntN(4) {
	case 0:
		w.note("open %s", name)
		if err := w.s.OpenBytes(name, data); err != nil {
			w.t.Fatal(err)
		}
		w.first = string(data)
	case 1:
		data = data[:w.random.IntN(len(data)-2)]
		w.note("open broken %s: %v", name, w.s.OpenBytes(name, data))
		mustBe(w.t, "plan after a broken one", bytesOf(w.s), before)
	default:
		w.note("open missing: %v", w.s.OpenFile("/no/such/plan.json"))
		mustBe(w.t, "plan after a missing one", bytesOf(w.s), before)
	}
}

// check holds what must hold after every action.
func (w *walker) check() {
	if _, err := plan.Open([]byte(bytesOf(w.s))); err != nil {
		w.t.Fatalf("the plan is broken: %v\nafter %q", err, w.log)
	}
}

// rewind undoes everything and repeats it.
func (w *walker) rewind() {
	w.s.EndDrag()
	for len(w.s.pendingTexts()) > 0 {
		w.s.Undo()
	}
	last := bytesOf(w.s)
	steps := 0
	for ; w.s.State().Undo != ""; steps++ {
		w.s.Undo()
	}
	if got := bytesOf(w.s); got != w.first {
		w.t.Fatalf("undo all the way: got\n%s\nwant\n%s\nafter %q", got, w.first, w.log)
	}
	for range steps {
		w.s.Redo()
	}
	if got := bytesOf(w.s); got != last {
		w.t.Fatalf("redo all the way: got\n%s\nwant\n%s\nafter %q", got, last, w.log)
	}
}

// TestRandomWalk never loses the plan, and undo all the way returns its first
// bytes.
func TestRandomWalk(t *testing.T) {
	for seed := range uint64(6) {
		s, v := newTest(t, Options{Folder: t.TempDir()})
		w := &walker{t: t, s: s, random: newRandom(seed), first: string(demo(t))}
		for i := range 300 {
			w.step()
			w.check()
			if i%75 == 74 {
				w.rewind()
			}
		}
		w.rewind()
		s.Focus("")
		settle(t, s, v)
		if t.Failed() {
			t.Fatalf("seed %d after %q", seed, w.log)
		}
	}
}

func (s *Session) state0() *State {
	st := s.State()
	return &st
}

func (s *Session) pendingTexts() []pendingText {
	s.mu.Lock()
	defer s.mu.Unlock()
	return append([]pendingText(nil), s.pending...)
}

package gui

import (
	"math/rand/v2"
	"os"
	"runtime"
	"testing"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/software"

	"hilltop/gui/session"
)

// soak does random things to a window, as its user would.
type soak struct {
	*bench
	random *rand.Rand
	idle   int // goroutines that run while nothing happens
}

// soakTexts are typed into fields of every kind.
var soakTexts = []string{"5", "12.5", "31 mW", "2*1.3", "−3", "200", "1,200", "", "NaN", "350 G", "80000", "letters", "0", "7.25"}

func (s *soak) pick(ids []string) string { return ids[s.random.IntN(len(ids))] }

// action does one thing.
func (s *soak) action() {
	w := s.window
	switch s.random.IntN(12) {
	case 0, 1, 2:
		s.write()
	case 3:
		if f, ok := s.canvas().Focused().(*ValueField); ok {
			s.press(f, fyne.KeyUp, fyne.KeyUp, fyne.KeyDown)
		}
	case 4, 5:
		s.drag()
	case 6:
		w.undo()
	case 7:
		w.redo()
	case 8:
		w.nextPage(1 - 2*s.random.IntN(2))
	case 9:
		w.nextStage(1 - 2*s.random.IntN(2))
	case 10:
		s.reshape()
	case 11:
		s.look()
	}
	s.until("shown", func() bool { return true })
}

// write types over a field of the plan.
func (s *soak) write() {
	id := s.pick(s.ids())
	s.window.reveal(id)
	if f, ok := s.canvas().Focused().(*ValueField); ok {
		f.TypedShortcut(&fyne.ShortcutSelectAll{})
		for _, r := range soakTexts[s.random.IntN(len(soakTexts))] {
			f.TypedRune(r)
		}
		s.press(f, []fyne.KeyName{fyne.KeyReturn, fyne.KeyTab, fyne.KeyEscape}[s.random.IntN(3)])
	}
}

// drag drags a knob over some of its range.
func (s *soak) drag() {
	var sliders []session.Field
	for _, f := range s.window.state.Knobs {
		if f.Slider {
			sliders = append(sliders, f)
		}
	}
	if len(sliders) == 0 {
		return
	}
	f := sliders[s.random.IntN(len(sliders))]
	s.window.desk.BeginDrag(f.ID)
	for range 4 {
		s.window.desk.Drag(f.Min + s.random.Float64()*(f.Max-f.Min))
		s.window.Echo()
	}
	s.window.desk.EndDrag()
	s.window.Echo()
}

// reshape adds or takes out something, or starts another plan.
func (s *soak) reshape() {
	var ids []string
	for id := range offered(s.window.state) {
		ids = append(ids, id)
	}
	if len(ids) > 0 && s.random.IntN(4) > 0 {
		s.window.onPlan(s.pick(ids))
		return
	}
	templates := session.Templates()
	s.fresh(templates[s.random.IntN(len(templates))].Name)
}

// look changes what does not change the plan.
func (s *soak) look() {
	w := s.window
	switch s.random.IntN(5) {
	case 0:
		w.column.ToggleAll()
	case 1:
		w.chooseVariant(variants[s.random.IntN(len(variants))])
	case 2:
		w.stepText(s.random.IntN(3) - 1)
	case 3:
		w.explain("interaction_hz")
	case 4:
		s.window.window.Resize(fyne.NewSize(800+float32(s.random.IntN(600)), 600+float32(s.random.IntN(200))))
	}
}

// fresh starts a plan from a template without asking.
func (s *soak) fresh(template string) {
	if err := s.window.desk.NewFrom(template); err != nil {
		s.Fatal(err)
	}
	s.window.did(nil)
}

// rest brings the window to one state and returns the memory that is in use then,
// and how many goroutines run. The toolkit keeps what was drawn for a minute; forget
// waits for that.
func (s *soak) rest(forget bool) (heap uint64, goroutines int) {
	s.Helper()
	w := s.window
	s.fresh(DemoPlan)
	for _, c := range w.column.sections {
		c.open = false
	}
	w.choose(look{Light, 1})
	w.window.Resize(fyne.NewSize(1280, 800))
	w.strip.Hide()
	s.turnTo("Ceiling")
	s.canvas().Unfocus()
	s.settleJobs()
	if forget {
		time.Sleep(cache)
		software.NewCanvas().Capture() // which clears the caches, as the window does
	}
	for range 100 { // workers that were told to stop take a moment
		if goroutines = runtime.NumGoroutine(); goroutines <= s.idle {
			break
		}
		time.Sleep(10 * time.Millisecond)
	}
	runtime.GC()
	runtime.GC()
	var m runtime.MemStats
	runtime.ReadMemStats(&m)
	return m.HeapAlloc, goroutines
}

// cache is how long the toolkit keeps what was drawn, with some to spare.
const cache = 65 * time.Second

// Actions leave nothing behind: no goroutine, and after 2,000 of them, with
// HILLTOP_LONG=1, no more memory than 10 % above that after the first 300. Without it
// there are 200 actions, and the memory is not compared, since that takes minutes.
func TestSoak(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	long := os.Getenv("HILLTOP_LONG") == "1"
	warm, actions := 20, 200
	if long {
		warm, actions = 300, 2000
	}
	s := &soak{bench: newBench(t, setup{}), random: rand.New(rand.NewPCG(3, 14))}
	for range warm {
		s.action()
	}
	heap, goroutines := s.rest(long)
	s.idle = goroutines
	began := time.Now()
	for range actions {
		s.action()
	}
	took := time.Since(began)
	after, running := s.rest(long)
	growth := float64(after)/float64(heap) - 1
	t.Logf("%d actions in %v: %.1f MB, then %.1f MB (%+.1f %%); %d goroutines, then %d",
		actions, took.Round(time.Millisecond), float64(heap)/1e6, float64(after)/1e6, 100*growth, goroutines, running)
	if long && growth > 0.1 {
		t.Errorf("%d actions let the memory grow by %.0f %%, want at most 10 %%", actions, 100*growth)
	}
	if running > goroutines {
		t.Errorf("%d goroutines run after %d actions, want %d", running, actions, goroutines)
	}
}

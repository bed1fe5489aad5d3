package gui

import (
	"image/png"
	"os"
	"path/filepath"
	"testing"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/test"

	"hilltop/gui/session"
)

// bench is a window without a display. What its session posts waits in a queue
// until the test runs it, so that only the test's goroutine touches the window.
type bench struct {
	*testing.T
	app    fyne.App
	window *Window
	queue  chan func()
}

// setup says which window a test wants.
type setup struct {
	width, height float32
	variant       Variant
	scale         float32
	plan          string // a template; "" for the demo
}

func newBench(t *testing.T, s setup) *bench {
	t.Helper()
	b := &bench{T: t, app: test.NewApp(), queue: make(chan func(), 1000)}
	if s.width == 0 {
		s.width, s.height = 1280, 800
	}
	if s.variant == "" {
		s.variant = Light
	}
	if s.scale == 0 {
		s.scale = 1
	}
	b.window = New(b.app, Options{
		Size: fyne.NewSize(s.width, s.height), Variant: s.variant, TextScale: s.scale,
		Post: func(f func()) { b.queue <- f },
	})
	b.window.desk.ChooseEntropySize(6) // quick
	t.Cleanup(func() {
		go func() {
			for range b.queue { // the session may still post while it ends
			}
		}()
		b.window.Close()
	})
	if s.plan != "" {
		if err := b.window.desk.NewFrom(s.plan); err != nil {
			t.Fatal(err)
		}
		b.window.did(nil)
	}
	b.settle()
	b.until("S(E)", func() bool { // so that no State comes later by itself
		now, shown := b.window.desk.State(), b.window.state
		return !now.Jobs[session.EntropyJob].Running && !shown.Jobs[session.EntropyJob].Running &&
			now.Entropy.Result == shown.Entropy.Result && b.window.easel.idle()
	})
	return b
}

// settle runs what the session and the easel post until the plan is judged and the
// pictures are drawn.
func (b *bench) settle() {
	b.Helper()
	b.until("judged and drawn", func() bool {
		s := b.window.state
		return !s.Busy && !s.Stale && b.window.easel.idle()
	})
}

// settleJobs also waits for what the pages compute.
func (b *bench) settleJobs() {
	b.Helper()
	b.settle()
	b.until("computed", func() bool {
		for _, job := range b.window.desk.State().Jobs {
			if job.Running {
				return false
			}
		}
		return b.window.easel.idle() && b.ceilingPage().room.timer == nil
	})
	b.window.Echo()
	b.settle()
}

// until runs what is posted until a condition holds and nothing waits.
func (b *bench) until(what string, ok func() bool) {
	b.Helper()
	deadline := time.Now().Add(20 * time.Second)
	for time.Now().Before(deadline) {
		select {
		case f := <-b.queue:
			f()
			continue
		default:
		}
		if ok() {
			return
		}
		select {
		case f := <-b.queue:
			f()
		case <-time.After(2 * time.Millisecond):
		}
	}
	b.Fatalf("not %s within 20 s: %+v", what, b.window.state.Failure)
}

// turnTo turns to a page and waits for its pictures.
func (b *bench) turnTo(name string) {
	b.Helper()
	b.window.choosePage(b.window.pageNamed(name))
	b.settle()
}

// ceilingPage and latticePage are pages of the window.
func (b *bench) ceilingPage() *CeilingPage {
	return b.window.pages[b.window.pageNamed("Ceiling")].(*CeilingPage)
}

func (b *bench) latticePage() *LatticePage {
	return b.window.pages[b.window.pageNamed("Lattice")].(*LatticePage)
}

// canvas is that of the window.
func (b *bench) canvas() fyne.Canvas { return b.window.window.Canvas() }

// field is the field of a knob.
func (b *bench) field(id string) *ValueField {
	b.Helper()
	row := b.window.column.rows[id]
	if row == nil {
		b.Fatalf("there is no knob %q, but %q", id, b.window.column.order)
	}
	return row.field
}

// enter types a text over what stands in a field, and commits it.
func (b *bench) enter(id, text string) {
	b.Helper()
	f := b.field(id)
	b.canvas().Focus(f)
	for _, r := range text {
		f.TypedRune(r)
	}
	b.press(f, fyne.KeyReturn)
	b.settle()
}

// press sends keys to a widget.
func (b *bench) press(f fyne.Focusable, keys ...fyne.KeyName) {
	for _, key := range keys {
		f.TypedKey(&fyne.KeyEvent{Name: key})
	}
}

// keep writes a picture of the window into the folder that HILLTOP_SHOTS names.
func (b *bench) keep(name string) {
	b.Helper()
	folder := os.Getenv("HILLTOP_SHOTS")
	if folder == "" {
		return
	}
	file, err := os.Create(filepath.Join(folder, name+".png"))
	if err != nil {
		b.Fatal(err)
	}
	if err := png.Encode(file, b.canvas().Capture()); err != nil {
		b.Fatal(err)
	}
	if err := file.Close(); err != nil {
		b.Fatal(err)
	}
}

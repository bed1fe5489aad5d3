package gui

import (
	"sync"
	"sync/atomic"
	"testing"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/test"

	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// Of many orders for one sheet the easel draws the first and the last, and those
// that had no newer one while it was free.
func TestEaselDrawsTheNewestOrder(t *testing.T) {
	test.NewApp().Settings().SetTheme(NewTheme(Light, 1))
	queue := make(chan func(), 1000)
	e := newEasel(func(f func()) { queue <- f })
	defer e.close()
	p := NewPlot("test", plotTools{easel: e})
	p.high = func(float32) float32 { return 100 }
	p.sheet.Resize(pictureTestSize)
	var drawn atomic.Int32
	gate := make(chan struct{})
	chart := &figure.Chart{Curves: []figure.Curve{{Name: "a", X: []float64{0, 1}, Y: []float64{0, 1}}}}
	for i := range 100 {
		p.Draw(i, func(*session.Artist) (subject, error) {
			drawn.Add(1)
			<-gate
			return &chartSubject{chart: func(figure.Unit) *figure.Chart { c := *chart; return &c }}, nil
		})
		if i == 0 {
			for drawn.Load() == 0 {
				time.Sleep(time.Millisecond)
			}
		}
	}
	close(gate)
	for !e.idle() {
		select {
		case f := <-queue:
			f()
		case <-time.After(time.Millisecond):
		}
	}
	if got := drawn.Load(); got != 2 {
		t.Errorf("100 orders were drawn %d times, want the first and the last", got)
	}
	if p.sheet.drawn == nil || p.sheet.drawn.key != 99 {
		t.Error("the last order is not the one that is shown")
	}
}

// A window that takes nothing has one drawing waiting for it, the newest.
func TestEaselPostsOneDrawingAtATime(t *testing.T) {
	test.NewApp().Settings().SetTheme(NewTheme(Light, 1))
	var posted atomic.Int32
	e := newEasel(func(func()) { posted.Add(1) })
	defer e.close()
	p := NewPlot("test", plotTools{easel: e})
	p.sheet.Resize(pictureTestSize)
	for i := range 20 {
		var once sync.WaitGroup
		once.Add(1)
		p.Draw(i, func(*session.Artist) (subject, error) {
			once.Done()
			return &chartSubject{chart: func(figure.Unit) *figure.Chart { return &figure.Chart{} }}, nil
		})
		once.Wait()
	}
	if got := posted.Load(); got > 1 {
		t.Errorf("%d drawings wait for the window, want 1", got)
	}
}

var pictureTestSize = fyne.NewSize(200, 100)

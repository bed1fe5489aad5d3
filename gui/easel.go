package gui

import (
	"context"
	"fmt"
	"image"
	"sync"

	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// easel draws pictures on a goroutine of its own, one at a time. Of the orders for
// one sheet only the newest is kept, and never more than one drawing waits for the
// window to take it.
type easel struct {
	post   func(func())
	ctx    context.Context
	cancel context.CancelFunc
	ended  sync.WaitGroup
	wake   chan struct{}

	mu      sync.Mutex
	orders  map[*pictureSheet]order
	queue   []*pictureSheet // of orders, the oldest first
	errands []func(*figure.Renderer)
	busy    bool
	done    map[*pictureSheet]*drawing // that the window has not taken yet
}

// order is one picture to be drawn.
type order struct {
	wish
	ready subject // where the data are known already
	make  source
}

// wish is all that a drawing depends on. Equal wishes give equal drawings.
type wish struct {
	key   any // of the data
	view  view
	frame figure.Frame
	style figure.Style
}

// source computes the data of a picture.
type source func(*session.Artist) (subject, error)

// drawing is what became of an order.
type drawing struct {
	wish
	subject subject
	picture figure.Picture
	guide   guide
	image   *image.RGBA
	err     error
}

// newEasel starts an easel that hands its drawings over through post.
func newEasel(post func(func())) *easel {
	e := &easel{post: post, wake: make(chan struct{}, 1), orders: map[*pictureSheet]order{}, done: map[*pictureSheet]*drawing{}}
	e.ctx, e.cancel = context.WithCancel(context.Background())
	e.ended.Add(1)
	go e.work()
	return e
}

// put orders a picture in place of what waits for the same sheet.
func (e *easel) put(s *pictureSheet, o order) {
	e.mu.Lock()
	defer e.mu.Unlock()
	if _, waits := e.orders[s]; !waits {
		e.queue = append(e.queue, s)
	}
	e.orders[s] = o
	e.nudge()
}

// run does something else with the renderer, after the picture that is drawn now.
func (e *easel) run(errand func(*figure.Renderer)) {
	e.mu.Lock()
	defer e.mu.Unlock()
	e.errands = append(e.errands, errand)
	e.nudge()
}

func (e *easel) nudge() {
	select {
	case e.wake <- struct{}{}:
	default:
	}
}

// idle reports whether nothing waits to be drawn or to be taken.
func (e *easel) idle() bool {
	e.mu.Lock()
	defer e.mu.Unlock()
	return !e.busy && len(e.orders) == 0 && len(e.errands) == 0 && len(e.done) == 0
}

// later runs something on the window's goroutine, unless the easel is closed.
func (e *easel) later(f func()) {
	if e.ctx.Err() == nil {
		e.post(f)
	}
}

// close drops what waits and ends the goroutine.
func (e *easel) close() {
	e.cancel()
	e.ended.Wait()
}

func (e *easel) work() {
	defer e.ended.Done()
	artist, renderer := session.NewArtist(), figure.NewRenderer()
	for {
		switch s, o, errand := e.next(); {
		case errand != nil:
			errand(renderer)
		case s != nil:
			e.deliver(s, draw(o, artist, renderer))
		default:
			select {
			case <-e.ctx.Done():
				return
			case <-e.wake:
			}
		}
		if e.ctx.Err() != nil {
			return
		}
	}
}

// next takes an errand or an order from the queue.
func (e *easel) next() (s *pictureSheet, o order, errand func(*figure.Renderer)) {
	e.mu.Lock()
	defer e.mu.Unlock()
	switch {
	case len(e.errands) > 0:
		errand, e.errands = e.errands[0], e.errands[1:]
	case len(e.queue) > 0:
		s, e.queue = e.queue[0], e.queue[1:]
		o = e.orders[s]
		delete(e.orders, s)
	}
	e.busy = s != nil || errand != nil
	return s, o, errand
}

// deliver hands a drawing over, in place of one that was not taken yet.
func (e *easel) deliver(s *pictureSheet, d *drawing) {
	e.mu.Lock()
	_, waits := e.done[s]
	e.done[s] = d
	e.mu.Unlock()
	if !waits {
		e.later(func() { s.take(e.collect(s)) })
	}
}

func (e *easel) collect(s *pictureSheet) *drawing {
	e.mu.Lock()
	defer e.mu.Unlock()
	d := e.done[s]
	delete(e.done, s)
	return d
}

// draw does an order. A picture that breaks off must not take the plan with it.
func draw(o order, artist *session.Artist, renderer *figure.Renderer) (d *drawing) {
	d = &drawing{wish: o.wish, subject: o.ready}
	defer func() {
		if cause := recover(); cause != nil {
			d.err = fmt.Errorf("the drawing broke off: %v", cause)
		}
	}()
	if d.subject == nil {
		if d.subject, d.err = o.make(artist); d.err != nil {
			return d
		}
	}
	d.picture = d.subject.picture(o.view)
	d.guide = d.subject.guide(d.picture, o.frame, o.style)
	d.image = renderer.Image(d.picture, o.frame, o.style)
	return d
}

package gui

import (
	"fmt"
	"slices"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"
)

// rect is a place in the window.
type rect struct{ left, top, right, bottom float32 }

func rectOf(at fyne.Position, size fyne.Size) rect {
	return rect{at.X, at.Y, at.X + size.Width, at.Y + size.Height}
}

// overlap is how far two places reach into each other, the smaller of the two
// directions; not positive where they do not.
func (r rect) overlap(o rect) float32 {
	return min(min(r.right, o.right)-max(r.left, o.left), min(r.bottom, o.bottom)-max(r.top, o.top))
}

// beyond is how far a place reaches out of another.
func (r rect) beyond(o rect) float32 {
	return max(o.left-r.left, r.right-o.right, o.top-r.top, r.bottom-o.bottom)
}

// within is the part of a place that lies in another.
func (r rect) within(o rect) rect {
	return rect{max(r.left, o.left), max(r.top, o.top), min(r.right, o.right), min(r.bottom, o.bottom)}
}

// piece is a text or a control that was found in the window.
type piece struct {
	name    string
	object  fyne.CanvasObject
	place   rect // as far as it is in sight
	text    bool
	parents []fyne.CanvasObject
}

// sight is what can be seen where an object stands: within view; out of it up and
// down where that scrolls.
type sight struct {
	view    rect
	scrolls bool
}

// beyond is how far a place reaches out of sight, where nothing can bring it in.
func (s sight) beyond(place rect) float32 {
	if s.scrolls {
		place.top, place.bottom = s.view.top, s.view.bottom
	}
	return place.beyond(s.view)
}

// survey walks the visible objects of a window and notes what is wrong.
type survey struct {
	inside     func(fyne.Widget) []fyne.CanvasObject
	pieces     []piece
	complaints []string
}

// layoutSlack is how far texts may reach out or overlap, for the room that fonts
// leave around their letters.
const layoutSlack = 1.5

// LayoutComplaints lists the labels of a tree that are cut, reach out of what they
// stand in, or overlap another label or a control. It is there for tests, of this
// package and of the program: inside returns what a widget is made of, which the
// toolkit tells only tests.
func LayoutComplaints(root fyne.CanvasObject, inside func(fyne.Widget) []fyne.CanvasObject) []string {
	s := &survey{inside: inside}
	s.walk(root, fyne.Position{}, sight{view: rectOf(root.Position(), root.Size())}, nil)
	s.compare()
	return s.complaints
}

func (s *survey) complain(format string, args ...any) {
	s.complaints = append(s.complaints, fmt.Sprintf(format, args...))
}

// walk notes an object at a position.
func (s *survey) walk(o fyne.CanvasObject, origin fyne.Position, in sight, parents []fyne.CanvasObject) {
	if !o.Visible() {
		return
	}
	at := origin.Add(o.Position())
	place := rectOf(at, o.Size())
	switch o := o.(type) {
	case *canvas.Text:
		s.text(o, at, in, parents)
		return
	case *Prose:
		if o.Cut() {
			s.complain("text %q is cut in a width of %.0f", o.Text, o.Size().Width)
		}
	case *container.Scroll:
		in = sight{view: place.within(in.view), scrolls: true}
	case fyne.Focusable:
		s.pieces = append(s.pieces, piece{fmt.Sprintf("%T", o), o.(fyne.CanvasObject), place.within(in.view), false, parents})
		if out := in.beyond(place); out > layoutSlack {
			s.complain("%T reaches out by %.1f", o, out)
		}
	}
	inner := append(parents[:len(parents):len(parents)], o)
	for _, child := range s.children(o) {
		s.walk(child, at, in, inner)
	}
}

func (s *survey) children(o fyne.CanvasObject) []fyne.CanvasObject {
	switch o := o.(type) {
	case *fyne.Container:
		return o.Objects
	case fyne.Widget:
		return s.inside(o)
	}
	return nil
}

func (s *survey) text(o *canvas.Text, at fyne.Position, in sight, parents []fyne.CanvasObject) {
	if strings.TrimSpace(o.Text) == "" {
		return
	}
	place := rectOf(at, o.MinSize())
	s.pieces = append(s.pieces, piece{fmt.Sprintf("%q", o.Text), o, place.within(in.view), true, parents})
	if out := in.beyond(place); out > layoutSlack {
		s.complain("text %q reaches out of the window by %.1f", o.Text, out)
	}
	for _, parent := range slices.Backward(parents) {
		if _, toolkit := parent.(*widget.RichText); toolkit {
			break // a dialog leaves its title's label at any size
		}
		if w, ok := parent.(fyne.Widget); ok && place.right-place.left > w.Size().Width+layoutSlack {
			s.complain("text %q is wider than the %T it stands in", o.Text, w)
		}
	}
}

// compare looks for pieces that overlap and do not hold each other.
func (s *survey) compare() {
	for i, a := range s.pieces {
		for _, b := range s.pieces[i+1:] {
			if slices.Contains(a.parents, b.object) || slices.Contains(b.parents, a.object) {
				continue
			}
			if by := a.place.overlap(b.place); by > layoutSlack && !lineBoxes(a, b) {
				s.complain("%s overlaps %s by %.1f", a.name, b.name, by)
			}
		}
	}
}

// lineBoxes reports whether two texts only share the room that fonts leave above
// and below their letters: the lower quarter of one line and the upper of another.
func lineBoxes(a, b piece) bool {
	if !a.text || !b.text {
		return false
	}
	down := min(a.place.bottom, b.place.bottom) - max(a.place.top, b.place.top)
	return down < 0.25*min(a.place.bottom-a.place.top, b.place.bottom-b.place.top)
}

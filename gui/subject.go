package gui

import "hilltop/bosehubbard/figure"

// subject is the data of a picture and the way to draw them. It does not change.
type subject interface {
	units() []figure.Unit // that it can be shown in; none where there is no choice
	scales() []string     // what its range can be chosen for; none where there is no choice
	picture(v view) figure.Picture
	guide(p figure.Picture, f figure.Frame, s figure.Style) guide
}

// view is how the user looks at a picture.
type view struct {
	unit   figure.Unit
	chart  figure.View // zero for the whole
	half   float64     // half-range of energies in the unit; 0 for the picture's choice
	scale  string      // one of the subject's scales; "" for the picture's choice
	pinned subject     // a reference, drawn dashed; nil for none
}

// whole reports whether the picture chooses what is seen.
func (v view) whole() bool { return v.chart == figure.View{} && v.half == 0 && v.scale == "" }

// reset lets the picture choose what is seen.
func (v view) reset() view {
	v.chart, v.half, v.scale = figure.View{}, 0, ""
	return v
}

// reading is what a picture says at a place.
type reading struct {
	at    figure.Point // px from the upper left corner
	text  string
	curve int // the place among what the keys lead through
	point int
}

// guide reads one drawing and says how it is zoomed.
type guide interface {
	area() figure.Rect
	read(p figure.Point) (reading, bool)      // at the pointer
	first() (reading, bool)                   // where the keys begin
	step(from reading, right, up int) reading // where the keys lead
	again(r reading) (reading, bool)          // the same place after a change
	zoom(v view, p figure.Point, by float64) view
	pan(v view, dx, dy float64) view
	box(v view, r figure.Rect) view
}

// zoomBy is how much one key or notch of the wheel magnifies.
const zoomBy = 1.25

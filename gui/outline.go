package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
)

// filled is a rectangle without an outline.
func filled(at fyne.Position, size fyne.Size, fill fyne.ThemeColorName) *canvas.Rectangle {
	o := canvas.NewRectangle(tint(fill))
	o.Move(at)
	o.Resize(size)
	return o
}

// framed is a rectangle with an outline inside its edge: one rectangle on another,
// which stays sharp where a stroke would straddle pixels.
func framed(at fyne.Position, size fyne.Size, fill fyne.ThemeColorName, stroke float32, edge fyne.ThemeColorName) []fyne.CanvasObject {
	outer := filled(at, size, edge)
	if min(size.Width, size.Height) <= 2*max(stroke, px(radius)) {
		return []fyne.CanvasObject{outer} // all edge, and too small for corners
	}
	outer.CornerRadius = px(radius)
	inner := filled(at.AddXY(stroke, stroke), size.SubtractWidthHeight(2*stroke, 2*stroke), fill)
	if c := px(radius) - stroke; c > 0 {
		inner.CornerRadius = c
	}
	return []fyne.CanvasObject{outer, inner}
}

// ring is the outline of what has the focus, inside the edge of a rectangle.
func ring(at fyne.Position, size fyne.Size) []fyne.CanvasObject {
	return outline(at, size, lineFocus, ColorInk)
}

// outline is a frame without a ground.
func outline(at fyne.Position, size fyne.Size, stroke float32, edge fyne.ThemeColorName) []fyne.CanvasObject {
	across, down := fyne.NewSize(size.Width, stroke), fyne.NewSize(stroke, size.Height-2*stroke)
	return []fyne.CanvasObject{
		filled(at, across, edge),
		filled(at.AddXY(0, size.Height-stroke), across, edge),
		filled(at.AddXY(0, stroke), down, edge),
		filled(at.AddXY(size.Width-stroke, stroke), down, edge),
	}
}

// dashed is an outline of dashes inside the edge of a rectangle.
func dashed(at fyne.Position, size fyne.Size, stroke, dash, gap float32, edge fyne.ThemeColorName) []fyne.CanvasObject {
	var list []fyne.CanvasObject
	add := func(x, y, w, h float32) {
		list = append(list, filled(at.AddXY(x, y), fyne.NewSize(w, h), edge))
	}
	for x := float32(0); x < size.Width; x += dash + gap {
		w := min(dash, size.Width-x)
		add(x, 0, w, stroke)
		add(x, size.Height-stroke, w, stroke)
	}
	for y := float32(0); y < size.Height; y += dash + gap {
		h := min(dash, size.Height-y)
		add(0, y, stroke, h)
		add(size.Width-stroke, y, stroke, h)
	}
	return list
}

package gui

import "fyne.io/fyne/v2"

// Post runs a function on the toolkit's goroutine, without waiting for it. It is
// the way into the window from any other goroutine.
func Post(f func()) { fyne.Do(f) }

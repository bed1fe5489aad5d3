package gui

import (
	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// Page is one sheet of the window. The window calls Show with every new state
// while the page is chosen, and once when it is chosen; KeyNumber always.
//
// To add a page, write its type and name it in [Window.pages].
type Page interface {
	Name() string
	KeyNumber(s session.State) string // under the name, in the page switch
	Show(s session.State)
	Object() fyne.CanvasObject
}

// pageTools are what pages use of the window.
type pageTools struct {
	desk    *session.Session
	explain func(topic string) // opens the strip
	apply   func(session.Advice)
	echo    func() // the session has taken an action
	key     func(*fyne.KeyEvent)
	turnTo  func(page string)
	goTo    func(stage int, field string) // leads to a knob
	plots   plotTools
}

package gui

import (
	"encoding/json"
	"os"
	"path/filepath"
)

// look is what the View menu chooses.
type look struct {
	Variant Variant `json:"variant"`
	Scale   float32 `json:"text_scale"`
}

// lookFile keeps the look that was chosen last, in the window's folder.
const lookFile = "look.json"

// textScales are the text sizes of the View menu.
var textScales = []float32{0.75, 0.9, 1, 1.1, 1.25, 1.5, 1.75, 2}

// firstLook takes the look from the options, else from what was chosen last.
func firstLook(opt Options) look {
	l := look{FollowSystem, 1}
	if opt.Folder != "" {
		if data, err := os.ReadFile(filepath.Join(opt.Folder, lookFile)); err == nil {
			_ = json.Unmarshal(data, &l) // what cannot be read stays as it was
		}
	}
	if opt.Variant != "" {
		l.Variant = opt.Variant
	}
	if opt.TextScale != 0 {
		l.Scale = opt.TextScale
	}
	return l
}

// keep writes the look for the next start, whole or not at all.
func (l look) keep(folder string) error {
	if folder == "" {
		return nil
	}
	data, err := json.Marshal(l)
	if err != nil {
		return err
	}
	path := filepath.Join(folder, lookFile)
	if err := os.WriteFile(path+".new", data, 0o600); err != nil {
		return err
	}
	return os.Rename(path+".new", path)
}

// choose wears a look and remembers it.
func (w *Window) choose(l look) {
	w.wear(l)
	w.menu.bar.Refresh() // its height changes with the text, and so does the place below it
	w.arrange()
	w.Echo()
	w.content.Refresh()
	for _, overlay := range w.window.Canvas().Overlays().List() {
		overlay.Refresh()
	}
	w.say(l.keep(w.folder))
}

// wear changes the look of the program; what is drawn already is refreshed by
// [Window.choose].
func (w *Window) wear(l look) {
	w.look = l
	if worn, ok := w.app.Settings().Theme().(*Theme); ok {
		worn.wear(l)
		return
	}
	w.app.Settings().SetTheme(NewTheme(l.Variant, l.Scale))
}

// chooseVariant changes the colours.
func (w *Window) chooseVariant(v Variant) { w.choose(look{v, w.look.Scale}) }

// stepText moves the text size by places of the list; 0 is back to 100 %.
func (w *Window) stepText(places int) {
	if places == 0 {
		w.choose(look{w.look.Variant, 1})
		return
	}
	at := 0
	for i, s := range textScales {
		if s <= w.look.Scale {
			at = i
		}
	}
	at = min(max(at+places, 0), len(textScales)-1)
	w.choose(look{w.look.Variant, textScales[at]})
}

// nextPage turns pages in a circle.
func (w *Window) nextPage(step int) {
	w.choosePage((w.page + step + len(w.pages)) % len(w.pages))
}

// nextStage selects the stage beside the selected one.
func (w *Window) nextStage(step int) {
	for i, stop := range w.state.Rail {
		if stop.Stage == w.state.Stage && i+step >= 0 && i+step < len(w.state.Rail) {
			w.desk.SelectStage(w.state.Rail[i+step].Stage)
			w.Echo()
			return
		}
	}
}

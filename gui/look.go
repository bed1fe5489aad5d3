package gui

// look is what the View menu chooses.
type look struct {
	variant Variant
	scale   float32
}

// Keys of the preferences.
const (
	variantKey = "variant"
	scaleKey   = "text-scale"
)

// textScales are the text sizes of the View menu.
var textScales = []float32{0.75, 0.9, 1, 1.1, 1.25, 1.5, 1.75, 2}

// firstLook takes the look from the options, else from what was chosen last.
func (w *Window) firstLook(opt Options) look {
	saved := w.app.Preferences()
	l := look{variant: opt.Variant, scale: opt.TextScale}
	if l.variant == "" {
		l.variant = Variant(saved.StringWithFallback(variantKey, string(FollowSystem)))
	}
	if l.scale == 0 {
		l.scale = float32(saved.FloatWithFallback(scaleKey, 1))
	}
	return l
}

// choose wears a look and remembers it.
func (w *Window) choose(l look) {
	w.app.Preferences().SetString(variantKey, string(l.variant))
	w.app.Preferences().SetFloat(scaleKey, float64(l.scale))
	w.wear(l)
	w.arrange()
	w.Echo()
	w.content.Refresh()
}

func (w *Window) wear(l look) {
	w.look = l
	w.app.Settings().SetTheme(NewTheme(l.variant, l.scale))
}

// chooseVariant changes the colours.
func (w *Window) chooseVariant(v Variant) { w.choose(look{v, w.look.scale}) }

// stepText moves the text size by places of the list; 0 is back to 100 %.
func (w *Window) stepText(places int) {
	if places == 0 {
		w.choose(look{w.look.variant, 1})
		return
	}
	at := 0
	for i, s := range textScales {
		if s <= w.look.scale {
			at = i
		}
	}
	at = min(max(at+places, 0), len(textScales)-1)
	w.choose(look{w.look.variant, textScales[at]})
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

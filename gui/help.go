package gui

import "strings"

// standingCautions hold for every plan.
const standingCautions = "Lasers of class 4, coils that carry high currents and store energy, alkali metals and ovens, vacuum: take the usual care. " +
	"Local rules and licensed practice decide.\n" +
	"The parameter set is a proposal. It arms nothing and replaces no interlock. Values beyond your stated limits are refused, not clipped."

// showCautions lists the cautions of the plan, then those that always hold.
func (w *Window) showCautions() {
	var lines []string
	if w.state.Report != nil {
		for _, c := range w.state.Report.Cautions {
			lines = append(lines, c.Text)
		}
	}
	w.tell("Cautions", strings.Join(append(lines, standingCautions), "\n"))
}

// showAbout says what the program is.
func (w *Window) showAbout() {
	version := w.app.Metadata().Version
	if version == "" {
		version = "development"
	}
	w.tell("Hilltop "+version, "A planner for bosons in an optical lattice at a negative absolute temperature of their motion: "+
		"whether a planned flip bounds the energy from above, and which knob mends it where it does not.\n"+
		"BSD 3-clause licence. Colours: Paul Tol, medium-contrast set.")
}

package plan

import (
	"fmt"
	"strconv"
	"strings"
)

// MaxDepthEr is the largest lattice depth that a plan may ask for.
const MaxDepthEr = 300

// quantity is the range in which a number of the document is plausible, with the
// slips of the unit that are worth a hint.
type quantity struct {
	what, unit string
	low, high  float64
	above      bool // low itself is refused
	slips      []slip
}

// slip is a unit that users write by mistake: value*factor is in the right one.
type slip struct {
	factor float64
	name   string
}

var (
	wavelength = quantity{what: "a wavelength", unit: "nm", low: 150, high: 20_000,
		slips: []slip{{1e9, "metres"}, {1e3, "micrometres"}, {1e6, "millimetres"}, {1e-3, "picometres"}}}
	waist = quantity{what: "a waist", unit: "um", low: 0.5, high: 50_000,
		slips: []slip{{1e6, "metres"}, {1e3, "millimetres"}, {1e-3, "nanometres"}}}
	returnRatio = quantity{what: "a ratio of powers", low: 0, above: true, high: 1,
		slips: []slip{{0.01, "per cent"}}}
	depth = quantity{what: "a depth", unit: "Er", low: 0, high: MaxDepthEr}
	power = quantity{what: "a power", unit: "W", low: 0, high: 500,
		slips: []slip{{1e-3, "milliwatts"}, {1e-6, "microwatts"}}}
	field = quantity{what: "a field", unit: "G", low: 0, high: 50_000,
		slips: []slip{{1e-3, "milligauss"}}}
	gradient   = quantity{what: "a gradient", unit: "G/cm", low: -1e5, high: 1e5}
	bend       = quantity{what: "a relative curvature", unit: "1/cm^2", low: -1e5, high: 1e5}
	duration   = quantity{what: "a duration", unit: "ms", low: 0, above: true, high: 1e9}
	entropy    = quantity{what: "an entropy per atom", unit: "kB", low: 0, high: 100}
	count      = quantity{what: "a whole number of atoms", low: 1, high: 1e10}
	position   = quantity{what: "a resonance position", unit: "G", low: -50_000, high: 50_000}
	width      = quantity{what: "a resonance width other than 0", unit: "G", low: -50_000, high: 50_000}
	background = quantity{what: "a scattering length other than 0", unit: "a0", low: -1e6, high: 1e6,
		slips: []slip{{18897261246, "metres"}}}
	energy     = quantity{what: "an energy E/h", unit: "Hz", low: -1e18, high: 1e18}
	relaxation = quantity{what: "a time", unit: "s", low: 0, above: true, high: 1e18}
	bodies     = quantity{what: "a number of bodies", low: 0, above: true, high: 1e40}
	multiple   = quantity{what: "a degeneracy", low: 0, above: true, high: 1e15}
)

// holds reports whether x lies in the range.
func (q quantity) holds(x float64) bool {
	return x >= q.low && x <= q.high && !(q.above && x == q.low)
}

// wanted says what is wrong with x, which lies outside the range.
func (q quantity) wanted(x float64) string {
	span := " from " + short(q.low) + " to "
	if q.above {
		span = " above " + short(q.low) + ", up to "
	}
	text := "want " + q.what + span + short(q.high)
	if q.unit != "" {
		text += " " + q.unit
	}
	for _, s := range q.slips {
		if right := x * s.factor; q.holds(right) && right != 0 {
			return text + fmt.Sprintf("; %s looks like %s, which would be %s", short(x), s.name, short(right)+trailing(q.unit))
		}
	}
	return text
}

func trailing(unit string) string {
	if unit == "" {
		return ""
	}
	return " " + unit
}

// short writes a number with six digits for a message.
func short(x float64) string {
	return plainExponent.Replace(strconv.FormatFloat(x, 'g', 6, 64))
}

var plainExponent = strings.NewReplacer("e+0", "e", "e+", "e", "e-0", "e-")

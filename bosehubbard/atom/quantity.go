package atom

import (
	"encoding/json"
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"

	"hilltop/bosehubbard/si"
)

// quantity says how a species file writes one kind of number and between which
// bounds, in that unit, it can be true. Zero is never true where nonzero is set.
type quantity struct {
	unit      string
	scale     float64 // to the unit of the library
	low, high float64
	nonzero   bool
}

// The kinds of number in a species file. The bounds are wide: they catch a unit
// or a convention mistaken for another, such as a nuclear g factor in nuclear
// magnetons, which is 1836 times as large.
var (
	massInU        = quantity{"u", si.AtomicMassConstant, 0.5, 400, false}
	spinNumber     = quantity{"1", 1, 0.4, 20, false}
	hyperfineInMHz = quantity{"MHz", 1e6, -1e5, 1e5, true}
	electronG      = quantity{"1", 1, 1, 3, false}
	nuclearG       = quantity{"1", 1, -0.01, 0.01, false}
	wavelengthInNM = quantity{"nm", 1e-9, 50, 5000, false}
	linewidthInMHz = quantity{"MHz", 2 * math.Pi * 1e6, 0, 1e4, false} // Gamma/2 pi
	fieldInGauss   = quantity{"G", si.Gauss, -1e5, 1e5, false}
	lengthInA0     = quantity{"a0", si.BohrRadius, -1e6, 1e6, true}
)

// reader walks through a species file and gathers its mistakes and its numbers.
type reader struct {
	mistakes []error
	data     []Datum
}

func (r *reader) fail(path, format string, args ...any) {
	r.mistakes = append(r.mistakes, &DataError{Path: path, Reason: fmt.Sprintf(format, args...)})
}

// object returns the members of an object and reports keys that are not known.
func (r *reader) object(n node, known ...string) object {
	members, ok := n.value.(object)
	if !ok {
		r.fail(n.path, "%s, want an object with %s", describe(n.value), strings.Join(known, ", "))
		return nil
	}
	for _, key := range slices.Sorted(maps.Keys(members)) {
		if !slices.Contains(known, key) {
			r.fail(members[key].path, "unknown key, want one of %s", strings.Join(known, ", "))
		}
	}
	return members
}

// member returns a member that has to be there.
func (r *reader) member(parent node, members object, key string) (node, bool) {
	n, ok := members[key]
	if !ok && members != nil {
		r.fail(parent.path, "no %q", key)
	}
	return n, ok
}

func (r *reader) list(n node) []node {
	list, ok := n.value.([]node)
	if !ok {
		r.fail(n.path, "%s, want a list", describe(n.value))
	}
	return list
}

func (r *reader) text(n node) string {
	text, ok := n.value.(string)
	if text = strings.TrimSpace(text); !ok || text == "" {
		r.fail(n.path, "%s, want a text", describe(n.value))
	}
	return text
}

// number reads a bare JSON number.
func (r *reader) number(n node) float64 {
	text, ok := n.value.(json.Number)
	if !ok {
		r.fail(n.path, "%s, want a number", describe(n.value))
		return 0
	}
	x, err := text.Float64()
	if err != nil {
		r.fail(n.path, "number %s, want one that fits a 64-bit float", text)
		return 0
	}
	return x
}

// quantity reads {"value", "sigma", "unit", "source"}, keeps it as a Datum and
// returns the value in the unit of the library, 0 if there is a mistake in it.
func (r *reader) quantity(parent node, members object, key string, kind quantity) float64 {
	n, ok := r.member(parent, members, key)
	if !ok {
		return 0
	}
	parts := r.object(n, "value", "sigma", "unit", "source")
	if parts == nil {
		return 0
	}
	before := len(r.mistakes)
	datum := r.datum(n, parts, kind)
	zero := kind.nonzero && datum.Value == 0
	if len(r.mistakes) == before && (zero || !(kind.low < datum.Value && datum.Value < kind.high)) {
		r.fail(n.path, "value %g %s, want one between %g and %g that is not 0", datum.Value, kind.unit, kind.low, kind.high)
	}
	if len(r.mistakes) > before {
		return 0
	}
	r.data = append(r.data, datum)
	return datum.Value * kind.scale
}

// datum reads the parts of a number and checks each by itself.
func (r *reader) datum(n node, parts object, kind quantity) Datum {
	datum := Datum{Path: n.path, Unit: kind.unit}
	if value, ok := r.member(n, parts, "value"); ok {
		datum.Value = r.number(value)
	}
	if sigma, ok := parts["sigma"]; ok {
		datum.Sigma, datum.SigmaKnown = r.number(sigma), true
		if datum.Sigma < 0 {
			r.fail(sigma.path, "uncertainty %g, want at least 0", datum.Sigma)
		}
	}
	if unit, ok := r.member(n, parts, "unit"); ok && unit.value != kind.unit {
		r.fail(unit.path, "unit %s, want %q", describe(unit.value), kind.unit)
	}
	if source, ok := parts["source"]; ok {
		datum.Source = r.text(source)
	} else {
		r.fail(n.path, "no \"source\": every number says where it comes from")
	}
	return datum
}

func describe(value any) string {
	switch v := value.(type) {
	case object:
		return "an object"
	case []node:
		return "a list"
	case string:
		return fmt.Sprintf("%q", v)
	case nil:
		return "null"
	}
	return fmt.Sprint(value)
}

package plan

import (
	"slices"
	"strings"
)

// maxCandidates bounds the paths among which the nearest to a wrong one is sought.
const maxCandidates = 500

// references checks the keys of measured, limits and uncertainty, which are paths,
// and their values.
func (c *checker) references() {
	p := c.plan
	for _, path := range sortedKeys(p.Measured) {
		at := JoinPath("measured", path)
		c.reference(at, path, true)
		if p.Measured[path].Sigma < 0 {
			c.bad(at+"/sigma", "want a standard deviation of 0 or more")
		}
	}
	for _, path := range sortedKeys(p.Uncertainty) {
		at := JoinPath("uncertainty", path)
		c.reference(at, path, false)
		if p.Uncertainty[path] < 0 {
			c.bad(at, "want a standard deviation of 0 or more")
		}
	}
	for _, path := range sortedKeys(p.Limits) {
		at := JoinPath("limits", path)
		c.reference(at, path, false)
		c.limit(at, p.Limits[path])
	}
}

func (c *checker) limit(at string, l Limit) {
	if l.Min == nil && l.Max == nil && l.SlewPerMS == nil {
		c.bad(at, "want min, max or slew_per_ms")
	}
	if l.Min != nil && l.Max != nil && *l.Min > *l.Max {
		c.bad(at+"/max", "want at least the "+short(*l.Min)+" of min")
	}
	if l.SlewPerMS != nil && !(*l.SlewPerMS > 0) {
		c.bad(at+"/slew_per_ms", "want a slew rate above 0")
	}
}

// reference checks that path, the key at the place at, names a number of the plan,
// a knob of a stage or, without a stage, a knob of all of them. With trap, the
// signed trap frequencies of a stage are allowed too.
func (c *checker) reference(at, path string, trap bool) {
	if n := c.at(path); n != nil && n.kind == numberKind && referable(path) {
		return
	}
	if c.isKnob(path) || trap && c.isTrap(path) {
		return
	}
	c.badKey(at, path, "want the path of a number of this plan or of a knob, like /start/field_g or /field_g",
		alike(path, c.numberPaths()))
}

// badKey adds a mistake about the key of a member instead of its value.
func (c *checker) badKey(at, key, reason, nearest string) {
	c.add(&FieldError{Path: at, Value: `"` + shorten([]byte(key)) + `"`, Reason: reason, Nearest: nearest})
}

// referable tells the numbers that describe the bench from those about the plan.
func referable(path string) bool {
	tokens, _ := SplitPath(path)
	return len(tokens) > 0 && !slices.ContainsFunc(tokens, own) &&
		!slices.Contains([]string{"version", "measured", "limits", "uncertainty", "outputs"}, tokens[0])
}

// isKnob reports whether path is /KNOB, /start/KNOB, /model/KNOB or /stages/N/KNOB.
func (c *checker) isKnob(path string) bool {
	rest := c.belowStage(path)
	return slices.ContainsFunc(c.plan.Knobs(), func(knob string) bool {
		return rest == knobPath(knob) || path == knobPath(knob)
	})
}

// isTrap reports whether path is the signed trap frequency of an axis, in Hz, at
// the end of a stage: /stages/N/trap_hz/0, 1 or 2 for x, y, z.
func (c *checker) isTrap(path string) bool {
	return c.plan.Kind() == ApparatusKind &&
		slices.Contains([]string{"/trap_hz/0", "/trap_hz/1", "/trap_hz/2"}, c.belowStage(path))
}

// belowStage returns what follows an existing stage or the start in a path, or "".
func (c *checker) belowStage(path string) string {
	begin := "/start"
	if c.plan.Kind() == ModelKind {
		begin = "/model"
	}
	if rest, ok := strings.CutPrefix(path, begin); ok {
		return rest
	}
	rest, ok := strings.CutPrefix(path, "/stages/")
	if !ok {
		return ""
	}
	number, rest, _ := strings.Cut(rest, "/")
	if i, ok := listIndex(number); !ok || i >= len(c.plan.Stages) {
		return ""
	}
	return "/" + rest
}

// numberPaths returns the paths of the numbers of the plan, the first ones if
// there are many.
func (c *checker) numberPaths() []string {
	var paths []string
	var walk func(n *node, path string)
	walk = func(n *node, path string) {
		if n.kind == numberKind && referable(path) {
			paths = append(paths, path)
		}
		for i, child := range n.children {
			if len(paths) >= maxCandidates {
				return
			}
			token := itoa(i)
			if n.kind == objectKind {
				token = escape(child.key)
			}
			walk(child, path+"/"+token)
		}
	}
	walk(c.root, "")
	return paths
}

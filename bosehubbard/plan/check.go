package plan

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"
)

// checker looks for values that have the right type and make no sense.
type checker struct {
	*mistakes
	plan *Plan
	root *node
	text []byte
}

// apparatusKeys are the keys that only a plan of an apparatus has.
var apparatusKeys = []string{"cloud", "lattice", "beams", "field", "scattering", "gravity_axis", "start"}

func (c *checker) check() {
	if !c.oneKind() {
		return
	}
	c.oneOf("/aim_sign", c.plan.AimSign, Negative, Positive)
	switch c.plan.Kind() {
	case ApparatusKind:
		c.apparatus()
	case ModelKind:
		c.model()
	case LevelsKind:
		c.levels()
	}
	c.stages()
	c.references()
}

// oneKind checks that the plan has the keys of an apparatus or model or levels.
func (c *checker) oneKind() bool {
	has := func(key string) bool { return c.root.member(key) != nil }
	if !has("model") && !has("levels") {
		return c.apparatusIsWhole(has)
	}
	other := "model"
	if has("levels") {
		other = "levels"
	}
	if has("model") && has("levels") {
		c.bad("/levels", "a plan has a model or levels, and this one has both")
		return false
	}
	for _, key := range apparatusKeys {
		if has(key) {
			c.bad("/"+key, "the key belongs to an apparatus, and this plan has "+other)
		}
	}
	if has("levels") && len(c.plan.Stages) > 0 {
		c.bad("/stages", "levels have no stages")
	}
	return true
}

func (c *checker) apparatusIsWhole(has func(string) bool) bool {
	needed := []string{"cloud", "lattice", "start", "stages"}
	if !slices.ContainsFunc(needed, has) {
		c.bad("", "want an apparatus (cloud, lattice, start, stages), a model or levels")
		return false
	}
	for _, key := range needed {
		if !has(key) {
			c.bad("/"+key, "the key is missing")
		}
	}
	return true
}

// at returns the node of a path, or nil.
func (c *checker) at(path string) *node {
	tokens, err := SplitPath(path)
	if err != nil {
		return nil
	}
	n := c.root
	for _, token := range tokens {
		n = n.step(token)
	}
	return n
}

// bad adds a mistake about the value at path, if there is one.
func (c *checker) bad(path, reason string) { c.badWord(path, reason, "") }

func (c *checker) badWord(path, reason, nearest string) {
	e := &FieldError{Path: path, Reason: reason, Nearest: nearest}
	if n := c.at(path); n != nil && path != "" {
		e.Value = shorten(c.text[n.start:n.end])
	}
	c.add(e)
}

// within checks the range of a number; it reports whether it is good.
func (c *checker) within(path string, x float64, q quantity) bool {
	if q.holds(x) {
		return true
	}
	c.bad(path, q.wanted(x))
	return false
}

// optional checks the range of a number that may be absent.
func (c *checker) optional(path string, x float64, q quantity) {
	if c.at(path) != nil {
		c.within(path, x, q)
	}
}

// oneOf checks that a word is one of a few.
func (c *checker) oneOf(path, word string, known ...string) bool {
	for _, k := range known {
		if word == k {
			return true
		}
	}
	c.badWord(path, "want "+listed(known), alike(word, known))
	return false
}

// listed joins words as "a", "b" or "c".
func listed(words []string) string {
	quoted := make([]string, len(words))
	for i, w := range words {
		quoted[i] = `"` + w + `"`
	}
	if len(quoted) < 2 {
		return strings.Join(quoted, "")
	}
	last := len(quoted) - 1
	return strings.Join(quoted[:last], ", ") + " or " + quoted[last]
}

// name checks the name of a beam or a stage and that no earlier one has it.
func (c *checker) name(path, name string, earlier map[string]string) {
	const most = 64
	switch first, twice := earlier[name]; {
	case name == "":
		c.bad(path, "want a name that is not empty")
	case strings.TrimSpace(name) != name || strings.ContainsFunc(name, unicode.IsControl):
		c.bad(path, "want a name without space around it and without control characters")
	case utf8.RuneCountInString(name) > most:
		c.bad(path, "want a name of at most "+itoa(most)+" characters")
	case own(name):
		c.bad(path, "want a name that does not begin with x_, which marks keys of your own")
	case twice:
		c.bad(path, "the name is taken by "+first)
	default:
		earlier[name] = path
	}
}

// lengthIs checks the number of entries of a list.
func (c *checker) lengthIs(path string, got, want int, why string) bool {
	if got == want {
		return true
	}
	c.bad(path, itoa(got)+" entries, want "+itoa(want)+", "+why)
	return false
}

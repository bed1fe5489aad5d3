package plan

import (
	"fmt"
	"slices"
)

// editor makes one edit of a text. The plan may have mistakes.
type editor struct {
	text []byte
	root *node
	plan *Plan
}

// refuse returns the error of an edit that cannot be made.
func refuse(path, value, format string, args ...any) error {
	return Errors{{Path: path, Value: value, Reason: fmt.Sprintf(format, args...)}}
}

func (e *editor) apply(edit Edit) ([]byte, error) {
	tokens, err := SplitPath(edit.Path)
	if err != nil {
		return nil, refuse(edit.Path, "", "want a path like /stages/0/field_g, with ~0 for ~ and ~1 for /")
	}
	if edit.Value == nil {
		return e.remove(edit.Path, tokens)
	}
	value := edit.Value
	if e.find(tokens) == nil {
		if list := e.wholeList(tokens); list != nil {
			if list, err = withEntry(list, edit, tokens[len(tokens)-1]); err != nil {
				return nil, err
			}
			tokens, value = tokens[:len(tokens)-1], list
		}
	}
	return e.set(edit.Path, tokens, value)
}

// find returns the node at the tokens, or nil.
func (e *editor) find(tokens []string) *node {
	n := e.root
	for _, token := range tokens {
		n = n.step(token)
	}
	return n
}

// set replaces or creates the value at the tokens.
func (e *editor) set(path string, tokens []string, value any) ([]byte, error) {
	w := writerFor(e.text, e.root)
	parent := e.root
	for i, token := range tokens {
		next := parent.step(token)
		if next == nil {
			missing := nested(tokens[i+1:], value)
			text, err := w.encode(path, missing)
			if err != nil {
				return nil, err
			}
			return e.create(path, parent, token, w, text)
		}
		parent = next
	}
	text, err := w.encode(path, value)
	if err != nil {
		return nil, err
	}
	return splice(e.text, parent.start, parent.end, text), nil
}

// nested wraps value into one object for every token.
func nested(tokens []string, value any) any {
	for _, token := range slices.Backward(tokens) {
		value = map[string]any{token: value}
	}
	return value
}

// create adds a member or an element to the node parent.
func (e *editor) create(path string, parent *node, token string, w writer, text []byte) ([]byte, error) {
	switch parent.kind {
	case objectKind:
		member := append(w.key(token), text...)
		return insert(e.text, parent, member), nil
	case listKind:
		if i, ok := listIndex(token); ok && i == len(parent.children) || token == "-" {
			return insert(e.text, parent, text), nil
		}
		return nil, refuse(path, "", "the list has %d entries, no entry %s", len(parent.children), token)
	}
	return nil, refuse(path, "", "the path leads through %s, want an object or a list", parent.kind)
}

// insert puts a member or an element behind the last one of a container, spaced as
// that one is.
func insert(text []byte, parent *node, item []byte) []byte {
	if len(parent.children) == 0 {
		return splice(text, parent.start+1, parent.end-1, item)
	}
	last := parent.children[len(parent.children)-1]
	begin := parent.start + 1
	if len(parent.children) > 1 {
		begin = parent.children[len(parent.children)-2].end
	}
	gap := slices.Clone(text[begin:first(last)])
	gap = slices.DeleteFunc(gap, func(c byte) bool { return c == ',' })
	if len(parent.children) == 1 && !slices.Contains(gap, '\n') {
		gap = []byte(" ")
	}
	item = slices.Concat([]byte(","), gap, item)
	return splice(text, last.end, last.end, item)
}

// first returns where a member or an element begins, its key included.
func first(n *node) int {
	if n.keyEnd > 0 {
		return n.keyStart
	}
	return n.start
}

// remove takes out the value at the tokens.
func (e *editor) remove(path string, tokens []string) ([]byte, error) {
	if len(tokens) == 0 {
		return nil, refuse(path, "", "the whole document cannot be removed")
	}
	parent := e.find(tokens[:len(tokens)-1])
	token := tokens[len(tokens)-1]
	target := parent.step(token)
	if target == nil {
		return nil, refuse(path, "", "there is nothing to remove")
	}
	if text, done, err := e.removeEntry(path, tokens); done {
		return text, err
	}
	if len(parent.children) == 1 && isStagePower(tokens[:len(tokens)-1]) {
		return e.remove(path, tokens[:len(tokens)-1])
	}
	return cut(e.text, parent, slices.Index(parent.children, target)), nil
}

func isStagePower(tokens []string) bool {
	return len(tokens) == 3 && tokens[0] == "stages" && tokens[2] == "power_w"
}

// cut removes child i of a container with one of the commas beside it.
func cut(text []byte, parent *node, i int) []byte {
	child := parent.children[i]
	switch {
	case len(parent.children) == 1:
		return splice(text, parent.start+1, parent.end-1, nil)
	case i == 0:
		return splice(text, first(child), first(parent.children[1]), nil)
	}
	return splice(text, parent.children[i-1].end, child.end, nil)
}

// splice returns text with text[from:to] replaced.
func splice(text []byte, from, to int, with []byte) []byte {
	return slices.Concat(text[:from], with, text[to:])
}

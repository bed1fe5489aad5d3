package plan

import (
	"encoding/json"
	"slices"
)

// Document is the text of a valid plan. It never changes; an edit returns a new
// Document, whose text differs only where the edit is: order, spacing, numbers
// and keys that begin with x_ stay byte for byte as the user wrote them.
//
// Paths are RFC 6901 pointers into the text.
type Document struct {
	text []byte
	root *node
	plan *Plan
}

// Edit is one change of a document.
type Edit struct {
	Path  string
	Value any // whatever encoding/json can write; nil removes the value
}

// Open checks the text of a plan. It keeps a copy of data.
//
// It returns the errors of [Parse].
func Open(data []byte) (*Document, error) {
	text := slices.Clone(data)
	p, root, err := read(text)
	if err != nil {
		return nil, err
	}
	return &Document{text: text, root: root, plan: p}, nil
}

// Bytes returns a copy of the text.
func (d *Document) Bytes() []byte { return slices.Clone(d.text) }

// Plan returns the plan. It belongs to the document and must not be changed.
func (d *Document) Plan() *Plan { return d.plan }

// Value returns the text of the value at path, and whether there is one.
func (d *Document) Value(path string) (json.RawMessage, bool) {
	tokens, err := SplitPath(path)
	if err != nil {
		return nil, false
	}
	n := d.root
	for _, token := range tokens {
		n = n.step(token)
	}
	if n == nil {
		return nil, false
	}
	return slices.Clone(d.text[n.start:n.end]), true
}

// With returns the document with one value replaced, created or, if value is nil,
// removed; see [Document.Apply].
func (d *Document) With(path string, value any) (*Document, error) {
	return d.Apply(Edit{Path: path, Value: value})
}

// Apply returns the document after several edits, which are made in order and
// checked together at the end: they may only make sense jointly.
//
// A missing member is created at the end of its object, missing objects on the way
// to it too. An index equal to the length of a list, or "-", appends. An entry of a
// list that is not there yet (/stages/2/depth_er/0, /model/curvature_hz/0), or is
// one number for all axes (waist_um, tunnelling_hz), is created with the whole
// list: the other entries keep the values in force. Removing an entry of such a
// list in a stage gives it the value in force before the stage; a list that then
// changes nothing is dropped, and so is a power_w that becomes empty.
//
// It returns Errors, with d as it was, if a path leads nowhere, a value cannot be
// written as JSON, or the result is no valid plan. Cost linear in the text.
func (d *Document) Apply(edits ...Edit) (*Document, error) {
	text, root, p := d.text, d.root, d.plan
	for i, edit := range edits {
		e := &editor{text: text, root: root, plan: p}
		next, err := e.apply(edit)
		if err != nil {
			return nil, err
		}
		text = next
		if i == len(edits)-1 {
			break
		}
		if p, root, err = read(text); root == nil {
			return nil, err
		}
	}
	return Open(text)
}

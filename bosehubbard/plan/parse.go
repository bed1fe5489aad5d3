package plan

import (
	"bytes"
	"reflect"
	"sort"
	"unicode/utf8"
)

// MaxBytes is the size of the largest plan that is read.
const MaxBytes = 16_000_000

var byteOrderMark = []byte("\ufeff")

// Parse reads a plan document and checks it. A byte-order mark is tolerated.
// Every number of the plan is finite.
//
// It returns a *SizeError, a *SyntaxError, or Errors with all mistakes at once; a
// document of another format or of a newer version is refused by that alone.
func Parse(data []byte) (*Plan, error) {
	p, _, err := read(data)
	if err != nil {
		return nil, err
	}
	return p, nil
}

// read parses and checks a document. The plan and the tree it returns with Errors
// hold what could be read.
func read(data []byte) (*Plan, *node, error) {
	root, err := tree(data)
	if err != nil {
		return nil, nil, err
	}
	d := &decoder{text: data}
	p := &Plan{}
	if d.head(root); len(d.found) > 0 {
		return p, root, d.found
	}
	d.value(root, "", reflect.ValueOf(p).Elem())
	p.fillDefaults(root)
	c := &checker{mistakes: &d.mistakes, plan: p, root: root, text: data}
	c.check()
	if len(d.found) > 0 {
		return p, root, d.inOrder(root)
	}
	return p, root, nil
}

// tree checks size and encoding and scans the text. Offsets count from the
// beginning of data, a byte-order mark included.
func tree(data []byte) (*node, error) {
	if len(data) > MaxBytes {
		return nil, &SizeError{Bytes: int64(len(data)), Limit: MaxBytes}
	}
	if bytes.HasPrefix(data, []byte{0xff, 0xfe}) || bytes.HasPrefix(data, []byte{0xfe, 0xff}) {
		return nil, &SyntaxError{Line: 1, Column: 1, Reason: "the text is UTF-16, want UTF-8"}
	}
	if !utf8.Valid(data) {
		at := 0
		for r, n := utf8.DecodeRune(data); r != utf8.RuneError || n != 1; r, n = utf8.DecodeRune(data[at:]) {
			at += n
		}
		line, column := place(data, at)
		return nil, &SyntaxError{Line: line, Column: column, Reason: "the text is not UTF-8"}
	}
	return scan(data)
}

// head checks what must be right before anything else has a meaning.
func (d *decoder) head(root *node) {
	if root.kind != objectKind {
		d.wrongType(root, "", "an object")
		return
	}
	format, version := root.member("format"), root.member("version")
	if format == nil {
		d.add(&FieldError{Path: "/format", Reason: `the key is missing, want "` + Format + `"`})
		return
	}
	if format.kind != textKind || textOf(d.text, format) != Format {
		d.add(&FieldError{Path: "/format", Value: d.shown(format), Reason: `want "` + Format + `"`})
		return
	}
	if version == nil {
		return
	}
	probe := decoder{text: d.text}
	var n int
	probe.number(version, "/version", reflect.ValueOf(&n).Elem())
	switch d.found = probe.found; {
	case len(d.found) > 0:
	case n > Version:
		d.add(&FieldError{Path: "/version", Value: d.shown(version),
			Reason: "version " + itoa(n) + " is newer than this program, which reads versions up to " + itoa(Version)})
	case n < 1:
		d.add(&FieldError{Path: "/version", Value: d.shown(version), Reason: "want a version from 1 to " + itoa(Version)})
	}
}

// fillDefaults gives absent optional keys their values.
func (p *Plan) fillDefaults(root *node) {
	setDefault := func(key string, value *string, word string) {
		if root.member(key) == nil {
			*value = word
		}
	}
	setDefault("aim_sign", &p.AimSign, Negative)
	if p.Kind() != ApparatusKind {
		return
	}
	setDefault("gravity_axis", &p.GravityAxis, "z")
	if p.Field == nil {
		p.Field = &Field{Axis: "z"}
	}
	if p.Lattice == nil {
		return
	}
	for i := range p.Lattice.Axes {
		axis := root.member("lattice").member("axes").step(itoa(i))
		if axis.member("return_ratio") == nil {
			p.Lattice.Axes[i].ReturnRatio = 1
		}
	}
}

// inOrder sorts the mistakes by their place in the text; a missing key stands
// where its object begins.
func (d *decoder) inOrder(root *node) Errors {
	offset := func(path string) int {
		tokens, _ := SplitPath(path)
		at := root
		for _, token := range tokens {
			next := at.step(token)
			if next == nil {
				break
			}
			at = next
		}
		return at.start
	}
	sort.SliceStable(d.found, func(i, j int) bool { return offset(d.found[i].Path) < offset(d.found[j].Path) })
	return d.found
}

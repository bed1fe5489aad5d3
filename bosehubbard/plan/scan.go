package plan

import (
	"bytes"
	"encoding/json"
	"fmt"
	"unicode/utf8"
)

// Limits of a text, against nesting bombs and texts of nothing but commas.
const (
	maxDepth  = 100
	maxValues = 1_000_000
)

type kind uint8

const (
	nullKind kind = iota
	boolKind
	numberKind
	textKind
	listKind
	objectKind
)

func (k kind) String() string {
	return [...]string{"null", "true or false", "a number", "a string", "a list", "an object"}[k]
}

// node is one value of a JSON text with its place: text[start:end] is the value
// and, for a member of an object, text[keyStart:keyEnd] its key in quotes.
type node struct {
	kind             kind
	start, end       int
	keyStart, keyEnd int
	key              string
	children         []*node // members or elements, in the order of the text
}

// member returns the last member of an object with the key, or nil.
func (n *node) member(key string) *node {
	if n == nil || n.kind != objectKind {
		return nil
	}
	for i := len(n.children) - 1; i >= 0; i-- {
		if n.children[i].key == key {
			return n.children[i]
		}
	}
	return nil
}

// step returns the member or the element that a path token names, or nil.
func (n *node) step(token string) *node {
	if n == nil {
		return nil
	}
	if n.kind == listKind {
		if i, ok := listIndex(token); ok && i < len(n.children) {
			return n.children[i]
		}
		return nil
	}
	return n.member(token)
}

// scan reads a JSON text into its tree. The text must be valid UTF-8.
//
// It returns a *SyntaxError at the first place where the text stops being JSON.
func scan(text []byte) (*node, error) {
	s := &scanner{text: text}
	if bytes.HasPrefix(text, byteOrderMark) {
		s.pos = len(byteOrderMark)
	}
	root, err := s.value()
	if err != nil {
		return nil, err
	}
	s.space()
	if s.pos < len(text) {
		return nil, s.fail(s.pos, "%s after the end of the plan", s.found())
	}
	return root, nil
}

type scanner struct {
	text   []byte
	pos    int
	values int
	open   []int // where the unfinished lists and objects begin
}

func (s *scanner) fail(at int, format string, args ...any) *SyntaxError {
	line, column := place(s.text, at)
	return &SyntaxError{Line: line, Column: column, Reason: fmt.Sprintf(format, args...)}
}

// place returns line and column, from 1, of a byte of the text; a byte-order mark
// takes no column.
func place(text []byte, at int) (line, column int) {
	before := bytes.TrimPrefix(text[:at], byteOrderMark)
	begin := bytes.LastIndexByte(before, '\n') + 1
	return bytes.Count(before, []byte{'\n'}) + 1, utf8.RuneCount(before[begin:]) + 1
}

func (s *scanner) space() {
	for s.pos < len(s.text) {
		switch s.text[s.pos] {
		case ' ', '\t', '\n', '\r':
			s.pos++
		default:
			return
		}
	}
}

// found names what stands at the present place.
func (s *scanner) found() string {
	rest := s.text[s.pos:]
	word := 0
	for word < len(rest) && word < 20 && letter(rest[word]) {
		word++
	}
	if word > 1 {
		return fmt.Sprintf("found %s", rest[:word])
	}
	r, _ := utf8.DecodeRune(rest)
	return fmt.Sprintf("found %q", r)
}

func letter(c byte) bool { return c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c >= '0' && c <= '9' }

// want returns the error for a place where something else was expected.
func (s *scanner) want(what string) *SyntaxError {
	if s.pos < len(s.text) {
		return s.fail(s.pos, "%s, want %s", s.found(), what)
	}
	if len(s.open) == 0 {
		return s.fail(s.pos, "the text is empty, want %s", what)
	}
	begin := s.open[len(s.open)-1]
	line, column := place(s.text, begin)
	name := "object"
	if s.text[begin] == '[' {
		name = "list"
	}
	return s.fail(s.pos, "the text ends inside the %s that begins at line %d, column %d", name, line, column)
}

func (s *scanner) value() (*node, error) {
	s.space()
	if s.values++; s.values > maxValues {
		return nil, s.fail(s.pos, "more than %d values", maxValues)
	}
	if s.pos == len(s.text) {
		return nil, s.want("a JSON object")
	}
	switch c := s.text[s.pos]; {
	case c == '{' || c == '[':
		return s.container()
	case c == '"':
		return s.string()
	case c == '-' || c >= '0' && c <= '9':
		return s.number()
	}
	for _, w := range [...]struct {
		text string
		kind kind
	}{{"true", boolKind}, {"false", boolKind}, {"null", nullKind}} {
		end := s.pos + len(w.text)
		if bytes.HasPrefix(s.text[s.pos:], []byte(w.text)) && (end == len(s.text) || !letter(s.text[end])) {
			n := &node{kind: w.kind, start: s.pos, end: end}
			s.pos = end
			return n, nil
		}
	}
	return nil, s.want("a value")
}

// container reads a list or an object.
func (s *scanner) container() (*node, error) {
	n := &node{kind: objectKind, start: s.pos}
	closing, end := byte('}'), "',' or '}'"
	if s.text[s.pos] == '[' {
		n.kind, closing, end = listKind, ']', "',' or ']'"
	}
	if len(s.open) == maxDepth {
		return nil, s.fail(s.pos, "more than %d lists and objects inside one another", maxDepth)
	}
	s.open = append(s.open, s.pos)
	s.pos++
	for s.space(); ; s.space() {
		if s.at(closing) && len(n.children) == 0 {
			break
		}
		child, err := s.child(n.kind)
		if err != nil {
			return nil, err
		}
		n.children = append(n.children, child)
		s.space()
		if s.at(closing) {
			break
		}
		if !s.at(',') {
			return nil, s.want(end)
		}
		s.pos++
	}
	s.pos++
	s.open = s.open[:len(s.open)-1]
	n.end = s.pos
	return n, nil
}

func (s *scanner) at(c byte) bool { return s.pos < len(s.text) && s.text[s.pos] == c }

// child reads an element of a list or a member of an object.
func (s *scanner) child(parent kind) (*node, error) {
	if parent == listKind {
		if s.pos == len(s.text) {
			return nil, s.want("a value")
		}
		return s.value()
	}
	if !s.at('"') {
		return nil, s.want("a key in double quotes")
	}
	key, err := s.string()
	if err != nil {
		return nil, err
	}
	s.space()
	if !s.at(':') {
		return nil, s.want("':'")
	}
	s.pos++
	if s.space(); s.pos == len(s.text) {
		return nil, s.want("a value")
	}
	n, err := s.value()
	if err != nil {
		return nil, err
	}
	n.keyStart, n.keyEnd = key.start, key.end
	n.key = textOf(s.text, key)
	return n, nil
}

// string reads a text in double quotes; its escapes are checked by encoding/json.
func (s *scanner) string() (*node, error) {
	n := &node{kind: textKind, start: s.pos}
	for i := s.pos + 1; i < len(s.text); i++ {
		switch c := s.text[i]; {
		case c == '\\':
			i++
		case c < 0x20:
			return nil, s.fail(i, "found %q inside a string that begins at column %d, want it closed or escaped", c, s.column())
		case c == '"':
			n.end = i + 1
			if !json.Valid(s.text[n.start:n.end]) {
				return nil, s.fail(s.pos, "a string with a backslash that JSON does not know")
			}
			s.pos = n.end
			return n, nil
		}
	}
	return nil, s.fail(len(s.text), "the text ends inside a string that begins at %s", s.where())
}

func (s *scanner) column() int {
	_, column := place(s.text, s.pos)
	return column
}

func (s *scanner) where() string {
	line, column := place(s.text, s.pos)
	return fmt.Sprintf("line %d, column %d", line, column)
}

// number reads a number; its grammar is checked by encoding/json.
func (s *scanner) number() (*node, error) {
	end := s.pos
	for end < len(s.text) && (letter(s.text[end]) || bytes.IndexByte([]byte("+-."), s.text[end]) >= 0) {
		end++
	}
	n := &node{kind: numberKind, start: s.pos, end: end}
	if !json.Valid(s.text[n.start:n.end]) {
		return nil, s.fail(s.pos, "found %s, want a number like -1.5e3", shorten(s.text[n.start:n.end]))
	}
	s.pos = end
	return n, nil
}

// textOf returns the characters of a string value.
func textOf(text []byte, n *node) string {
	inner := text[n.start+1 : n.end-1]
	if bytes.IndexByte(inner, '\\') < 0 {
		return string(inner)
	}
	var out string
	if json.Unmarshal(text[n.start:n.end], &out) != nil {
		return string(inner) // the scanner has refused such strings
	}
	return out
}

// shorten returns the beginning of a value for a message.
func shorten(value []byte) string {
	const most = 60
	if len(value) <= most {
		return string(value)
	}
	cut := most
	for cut > 0 && !utf8.RuneStart(value[cut]) {
		cut--
	}
	return string(value[:cut]) + "..."
}

package plan

import (
	"fmt"
	"strings"
)

// maxMistakes bounds the length of [Errors], so that a hostile file cannot fill
// the memory with complaints.
const maxMistakes = 1000

// FieldError is one mistake in a plan.
type FieldError struct {
	Path    string `json:"path"`    // RFC 6901; "" is the whole document
	Value   string `json:"value"`   // as written, shortened; "" if the key is missing
	Reason  string `json:"reason"`  // what is wanted
	Nearest string `json:"nearest"` // the known word nearest to a misspelt one, or ""
}

// Error returns path, value, reason and the nearest known word in one line.
func (e *FieldError) Error() string {
	parts := []string{e.Path}
	if e.Path == "" {
		parts[0] = "document"
	}
	if e.Value != "" {
		parts = append(parts, e.Value)
	}
	text := strings.Join(append(parts, e.Reason), ": ")
	if e.Nearest != "" {
		text += fmt.Sprintf("; the nearest known one is %q", e.Nearest)
	}
	return text
}

// Errors are all mistakes of a plan, in the order of the document.
type Errors []*FieldError

// Error returns one line per mistake.
func (e Errors) Error() string {
	if len(e) == 1 {
		return "plan: " + e[0].Error()
	}
	var text strings.Builder
	fmt.Fprintf(&text, "plan: %d mistakes:", len(e))
	for _, one := range e {
		text.WriteString("\n  " + one.Error())
	}
	return text.String()
}

// Unwrap returns the mistakes for errors.As.
func (e Errors) Unwrap() []error {
	out := make([]error, len(e))
	for i, one := range e {
		out[i] = one
	}
	return out
}

// SyntaxError says where a text stops being JSON.
type SyntaxError struct {
	Line, Column int // from 1; columns count characters
	Reason       string
}

// Error returns the place and the reason.
func (e *SyntaxError) Error() string {
	return fmt.Sprintf("plan: line %d, column %d: %s", e.Line, e.Column, e.Reason)
}

// SizeError says that a plan is larger than this program reads.
type SizeError struct{ Bytes, Limit int64 }

// Error returns both sizes.
func (e *SizeError) Error() string {
	return fmt.Sprintf("plan: %s, want at most %s", megabytes(e.Bytes), megabytes(e.Limit))
}

func megabytes(n int64) string { return fmt.Sprintf("%.4g MB (%d bytes)", float64(n)/1e6, n) }

// mistakes collects field errors, the first for every path: a value that is
// already known to be wrong, or lies in one that is, needs no second complaint.
type mistakes struct {
	found Errors
	seen  map[string]bool
}

func (m *mistakes) add(e *FieldError) {
	if m.full() || m.wrong(e.Path) {
		return
	}
	if len(m.found) == maxMistakes {
		e = &FieldError{Reason: fmt.Sprintf("more than %d mistakes; the others are left out", maxMistakes)}
	}
	if m.seen == nil {
		m.seen = map[string]bool{}
	}
	m.seen[e.Path] = true
	m.found = append(m.found, e)
}

// full reports whether no more mistakes are collected.
func (m *mistakes) full() bool { return len(m.found) > maxMistakes }

// wrong reports whether path, or a value that contains it, has a mistake.
func (m *mistakes) wrong(path string) bool {
	for path != "" {
		if m.seen[path] {
			return true
		}
		path = path[:strings.LastIndexByte(path, '/')]
	}
	return false
}

// wrongInside reports whether path or anything in it or around it has a mistake.
func (m *mistakes) wrongInside(path string) bool {
	for seen := range m.seen {
		if seen == path || strings.HasPrefix(seen, path+"/") {
			return true
		}
	}
	return m.wrong(path)
}

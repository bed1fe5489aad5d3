package plan

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
)

// writer writes values the way the rest of the document is written, on one line.
type writer struct {
	colon, comma string
}

// writerFor looks at the first member of a text for the spacing.
func writerFor(text []byte, root *node) writer {
	if root.kind == objectKind && len(root.children) > 0 {
		first := root.children[0]
		if !bytes.ContainsAny(text[first.keyEnd:first.start], " \t\n\r") {
			return writer{colon: ":", comma: ","}
		}
	}
	return writer{colon: ": ", comma: ", "}
}

// encode returns the JSON text of a value; numbers have the fewest digits that
// read back as the same number.
//
// It returns Errors if the value cannot be written: NaN, infinities, channels.
func (w writer) encode(path string, value any) ([]byte, error) {
	var out bytes.Buffer
	encoder := json.NewEncoder(&out)
	encoder.SetEscapeHTML(false)
	if err := encoder.Encode(value); err != nil {
		var unsupported *json.UnsupportedValueError
		if errors.As(err, &unsupported) {
			return nil, refuse(path, unsupported.Str, "want a finite number")
		}
		return nil, refuse(path, shorten(fmt.Append(nil, value)), "the value cannot be written as JSON: %v", err)
	}
	text := bytes.TrimSpace(out.Bytes())
	root, err := scan(text)
	if err != nil {
		return nil, refuse(path, shorten(text), "the value is too large for a plan: %v", err)
	}
	return w.node(nil, text, root), nil
}

// key returns a key in quotes with its colon.
func (w writer) key(key string) []byte {
	quoted, err := w.encode("", key)
	if err != nil {
		panic("plan: a string that cannot be quoted: " + err.Error())
	}
	return append(quoted, w.colon...)
}

// node appends a value with this document's spacing.
func (w writer) node(dst, text []byte, n *node) []byte {
	if n.kind != listKind && n.kind != objectKind {
		return append(dst, text[n.start:n.end]...)
	}
	dst = append(dst, text[n.start])
	for i, child := range n.children {
		if i > 0 {
			dst = append(dst, w.comma...)
		}
		if n.kind == objectKind {
			dst = append(append(dst, text[child.keyStart:child.keyEnd]...), w.colon...)
		}
		dst = w.node(dst, text, child)
	}
	return append(dst, text[n.end-1])
}

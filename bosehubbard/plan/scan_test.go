package plan

import (
	"encoding/json"
	"reflect"
	"testing"
)

// value turns a tree into what encoding/json makes of the text.
func (n *node) value(text []byte) any {
	switch n.kind {
	case listKind:
		out := make([]any, len(n.children))
		for i, child := range n.children {
			out[i] = child.value(text)
		}
		return out
	case objectKind:
		out := make(map[string]any, len(n.children))
		for _, child := range n.children {
			out[child.key] = child.value(text)
		}
		return out
	}
	var out any
	if err := json.Unmarshal(text[n.start:n.end], &out); err != nil {
		return err
	}
	return out
}

// FuzzScan compares the scanner with encoding/json: both accept the same texts and
// read the same values.
func FuzzScan(f *testing.F) {
	for _, text := range []string{good, goodModel, goodLevels, `[]`, `{"a":[1,-0,2.5e-3,"é\n",true,null]} `, `{"a":1,}`,
		`"\ud83d\ude00"`, `01`, `1e`, `-`, `[1 2]`, `nul`, `{"a":{"b":[{}]}}`, `1e400`} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		root, err := tree(text)
		if err != nil {
			if json.Valid(text) && !overLimits(err) {
				t.Fatalf("%q: %v", text, err)
			}
			return
		}
		var want any
		if err := json.Unmarshal(cutMark(text), &want); err != nil {
			if _, overflow := err.(*json.UnmarshalTypeError); overflow {
				return
			}
			t.Fatalf("%q: accepted, and encoding/json says %v", text, err)
		}
		if got := root.value(text); !reflect.DeepEqual(got, want) {
			t.Fatalf("%q: got %v, want %v", text, got, want)
		}
	})
}

func cutMark(text []byte) []byte {
	if len(text) > 3 && string(text[:3]) == string(byteOrderMark) {
		return text[3:]
	}
	return text
}

// overLimits reports whether a text was refused for more than its syntax.
func overLimits(err error) bool {
	e, ok := err.(*SyntaxError)
	return ok && (e.Reason == "the text is not UTF-8" || e.Reason == "more than 100 lists and objects inside one another")
}

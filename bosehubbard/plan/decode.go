package plan

import (
	"encoding/json"
	"math"
	"reflect"
	"strconv"
	"strings"
)

// decoder fills Go values from a syntax tree. It goes on after a mistake, so that
// one pass finds all of them.
type decoder struct {
	text []byte
	mistakes
}

var (
	oneOrManyType = reflect.TypeFor[OneOrMany]()
	rawType       = reflect.TypeFor[json.RawMessage]()
)

// own reports whether a key is the user's own.
func own(key string) bool { return strings.HasPrefix(key, "x_") }

func (d *decoder) shown(n *node) string { return shorten(d.text[n.start:n.end]) }

func (d *decoder) wrongType(n *node, path, want string) {
	reason := "found " + n.kind.String() + ", want " + want
	if n.kind == nullKind {
		reason += "; leave out a key that has no value"
	}
	if n.kind == textKind && strings.Contains(want, "number") {
		if _, err := strconv.ParseFloat(strings.TrimSpace(textOf(d.text, n)), 64); err == nil {
			reason += " without quotes"
		}
	}
	d.add(&FieldError{Path: path, Value: d.shown(n), Reason: reason})
}

// value fills dst from n.
func (d *decoder) value(n *node, path string, dst reflect.Value) {
	switch dst.Type() {
	case oneOrManyType:
		d.oneOrMany(n, path, dst)
		return
	case rawType:
		d.raw(n, path, dst)
		return
	}
	switch dst.Kind() {
	case reflect.Pointer:
		dst.Set(reflect.New(dst.Type().Elem()))
		d.value(n, path, dst.Elem())
	case reflect.Struct:
		d.object(n, path, dst)
	case reflect.Map:
		d.table(n, path, dst)
	case reflect.Slice:
		d.list(n, path, dst)
	case reflect.String:
		if d.is(n, path, textKind) {
			dst.SetString(textOf(d.text, n))
		}
	case reflect.Bool:
		if d.is(n, path, boolKind) {
			dst.SetBool(d.text[n.start] == 't')
		}
	default:
		d.number(n, path, dst)
	}
}

func (d *decoder) is(n *node, path string, want kind) bool {
	if n.kind != want {
		d.wrongType(n, path, want.String())
	}
	return n.kind == want
}

// number fills a float64 or an int.
func (d *decoder) number(n *node, path string, dst reflect.Value) {
	whole := dst.CanInt()
	want := "a number"
	if whole {
		want = "a whole number"
	}
	if n.kind != numberKind {
		d.wrongType(n, path, want)
		return
	}
	x, err := strconv.ParseFloat(string(d.text[n.start:n.end]), 64)
	switch {
	case err != nil || math.IsInf(x, 0):
		d.add(&FieldError{Path: path, Value: d.shown(n), Reason: "the number overflows, want at most 1.8e308 in size"})
	case whole && (x != math.Trunc(x) || math.Abs(x) > 1<<53):
		d.add(&FieldError{Path: path, Value: d.shown(n), Reason: "want a whole number"})
	case whole:
		dst.SetInt(int64(x))
	default:
		dst.SetFloat(x)
	}
}

func (d *decoder) oneOrMany(n *node, path string, dst reflect.Value) {
	var out OneOrMany
	switch n.kind {
	case numberKind:
		out = OneOrMany{Values: []float64{0}, Single: true}
		d.number(n, path, reflect.ValueOf(&out.Values[0]).Elem())
	case listKind:
		d.list(n, path, reflect.ValueOf(&out.Values).Elem())
	default:
		d.wrongType(n, path, "a number or a list of numbers")
	}
	dst.Set(reflect.ValueOf(out))
}

// list fills a slice; an empty list gives an empty slice, not nil.
func (d *decoder) list(n *node, path string, dst reflect.Value) {
	if !d.is(n, path, listKind) {
		return
	}
	dst.Set(reflect.MakeSlice(dst.Type(), len(n.children), len(n.children)))
	for i, child := range n.children {
		d.value(child, path+"/"+itoa(i), dst.Index(i))
	}
}

// table fills a map by string from an object whose keys are free.
func (d *decoder) table(n *node, path string, dst reflect.Value) {
	if !d.is(n, path, objectKind) {
		return
	}
	d.duplicates(n, path)
	dst.Set(reflect.MakeMap(dst.Type()))
	for _, child := range n.children {
		if own(child.key) {
			continue
		}
		element := reflect.New(dst.Type().Elem()).Elem()
		d.value(child, path+"/"+escape(child.key), element)
		dst.SetMapIndex(reflect.ValueOf(child.key), element)
	}
}

// object fills a struct by its json tags; a key without omitempty is required.
func (d *decoder) object(n *node, path string, dst reflect.Value) {
	if !d.is(n, path, objectKind) {
		return
	}
	d.duplicates(n, path)
	fields := fieldsOf(dst.Type())
	for _, child := range n.children {
		if own(child.key) {
			continue
		}
		at := path + "/" + escape(child.key)
		i := fields.index(child.key)
		if i < 0 && d.full() {
			continue
		}
		if i < 0 {
			d.add(&FieldError{Path: at, Value: shorten([]byte(strconv.Quote(child.key))),
				Reason: "unknown key", Nearest: nearest(child.key, fields.names())})
			continue
		}
		d.value(child, at, dst.Field(fields[i].place))
	}
	for _, field := range fields {
		if field.required && n.member(field.name) == nil {
			d.add(&FieldError{Path: path + "/" + field.name, Reason: "the key is missing"})
		}
	}
}

// duplicates complains about every key that an object has twice.
func (d *decoder) duplicates(n *node, path string) {
	seen := make(map[string]*node, len(n.children))
	for _, child := range n.children {
		if first := seen[child.key]; first != nil {
			line, _ := place(d.text, first.keyStart)
			again, _ := place(d.text, child.keyStart)
			d.add(&FieldError{Path: path + "/" + escape(child.key), Value: d.shown(child),
				Reason: "the key stands twice, in line " + itoa(line) + " and in line " + itoa(again)})
			continue
		}
		seen[child.key] = child
	}
}

// raw keeps the text of an object as it is.
func (d *decoder) raw(n *node, path string, dst reflect.Value) {
	if !d.is(n, path, objectKind) {
		return
	}
	d.duplicatesWithin(n, path)
	dst.SetBytes(append([]byte(nil), d.text[n.start:n.end]...))
}

func (d *decoder) duplicatesWithin(n *node, path string) {
	if n.kind == objectKind {
		d.duplicates(n, path)
	}
	for i, child := range n.children {
		token := itoa(i)
		if n.kind == objectKind {
			if token = escape(child.key); own(child.key) {
				continue
			}
		}
		d.duplicatesWithin(child, path+"/"+token)
	}
}

// fieldList are the keys that a struct knows.
type fieldList []struct {
	name     string
	required bool
	place    int
}

func fieldsOf(t reflect.Type) fieldList {
	list := make(fieldList, t.NumField())
	for i := range list {
		name, options, _ := strings.Cut(t.Field(i).Tag.Get("json"), ",")
		list[i].name, list[i].required, list[i].place = name, options != "omitempty", i
	}
	return list
}

func (l fieldList) index(name string) int {
	for i := range l {
		if l[i].name == name {
			return i
		}
	}
	return -1
}

func (l fieldList) names() []string {
	out := make([]string, len(l))
	for i := range l {
		out[i] = l[i].name
	}
	return out
}

package atom

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
)

// DataError is one mistake in a species file.
type DataError struct {
	Path   string // RFC 6901, "" for the whole document
	Reason string
}

// Error gives the place and what is wrong there.
func (e *DataError) Error() string {
	if e.Path == "" {
		return "atom: species file: " + e.Reason
	}
	return "atom: species file: " + e.Path + ": " + e.Reason
}

// node is one value of a JSON document with the path that leads to it: an
// object, a []node, a string, a json.Number, a bool or nil.
type node struct {
	path  string
	value any
}

type object map[string]node

// deepest is more than a species file needs, and bounds the recursion.
const deepest = 10

var errTooDeep = errors.New("nested too deeply for a species file")

// parseDocument reads one JSON value and nothing after it. A key that stands
// twice in an object is a mistake, as one of the two would be lost.
func parseDocument(data []byte) (node, error) {
	decoder := json.NewDecoder(bytes.NewReader(data))
	decoder.UseNumber()
	root, err := parseValue(decoder, "", 0)
	if err != nil {
		if _, ok := errors.AsType[*DataError](err); ok {
			return node{}, err
		}
		if errors.Is(err, io.EOF) {
			err = io.ErrUnexpectedEOF
		}
		return node{}, &DataError{Reason: fmt.Sprintf("not JSON at byte %d: %v", decoder.InputOffset(), err)}
	}
	if _, err := decoder.Token(); !errors.Is(err, io.EOF) {
		return node{}, &DataError{Reason: fmt.Sprintf("more text after the document at byte %d", decoder.InputOffset())}
	}
	return root, nil
}

func parseValue(decoder *json.Decoder, path string, depth int) (node, error) {
	token, err := decoder.Token()
	if err != nil {
		return node{}, err
	}
	delimiter, ok := token.(json.Delim)
	switch {
	case !ok:
		return node{path, token}, nil
	case depth == deepest:
		return node{}, errTooDeep
	case delimiter == '{':
		return parseObject(decoder, path, depth)
	}
	return parseList(decoder, path, depth)
}

func parseObject(decoder *json.Decoder, path string, depth int) (node, error) {
	members := object{}
	for decoder.More() {
		token, err := decoder.Token()
		if err != nil {
			return node{}, err
		}
		key := token.(string) // the decoder lets nothing else stand there
		place := path + "/" + escape(key)
		if _, twice := members[key]; twice {
			return node{}, &DataError{Path: place, Reason: "key stands twice"}
		}
		if members[key], err = parseValue(decoder, place, depth+1); err != nil {
			return node{}, err
		}
	}
	_, err := decoder.Token()
	return node{path, members}, err
}

func parseList(decoder *json.Decoder, path string, depth int) (node, error) {
	list := []node{}
	for decoder.More() {
		item, err := parseValue(decoder, path+"/"+strconv.Itoa(len(list)), depth+1)
		if err != nil {
			return node{}, err
		}
		list = append(list, item)
	}
	_, err := decoder.Token()
	return node{path, list}, err
}

// escapes are those of RFC 6901.
var escapes = strings.NewReplacer("~", "~0", "/", "~1")

// escape writes a key as one step of an RFC 6901 path.
func escape(key string) string { return escapes.Replace(key) }

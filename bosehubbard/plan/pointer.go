package plan

import (
	"fmt"
	"strconv"
	"strings"
)

// JoinPath returns the RFC 6901 path of the given keys and indices.
func JoinPath(tokens ...string) string {
	var path strings.Builder
	for _, token := range tokens {
		path.WriteByte('/')
		path.WriteString(escape(token))
	}
	return path.String()
}

// SplitPath returns the keys and indices of an RFC 6901 path; "" has none.
//
// It returns an error if a path that is not empty does not begin with "/" or has
// a "~" that is followed by neither 0 nor 1.
func SplitPath(path string) ([]string, error) {
	if path == "" {
		return nil, nil
	}
	if path[0] != '/' {
		return nil, fmt.Errorf("plan: path %q, want one that begins with /", path)
	}
	tokens := strings.Split(path[1:], "/")
	for i, token := range tokens {
		plain := withoutEscapes.Replace(token)
		if strings.Contains(plain, "~") {
			return nil, fmt.Errorf("plan: path %q, want ~0 for ~ and ~1 for /", path)
		}
		tokens[i] = unescape(token)
	}
	return tokens, nil
}

// The replacers are made once: paths are built at every knob move.
var (
	escapes        = strings.NewReplacer("~", "~0", "/", "~1")
	unescapes      = strings.NewReplacer("~0", "~", "~1", "/")
	withoutEscapes = strings.NewReplacer("~0", "", "~1", "")
)

func escape(token string) string { return escapes.Replace(token) }

func unescape(token string) string { return unescapes.Replace(token) }

// listIndex reads an array index of RFC 6901: digits without a leading zero.
func listIndex(token string) (int, bool) {
	if len(token) > 9 || token == "" || len(token) > 1 && token[0] == '0' || token[0] == '+' || token[0] == '-' {
		return 0, false
	}
	i, err := strconv.Atoi(token)
	return i, err == nil
}

func itoa(i int) string { return strconv.Itoa(i) }

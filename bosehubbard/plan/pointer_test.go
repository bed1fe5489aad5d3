package plan

import (
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// TestPathsOfRFC6901 are the examples of RFC 6901, section 5, that are objects.
func TestPathsOfRFC6901(t *testing.T) {
	for _, tc := range []struct {
		path   string
		tokens []string
	}{
		{"", nil}, {"/", []string{""}}, {"/foo/0", []string{"foo", "0"}}, {"/a~1b", []string{"a/b"}},
		{"/m~0n", []string{"m~n"}}, {"/ ", []string{" "}}, {"/k\"l", []string{"k\"l"}}, {"/~01", []string{"~1"}},
	} {
		got, err := SplitPath(tc.path)
		if err != nil || !slices.Equal(got, tc.tokens) {
			t.Errorf("%q: got %q, %v, want %q", tc.path, got, err, tc.tokens)
		}
		if back := JoinPath(tc.tokens...); back != tc.path {
			t.Errorf("%q: back to %q, want %q", tc.tokens, back, tc.path)
		}
	}
	for _, path := range []string{"foo", "/a~", "/a~2", "/~~0"} {
		if got, err := SplitPath(path); err == nil {
			t.Errorf("%q: got %q, want an error", path, got)
		}
	}
}

func TestPathsRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		tokens := rapid.SliceOf(rapid.StringMatching(`[a/~01]{0,5}`)).Draw(t, "tokens")
		got, err := SplitPath(JoinPath(tokens...))
		if err != nil || !slices.Equal(got, tokens) {
			t.Fatalf("%q: got %q, %v", tokens, got, err)
		}
	})
}

func TestListIndices(t *testing.T) {
	for token, want := range map[string]int{"0": 0, "10": 10, "01": -1, "-1": -1, "+1": -1, "": -1, "1.5": -1, "1234567890": -1} {
		i, ok := listIndex(token)
		if ok != (want >= 0) || ok && i != want {
			t.Errorf("%q: got %d, %v, want %d", token, i, ok, want)
		}
	}
}

func TestNearest(t *testing.T) {
	for _, tc := range []struct {
		word string
		want string
	}{{"depth", "depth_er"}, {"DEPTH_ER", "depth_er"}, {"feild_g", "field_g"}, {"powers", "power_w"}} {
		if got := nearest(tc.word, []string{"depth_er", "power_w", "field_g"}); got != tc.want {
			t.Errorf("%q: got %q, want %q", tc.word, got, tc.want)
		}
	}
	for _, tc := range []struct {
		a, b string
		want int
	}{{"", "", 0}, {"", "abc", 3}, {"kitten", "sitting", 3}, {"ab", "ba", 1}, {"field", "feild", 1}} {
		if got, back := edits(tc.a, tc.b), edits(tc.b, tc.a); got != tc.want || back != tc.want {
			t.Errorf("%q to %q: got %d and %d back, want %d", tc.a, tc.b, got, back, tc.want)
		}
	}
}

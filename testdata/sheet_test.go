package testdata

import (
	"strings"
	"testing"
)

const good = "# source: a book, table 1\n# generator: typed\n# digits: 3\nx/1\ty/Hz\n1\t2.5\n"

func TestParseRefusesTablesWithoutOrigin(t *testing.T) {
	if _, err := Parse(good); err != nil {
		t.Fatalf("good table: %v", err)
	}
	for _, tc := range []struct{ name, text, want string }{
		{"no source", strings.Replace(good, "# source: a book, table 1\n", "", 1), `no "# source:"`},
		{"empty generator", strings.Replace(good, "typed", "", 1), `no "# generator:"`},
		{"no digits", strings.Replace(good, "# digits: 3\n", "", 1), `no "# digits:"`},
		{"column without unit", strings.Replace(good, "y/Hz", "y", 1), `column "y"`},
		{"short row", strings.Replace(good, "1\t2.5", "1", 1), "1 cells, want 2"},
	} {
		_, err := Parse(tc.text)
		if err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%s: got %v, want an error with %q", tc.name, err, tc.want)
		}
	}
}

func TestEveryTableSaysItsOrigin(t *testing.T) {
	entries, err := tables.ReadDir(".")
	if err != nil {
		t.Fatal(err)
	}
	for _, entry := range entries {
		sheet := Table(t, strings.TrimSuffix(entry.Name(), ".tsv"))
		if len(sheet.Rows) == 0 {
			t.Errorf("%s: no rows", entry.Name())
		}
	}
}

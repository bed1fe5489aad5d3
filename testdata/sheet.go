// Package testdata holds the reference tables that the tests check against and
// the reader that refuses a table which does not say where it comes from.
//
// A table is a text file NAME.tsv of tab-separated columns. Its first lines are
//
//	# source: where the values come from
//	# generator: what computed or typed them
//	# digits: how many digits are good
//
// and the first line after them names the columns as name/unit.
package testdata

import (
	"embed"
	"fmt"
	"strconv"
	"strings"
	"testing"
)

//go:embed *.tsv
var tables embed.FS

// Sheet is one reference table with its origin.
type Sheet struct {
	Source, Generator, Digits string
	Columns                   []Column
	Rows                      [][]string
}

// Column is the name and the unit of one column; the unit of a pure number is "1".
type Column struct{ Name, Unit string }

// Table reads NAME.tsv and ends the test if the table does not say its source,
// generator and digits or if a row has the wrong number of cells.
func Table(t testing.TB, name string) *Sheet {
	t.Helper()
	data, err := tables.ReadFile(name + ".tsv")
	if err != nil {
		t.Fatalf("testdata: %v", err)
	}
	sheet, err := Parse(string(data))
	if err != nil {
		t.Fatalf("testdata: %s.tsv: %v", name, err)
	}
	return sheet
}

// Parse reads the text of a table.
//
// It returns an error that names the missing header line or the malformed row.
func Parse(text string) (*Sheet, error) {
	sheet := &Sheet{}
	headers := map[string]*string{
		"# source:": &sheet.Source, "# generator:": &sheet.Generator, "# digits:": &sheet.Digits,
	}
	for number, line := range strings.Split(strings.TrimRight(text, "\n"), "\n") {
		if strings.HasPrefix(line, "#") {
			for key, value := range headers {
				if rest, ok := strings.CutPrefix(line, key); ok {
					*value = strings.TrimSpace(rest)
				}
			}
			continue
		}
		if err := sheet.addLine(line); err != nil {
			return nil, fmt.Errorf("line %d: %w", number+1, err)
		}
	}
	for key, value := range headers {
		if *value == "" {
			return nil, fmt.Errorf("no %q line", key)
		}
	}
	return sheet, nil
}

func (s *Sheet) addLine(line string) error {
	cells := strings.Split(line, "\t")
	if s.Columns != nil {
		if len(cells) != len(s.Columns) {
			return fmt.Errorf("%d cells, want %d", len(cells), len(s.Columns))
		}
		s.Rows = append(s.Rows, cells)
		return nil
	}
	for _, cell := range cells {
		name, unit, ok := strings.Cut(cell, "/")
		if !ok || name == "" || unit == "" {
			return fmt.Errorf("column %q, want name/unit", cell)
		}
		s.Columns = append(s.Columns, Column{Name: name, Unit: unit})
	}
	return nil
}

// Strings returns the cells of one column.
func (s *Sheet) Strings(t testing.TB, column string) []string {
	t.Helper()
	for i, c := range s.Columns {
		if c.Name == column {
			out := make([]string, len(s.Rows))
			for r, row := range s.Rows {
				out[r] = row[i]
			}
			return out
		}
	}
	t.Fatalf("testdata: no column %q in %v", column, s.Columns)
	return nil
}

// Floats returns one column as numbers.
func (s *Sheet) Floats(t testing.TB, column string) []float64 {
	t.Helper()
	cells := s.Strings(t, column)
	out := make([]float64, len(cells))
	for i, cell := range cells {
		value, err := strconv.ParseFloat(cell, 64)
		if err != nil {
			t.Fatalf("testdata: column %q row %d: %v", column, i+1, err)
		}
		out[i] = value
	}
	return out
}

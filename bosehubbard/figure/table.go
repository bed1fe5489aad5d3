package figure

import (
	"encoding/csv"
	"fmt"
	"io"
	"math"
	"strconv"
)

// Column is the head of a column: a name and, for numbers, a unit ("1" for a pure
// number, "" for words).
type Column struct{ Name, Unit string }

// Table is the numbers behind a picture, one text per column and row.
type Table struct {
	Columns []Column
	Rows    [][]string
}

// row appends a row of texts and numbers.
func (t *Table) row(cells ...any) {
	line := make([]string, len(cells))
	for i, cell := range cells {
		switch v := cell.(type) {
		case string:
			line[i] = v
		case float64:
			line[i] = plain(v)
		default:
			panic(fmt.Sprintf("figure: a cell of type %T", cell))
		}
	}
	t.Rows = append(t.Rows, line)
}

// plain writes a number so that it reads back exactly; NaN is an empty cell.
func plain(v float64) string {
	switch {
	case math.IsNaN(v):
		return ""
	case math.IsInf(v, 0):
		return "unbounded"
	}
	return strconv.FormatFloat(v, 'g', -1, 64)
}

// WriteCSV writes the table of a picture as RFC 4180 wants it: commas, lines that
// end in CR LF, quotes where needed. The first line names the columns, with units
// in brackets.
func WriteCSV(w io.Writer, p Picture) error {
	t := p.Table()
	out := csv.NewWriter(w)
	out.UseCRLF = true
	head := make([]string, len(t.Columns))
	for i, c := range t.Columns {
		head[i] = c.Name
		if c.Unit != "" {
			head[i] += " (" + c.Unit + ")"
		}
	}
	if err := out.Write(head); err != nil {
		return fmt.Errorf("figure: table of %q: %w", p.Stem(), err)
	}
	if err := out.WriteAll(t.Rows); err != nil {
		return fmt.Errorf("figure: table of %q: %w", p.Stem(), err)
	}
	return nil
}

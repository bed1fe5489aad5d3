package figure

import (
	"bytes"
	"compress/zlib"
	"encoding/csv"
	"encoding/xml"
	"errors"
	"image/png"
	"io"
	"math"
	"strconv"
	"strings"
	"testing"
	"unicode/utf16"
)

// samples are texts that each picture must show, in SVG and PDF too.
var samples = map[string][]string{
	"ceiling":     {"kinetic", "interaction", "+1,975 Hz", "−1,832 Hz", "V −0.316 Hz/site², anti-trap"},
	"budget":      {"lattice x", "f, spaced as f|f| so that bars add (Hz)", "−34.6 Hz, anti-trap"},
	"scattering":  {"pole 402.5 G", "zero 350.5 G", "flip … wait: −21.6 a0"},
	"bands":       {"quasi-momentum (π/d)", "gap 27.1 kHz"},
	"depth":       {"|J2|", "depth (Er)", "lower, wait"},
	"wannier":     {"w √d", "x, y: 6 Er"},
	"verdict-map": {"V (Hz/site²)", "sealed", "astray"},
}

var exportFrame = Frame{Width: 976, Height: 412}

func TestPNGDecodes(t *testing.T) {
	r := NewRenderer()
	for _, p := range gallery(t) {
		f := exportFrame
		f.Scale = 2
		var data bytes.Buffer
		if err := r.WritePNG(&data, p, f, Style{Palette: Dark()}); err != nil {
			t.Fatal(err)
		}
		img, err := png.Decode(&data)
		if err != nil {
			t.Errorf("%s: %v", p.Stem(), err)
			continue
		}
		if size := img.Bounds().Size(); size.X != 1952 || size.Y != 824 {
			t.Errorf("%s: %v pixels, want 1952x824", p.Stem(), size)
		}
	}
}

func TestSVGIsXMLWithTheTexts(t *testing.T) {
	for _, p := range gallery(t) {
		var data bytes.Buffer
		if err := WriteSVG(&data, p, exportFrame, Style{Palette: Light()}); err != nil {
			t.Fatal(err)
		}
		found := map[string]bool{}
		decoder := xml.NewDecoder(&data)
		for {
			token, err := decoder.Token()
			if errors.Is(err, io.EOF) {
				break
			}
			if err != nil {
				t.Errorf("%s: %v", p.Stem(), err)
				break
			}
			if text, ok := token.(xml.CharData); ok {
				found[strings.TrimSpace(string(text))] = true
			}
		}
		for _, want := range samples[p.Stem()] {
			if !found[want] {
				t.Errorf("%s: no text %q", p.Stem(), want)
			}
		}
	}
}

func TestPDFHoldsTheTexts(t *testing.T) {
	for _, p := range gallery(t) {
		var data bytes.Buffer
		if err := WritePDF(&data, p, exportFrame, Style{Palette: Light()}); err != nil {
			t.Fatal(err)
		}
		if !bytes.HasPrefix(data.Bytes(), []byte("%PDF-")) || !bytes.HasSuffix(bytes.TrimSpace(data.Bytes()), []byte("%%EOF")) {
			t.Errorf("%s: not a whole PDF", p.Stem())
		}
		content := inflate(data.Bytes())
		for _, want := range samples[p.Stem()] {
			if !bytes.Contains(content, pdfText(want)) {
				t.Errorf("%s: no text %q", p.Stem(), want)
			}
		}
	}
}

// inflate returns the streams of a PDF one after the other.
func inflate(data []byte) []byte {
	var out []byte
	for {
		_, after, ok := bytes.Cut(data, []byte("stream\n"))
		if !ok {
			return out
		}
		if r, err := zlib.NewReader(bytes.NewReader(after)); err == nil {
			text, _ := io.ReadAll(r)
			out = append(out, text...)
		}
		data = after
	}
}

// pdfText is a text as it stands in a page: UTF-16, big end first, in which \, (
// and ) are escaped.
func pdfText(text string) []byte {
	var out []byte
	for _, unit := range utf16.Encode([]rune(text)) {
		out = append(out, byte(unit>>8), byte(unit))
	}
	for _, b := range []string{`\`, "(", ")"} {
		out = bytes.ReplaceAll(out, []byte(b), []byte(`\`+b))
	}
	return bytes.ReplaceAll(out, []byte("\r"), []byte(`\r`))
}

// A table reads back as the numbers it was made of, to the last bit.
func TestCSVReadsBack(t *testing.T) {
	for _, p := range gallery(t) {
		var data bytes.Buffer
		if err := WriteCSV(&data, p); err != nil {
			t.Fatal(err)
		}
		if !bytes.Contains(data.Bytes(), []byte("\r\n")) {
			t.Errorf("%s: lines do not end in CR LF", p.Stem())
		}
		rows, err := csv.NewReader(&data).ReadAll()
		if err != nil {
			t.Errorf("%s: %v", p.Stem(), err)
			continue
		}
		want := p.Table()
		if len(rows) != len(want.Rows)+1 || len(want.Rows) == 0 {
			t.Errorf("%s: %d lines for %d rows", p.Stem(), len(rows), len(want.Rows))
			continue
		}
		for i, c := range want.Columns {
			if c.Unit != "" && rows[0][i] != c.Name+" ("+c.Unit+")" {
				t.Errorf("%s: column %d is headed %q, want %q in %q", p.Stem(), i, rows[0][i], c.Name, c.Unit)
			}
		}
		for i, row := range want.Rows {
			for k, cell := range row {
				if rows[i+1][k] != cell {
					t.Errorf("%s: row %d, column %d: %q, want %q", p.Stem(), i, k, rows[i+1][k], cell)
				}
			}
		}
	}
}

func TestCurvesReadBackFromTheirTable(t *testing.T) {
	c := &Chart{
		Name: "test", X: Axis{Label: "x", Unit: "G"}, Y: Axis{Label: "y", Unit: "Hz"},
		Curves: []Curve{{Name: "a, \"quoted\"", X: []float64{0.1, 1.0 / 3, 3}, Y: []float64{math.Pi, math.NaN(), -1e-300}}},
	}
	var data bytes.Buffer
	if err := WriteCSV(&data, c); err != nil {
		t.Fatal(err)
	}
	rows, err := csv.NewReader(&data).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	for i, row := range rows[1:] {
		x, errX := strconv.ParseFloat(row[1], 64)
		y, errY := strconv.ParseFloat(row[2], 64)
		if row[0] != c.Curves[0].Name || errX != nil || x != c.Curves[0].X[i] {
			t.Errorf("row %d: %q", i, row)
		}
		if math.IsNaN(c.Curves[0].Y[i]) {
			if row[2] != "" {
				t.Errorf("row %d: %q, want an empty cell", i, row[2])
			}
		} else if errY != nil || y != c.Curves[0].Y[i] {
			t.Errorf("row %d: y = %q, want %g", i, row[2], c.Curves[0].Y[i])
		}
	}
}

func TestCeilingTableHoldsTheReport(t *testing.T) {
	p := &Ceiling{Report: judged(t, "skerry-demo")}
	table := p.Table()
	for i, term := range p.Report.Ceiling.Terms {
		row := table.Rows[i]
		if row[1] != term.Term {
			t.Errorf("row %d is %q, want %s", i, row, term.Term)
		}
		for k, bound := range []float64{number(term.Floor), number(term.Ceiling)} {
			got, err := strconv.ParseFloat(row[2+k], 64)
			switch {
			case math.IsInf(bound, 0) && row[2+k] != "unbounded",
				math.IsNaN(bound) && row[2+k] != "",
				!math.IsInf(bound, 0) && !math.IsNaN(bound) && (err != nil || got != bound):
				t.Errorf("%s: %q, want %g", term.Term, row, bound)
			}
		}
	}
}

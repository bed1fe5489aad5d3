package figure

import (
	"image/color"
	"math"
)

// VerdictMap is the verdict over interaction and curvature, in the fills of the
// Ceiling picture: sealed solid, open in strips, leaky split, astray dotted.
type VerdictMap struct {
	U, V          Range // Hz and Hz per site squared
	Columns, Rows int
	Verdicts      []string // row by row, the lowest V first
	Axis          string   // of V; empty where all change together
	AtU, AtV      float64  // the plan; NaN where unknown
}

// NewVerdictMap asks for the verdict at the middle of every cell. judge returns
// "sealed", "leaky", "open" or "astray" for U in Hz and V in Hz per site squared.
//
// It panics if a range is empty or there are no cells.
func NewVerdictMap(u, v Range, columns, rows int, judge func(u, v float64) string) *VerdictMap {
	if !u.valid(Linear) || !v.valid(Linear) || columns < 1 || rows < 1 {
		panic("figure: a verdict map without cells")
	}
	m := &VerdictMap{U: u, V: v, Columns: columns, Rows: rows, AtU: math.NaN(), AtV: math.NaN()}
	for row := range rows {
		for column := range columns {
			x, y := m.Cell(column, row)
			m.Verdicts = append(m.Verdicts, judge(x, y))
		}
	}
	return m
}

// Cell returns U and V at the middle of a cell.
func (m *VerdictMap) Cell(column, row int) (u, v float64) {
	return inverse(Linear, m.U, (float64(column)+0.5)/float64(m.Columns)),
		inverse(Linear, m.V, (float64(row)+0.5)/float64(m.Rows))
}

// At returns the verdict of the cell that holds U and V; empty outside the map.
func (m *VerdictMap) At(u, v float64) string {
	column := math.Floor(Linear.Normalize(m.U.Low, m.U.High, u) * float64(m.Columns))
	row := math.Floor(Linear.Normalize(m.V.Low, m.V.High, v) * float64(m.Rows))
	if !(column >= 0 && column < float64(m.Columns) && row >= 0 && row < float64(m.Rows)) {
		return ""
	}
	return m.verdict(int(column), int(row))
}

func (m *VerdictMap) verdict(column, row int) string {
	if column < 0 || column >= m.Columns || row < 0 || row >= m.Rows {
		return ""
	}
	return m.Verdicts[row*m.Columns+column]
}

// Chart draws the map.
func (m *VerdictMap) Chart() *Chart {
	label := "V"
	if m.Axis != "" {
		label = "V along " + m.Axis
	}
	c := &Chart{
		Name:  "verdict-map",
		Title: "Verdict over U and V",
		X:     Axis{Label: "U", Unit: "Hz", Range: m.U},
		Y:     Axis{Label: label, Unit: "Hz/site²", Range: m.V},
		rows:  m.table,
	}
	c.under = m.draw
	return c
}

// draw fills blocks of cells, then draws the borders, the names and the plan.
func (m *VerdictMap) draw(p *pen, a Area) {
	done := make([]bool, len(m.Verdicts))
	for k := range m.Verdicts {
		if !done[k] {
			m.block(p, a, k%m.Columns, k/m.Columns, done)
		}
	}
	m.borders(p, a)
	m.names(p, a)
	if at := a.Pixel(m.AtU, m.AtV); a.Contains(at) {
		p.diamond(at, 12)
	}
}

// block fills the widest row of like cells from a cell on, and all rows above that
// are alike over that width, as one rectangle: pieces side by side would show
// seams in print.
func (m *VerdictMap) block(p *pen, a Area, column, row int, done []bool) {
	verdict := m.verdict(column, row)
	alike := func(from, to, row int) bool {
		for i := from; i < to; i++ {
			if m.verdict(i, row) != verdict || done[row*m.Columns+i] {
				return false
			}
		}
		return true
	}
	end, top := column+1, row+1
	for end < m.Columns && alike(end, end+1, row) {
		end++
	}
	for top < m.Rows && alike(column, end, top) {
		top++
	}
	for j := row; j < top; j++ {
		for i := column; i < end; i++ {
			done[j*m.Columns+i] = true
		}
	}
	low, high := m.box(a, column, end, row), m.box(a, column, end, top-1)
	p.pattern(verdict, Rect{low.X0, high.Y0, low.X1, low.Y1})
}

// box is the run of cells from first to end, cut at the border of the area.
func (m *VerdictMap) box(a Area, first, end, row int) Rect {
	u := func(i int) float64 { return inverse(Linear, m.U, float64(i)/float64(m.Columns)) }
	v := func(i int) float64 { return inverse(Linear, m.V, float64(i)/float64(m.Rows)) }
	low, high := a.Pixel(u(first), v(row)), a.Pixel(u(end), v(row+1))
	return Rect{math.Max(low.X, a.X0), math.Max(high.Y, a.Y0), math.Min(high.X, a.X1), math.Min(low.Y, a.Y1)}
}

// pattern fills a rectangle as a verdict is filled. Patterns of neighbours meet,
// since they hang on the corner of the picture.
func (p *pen) pattern(verdict string, r Rect) {
	ink := p.style.Palette
	if !(r.X1 > r.X0 && r.Y1 > r.Y0) {
		return
	}
	switch verdict {
	case "sealed":
		p.fill(r, ink.Blue)
	case "open":
		p.rows(r, 9, 4, func(y0, y1 float64) { p.fill(Rect{r.X0, y0, r.X1, y1}, ink.Red) })
	case "leaky":
		p.fill(r, ink.Yellow)
		p.pieces(r, 12, 2, 16, 10, ink.OnYellow)
	case "astray":
		p.pieces(r, 7, 2, 7, 2, ink.Ink)
	}
}

// rows hands the parts of horizontal stripes inside a rectangle to use.
func (p *pen) rows(r Rect, period, high float64, use func(y0, y1 float64)) {
	for y := math.Floor(r.Y0/period) * period; y < r.Y1; y += period {
		if y0, y1 := math.Max(y, r.Y0), math.Min(y+high, r.Y1); y1 > y0 {
			use(y0, y1)
		}
	}
}

// pieces fills a rectangle with short bars, all in one path.
func (p *pen) pieces(r Rect, period, high, pitch, wide float64, ink color.Color) {
	p.path = p.path[:0]
	p.rows(r, period, high, func(y0, y1 float64) {
		shift := 0.0
		if math.Mod(math.Floor(y0/period), 2) == 1 {
			shift = pitch / 2
		}
		for x := math.Floor(r.X0/pitch)*pitch - pitch + shift; x < r.X1; x += pitch {
			x0, x1 := math.Max(x, r.X0), math.Min(x+wide, r.X1)
			if x1 <= x0 {
				continue
			}
			p.path.Move(p.at(x0, y0))
			p.path.Line(p.at(x1, y0))
			p.path.Line(p.at(x1, y1))
			p.path.Line(p.at(x0, y1))
			p.path.Close()
		}
	})
	p.canvas.SetColor(ink)
	p.canvas.Fill(p.path)
}

// borders draws lines between cells of different verdicts.
func (m *VerdictMap) borders(p *pen, a Area) {
	s := stroke{width: 1.5, color: p.style.Palette.Ink}
	for row := range m.Rows {
		for column := range m.Columns {
			here := m.verdict(column, row)
			box := m.box(a, column, column+1, row)
			if !(box.X1 > box.X0 && box.Y1 > box.Y0) {
				continue
			}
			if right := m.verdict(column+1, row); right != "" && right != here {
				p.line(s, Point{box.X1, box.Y0}, Point{box.X1, box.Y1})
			}
			if up := m.verdict(column, row+1); up != "" && up != here {
				p.line(s, Point{box.X0, box.Y0}, Point{box.X1, box.Y0})
			}
		}
	}
}

// names writes each verdict once, where its cells reach furthest around.
func (m *VerdictMap) names(p *pen, a Area) {
	place := placer{style: p.style, bounds: a.Rect}
	if at := a.Pixel(m.AtU, m.AtV); a.Contains(at) {
		place.taken = append(place.taken, Rect{at.X - 10, at.Y - 10, at.X + 10, at.Y + 10})
	}
	for _, verdict := range [...]string{"sealed", "leaky", "astray", "open"} {
		column, row, ok := m.middle(verdict)
		if !ok {
			continue
		}
		box := m.box(a, column, column+1, row)
		place.put(Flag, verdict, near(Point{(box.X0 + box.X1) / 2, (box.Y0 + box.Y1) / 2}, 0.5, 12, 120)...)
	}
	p.drawLabels(place.labels)
}

// middle finds the cell of a verdict with the most cells of the same around it;
// borders of the map count as others. Of several it takes the one nearest to the
// middle of all cells of the verdict.
func (m *VerdictMap) middle(verdict string) (column, row int, ok bool) {
	// side is the side of the largest square of the verdict that ends in a cell.
	side := make([]int, m.Columns*m.Rows)
	best, count, sumX, sumY := 0, 0, 0, 0
	for j := range m.Rows {
		for i := range m.Columns {
			if m.verdict(i, j) != verdict {
				continue
			}
			count, sumX, sumY = count+1, sumX+i, sumY+j
			here := &side[j*m.Columns+i]
			*here = 1
			if i > 0 && j > 0 {
				*here += min(side[j*m.Columns+i-1], side[(j-1)*m.Columns+i], side[(j-1)*m.Columns+i-1])
			}
			best = max(best, *here)
		}
	}
	nearest := math.Inf(1)
	for k, s := range side {
		if best == 0 || s != best {
			continue
		}
		i, j := k%m.Columns-s/2, k/m.Columns-s/2
		d := math.Hypot(float64(i)-float64(sumX)/float64(count), float64(j)-float64(sumY)/float64(count))
		if d < nearest {
			nearest, column, row, ok = d, i, j, true
		}
	}
	return column, row, ok
}

// table lists the cells.
func (m *VerdictMap) table() Table {
	t := Table{Columns: []Column{{"U", "Hz"}, {"V", "Hz/site²"}, {"verdict", ""}}}
	for row := range m.Rows {
		for column := range m.Columns {
			u, v := m.Cell(column, row)
			t.row(u, v, m.verdict(column, row))
		}
	}
	return t
}

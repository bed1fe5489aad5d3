package figure

import (
	"math"
	"strings"

	"gonum.org/v1/plot/vg"

	"hilltop/bosehubbard/report"
)

// Ceiling is the picture of the bounds of the energy per atom: a bar per term with
// a lid where it is bounded and strips where it is not, their sum, the hill along
// one axis, and a line of sizes.
type Ceiling struct {
	Report  *report.Report
	Options CeilingOptions
}

var _ Picture = (*Ceiling)(nil)

// Stem returns "ceiling".
func (c *Ceiling) Stem() string { return "ceiling" }

// Geometry lays the picture out.
func (c *Ceiling) Geometry(f Frame, s Style) *Geometry {
	return CeilingGeometry(c.Report, f, s, c.Options)
}

// Draw draws the picture.
func (c *Ceiling) Draw(to vg.Canvas, f Frame, s Style) {
	c.Geometry(f, s).Draw(to, f, s)
}

// Table lists the bounds of every term and of the total, the ends of growing
// systems and the sizes. A cell without a number was not computed.
func (c *Ceiling) Table() Table {
	t := Table{Columns: []Column{
		{"part", ""}, {"name", ""}, {"floor per atom", "Hz"}, {"ceiling per atom", "Hz"}, {"value", "Hz"}, {"note", ""},
	}}
	none := math.NaN()
	for _, term := range c.Report.Ceiling.Terms {
		note := term.Reason
		if note == "" {
			note = term.Motion
		}
		t.row("term", term.Term, number(term.Floor), number(term.Ceiling), none, note)
	}
	total := c.Report.Ceiling.Total
	t.row("total", "total", number(total.Floor), number(total.Ceiling), none, c.Report.Verdict)
	for _, e := range c.Report.Ceiling.Exact {
		t.row("exact", sitesName(e.Sites), e.Floor, e.Ceiling, none, plain(float64(e.Atoms))+" atoms")
	}
	if l := c.Options.Ladder; l != nil {
		for i, r := range l.rows() {
			t.row("level", plain(float64(i+1)), none, none, r[0], "degeneracy "+plain(r[1])+", share "+plain(r[2]))
		}
	}
	for _, m := range sizesOf(c.Report, c.Options.LatticeAxes) {
		note := ""
		if m.Name == "|V|" {
			note = "per site squared"
		}
		t.row("size", m.Name, none, none, m.Hz, note)
	}
	c.Options.Entropy.addTo(&t)
	return t
}

// addTo appends S(E) to a table, in columns of its own.
func (c *EntropyCurve) addTo(t *Table) {
	if c == nil {
		return
	}
	wide := len(t.Columns)
	t.Columns = append(t.Columns, Column{"energy per atom", "Hz"}, Column{"entropy per atom", "kB"}, Column{"dS/dE", "kB/Hz"})
	for i := range t.Rows {
		t.Rows[i] = append(t.Rows[i], "", "", "")
	}
	for i, hz := range c.Energy {
		row := make([]string, wide, wide+3)
		row[0], row[1] = "entropy", c.Name
		t.Rows = append(t.Rows, append(row, plain(hz), plain(c.Entropy[i]), plain(c.Beta[i])))
	}
}

// number is a bound for a table: NaN where it was not computed.
func number(b report.Bound) float64 {
	if b.IsZero() {
		return math.NaN()
	}
	return b.Hz
}

func sitesName(sites []int) string {
	parts := make([]string, len(sites))
	for i, n := range sites {
		parts[i] = plain(float64(n))
	}
	return strings.Join(parts, "x") + " sites"
}

// At returns the term whose column a point lies in, for a click on its bar; empty
// where there is none.
func (g *Geometry) At(p Point) string {
	if p.Y < g.Plot.Y0 || p.Y > g.Plot.Y1 {
		return ""
	}
	for _, bar := range append(append([]Bar(nil), g.Bars...), g.Total) {
		reach := math.Max(bar.Overhang, 0.5*trapGap)
		if axisOf(bar.Term) != "" {
			reach = 0.5 * trapGap
		}
		if p.X >= bar.X0-reach && p.X <= bar.X1+reach {
			return bar.Term
		}
	}
	return ""
}

// Read gives the energy at a place of the linear part, and on the hill the site;
// ok is false elsewhere.
func (g *Geometry) Read(p Point) (r Reading, ok bool) {
	if !g.Plot.Contains(p) || p.Y < g.Sky.Y1 || p.Y > g.Ground.Y0 {
		return Reading{}, false
	}
	r = Reading{Y: g.Scale.Hz(p.Y), At: p}
	r.Text = "E/N " + g.unit.signed(r.Y, 4)
	if e := g.Entropy; e != nil && p.X >= e.Box.X0 && p.X <= e.Box.X1 {
		if q, ok := e.at(r.Y); ok {
			r.X = q.Entropy
			r.Text += ", " + e.Says(q)
		}
	}
	if s := g.Slope; s != nil && p.X >= s.Box.X0 && p.X <= s.Box.X1 {
		r.X = s.Site(p.X)
		r.Text += " at " + Number(r.X, 3) + " sites along " + s.Axis
	}
	return r, true
}

package figure

import (
	"math"

	"hilltop/bosehubbard/report"
)

// Geometry is where everything of the Ceiling picture stands, in px, y downwards.
// Draw draws nothing else.
type Geometry struct {
	Frame   Rect // the whole picture
	Plot    Rect // sky, linear part and ground
	Sky     Rect // where only what has no ceiling enters; for T > 0 where nothing counts
	Ground  Rect
	Terms   Rect // columns of the bars
	Hill    Rect // columns of the hill; empty where there is no room for it
	Ruler   Rect
	Scale   EnergyScale
	Upwards bool // T < 0: ceilings count
	Open    bool // no bound at the end that counts

	Bars    []Bar // in the order of the report's terms
	Total   Bar
	Exact   []Tick  // ends of growing systems, on the right edge of the total
	Carry   []Point // the sum, from the kinetic lid to the total's
	Ceiling Line    // from the total's lid to the ruler; no length where open
	State   *Line
	Slope   *Slope        // the hill; nil where there is none
	Entropy *EntropyPanel // S(E); nil where it is not known
	Rungs   []Rung        // of levels, from the first given
	Size    SizeLine
	Ticks   []Tick // of the energy axis
	Pinned  []Rect
	Labels  []Label

	text float64
	unit measureOf
}

// EndKind says how the end of a bar is drawn.
type EndKind int

// The ends of bars.
const (
	Lid    EndKind = iota // at its place
	Strips                // unbounded
	Cut                   // bounded, but beyond the range
)

// End is the floor or the ceiling of a bar.
type End struct {
	Hz     float64 // infinite where unbounded
	Y      float64 // of a lid or cut; for strips the border of the sky or ground
	Kind   EndKind
	Counts bool // the end that the wanted sign of T asks about
}

// Bar is one term of the energy, or the total.
type Bar struct {
	Term         string
	X0, X1       float64
	Upper, Lower End
	Fill         Fill
	Still        bool   // an axis that does not move: an empty outline
	Reason       string // why
	Pair         bool   // too thin for a bar: two lids
	Overhang     float64
}

// Counting is the end that counts.
func (b *Bar) Counting() *End {
	if b.Upper.Counts {
		return &b.Upper
	}
	return &b.Lower
}

// Centre is the middle of the bar's width.
func (b *Bar) Centre() float64 { return (b.X0 + b.X1) / 2 }

// Body is the rectangle between the two ends.
func (b *Bar) Body() Rect { return Rect{b.X0, b.Upper.Y, b.X1, b.Lower.Y} }

// Tick is a place on a scale with its value in Hz.
type Tick struct{ Hz, Y float64 }

// Line is horizontal, at an energy.
type Line struct{ Hz, X0, X1, Y float64 }

// CeilingOptions choose what the Ceiling picture shows. The zero value works.
type CeilingOptions struct {
	Unit Unit
	// ScaleTo names the term whose bounds the range is to hold, or is "state";
	// empty holds the kinetic floor, the total's ceiling and the state.
	ScaleTo string
	// HalfRange, in Unit, freezes the range, as during a drag; 0 chooses it.
	HalfRange float64
	// State is the energy per atom of the cloud, Hz; nil where it is not known.
	State *float64
	// Pinned is another report, drawn as outlines.
	Pinned *report.Report
	// LatticeAxes names the axis of every entry of lattice.axes; nil is x, y, z.
	LatticeAxes []string
	// Entropy is S(E) of what stands for the cloud; nil where it is not known.
	Entropy *EntropyCurve
	// Ladder is drawn in place of the bars for levels.
	Ladder *Ladder
	// HillAxis is the axis of the hill; empty chooses the one most in danger.
	HillAxis string
}

// CeilingGeometry lays out the Ceiling picture of a report.
func CeilingGeometry(r *report.Report, f Frame, s Style, o CeilingOptions) *Geometry {
	b := builder{report: r, style: s, options: o, g: &Geometry{text: s.text()}}
	b.g.Upwards = r.AimSign != "positive"
	b.curve = o.Entropy.counted()
	b.place(f)
	b.chooseScale()
	if o.Ladder != nil {
		b.ladder()
	} else {
		b.bars()
		b.carry()
	}
	b.ceiling()
	b.hill()
	b.entropy()
	b.sizes()
	b.pinned()
	b.label()
	return b.g
}

// builder fills a Geometry step by step.
type builder struct {
	report  *report.Report
	style   Style
	options CeilingOptions
	g       *Geometry
	curve   *EntropyCurve // the part that is shown; nil for none
	unit    measureOf
	notes   []string // lines below the names: why axes do not move
	names   float64  // upper edge of the names below the plot
	placer  placer
}

// place divides the frame: the plot, below it names and notes, at the bottom the
// size line.
func (b *builder) place(f Frame) {
	g, t := b.g, b.style.text()
	g.Frame = f.rect()
	b.notes = b.reasons(f.Width - 16)
	row := 15 * t
	sizes, names := 40*t, 2*row+8
	bottom := f.Height - sizes - names - row*float64(len(b.notes))
	if bottom < 200 { // too low for notes
		bottom += row * float64(len(b.notes))
		b.notes = nil
	}
	b.names = bottom
	g.Size.Box = Rect{0, f.Height - sizes, f.Width, f.Height}
	left, right := 64*t, f.Width-92*t
	g.Plot = Rect{left, 0, right, bottom}
	g.Ruler = Rect{right, 0, f.Width, bottom}
	b.divide(f.Width >= 620*t && b.options.Ladder == nil)
	band := math.Max(0.16*bottom, 56)
	g.Sky = Rect{left, 0, right, band}
	g.Ground = Rect{left, bottom - band, right, bottom}
}

// Shares of the width inside.
const (
	termsShare   = 46.0
	hillShare    = 27.0
	entropyShare = 27.0
)

// divide gives the terms, the hill and S(E) their columns; what is not shown leaves
// its share to the others.
func (b *builder) divide(hill bool) {
	g := b.g
	shares := [...]float64{termsShare, 0, 0}
	if hill {
		shares[1] = hillShare
	}
	if b.curve != nil {
		shares[2] = entropyShare
	}
	one := g.Plot.Width() / (shares[0] + shares[1] + shares[2])
	g.Terms, g.Hill = g.Plot, Rect{}
	g.Terms.X1 = g.Plot.X0 + shares[0]*one
	if hill {
		g.Hill = Rect{g.Terms.X1, 0, g.Terms.X1 + shares[1]*one, g.Plot.Y1}
	}
	if b.curve != nil {
		g.Entropy = &EntropyPanel{Box: Rect{g.Plot.X1 - shares[2]*one, 0, g.Plot.X1 - 8, g.Plot.Y1}}
	}
}

// reasons wraps why axes do not move into lines.
func (b *builder) reasons(width float64) []string {
	var lines []string
	for _, t := range b.report.Ceiling.Terms {
		if t.Reason != "" {
			lines = append(lines, wrap(b.style, words, axisOf(t.Term)+" "+t.Reason, width)...)
		}
	}
	return lines
}

// axisOf returns "x" for "trap_x" and nothing for a term without axis.
func axisOf(term string) string {
	if len(term) == len("trap_x") && term[:5] == "trap_" {
		return term[5:]
	}
	return ""
}

// bound returns the end of a bound that counts for the wanted sign.
func (b *builder) counting(bounds report.Bounds) report.Bound {
	if b.g.Upwards {
		return bounds.Ceiling
	}
	return bounds.Floor
}

package gui

import "fyne.io/fyne/v2"

// gridLayout is where everything in a grid stands.
type gridLayout struct {
	titles []gridText
	cells  [][]box // by row and column
	texts  []gridText
	rows   []box     // of the grounds
	lines  []float32 // heights at which lines part the rows
	height float32
}

// gridText is a text in its place.
type gridText struct {
	prose *Prose
	box
}

// gridInset is the room at both sides of a cell; half of it lies above and below.
const gridInset = space8

// inset is a text in the middle of its cell.
func inset(p *Prose, cell box) gridText {
	return gridText{p, box{
		cell.at.AddXY(px(gridInset), px(gridInset)/2),
		cell.size.SubtractWidthHeight(2*px(gridInset), px(gridInset)),
	}}
}

// title is a heading as it is drawn.
func (g *Grid) title(column int) *Prose {
	return g.aligned(NewProse(g.Columns[column].Title, textAxis, 0).soft().once(), column)
}

// text is a cell as it is drawn.
func (g *Grid) text(row, column int) *Prose {
	p := NewProse(g.Rows[row].Cells[column], textBody, 0).once()
	p.Bold = column == 0 && g.Rows[row].Chosen
	if g.faded {
		p.Color = ColorSoftInk
	}
	return g.aligned(p, column)
}

func (g *Grid) aligned(p *Prose, column int) *Prose {
	if !g.Columns[column].Words {
		p.Align = fyne.TextAlignTrailing
	}
	return p
}

// measure places everything in a width; the last answer is kept until a refresh.
func (g *Grid) measure(width float32) *gridLayout {
	if g.measured == nil || g.measuredWidth != width {
		g.measured, g.measuredWidth = g.arrange(width), width
	}
	return g.measured
}

func (g *Grid) arrange(width float32) *gridLayout {
	n := len(g.Columns)
	least, wish, needed := make([]float32, n), make([]float32, n), float32(0)
	for column := range n {
		texts := []*Prose{g.title(column)}
		for row := range g.Rows {
			texts = append(texts, g.text(row, column))
		}
		for _, text := range texts {
			least[column] = max(least[column], text.MinSize().Width)
			wish[column] = max(wish[column], text.Width())
		}
		needed += least[column] + 2*px(gridInset)
	}
	if needed > width {
		return g.cards(width)
	}
	return g.table(share(width-2*px(gridInset)*float32(n), least, wish))
}

// table places the rows below each other in columns of the given inner widths.
func (g *Grid) table(widths []float32) *gridLayout {
	l := &gridLayout{}
	titles := make([]*Prose, len(g.Columns))
	for column := range g.Columns {
		titles[column] = g.title(column)
	}
	for i, cell := range l.row(titles, widths) {
		l.titles = append(l.titles, inset(titles[i], cell))
	}
	for row := range g.Rows {
		l.lines = append(l.lines, l.height)
		texts := make([]*Prose, len(g.Columns))
		for column := range g.Columns {
			texts[column] = g.text(row, column)
		}
		top := l.height
		cells := l.row(texts, widths)
		for i, cell := range cells {
			l.texts = append(l.texts, inset(texts[i], cell))
		}
		l.cells = append(l.cells, cells)
		l.rows = append(l.rows, box{fyne.NewPos(0, top), fyne.NewSize(0, l.height-top)})
	}
	return l
}

// row places texts beside each other below what is there already.
func (l *gridLayout) row(texts []*Prose, widths []float32) []box {
	height := float32(0)
	for i, text := range texts {
		height = max(height, text.HeightFor(widths[i])+px(gridInset))
	}
	cells, x := make([]box, len(texts)), float32(0)
	for i := range texts {
		cells[i] = box{fyne.NewPos(x, l.height), fyne.NewSize(widths[i]+2*px(gridInset), height)}
		x += cells[i].size.Width
	}
	l.height += height
	return cells
}

// cards places every row as a card: its first cell on top, below it the others,
// each on a line with its heading before it. Empty cells are left out.
func (g *Grid) cards(width float32) *gridLayout {
	l := &gridLayout{}
	for row := range g.Rows {
		l.lines = append(l.lines, l.height)
		top, cells := l.height, make([]box, len(g.Columns))
		for column := range g.Columns {
			if text := g.text(row, column); text.Text != "" {
				cells[column] = l.cardLine(g.title(column), text, width, column == 0)
			}
		}
		l.cells = append(l.cells, cells)
		l.rows = append(l.rows, box{fyne.NewPos(0, top), fyne.NewSize(0, l.height-top)})
	}
	return l
}

// cardLine adds a line of a card; the first has no heading.
func (l *gridLayout) cardLine(title, text *Prose, width float32, first bool) box {
	left := float32(0)
	if first {
		text.Bold = true
	} else {
		title.Align, text.Align = fyne.TextAlignLeading, fyne.TextAlignTrailing
		left = min(title.Width(), width/3) + 2*px(gridInset)
	}
	height := max(text.HeightFor(width-left-2*px(gridInset)), title.HeightFor(left-2*px(gridInset))) + px(gridInset)
	cell := box{fyne.NewPos(left, l.height), fyne.NewSize(width-left, height)}
	l.texts = append(l.texts, inset(text, cell))
	if !first {
		l.titles = append(l.titles, inset(title, box{fyne.NewPos(0, l.height), fyne.NewSize(left, height)}))
	}
	l.height += height
	return cell
}

// share gives columns between what they need at least and what they wish for; what
// is left over is spread evenly.
func share(width float32, least, wish []float32) []float32 {
	needed, wanted := float32(0), float32(0)
	for i := range wish {
		needed, wanted = needed+least[i], wanted+wish[i]
	}
	out := make([]float32, len(wish))
	for i := range out {
		if wanted <= width {
			out[i] = wish[i] + (width-wanted)/float32(len(out))
		} else {
			out[i] = least[i] + (width-needed)*(wish[i]-least[i])/(wanted-needed)
		}
	}
	return out
}

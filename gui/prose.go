package gui

import (
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/widget"
)

// Prose is text in which words stand in the sans and numbers in the mono, on one
// baseline, wrapped at spaces.
//
// It reports no height for a width to the toolkit, which cannot ask; a layout that
// wraps calls [Prose.HeightFor].
//
// The toolkit knows a text only once it is drawn, since it keeps what it knows for a
// minute and many texts are only measured.
type Prose struct {
	widget.BaseWidget

	Text     string
	TextSize float32 // at 100 % text
	Color    fyne.ThemeColorName
	Bold     bool
	Lines    int            // most lines that are drawn; 0 draws all
	Align    fyne.TextAlign // of every line

	passing bool // made for one painting, and not changed afterwards
}

var _ fyne.Accessible = (*Prose)(nil)

// NewProse returns ink text of a size at 100 %, on at most the given lines.
func NewProse(text string, size float32, lines int) *Prose {
	return &Prose{Text: text, TextSize: size, Color: ColorInk, Lines: lines}
}

// soft returns the text in soft ink.
func (p *Prose) soft() *Prose {
	p.Color = ColorSoftInk
	return p
}

// bold returns the words in bold.
func (p *Prose) bold() *Prose {
	p.Bold = true
	return p
}

// once returns the text as one that is made for one painting.
func (p *Prose) once() *Prose {
	p.passing = true
	return p
}

// right returns the text at the right edge.
func (p *Prose) right() *Prose {
	p.Align = fyne.TextAlignTrailing
	return p
}

// SetText changes the text.
func (p *Prose) SetText(text string) {
	if p.Text != text {
		p.Text = text
		p.Refresh()
	}
}

// AccessibilityLabel is the text.
func (p *Prose) AccessibilityLabel() string { return p.Text }

// AccessibilityRole is text.
func (p *Prose) AccessibilityRole() fyne.AccessibleRole { return fyne.AccessibleRoleText }

// HeightFor is the height of the wrapped text in a width.
func (p *Prose) HeightFor(width float32) float32 {
	return float32(len(p.wrap(width))) * p.lineHeight()
}

// MinSize is the whole text for one line, else the widest word by the lines.
func (p *Prose) MinSize() fyne.Size { return p.least() }

// Width is that of the text on one line.
func (p *Prose) Width() float32 { return p.lineWidth(p.Text) }

func (p *Prose) lineHeight() float32 {
	sans, _ := measure("x", px(p.TextSize), p.style("x"))
	mono, _ := measure("0", px(p.TextSize), fyne.TextStyle{Monospace: true})
	return max(sans.Height, mono.Height)
}

// style is the font of a word.
func (p *Prose) style(word string) fyne.TextStyle {
	if needsMono(word) {
		return fyne.TextStyle{Monospace: true}
	}
	return fyne.TextStyle{Bold: p.Bold}
}

// slack is how far a text may reach out of its width: less than a pixel, from sums
// that round.
const slack = 0.5

// dots end a text that does not fit.
const dots = " ..."

func (p *Prose) lineWidth(line string) float32 {
	width := float32(0)
	for _, r := range runsOf(line, p.style) {
		size, _ := measure(r.text, px(p.TextSize), r.style)
		width += size.Width
	}
	return width
}

// wrap breaks the text at spaces and at newlines; a word wider than the line
// stands alone.
func (p *Prose) wrap(width float32) []string {
	var lines []string
	for _, part := range strings.Split(p.Text, "\n") {
		line := ""
		for i, word := range pieces(part) {
			longer := line + " " + word
			if i == 0 {
				longer = word
			}
			if i > 0 && p.lineWidth(longer) > width+slack {
				lines = append(lines, line)
				longer = word
			}
			line = longer
		}
		lines = append(lines, line)
	}
	return p.clip(lines, width)
}

// clip keeps the lines that are drawn; the last one ends in dots where some are
// left out.
func (p *Prose) clip(lines []string, width float32) []string {
	if p.Lines <= 0 || len(lines) <= p.Lines {
		return lines
	}
	lines = lines[:p.Lines]
	last := lines[p.Lines-1]
	for {
		cut := strings.LastIndex(last, " ")
		if cut < 0 || p.lineWidth(last+dots) <= width {
			break
		}
		last = last[:cut]
	}
	lines[p.Lines-1] = last + dots
	return lines
}

// Cut reports whether some of the text is not drawn or leaves the widget.
func (p *Prose) Cut() bool {
	lines := p.wrap(p.Size().Width)
	drawn := 0
	for _, line := range lines {
		if p.lineWidth(line) > p.Size().Width+slack {
			return true
		}
		drawn += len(strings.Fields(line))
	}
	return drawn != len(strings.Fields(p.Text)) || strings.HasSuffix(lines[len(lines)-1], dots) ||
		float32(len(lines))*p.lineHeight() > p.Size().Height+slack
}

// CreateRenderer implements [fyne.Widget].
func (p *Prose) CreateRenderer() fyne.WidgetRenderer {
	p.ExtendBaseWidget(p)
	return newPainting(p)
}

// least is the whole text for one line, else the widest word by the lines.
func (p *Prose) least() fyne.Size {
	if p.Lines == 1 {
		return fyne.NewSize(p.Width(), p.lineHeight())
	}
	width := float32(0)
	for _, word := range pieces(strings.ReplaceAll(p.Text, "\n", " ")) {
		width = max(width, p.lineWidth(word))
	}
	return fyne.NewSize(width, float32(max(p.Lines, 1))*p.lineHeight())
}

// paint draws one text object for each run of each line.
func (p *Prose) paint(size fyne.Size) []fyne.CanvasObject {
	if p.Text == "" {
		return nil
	}
	var texts []fyne.CanvasObject
	height := p.lineHeight()
	for i, line := range p.wrap(size.Width) {
		x := float32(0)
		switch rest := size.Width - p.lineWidth(line); p.Align {
		case fyne.TextAlignTrailing:
			x = rest
		case fyne.TextAlignCenter:
			x = rest / 2
		}
		texts = append(texts, p.paintLine(line, fyne.NewPos(x, float32(i)*height))...)
	}
	return texts
}

// ascent is how far the baseline of a line is below its top.
func (p *Prose) ascent(line string) float32 {
	ascent := float32(0)
	for _, run := range runsOf(line, p.style) {
		_, baseline := measure(run.text, px(p.TextSize), run.style)
		ascent = max(ascent, baseline)
	}
	return ascent
}

// paintLine draws the runs of a line, all on the baseline of the lowest.
func (p *Prose) paintLine(line string, at fyne.Position) []fyne.CanvasObject {
	list, ascent := runsOf(line, p.style), p.ascent(line)
	texts := make([]fyne.CanvasObject, len(list))
	for i, run := range list {
		text := canvas.NewText(run.text, tint(p.Color))
		text.TextSize, text.TextStyle = px(p.TextSize), run.style
		size, baseline := measure(run.text, text.TextSize, run.style)
		text.Resize(size)
		text.Move(at.AddXY(0, ascent-baseline))
		texts[i] = text
		at.X += size.Width
	}
	return texts
}

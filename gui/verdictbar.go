package gui

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// VerdictBar says what becomes of a state of the wanted sign: badge, word, a
// sentence of two lines, and a button that mends what blocks. The place on the
// right waits for the temperature, which comes with the cloud.
type VerdictBar struct {
	widget.BaseWidget
	Metrics Metrics
	OnApply func(session.Advice)
	OnWhy   func() // tells all about a failure, and tries again
	OnOpen  func()

	badge     *Badge
	word      *Prose
	sentence  *Prose
	fault     *Fault // why there is no report
	unapplied *Fault // how many texts are not in the plan
	button    *Button
	advice    *session.Advice
	hasPlan   bool
}

var _ fyne.Widget = (*VerdictBar)(nil)

// NewVerdictBar returns a bar without a verdict. key takes the keys that are not
// the button's.
func NewVerdictBar(apply func(session.Advice), why, open func(), key func(*fyne.KeyEvent)) *VerdictBar {
	v := &VerdictBar{OnApply: apply, OnWhy: why, OnOpen: open, Metrics: metrics[fullFold],
		badge: NewBadge(metrics[fullFold].Badge), word: NewProse("", textVerdict, 1).bold(),
		sentence: NewProse("", textBody, 2), fault: NewFault("", textBody, 2), unapplied: NewFault("", textAxis, 1)}
	v.button = NewButton("", v.press)
	v.button.OnKey = key
	v.button.Hide()
	v.fault.Hide()
	v.unapplied.Hide()
	v.ExtendBaseWidget(v)
	return v
}

// press opens a plan where there is none, applies the advice, or tells all about a
// failure.
func (v *VerdictBar) press() {
	switch {
	case !v.hasPlan:
		v.OnOpen()
	case v.advice != nil:
		v.OnApply(*v.advice)
	default:
		v.OnWhy()
	}
}

// Set shows the verdict of a state; a stale one is soft.
func (v *VerdictBar) Set(s session.State) {
	verdict := s.Verdict
	v.badge.set(strings.ToLower(verdict.Word), isFloor(s), s.Fading)
	v.word.Text = verdict.Word
	v.sentence.Text = sentenceAlone(verdict)
	if verdict.Word == "" {
		v.word.Text, v.sentence.Text = waiting(s)
	}
	v.word.Color, v.sentence.Color = ColorInk, ColorInk
	if s.Fading {
		v.word.Color, v.sentence.Color = ColorSoftInk, ColorSoftInk
		if s.Undo != "" {
			v.sentence.Text = "From before: " + s.Undo + "."
		}
	}
	v.advice, v.hasPlan = verdict.Advice, s.Plan != nil
	if s.Fading {
		v.advice = nil
	}
	v.failure(s)
	v.unapplied.SetText(notApplied(s.Unapplied))
	show(v.unapplied, s.Unapplied > 0)
	v.Refresh()
}

// sentenceAlone is the sentence without the word that stands beside it already.
func sentenceAlone(v session.Verdict) string {
	text := strings.TrimPrefix(v.Sentence, v.Word+": ")
	first, size := utf8.DecodeRuneInString(text)
	if size == len(text) {
		return text
	}
	return string(unicode.ToUpper(first)) + text[size:]
}

// waiting is what stands in place of a verdict.
func waiting(s session.State) (word, sentence string) {
	switch {
	case s.Plan == nil:
		return "No plan", "Open a plan, or start one from a template."
	case s.Busy:
		return "Judging", "The first verdict is on its way."
	}
	return "No verdict", ""
}

// failure shows why a plan has no report, and the button to try again.
func (v *VerdictBar) failure(s session.State) {
	show(v.fault, s.Failure != nil)
	show(v.sentence, s.Failure == nil)
	if s.Failure != nil {
		v.fault.SetText(strings.TrimSuffix(s.Failure.Reason, ".") + ". " + s.Failure.Cure)
		v.advice = nil
	}
	switch {
	case !v.hasPlan:
		v.button.SetText("Open a plan")
	case s.Failure != nil:
		v.button.SetText("Retry, or see all of it")
	case v.advice != nil:
		v.button.SetText(v.advice.Text)
	}
	show(v.button, !v.hasPlan || s.Failure != nil || v.advice != nil)
}

// notApplied counts the fields whose text is not in the plan.
func notApplied(n int) string {
	if n == 1 {
		return "1 field not applied"
	}
	return fmt.Sprintf("%d fields not applied", n)
}

// CreateRenderer implements [fyne.Widget].
func (v *VerdictBar) CreateRenderer() fyne.WidgetRenderer {
	v.ExtendBaseWidget(v)
	return newPainting(v)
}

func (v *VerdictBar) least() fyne.Size { return fyne.NewSize(0, v.Metrics.Verdict) }

func (v *VerdictBar) paint(size fyne.Size) []fyne.CanvasObject {
	m := v.Metrics
	v.badge.Side, v.word.TextSize = m.Badge, m.VerdictText
	side, gap, first := px(m.Badge), m.Padding, size.Height
	if m.Fold == drawerFold {
		first = side + 2*px(space8)
	}
	v.badge.Move(fyne.NewPos(gap, (first-side)/2))
	v.badge.Resize(fyne.NewSquareSize(side))
	x := gap + side + px(space12)
	v.word.Move(fyne.NewPos(x, (first-v.word.lineHeight())/2))
	v.word.Resize(fyne.NewSize(v.word.Width(), v.word.lineHeight()))
	if m.Fold == drawerFold {
		v.placeTexts(gap, size.Width-gap, first, size.Height)
	} else {
		v.placeTexts(x+v.word.Width()+gap, size.Width-m.Temperature-gap, 0, size.Height)
	}
	return []fyne.CanvasObject{
		filled(fyne.Position{}, size, ColorPanel),
		filled(fyne.NewPos(0, size.Height-lineThin), fyne.NewSize(size.Width, lineThin), ColorEdge),
		v.badge, v.word, v.sentence, v.fault, v.unapplied, v.button,
	}
}

// placeTexts places sentence and button between two edges and two heights.
func (v *VerdictBar) placeTexts(left, right, top, bottom float32) {
	m := v.Metrics
	if v.button.Visible() {
		high := min(v.button.HeightFor(m.Advice), bottom-top-px(space8))
		right -= m.Advice
		v.button.Move(fyne.NewPos(right, top+(bottom-top-high)/2))
		v.button.Resize(fyne.NewSize(m.Advice, high))
		right -= m.Padding
	}
	width := right - left
	total := float32(0)
	var shown []fyne.CanvasObject
	for _, o := range []fyne.CanvasObject{v.sentence, v.fault, v.unapplied} {
		if o.Visible() {
			shown = append(shown, o)
			total += heightFor(o, width)
		}
	}
	y := top + max(0, (bottom-top-total)/2)
	for _, o := range shown {
		o.Move(fyne.NewPos(left, y))
		o.Resize(fyne.NewSize(width, heightFor(o, width)))
		y += o.Size().Height
	}
}

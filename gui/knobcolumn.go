package gui

import (
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// KnobColumn holds the stage rail, the knobs as they stand at the end of the
// selected stage, the wanted sign, and every other value of the plan in groups that
// can be opened.
type KnobColumn struct {
	widget.BaseWidget
	Metrics Metrics
	On      ColumnEvents

	desk     *session.Session
	state    session.State // the one that is shown
	rail     *Segmented
	stops    []int // stages of the rail
	heading  *Prose
	column   *Column
	scroller *Scroller
	rows     map[string]*KnobRow
	choices  map[string]*choiceRow
	sections map[string]*section // by the names of the groups
	order    []string            // IDs of the fields that are shown
	atHand   string              // field that had the focus last; its slider is shown
}

// ColumnEvents are what the column tells of. None may be nil.
type ColumnEvents struct {
	Echo   func()                                  // the session has taken an action
	Leave  func(direction int)                     // Tab
	Menu   func(f session.Field, at fyne.Position) // a field's menu is wanted
	Key    func(*fyne.KeyEvent)                    // a key that nothing here uses
	Failed func(error)                             // an action was refused
}

var _ fyne.Widget = (*KnobColumn)(nil)

// NewKnobColumn returns a column that edits the plan of a session.
func NewKnobColumn(desk *session.Session, events ColumnEvents) *KnobColumn {
	k := &KnobColumn{desk: desk, On: events, Metrics: metrics[fullFold],
		rows: map[string]*KnobRow{}, choices: map[string]*choiceRow{}, sections: map[string]*section{}}
	k.rail = NewSegmented(func(i int) {
		k.desk.SelectStage(k.stops[i])
		k.On.Echo()
	})
	k.rail.Linked = true
	k.rail.OnKey, k.rail.OnFocus = events.Key, func() { k.scroller.Reveal(k.rail) }
	k.heading = NewProse("", textBody, 2).bold()
	k.column = NewColumn(space8, space12)
	k.scroller = NewScroller(k.column)
	k.ExtendBaseWidget(k)
	return k
}

// Set shows the values of a state.
func (k *KnobColumn) Set(s session.State) {
	k.state = s
	k.setRail(s)
	k.heading.SetText(knobHeading(s))
	k.assemble()
	k.scroller.Fit()
}

func (k *KnobColumn) setRail(s session.State) {
	cells, chosen := make([]string, len(s.Rail)), -1
	k.stops = k.stops[:0]
	for i, stop := range s.Rail {
		cells[i] = stop.Name
		k.stops = append(k.stops, stop.Stage)
		if stop.Stage == s.Stage {
			chosen = i
		}
	}
	k.rail.Set(cells, chosen)
}

// knobHeading says which stage the knobs belong to.
func knobHeading(s session.State) string {
	for _, stop := range s.Rail {
		if stop.Stage != s.Stage {
			continue
		}
		if stop.Stage == session.StartStage {
			return "Knobs at the start"
		}
		return "Knobs at the end of '" + stop.Name + "'"
	}
	return ""
}

// assemble puts what is to be seen in order, keeping what is there already.
func (k *KnobColumn) assemble() {
	k.order = k.order[:0]
	objects := []fyne.CanvasObject{k.rail, k.heading}
	for _, f := range k.state.Knobs {
		objects = append(objects, k.show(f))
	}
	if aim, ok := k.state.Field(aimField); ok {
		objects = append(objects, k.show(aim))
	}
	for _, g := range k.state.Groups {
		objects = append(objects, k.assembleGroup(g)...)
	}
	if slices.Equal(objects, k.column.Objects) {
		return
	}
	before := k.column.Objects
	k.column.Objects = objects
	k.column.Refresh()
	k.letGo(before)
}

// aimField is the wanted sign, which stands below the knobs.
const aimField = "/aim_sign"

// show shows one field and returns what shows it.
func (k *KnobColumn) show(f session.Field) fyne.CanvasObject {
	k.order = append(k.order, f.ID)
	if f.Kind == session.ChoiceField {
		choice := k.choice(f.ID)
		choice.set(f)
		return choice
	}
	preview := ""
	if s := &k.state; s.Preview != nil && s.Preview.Field == f.ID {
		preview = s.Preview.Text
	}
	row := k.row(f.ID)
	row.FieldWidth = k.Metrics.Field
	row.Set(f, preview, k.state.Track, f.ID == k.atHand)
	return row
}

func (k *KnobColumn) choice(id string) *choiceRow {
	if k.choices[id] == nil {
		k.choices[id] = k.newChoice(id)
	}
	return k.choices[id]
}

func (k *KnobColumn) row(id string) *KnobRow {
	if k.rows[id] == nil {
		k.rows[id] = k.newRow(id)
	}
	return k.rows[id]
}

// SetMetrics changes the sizes.
func (k *KnobColumn) SetMetrics(m Metrics) {
	k.Metrics = m
	for _, row := range k.rows {
		row.FieldWidth = m.Field
	}
}

// Drop forgets the edits of every field that are not in the plan.
func (k *KnobColumn) Drop() {
	for _, row := range k.rows {
		row.field.Drop()
	}
}

// Reveal brings a field into sight, opening its group, and gives it the focus.
func (k *KnobColumn) Reveal(id string) {
	if _, ok := k.state.Field(id); !ok {
		return
	}
	k.openFor(id)
	if choice := k.choices[id]; choice != nil {
		takeFocus(choice.words)
		k.scroller.Reveal(choice)
		return
	}
	row := k.rows[id]
	row.field.takeFocus()
	k.scroller.Reveal(row)
}

// CreateRenderer implements [fyne.Widget].
func (k *KnobColumn) CreateRenderer() fyne.WidgetRenderer {
	k.ExtendBaseWidget(k)
	return newPainting(k)
}

func (k *KnobColumn) least() fyne.Size { return fyne.NewSize(k.Metrics.Knobs, 0) }

// paint keeps the field with the focus in sight where the column gets lower.
func (k *KnobColumn) paint(size fyne.Size) []fyne.CanvasObject {
	lower := size.Height < k.scroller.Size().Height
	k.scroller.Resize(fyne.NewSize(size.Width-lineThin, size.Height))
	if row := k.rows[k.atHand]; lower && row != nil && row.field.Focused() {
		k.scroller.Reveal(row)
	}
	return []fyne.CanvasObject{
		filled(fyne.Position{}, size, ColorPanel),
		k.scroller,
		filled(fyne.NewPos(size.Width-lineThin, 0), fyne.NewSize(lineThin, size.Height), ColorEdge),
	}
}

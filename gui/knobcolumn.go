package gui

import (
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// KnobColumn holds the stage rail, the knobs as they stand at the end of the
// selected stage, and what else belongs to that stage.
type KnobColumn struct {
	widget.BaseWidget
	Metrics Metrics
	On      ColumnEvents

	desk     *session.Session
	rail     *Segmented
	stops    []int // stages of the rail
	heading  *Prose
	column   *Column
	scroller *Scroller
	rows     map[string]*KnobRow
	choices  map[string]*choiceRow
	order    []string
	atHand   string // field whose slider is shown
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
		rows: map[string]*KnobRow{}, choices: map[string]*choiceRow{}}
	k.rail = NewSegmented(func(i int) {
		k.desk.SelectStage(k.stops[i])
		k.On.Echo()
	})
	k.rail.Linked = true
	k.rail.OnKey = events.Key
	k.heading = NewProse("", textBody, 2).bold()
	k.column = NewColumn(space8, space12)
	k.scroller = NewScroller(k.column)
	k.ExtendBaseWidget(k)
	return k
}

// Set shows the knobs of a state.
func (k *KnobColumn) Set(s session.State) {
	k.setRail(s)
	k.heading.SetText(knobHeading(s))
	fields := columnFields(s)
	if order := fieldIDs(fields); !slices.Equal(order, k.order) {
		k.order = order
		k.rebuild(fields)
	}
	for _, f := range fields {
		k.setField(f, s)
	}
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

// columnFields are the knobs, what belongs to the selected stage, and the wanted
// sign.
func columnFields(s session.State) []session.Field {
	fields := slices.Clone(s.Knobs)
	for _, g := range s.Groups {
		for _, f := range g.Fields {
			if g.Name == "Stage" || f.ID == "/aim_sign" {
				fields = append(fields, f)
			}
		}
	}
	return fields
}

func fieldIDs(fields []session.Field) []string {
	ids := make([]string, len(fields))
	for i, f := range fields {
		ids[i] = f.ID
	}
	return ids
}

// rebuild puts the rows in order, keeping those that are there already.
func (k *KnobColumn) rebuild(fields []session.Field) {
	objects := []fyne.CanvasObject{k.rail, k.heading}
	for _, f := range fields {
		if f.Kind == session.ChoiceField {
			objects = append(objects, k.choice(f.ID))
		} else {
			objects = append(objects, k.row(f.ID))
		}
	}
	k.column.Objects = objects
	k.column.Refresh()
}

func (k *KnobColumn) choice(id string) *choiceRow {
	if k.choices[id] == nil {
		k.choices[id] = newChoiceRow(func(word string) { k.did(k.desk.Commit(id, word)) }, k.On.Key)
	}
	return k.choices[id]
}

func (k *KnobColumn) row(id string) *KnobRow {
	if k.rows[id] == nil {
		k.rows[id] = k.newRow(id)
	}
	return k.rows[id]
}

// setField shows one field.
func (k *KnobColumn) setField(f session.Field, s session.State) {
	if f.Kind == session.ChoiceField {
		k.choices[f.ID].set(f)
		return
	}
	preview := ""
	if s.Preview != nil && s.Preview.Field == f.ID {
		preview = s.Preview.Text
	}
	row := k.rows[f.ID]
	row.FieldWidth = k.Metrics.Field
	row.Set(f, preview, s.Track, f.ID == k.atHand)
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

// Reveal brings a field into sight and gives it the focus.
func (k *KnobColumn) Reveal(id string) {
	row := k.rows[id]
	if row == nil || !slices.Contains(k.order, id) {
		return
	}
	if c := fyne.CurrentApp().Driver().CanvasForObject(row.field); c != nil {
		c.Focus(row.field)
	}
	k.scroller.Reveal(row)
}

// CreateRenderer implements [fyne.Widget].
func (k *KnobColumn) CreateRenderer() fyne.WidgetRenderer {
	k.ExtendBaseWidget(k)
	return newPainting(k)
}

func (k *KnobColumn) least() fyne.Size { return fyne.NewSize(k.Metrics.Knobs, 0) }

func (k *KnobColumn) paint(size fyne.Size) []fyne.CanvasObject {
	k.scroller.Resize(fyne.NewSize(size.Width-lineThin, size.Height))
	return []fyne.CanvasObject{
		filled(fyne.Position{}, size, ColorPanel),
		k.scroller,
		filled(fyne.NewPos(size.Width-lineThin, 0), fyne.NewSize(lineThin, size.Height), ColorEdge),
	}
}

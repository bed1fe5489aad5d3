package session

import (
	"fmt"
	"slices"
	"strings"

	"hilltop/bosehubbard/plan"
)

// entry is a Field with what the session needs to edit it.
type entry struct {
	Field
	measure  Measure
	value    float64 // in the unit of the document
	sets     int     // the stage an edit goes to, for knobs
	low, top float64 // of the slider, in the unit of the document; equal for none
	clear    []plan.Edit
	editsFor func(value any) []plan.Edit    // nil: one edit at SetPath
	encode   func(text string) (any, error) // of texts and choices; nil: the text itself
}

// edits returns what puts a value, in the unit of the document, into the plan.
func (e entry) edits(value any) []plan.Edit {
	if f, ok := value.(float64); ok && e.measure.Whole {
		value = int64(f)
	}
	if e.editsFor != nil {
		return e.editsFor(value)
	}
	return []plan.Edit{{Path: e.SetPath, Value: value}}
}

// catalogue holds every entry of a plan as one stage sees it.
type catalogue struct {
	knobs  []entry
	groups []entryGroup
}

type entryGroup struct {
	name    string
	entries []entry
	parts   []Part
	actions []Action
}

// all calls f with a pointer to every entry.
func (c *catalogue) all(f func(*entry)) {
	for i := range c.knobs {
		f(&c.knobs[i])
	}
	for i := range c.groups {
		for j := range c.groups[i].entries {
			f(&c.groups[i].entries[j])
		}
	}
}

// entryCache keeps the catalogue of one document and stage.
type entryCache struct {
	doc   *plan.Document
	stage int
	*catalogue
}

// catalogue returns the entries of the present plan and stage. The caller holds
// mu and must not change them.
func (s *Session) catalogue() *catalogue {
	if s.doc == nil {
		return &catalogue{}
	}
	if s.entries.catalogue == nil || s.entries.doc != s.doc.now || s.entries.stage != s.stage {
		s.entries = entryCache{s.doc.now, s.stage, s.catalogueOf(s.doc.now.Plan(), s.stage)}
	}
	return s.entries.catalogue
}

// catalogueOf builds the entries of any plan. The caller holds mu.
func (s *Session) catalogueOf(p *plan.Plan, stage int) *catalogue {
	facts := s.factsOf(p)
	c := &catalogue{knobs: knobs(p, stage, facts.recoil)}
	add := func(name string, entries []entry, parts []Part, actions []Action) {
		if len(entries) > 0 || len(actions) > 0 {
			c.groups = append(c.groups, entryGroup{name, entries, parts, actions})
		}
	}
	add(stageGroup, stageEntries(p, stage), nil, stageActions(p, stage))
	add(cloudGroup, cloudEntries(p, facts.states), nil, nil)
	add(latticeGroup, latticeEntries(p), latticeParts(p), nil)
	add(beamsGroup, beamEntries(p), beamParts(p), beamActions(p))
	add(fieldGroup, fieldEntries(p), resonanceParts(p), scatteringActions(p, facts.curves))
	add(modelGroup, modelEntries(p), axisParts(p), axisActions(p))
	add(levelsGroup, levelEntries(p), nil, nil)
	add(planGroup, planEntries(p), nil, nil)
	return c
}

// entry returns one entry with the shown unit, the slider and the typed text put
// in. The caller holds mu.
func (s *Session) entry(id string) (entry, bool) {
	var found *entry
	s.catalogue().all(func(e *entry) {
		if e.ID == id {
			found = e
		}
	})
	if found == nil {
		return entry{}, false
	}
	e := *found
	s.dress(&e)
	return e, true
}

// dress fills in what does not come from the plan. The caller holds mu.
func (s *Session) dress(e *entry) {
	if e.Kind == NumberField {
		if unit, chosen := s.units[e.ID]; chosen && e.measure.size(unit) != nil {
			e.Unit = unit
		}
		e.Text = e.measure.FormatNumber(e.value, e.Unit)
		e.Value = e.measure.inUnit(e.value, e.Unit)
		e.Units = e.measure.Units()
		e.Signed = e.measure.Signed
	}
	if e.Slider {
		low, top := s.sliderRange(e)
		e.Min, e.Max = e.measure.inUnit(low, e.Unit), e.measure.inUnit(top, e.Unit)
	}
	for _, p := range s.pending {
		if p.field == e.ID && p.stage == s.stage {
			e.Pending, e.Reason = p.text, p.reason
		}
	}
}

// sliderRange returns the ends of a slider, which stay while the value is inside,
// so that the track does not move under the hand.
func (s *Session) sliderRange(e *entry) (low, top float64) {
	kept, ok := s.ranges[e.ID]
	if !ok || e.value < kept[0] || e.value > kept[1] {
		kept = [2]float64{min(e.low, e.value), max(e.top, e.value)}
		s.ranges[e.ID] = kept
	}
	return kept[0], kept[1]
}

// fields returns all entries dressed for the view. The caller holds mu.
func (s *Session) fields() (knobs []Field, groups []Group) {
	c := s.catalogue()
	dressed := func(entries []entry) []Field {
		out := make([]Field, len(entries))
		for i := range entries {
			e := entries[i]
			s.dress(&e)
			out[i] = e.Field
		}
		return out
	}
	p := s.doc.now.Plan()
	for _, g := range c.groups {
		fields := dressed(g.entries)
		groups = append(groups, Group{g.name, summary(g.name, p, fields), fields, g.parts, g.actions})
	}
	return dressed(c.knobs), groups
}

// inUnit and inDocument convert between the unit of the document and a shown one;
// a unit that the measure does not take leaves the number as it is.
func (m Measure) inUnit(value float64, unit string) float64 {
	if out, err := m.Convert(value, unit); err == nil {
		return out
	}
	return value
}

func (m Measure) inDocument(value float64, unit string) float64 {
	back := m
	back.Unit = unit
	return back.inUnit(value, m.Unit)
}

// numberEntry builds the entry of one number. The path is its ID.
func numberEntry(label, path string, value float64, m Measure) entry {
	return entry{
		Field:   Field{ID: path, Label: label, Short: label, Kind: NumberField, Unit: m.Unit, Path: path, SetPath: path},
		measure: m, value: value,
	}
}

func textEntry(label, path, text string) entry {
	return entry{Field: Field{ID: path, Label: label, Short: label, Kind: TextField, Text: text, Path: path, SetPath: path}}
}

// longEntry is a text that may take several lines on the screen.
func longEntry(label, path, text string) entry {
	e := textEntry(label, path, text)
	e.Long = true
	return e
}

// under puts entries below the heading of a part, where their labels need not
// name it: word is what the labels name it by.
func under(part, word string, entries ...entry) []entry {
	for i := range entries {
		e := &entries[i]
		e.Part = part
		e.Short = capital(strings.TrimSpace(strings.Replace(e.Label, word, "", 1)))
	}
	return entries
}

func choiceEntry(label, path, text string, choices ...string) entry {
	e := textEntry(label, path, text)
	e.Kind, e.Choices = ChoiceField, choices
	e.encode = func(text string) (any, error) {
		if !slices.Contains(choices, text) {
			return nil, fmt.Errorf("is none of %s", strings.Join(choices, ", "))
		}
		return text, nil
	}
	return e
}

// axisIndex is 0, 1, 2 for x, y, z.
func axisIndex(name string) int { return max(0, strings.Index("xyz", name)) }

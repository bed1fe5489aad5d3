package session

import (
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// StartStage is the index of the settings before the first stage.
const StartStage = -1

// State is everything a view shows. It is complete and never changes after it
// was handed out; slices and pointers in it are shared and must not be written.
type State struct {
	Number uint64 // counts States; the larger is the newer

	Name   string     // of the document, for the window's title; "" where none is open
	Path   string     // "" where it was never saved
	Dirty  bool       // differs from the file, or from the template it came from
	Plan   *plan.Plan // nil where none is open
	Broken *Broken    // why the last attempt to open failed; nil after the next success

	Stage  int    // the selected stage, StartStage for the start
	Rail   []Stop // the stages that can be selected, start first
	Knobs  []Field
	Groups []Group    // every other value of the plan, in the order they are shown
	Rows   []StageRow // the stage table of the last good report

	Report   *report.Report // the last good one; nil before the first
	Judged   uint64         // counts good reports; a picture is old when this changed
	Verdict  Verdict
	Keys     PageKeys
	Stale    bool // Report is older than Plan
	Fading   bool // it has been for longer than a drag's delay: draw it dashed and soft
	Busy     bool // a judgement runs or waits
	Progress Progress
	Failure  *Failure // why Plan has no report; nil where it has one or waits for it

	Unapplied int      // fields with text that is not in the plan
	Preview   *Preview // what the text in the focused field would do
	Track     *Track   // the verdict along the focused knob's slider
	Dragging  bool

	Undo, Redo string // names of the edits, "" where there is none
	Touched    string // ID of the field that the last undo, redo or advice changed

	OnDisk     DiskState
	Recoveries []Recovery // work of earlier runs that ended without being asked
	Recent     []string   // paths, the last opened first
	Notice     string     // one sentence for the status line
	Jobs       map[string]Job
	Entropy    EntropyState
}

// Field returns the field with the ID, of the knobs or of any group.
func (s *State) Field(id string) (Field, bool) {
	for _, f := range s.Knobs {
		if f.ID == id {
			return f, true
		}
	}
	for _, g := range s.Groups {
		for _, f := range g.Fields {
			if f.ID == id {
				return f, true
			}
		}
	}
	return Field{}, false
}

// Stop is one place on the stage rail.
type Stop struct {
	Stage int
	Name  string
}

// Group is a heading with its fields.
type Group struct {
	Name    string
	Summary string // what the fields say, in one line
	Fields  []Field
	Parts   []Part   // headings inside the group, in the order of their fields
	Actions []Action // what changes the shape of the plan here
}

// Part is one of several things of a kind, such as one beam, whose fields stand
// under a heading of their own.
type Part struct {
	Name   string
	Remove *Action // nil where it cannot be taken out
}

// Action changes the shape of the plan; see [Session.Do].
type Action struct {
	ID    string
	Label string
}

// FieldKind says how a field is drawn.
type FieldKind int

// Kinds of fields.
const (
	NumberField FieldKind = iota
	TextField
	ChoiceField
	ReadOnlyField
)

// Field is one value of the plan with all that is needed to draw and edit it.
type Field struct {
	ID    string // stable while the plan keeps its shape; "power_w/sheet" of a knob, a path of others
	Label string // "Depth x"
	Short string // the label below the heading of its part; Label where it has none
	Part  string // name of the part of its group; "" for none
	Kind  FieldKind
	Long  bool // a text that may take several lines

	Text  string // as shown, without the unit
	Unit  string // the shown one; "" for none
	Units []string
	Value float64 // in Unit; numbers only
	Word  string  // for the sign: "attractive"

	Path      string // where the value in force is given; "" for a default
	SetPath   string // the path that sets it
	Inherited bool   // not given in the selected stage
	From      string // name of the stage that gives it, where Inherited
	SetsIn    string // name of the stage an edit goes to where that is not the selected one: a hold moves no knob
	Clearable bool   // Clear makes it inherited or absent again

	Signed   bool
	Slider   bool
	Min, Max float64 // of the slider, in Unit
	Choices  []string

	Pending string // uncommitted text that was refused or is being typed; "" for none
	Reason  string // why Pending was refused
}

// Verdict is what the verdict bar says. It belongs to State.Report and is stale
// with it.
type Verdict struct {
	Word     string // Sealed, Leaky, Open or Astray; "" before the first report
	Aim      string // "negative" or "positive"
	Sentence string // at most 96 characters
	Blocking string // name of the criterion that decides, "" where sealed
	Advice   *Advice
}

// Advice is a change that the button offers.
type Advice struct {
	Text    string // on the button: "Lower 'sheet' at 'lower': 45 → 31 mW, sealed"
	Knob    string // ID of the first field it changes, "" where it has none
	From    string // value in force, with unit
	To      string
	Verdict string // after it; "" while that is computed
	Set     []report.Set
}

// Progress is how far a computation is. Total is 0 where that is not known.
type Progress struct {
	Done, Total int
	Text        string // "63 %, about 4 s"
}

// Failure says why a plan could not be judged.
type Failure struct {
	Reason  string
	Cure    string   // what would help
	Path    string   // RFC 6901 of the value at fault, "" where there is none
	Field   string   // ID of its field
	Details []string // every mistake, where there are several
	Stopped bool     // by the user
}

// Broken says why a document could not be opened; the present one was kept.
type Broken struct {
	Name     string
	Reason   string
	Mistakes []string // one line each
}

// PreviewResult is what a text in a field means, at once.
type PreviewResult struct {
	Value float64 // in the unit of the document
	Unit  string
	Text  string // "= 2.6 mW"; "" for an error or where the text adds nothing
	Err   error  // *InputError
}

// Preview is a PreviewResult with the verdict that was computed for it.
type Preview struct {
	Field   string
	Text    string // "= 2.6 mW, sealed"
	Verdict string // "" while it is computed
}

// Track is the verdict along a slider. Points fill up while Done is false.
type Track struct {
	Field    string
	Unit     string
	Min, Max float64 // in Unit
	Points   []TrackPoint
	Done     bool
}

// TrackPoint is the verdict at one value; "" where the plan could not be judged.
type TrackPoint struct {
	Value   float64 // in the track's unit
	Verdict string
}

// StageRow is one row of the stage table, as text with units.
type StageRow struct {
	Stage       int // StartStage for the start
	Name        string
	Duration    string
	Tunnelling  string // J
	Interaction string // U with its word
	Curvature   string // V per site squared
	Scattering  string // a
	Trap        string
	Depth       string
	Crosses     string // "zero at 350.5 G"
}

// DiskState compares the open document with its file.
type DiskState int

// States of the file.
const (
	Same DiskState = iota
	Changed
	Missing
)

// Recovery is work that an earlier run left behind.
type Recovery struct {
	ID   string
	Name string
	Path string // of the document, "" where it was never saved
	Age  string // "2 minutes ago"
}

// Job is the state of a page's own computation.
type Job struct {
	Running bool
	Stale   bool // Result belongs to an older plan
	Progress
	Result any // the last good one
	Err    error
}

package session

import (
	"errors"
	"fmt"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

// InputError says what is wrong with a text in a field: field, typed, allowed, in
// force.
type InputError struct {
	Field  string // "Depth y at 'lower'"
	Reason string // "22 mW is a power; give Er, kHz or nK"
	Stays  string // "6.1 Er", "" where the field is empty
}

// Error returns the sentence below a field:
// "Depth y at 'lower': 22 mW is a power; give Er, kHz or nK. 6.1 Er stays."
func (e *InputError) Error() string {
	text := e.Field + ": " + strings.TrimSuffix(e.Reason, ".") + "."
	if e.Stays != "" {
		text += " " + e.Stays + " stays."
	}
	return text
}

// inputError wraps what refused a value of an entry. The caller holds mu.
func (s *Session) inputError(e entry, typed string, err error) *InputError {
	reason := err.Error()
	if found, ok := errors.AsType[*plan.FieldError](err); ok {
		reason = s.planReason(e, typed, err, found)
	}
	out := &InputError{Field: s.placeOf(e.ID), Reason: reason}
	if e.Text != "" {
		out.Stays = withUnit(e.Text, e.Unit)
	}
	return out
}

// planReason says why the plan refuses a value: by what stands at its own path if
// there is such a mistake, and else by the place of the first one.
func (s *Session) planReason(e entry, typed string, err error, first *plan.FieldError) string {
	if typed == "" {
		typed = "empty"
	}
	if all, ok := errors.AsType[plan.Errors](err); ok {
		for _, one := range all {
			if one.Path == e.SetPath || one.Path == e.Path {
				return typed + "; " + withNearest(one)
			}
		}
	}
	return typed + "; then " + s.placeOfPath(first.Path) + ": " + withNearest(first)
}

func withNearest(e *plan.FieldError) string {
	if e.Nearest == "" {
		return e.Reason
	}
	return fmt.Sprintf("%s; the nearest known is %q", e.Reason, e.Nearest)
}

// placeOf names a field and, for a knob, the stage it is set in. The caller holds
// mu.
func (s *Session) placeOf(id string) string {
	e, ok := s.entry(id)
	if !ok {
		return id
	}
	return e.Label + s.inStage(e)
}

// inStage is " at 'lower'" for a knob and for the values of a stage.
func (s *Session) inStage(e entry) string {
	stage := s.stage
	switch {
	case isKnob(e.ID):
		stage = e.sets
	case !strings.HasPrefix(e.ID, "/stages/"):
		return ""
	}
	return " at '" + s.stageName(stage) + "'"
}

// isKnob tells the IDs of knobs from paths.
func isKnob(id string) bool { return id != "" && id[0] != '/' }

func (s *Session) stageName(stage int) string {
	if s.doc == nil || stage < 0 || stage >= len(s.doc.now.Plan().Stages) {
		return "start"
	}
	return s.doc.now.Plan().Stages[stage].Name
}

// placeOfPath names the place of a path in words where it can: the field, or the
// stage.
func (s *Session) placeOfPath(path string) string {
	if id := s.fieldAt(path); id != "" {
		return s.placeOf(id)
	}
	tokens, err := plan.SplitPath(path)
	if err != nil || len(tokens) < 2 || tokens[0] != "stages" {
		return path
	}
	i, err := strconv.Atoi(tokens[1])
	if err != nil {
		return path
	}
	return "'" + s.stageName(i) + "'"
}

// fieldAt returns the ID of the field whose value stands at a path, or "".
func (s *Session) fieldAt(path string) string {
	id := ""
	s.catalogue().all(func(e *entry) {
		if id == "" && path != "" && (e.SetPath == path || e.Path == path) {
			id = e.ID
		}
	})
	if id == "" {
		id = knobAt(path)
		if _, ok := s.entry(id); !ok {
			return ""
		}
	}
	return id
}

// knobAt returns the knob that a path of a stage or of the start names, or "".
func knobAt(path string) string {
	tokens, err := plan.SplitPath(path)
	if err != nil || len(tokens) < 2 {
		return ""
	}
	switch tokens[0] {
	case "stages":
		tokens = tokens[2:]
	case "start", "model":
		tokens = tokens[1:]
	default:
		return ""
	}
	return strings.Join(tokens, "/")
}

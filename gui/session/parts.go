package session

import (
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

// ErrNoAction says that an action is not one of those that a group offers.
var ErrNoAction = errors.New("session: no such action")

// reshaping is a change of the shape of a plan: its name in the history, the edits,
// and the field to lead to after it.
type reshaping struct {
	name  string
	field string
	edits []plan.Edit
}

// Kinds of actions: the ID is one of these before the path of a list or of one of
// its entries.
const (
	adds    = "add "
	removes = "remove "
	raises  = "earlier "
	lowers  = "later "
)

// Paths of the lists whose entries come and go.
const (
	stageList      = "/stages"
	beamList       = "/beams"
	resonanceList  = "/scattering/resonances"
	scatteringPath = "/scattering"
	axisList       = "/model/sites"
)

func action(kind, path, label string) Action { return Action{kind + path, label} }

// removal is the action that takes an entry out of a list.
func removal(list string, i int) *Action {
	return &Action{removes + list + "/" + strconv.Itoa(i), "Remove"}
}

// Do carries out an action of a group; it is one entry of the history.
//
// It returns ErrNoAction, or the errors of the plan, which then stays as it is.
func (s *Session) Do(id string) error {
	kind, path := cutAction(id)
	list, index := cutIndex(path)
	switch kind + list {
	case adds + stageList:
		return s.AddStage(index)
	case removes + stageList:
		return s.RemoveStage(index)
	case raises + stageList:
		return s.MoveStage(index, -1)
	case lowers + stageList:
		return s.MoveStage(index, +1)
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil || !s.offers(id) {
		return ErrNoAction
	}
	s.endDrag(false)
	change, err := s.reshaping(kind+list, index)
	if err != nil {
		return err
	}
	before := s.doc.now
	next, err := before.Apply(change.edits...)
	if err != nil {
		return err
	}
	s.run = stepRun{}
	s.pending = slices.DeleteFunc(s.pending, func(p pendingText) bool { return strings.HasPrefix(p.field, list+"/") })
	s.record(change.name, change.field, before, next)
	s.afterEdit(change.field)
	s.changed(urgent)
	return nil
}

// cutAction splits an ID into the kind of the action and the path.
func cutAction(id string) (kind, path string) {
	kind, path, _ = strings.Cut(id, " ")
	return kind + " ", path
}

// cutIndex splits the index off a path; a path without one is a list as a whole.
func cutIndex(path string) (list string, index int) {
	at := strings.LastIndex(path, "/")
	if at < 0 {
		return path, 0
	}
	i, err := strconv.Atoi(path[at+1:])
	if err != nil {
		return path, 0
	}
	return path[:at], i
}

// offers reports whether a group offers an action now. The caller holds mu.
func (s *Session) offers(id string) bool {
	for _, g := range s.catalogue().groups {
		if slices.ContainsFunc(g.actions, func(a Action) bool { return a.ID == id }) ||
			slices.ContainsFunc(g.parts, func(p Part) bool { return p.Remove != nil && p.Remove.ID == id }) {
			return true
		}
	}
	return false
}

// reshaping returns what an action does. The caller holds mu.
func (s *Session) reshaping(what string, index int) (reshaping, error) {
	p := s.doc.now.Plan()
	switch what {
	case adds + beamList:
		return addBeam(p), nil
	case removes + beamList:
		return removeBeam(s.doc.now, index), nil
	case adds + scatteringPath:
		return addScattering(p), nil
	case removes + scatteringPath:
		return reshaping{"scattering length of the species file", "", []plan.Edit{{Path: scatteringPath}}}, nil
	case adds + resonanceList:
		return addResonance(p), nil
	case removes + resonanceList:
		return removeResonance(s.doc.now, index), nil
	case adds + axisList:
		return addAxis(p), nil
	case removes + axisList:
		return removeAxis(p, index)
	}
	return reshaping{}, ErrNoAction
}

// withoutEntry returns the edits that bring the keys of measured, limits and
// uncertainty in line with a list that loses an entry: those of the entry go, those
// of later entries move up.
func withoutEntry(d *plan.Document, list string, index int) []plan.Edit {
	var edits []plan.Edit
	later := map[int][]plan.Edit{}
	p := d.Plan()
	for _, key := range referenceKeys(p) {
		rest, inList := strings.CutPrefix(key.path, list+"/")
		number, tail, _ := strings.Cut(rest, "/")
		i, err := strconv.Atoi(number)
		if !inList || err != nil || i < index {
			continue
		}
		old := plan.JoinPath(key.object, key.path)
		if i == index {
			edits = append(edits, plan.Edit{Path: old})
			continue
		}
		value, _ := d.Value(old)
		moved := fmt.Sprintf("%s/%d/%s", list, i-1, tail)
		later[i] = append(later[i], plan.Edit{Path: plan.JoinPath(key.object, moved), Value: value}, plan.Edit{Path: old})
	}
	for i := index + 1; len(later) > 0; i++ {
		edits = append(edits, later[i]...)
		delete(later, i)
	}
	return edits
}

// referenceKey is one key of measured, limits or uncertainty: a path.
type referenceKey struct{ object, path string }

func referenceKeys(p *plan.Plan) []referenceKey {
	var keys []referenceKey
	add := func(object, path string) { keys = append(keys, referenceKey{object, path}) }
	for path := range p.Measured {
		add("measured", path)
	}
	for path := range p.Limits {
		add("limits", path)
	}
	for path := range p.Uncertainty {
		add("uncertainty", path)
	}
	slices.SortFunc(keys, func(a, b referenceKey) int { return strings.Compare(a.object+a.path, b.object+b.path) })
	return keys
}

// stageActions change the order of the stages about the selected one.
func stageActions(p *plan.Plan, stage int) []Action {
	if p.Levels != nil {
		return nil
	}
	at := func(kind, label string) Action { return action(kind, stageList+"/"+strconv.Itoa(stage), label) }
	list := []Action{at(adds, "Add a stage")}
	if stage < 0 {
		return list
	}
	if stage > 0 {
		list = append(list, at(raises, "Move earlier"))
	}
	if stage < len(p.Stages)-1 {
		list = append(list, at(lowers, "Move later"))
	}
	return append(list, at(removes, "Remove stage"))
}

func latticeParts(p *plan.Plan) []Part {
	if p.Lattice == nil {
		return nil
	}
	parts := make([]Part, len(p.Lattice.Axes))
	for i, axis := range p.Lattice.Axes {
		parts[i].Name = latticePart(axis)
	}
	return parts
}

func latticePart(axis plan.LatticeAxis) string { return "Beam along " + axis.Axis }

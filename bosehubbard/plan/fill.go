package plan

import "slices"

// wholeList returns the list that an entry at the tokens would be part of, if that
// list is missing or is one number for all axes, and nil otherwise.
func (e *editor) wholeList(tokens []string) []any {
	if len(tokens) < 3 {
		return nil
	}
	key := tokens[len(tokens)-2]
	holder := e.find(tokens[:len(tokens)-2])
	if holder == nil || holder.kind != objectKind {
		return nil
	}
	present := holder.member(key)
	single := present != nil && present.kind == numberKind
	if present != nil && !single {
		return nil
	}
	switch {
	case key == "waist_um" && single && (tokens[0] == "lattice" || tokens[0] == "beams"):
		x := e.text[present.start:present.end]
		return []any{rawNumber(x), rawNumber(x)}
	case tokens[0] == "model" && len(tokens) == 3 && key == "periodic" && !single && e.plan.Model != nil:
		return anys(e.plan.Model.Periodicity())
	case tokens[0] == "model" && len(tokens) == 3:
		return anys(listOf(e.plan.startRow(), key))
	case tokens[0] == "stages" && len(tokens) == 4:
		i, ok := listIndex(tokens[1])
		if rows := e.plan.Rows(); ok && i+1 < len(rows) {
			if single {
				i++
			}
			return anys(listOf(rows[i], key))
		}
	}
	return nil
}

// rawNumber is a number as the user wrote it.
type rawNumber []byte

// MarshalJSON returns the text of the number.
func (r rawNumber) MarshalJSON() ([]byte, error) { return r, nil }

// listOf returns the knobs of a row that stand in one list of the document.
func listOf(r Row, key string) []float64 {
	switch key {
	case "depth_er":
		return r.DepthEr
	case "tunnelling_hz":
		return r.TunnellingHz
	case "curvature_hz":
		return r.CurvatureHz
	}
	return nil
}

func anys[T any](list []T) []any {
	if len(list) == 0 {
		return nil
	}
	out := make([]any, len(list))
	for i, x := range list {
		out[i] = x
	}
	return out
}

// withEntry puts the value of an edit into its place in the list.
func withEntry(list []any, edit Edit, token string) ([]any, error) {
	i, ok := listIndex(token)
	if !ok || i >= len(list) {
		return nil, refuse(edit.Path, "", "the list has %d entries, no entry %s", len(list), token)
	}
	list[i] = edit.Value
	return list, nil
}

// inherited returns the list in force before a stage and that at its end, if the
// tokens name an entry of a list of knobs that the stage gives.
func (e *editor) inherited(tokens []string) (before, after []float64, entry int, ok bool) {
	if len(tokens) != 4 || tokens[0] != "stages" {
		return nil, nil, 0, false
	}
	stage, isStage := listIndex(tokens[1])
	entry, isEntry := listIndex(tokens[3])
	rows := e.plan.Rows()
	if !isStage || !isEntry || stage+1 >= len(rows) {
		return nil, nil, 0, false
	}
	before, after = listOf(rows[stage], tokens[2]), listOf(rows[stage+1], tokens[2])
	given := e.find(tokens[:3])
	ok = given != nil && len(before) == len(after) && len(given.children) == len(after) && entry < len(after)
	return before, after, entry, ok
}

// removeEntry gives an entry of a list of knobs in a stage the value in force
// before the stage, or drops the list if that changes nothing any more.
func (e *editor) removeEntry(path string, tokens []string) (text []byte, done bool, err error) {
	before, after, entry, ok := e.inherited(tokens)
	if !ok {
		return nil, false, nil
	}
	after = slices.Clone(after)
	if after[entry] = before[entry]; slices.Equal(before, after) {
		text, err = e.remove(path, tokens[:3])
	} else {
		text, err = e.set(path, tokens, before[entry])
	}
	return text, true, err
}

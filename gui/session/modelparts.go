package session

import (
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

// mostAxes is how many axes a model can have.
const mostAxes = 3

func modelPart(axis int) string { return "Axis " + axisName(axis) }

// axisParts are the axes of a model that has several.
func axisParts(p *plan.Plan) []Part {
	if p.Model == nil || len(p.Model.Sites) < 2 {
		return nil
	}
	parts := make([]Part, len(p.Model.Sites))
	for i := range parts {
		parts[i] = Part{modelPart(i), removal(axisList, i)}
	}
	return parts
}

func axisActions(p *plan.Plan) []Action {
	if p.Model == nil || len(p.Model.Sites) >= mostAxes {
		return nil
	}
	return []Action{action(adds, axisList, "Add an axis")}
}

// addAxis adds an axis of one site, with which the model means the same.
func addAxis(p *plan.Plan) reshaping {
	n := len(p.Model.Sites)
	field := axisList + "/" + strconv.Itoa(n)
	edits := []plan.Edit{{Path: axisList, Value: append(slices.Clone(p.Model.Sites), 1)}}
	edits = append(edits, listsPerAxis(p, func(list []float64) []float64 { return append(list, list[n-1]) })...)
	if p.Model.Periodic != nil {
		edits = append(edits, plan.Edit{Path: "/model/periodic", Value: append(slices.Clone(p.Model.Periodic), false)})
	}
	return reshaping{"add axis " + axisName(n), field, edits}
}

// removeAxis takes an axis out. Atoms that were given per site then have no place.
func removeAxis(p *plan.Plan, index int) (reshaping, error) {
	for _, key := range referenceKeys(p) {
		if _, last := cutIndex(key.path); last > 0 || strings.HasSuffix(key.path, "/0") {
			return reshaping{}, fmt.Errorf("session: %s names an axis by its number (%s), want that removed before axes are", key.object, key.path)
		}
	}
	without := func(list []float64) []float64 { return slices.Delete(list, index, index+1) }
	edits := []plan.Edit{{Path: axisList, Value: slices.Delete(slices.Clone(p.Model.Sites), index, index+1)}}
	edits = append(edits, listsPerAxis(p, without)...)
	if p.Model.Periodic != nil {
		edits = append(edits, plan.Edit{Path: "/model/periodic", Value: slices.Delete(slices.Clone(p.Model.Periodic), index, index+1)})
	}
	if p.Model.Fock != nil && p.Model.Sites[index] > 1 {
		edits = append(edits, plan.Edit{Path: fockPath})
	}
	return reshaping{"remove axis " + axisName(index), "", edits}, nil
}

// listsPerAxis changes every list of the plan that has one number per axis.
func listsPerAxis(p *plan.Plan, change func([]float64) []float64) []plan.Edit {
	var edits []plan.Edit
	put := func(path string, list []float64) {
		edits = append(edits, plan.Edit{Path: path, Value: change(slices.Clone(list))})
	}
	if t := p.Model.TunnellingHz; !t.Single {
		put("/model/tunnelling_hz", t.Values)
	}
	if p.Model.CurvatureHz != nil {
		put("/model/curvature_hz", p.Model.CurvatureHz)
	}
	for i, stage := range p.Stages {
		begin := stageList + "/" + strconv.Itoa(i)
		if t := stage.TunnellingHz; t != nil && !t.Single {
			put(begin+"/tunnelling_hz", t.Values)
		}
		if stage.CurvatureHz != nil {
			put(begin+"/curvature_hz", stage.CurvatureHz)
		}
	}
	return edits
}

const fockPath = "/model/fock"

// fockEntry gives the atoms on every site before the first stage. Without it a
// simulation begins in the end state of the wanted sign.
func fockEntry(m *plan.Model) entry {
	texts := make([]string, len(m.Fock))
	for i, n := range m.Fock {
		texts[i] = strconv.Itoa(n)
	}
	e := longEntry("Atoms per site", fockPath, strings.Join(texts, " "))
	if m.Fock == nil {
		e.Path, e.Inherited, e.From = "", true, "the end state"
	} else {
		e.Clearable, e.clear = true, []plan.Edit{{Path: fockPath}}
	}
	e.encode = func(text string) (any, error) { return fockList(text) }
	return e
}

// fockList reads whole numbers that stand apart; none is no list.
func fockList(text string) (any, error) {
	words := strings.FieldsFunc(text, func(r rune) bool { return strings.ContainsRune(" \t,;", r) })
	if len(words) == 0 {
		return nil, nil
	}
	list := make([]int, len(words))
	for i, word := range words {
		n, err := strconv.Atoi(word)
		if err != nil {
			return nil, errors.New("is no list of whole numbers, one for each site, like 1 1 0 2")
		}
		list[i] = n
	}
	return list, nil
}

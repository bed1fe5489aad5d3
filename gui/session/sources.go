package session

import (
	"math"
	"strconv"
	"strings"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/si"
)

// SourceRow is one number that the answers rest on.
type SourceRow struct {
	Name        string
	Value       string // with unit
	Uncertainty string // one sigma, "exact" or "not given"
	Source      string
}

// Sources lists the atom's numbers, the scattering length that is used, and the
// constants of nature.
//
// It returns ErrNoBench for a model plan, and the error of atom.Load.
func Sources(p *plan.Plan) ([]SourceRow, error) {
	if p.Cloud == nil {
		return nil, ErrNoBench
	}
	species, err := atom.Load(p.Cloud.Species)
	if err != nil {
		return nil, err
	}
	var rows []SourceRow
	for _, d := range species.Data {
		if isOfScattering(d.Path) && !usesScattering(p, species, d.Path) {
			continue
		}
		rows = append(rows, SourceRow{datumName(species.Name, d.Path), sourceNumber(d.Value, d.Unit), sigma(d.Sigma, d.SigmaKnown), d.Source})
	}
	rows = append(rows, planScattering(p)...)
	for _, c := range si.Constants() {
		rows = append(rows, SourceRow{c.Name + " " + c.Symbol, sourceNumber(c.Value, c.Unit), sigma(c.Uncertainty, true), c.Source})
	}
	return rows, nil
}

func isOfScattering(path string) bool { return strings.HasPrefix(path, "/scattering/") }

// usesScattering reports whether a number of the species file belongs to the curve
// that the plan uses. The file does not name the state at the number, so the
// background tells which curve it is.
func usesScattering(p *plan.Plan, species *atom.Species, path string) bool {
	if p.Scattering != nil {
		return false
	}
	state, err := species.State(p.Cloud.State)
	if err != nil || state.Scattering == nil {
		return false
	}
	which, _, _ := strings.Cut(strings.TrimPrefix(path, "/scattering/"), "/")
	for _, d := range species.Data {
		if d.Path == "/scattering/"+which+"/background" {
			mine := state.Scattering.Background / si.BohrRadius
			return math.Abs(d.Value-mine) <= 1e-9*math.Abs(mine)
		}
	}
	return false
}

// planScattering lists the curve that the plan brings.
func planScattering(p *plan.Plan) []SourceRow {
	if p.Scattering == nil {
		return nil
	}
	given := func(name string, value float64, unit string) SourceRow {
		return SourceRow{name, sourceNumber(value, unit), "not given", "this plan, key \"scattering\""}
	}
	rows := []SourceRow{given("Background scattering length", p.Scattering.BackgroundA0, "a0")}
	for i, r := range p.Scattering.Resonances {
		number := strconv.Itoa(i + 1)
		rows = append(rows, given("Resonance "+number+" position", r.PositionG, "G"), given("Resonance "+number+" width", r.WidthG, "G"))
	}
	return rows
}

// datumNames are the paths of a species file in words.
var datumNames = map[string]string{
	"/mass": "mass", "/nuclear_spin": "nuclear spin", "/hyperfine": "hyperfine constant A",
	"/gj": "gJ", "/gi": "gI",
	"/d1/wavelength": "D1 wavelength", "/d1/linewidth": "D1 linewidth",
	"/d2/wavelength": "D2 wavelength", "/d2/linewidth": "D2 linewidth",
}

func datumName(species, path string) string {
	if name, ok := datumNames[path]; ok {
		return species + " " + name
	}
	parts := strings.Split(strings.Trim(path, "/"), "/")
	if len(parts) == 5 && parts[2] == "resonances" {
		n, _ := strconv.Atoi(parts[3])
		return species + " resonance " + strconv.Itoa(n+1) + " " + parts[4]
	}
	return species + " " + strings.Join(parts, " ")
}

// sourceNumber writes all digits of a number that was given.
func sourceNumber(value float64, unit string) string {
	text := Digits(value, 17)
	if digits := shortest(value); len(digits) < 17 {
		text = Digits(value, significant(digits))
	}
	if unit == "1" {
		unit = ""
	}
	return withUnit(text, unit)
}

// significant counts the digits of a decimal.
func significant(text string) int {
	text, _, _ = strings.Cut(text, "e")
	text = strings.TrimLeft(strings.NewReplacer("-", "", ".", "").Replace(text), "0")
	return max(len(text), 1)
}

func sigma(value float64, known bool) string {
	switch {
	case !known:
		return "not given"
	case value == 0:
		return "exact"
	}
	return "±" + Digits(value, 2)
}

package session

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

// longestSummary is how many characters of a text a summary repeats.
const longestSummary = 60

// summary says in a line what the fields of a group hold.
func summary(group string, p *plan.Plan, fields []Field) string {
	said := func(end string) string { return quantityAt(fields, end) }
	switch group {
	case stageGroup:
		return joined(said("/duration_ms"), said("/shape"))
	case cloudGroup:
		return said("/atoms") + " of " + said("/species") + " at " + said("/entropy_per_atom_kb")
	case latticeGroup:
		return joined(distinct(fields, "/wavelength_nm"), distinct(fields, "/waist_um"))
	case beamsGroup:
		return beamsSummary(p)
	case fieldGroup:
		return joined("along "+said("/field/axis"), scatteringSummary(p, fields))
	case modelGroup:
		return joined(sitesSummary(p.Model)+" sites", said("/model/atoms")+" atoms")
	case levelsGroup:
		return strconv.Itoa(len(p.Levels.EnergiesHz)) + " levels"
	case planGroup:
		return shortenTo(p.Title, longestSummary)
	}
	return ""
}

func joined(parts ...string) string {
	return strings.Join(slices.DeleteFunc(parts, func(part string) bool { return part == "" }), ", ")
}

// quantityAt is the value, with its unit, of the field whose ID has an end.
func quantityAt(fields []Field, end string) string {
	i := slices.IndexFunc(fields, func(f Field) bool { return strings.HasSuffix(f.ID, end) })
	if i < 0 {
		return ""
	}
	return withUnit(fields[i].Text, fields[i].Unit)
}

// distinct lists the values of the fields that have a part in their IDs, each once.
func distinct(fields []Field, part string) string {
	var values []string
	for _, f := range fields {
		if value := withUnit(f.Text, f.Unit); strings.Contains(f.ID, part) && !slices.Contains(values, value) {
			values = append(values, value)
		}
	}
	return strings.Join(values, " and ")
}

func beamsSummary(p *plan.Plan) string {
	const most = 3
	switch n := len(p.Beams); {
	case n == 0:
		return "none"
	case n > most:
		return strconv.Itoa(n) + " beams"
	}
	names := make([]string, len(p.Beams))
	for i, b := range p.Beams {
		names[i] = "'" + shortenTo(b.Name, longestSummary/most) + "'"
	}
	return strings.Join(names, ", ")
}

func scatteringSummary(p *plan.Plan, fields []Field) string {
	if p.Scattering == nil {
		return "a(B) of the species"
	}
	switch n := len(p.Scattering.Resonances); n {
	case 0:
		return "no resonance"
	case 1:
		return "resonance at " + quantityAt(fields, "/position_g")
	default:
		return fmt.Sprintf("%d resonances", n)
	}
}

// sitesSummary is "12", or "3 × 4".
func sitesSummary(m *plan.Model) string {
	texts := make([]string, len(m.Sites))
	for i, n := range m.Sites {
		texts[i] = strconv.Itoa(n)
	}
	return strings.Join(texts, " × ")
}

// shortenTo cuts a text to a number of characters.
func shortenTo(text string, most int) string {
	if runes := []rune(text); len(runes) > most {
		return string(runes[:most-1]) + "…"
	}
	return text
}

package assets

import (
	"embed"
	"fmt"
	"io/fs"
	"strings"
)

//go:embed plans/*.json
var plans embed.FS

// PlanNames returns the names of the embedded demo plans, such as "skerry-demo",
// in alphabetical order.
func PlanNames() []string { return names(plans, "plans") }

// Plan returns the text of one demo plan, as package plan reads it.
//
// It returns an error that wraps fs.ErrNotExist if there is no such plan.
func Plan(name string) ([]byte, error) {
	data, err := plans.ReadFile("plans/" + name + ".json")
	if err != nil {
		return nil, fmt.Errorf("assets: plan %q, want one of %s: %w", name, strings.Join(PlanNames(), ", "), fs.ErrNotExist)
	}
	return data, nil
}

package assets

import _ "embed" // for the schema

//go:embed schema/plan.schema.json
var planSchema []byte

// PlanSchema returns the JSON Schema, draft 2020-12, of the plan document. It says
// keys, types, units and ranges; what needs a look at two places of a document
// at once is left to package plan.
func PlanSchema() []byte { return append([]byte(nil), planSchema...) }

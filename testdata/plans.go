package testdata

import (
	"embed"
	"testing"
)

//go:embed plans/*.json
var plans embed.FS

// Plan returns the text of the plan NAME.json that only tests use, and ends the
// test if there is none.
func Plan(t testing.TB, name string) []byte {
	t.Helper()
	data, err := plans.ReadFile("plans/" + name + ".json")
	if err != nil {
		t.Fatalf("testdata: %v", err)
	}
	return data
}

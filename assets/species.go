package assets

import (
	"embed"
	"fmt"
)

//go:embed species/*.json
var species embed.FS

// SpeciesNames returns the names of the embedded species files, such as "39K",
// in alphabetical order.
func SpeciesNames() []string { return names(species, "species") }

// SpeciesFile returns the text of one species file, as package atom reads it.
//
// It returns an error that wraps fs.ErrNotExist if there is no such file.
func SpeciesFile(name string) ([]byte, error) {
	data, err := species.ReadFile("species/" + name + ".json")
	if err != nil {
		return nil, fmt.Errorf("assets: species file %q: %w", name, err)
	}
	return data, nil
}

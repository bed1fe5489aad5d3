package assets

import (
	"embed"
	"fmt"
	"io/fs"
	"path"
	"strings"
)

//go:embed species/*.json
var species embed.FS

// SpeciesNames returns the names of the embedded species files, such as "39K",
// in alphabetical order.
func SpeciesNames() []string {
	files, err := fs.Glob(species, "species/*.json")
	if err != nil {
		panic("assets: " + err.Error()) // the pattern is wrong
	}
	names := make([]string, len(files))
	for i, file := range files {
		names[i] = strings.TrimSuffix(path.Base(file), ".json")
	}
	return names
}

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

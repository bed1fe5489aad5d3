package assets

import (
	"embed"
	"io/fs"
	"path"
	"strings"
)

// names lists the JSON files of an embedded folder without their ending, in
// alphabetical order.
func names(files embed.FS, folder string) []string {
	found, err := fs.Glob(files, folder+"/*.json")
	if err != nil {
		panic("assets: " + err.Error()) // the pattern is wrong
	}
	for i, file := range found {
		found[i] = strings.TrimSuffix(path.Base(file), ".json")
	}
	return found
}

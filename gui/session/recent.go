package session

import (
	"encoding/json"
	"os"
	"path/filepath"
	"slices"

	"hilltop/bosehubbard/plan"
)

// recentCount is how many files are remembered.
const recentCount = 10

func recentFile(folder string) string { return filepath.Join(folder, "recent.json") }

// readRecent returns the remembered paths, none where the file cannot be read.
func readRecent(folder string) []string {
	data, err := os.ReadFile(recentFile(folder))
	if err != nil {
		return nil
	}
	var paths []string
	if json.Unmarshal(data, &paths) != nil {
		return nil
	}
	return paths[:min(len(paths), recentCount)]
}

// remember puts a path on top of the recent ones. The list on the disk is read
// again, because another program may have written it. The caller holds mu.
func (s *Session) remember(path string) {
	s.rewriteRecent(func(paths []string) []string {
		return append([]string{path}, without(paths, path)...)
	})
}

// ForgetRecent takes a path from the recent ones, say because its file is gone.
func (s *Session) ForgetRecent(path string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.rewriteRecent(func(paths []string) []string { return without(paths, path) })
	s.changed(urgent)
}

// rewriteRecent changes the list. One that cannot be written is kept for this run
// only; it is not worth a message.
func (s *Session) rewriteRecent(change func([]string) []string) {
	paths := s.recent
	if s.opt.Folder != "" {
		paths = readRecent(s.opt.Folder)
	}
	paths = change(slices.Clone(paths))
	s.recent = paths[:min(len(paths), recentCount)]
	if s.opt.Folder == "" {
		return
	}
	if data, err := json.Marshal(s.recent); err == nil && os.MkdirAll(s.opt.Folder, 0o700) == nil {
		_ = plan.Save(recentFile(s.opt.Folder), data)
	}
}

func without(paths []string, path string) []string {
	return slices.DeleteFunc(paths, func(p string) bool { return p == path })
}

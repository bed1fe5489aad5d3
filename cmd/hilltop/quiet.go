package main

import (
	"bytes"
	"io"
	"slices"
)

// quiet passes the toolkit's log on, but for what is no fault of anybody's.
type quiet struct {
	to      io.Writer
	dropped bool // the lines that explain the dropped one follow
}

// noise lists what is dropped, with the lines that explain it.
var noise = [][]byte{
	// No desktop session runs: the window follows its settings from the next start.
	[]byte("Fyne error:  failed to watch theme settings"),
	// A desktop has no folder for videos, which the file dialog would have offered.
	[]byte("Fyne error:  Getting favorite locations"),
	// The toolkit reads its own preferences while it writes them. Nothing of ours
	// stands there.
	[]byte("Fyne error:  Preferences load error"),
}

// Write takes one line of the log, as package log hands it over.
func (q *quiet) Write(line []byte) (int, error) {
	detail := bytes.Contains(line, []byte("  Cause: ")) || bytes.Contains(line, []byte("  At: "))
	begins := func(what []byte) bool { return bytes.Contains(line, what) }
	q.dropped = slices.ContainsFunc(noise, begins) || q.dropped && detail
	if q.dropped {
		return len(line), nil
	}
	return q.to.Write(line)
}

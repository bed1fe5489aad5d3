package main

import (
	"bytes"
	"io"
)

// quiet passes the toolkit's log on, but for what it says where no desktop session
// runs: that it cannot watch the desktop's settings. That is no fault, and the
// window follows them only from the next start on.
type quiet struct {
	to      io.Writer
	dropped bool // the lines that explain the dropped one follow
}

var noise = []byte("Fyne error:  failed to watch theme settings")

// Write takes one line of the log, as package log hands it over.
func (q *quiet) Write(line []byte) (int, error) {
	detail := bytes.Contains(line, []byte("  Cause: ")) || bytes.Contains(line, []byte("  At: "))
	q.dropped = bytes.Contains(line, noise) || q.dropped && detail
	if q.dropped {
		return len(line), nil
	}
	return q.to.Write(line)
}

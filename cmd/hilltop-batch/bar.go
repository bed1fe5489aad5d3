package main

import (
	"fmt"
	"io"
	"os"
	"strings"
	"time"
)

// bar is a line of progress on a terminal, and nothing elsewhere.
type bar struct {
	out  io.Writer // nil: not a terminal
	last time.Time
	wide int // columns written
}

// newBar returns a bar that writes to w if that is a terminal.
func newBar(w io.Writer) *bar {
	file, ok := w.(*os.File)
	if !ok || os.Getenv("TERM") == "dumb" {
		return &bar{}
	}
	if info, err := file.Stat(); err != nil || info.Mode()&os.ModeCharDevice == 0 {
		return &bar{}
	}
	return &bar{out: file}
}

// barEvery is the least time between two drawings.
const barEvery = 100 * time.Millisecond

// show receives the progress of work that is all of a piece.
func (b *bar) show(done, total int) { b.part("", done, total) }

// progress returns a receiver for one part of the work.
func (b *bar) progress(what string) func(done, total int) {
	return func(done, total int) { b.part(" "+what, done, total) }
}

// part draws the line, unless that was done just now.
func (b *bar) part(what string, done, total int) {
	if b.out == nil || total < 1 || time.Since(b.last) < barEvery {
		return
	}
	b.last = time.Now()
	b.draw(gauge(done, total) + what)
}

// gauge draws a share of 30 places.
func gauge(done, total int) string {
	const places = 30
	full := min(max(places*done/total, 0), places)
	return fmt.Sprintf("[%s%s] %3d %%", strings.Repeat("=", full), strings.Repeat(" ", places-full), 100*done/total)
}

// draw replaces the line.
func (b *bar) draw(line string) {
	fmt.Fprintf(b.out, "\r%s%s", line, strings.Repeat(" ", max(b.wide-len(line), 0)))
	b.wide = len(line)
}

// clear takes the line away.
func (b *bar) clear() {
	if b.out != nil && b.wide > 0 {
		b.draw("")
		fmt.Fprint(b.out, "\r")
		b.wide = 0
	}
}

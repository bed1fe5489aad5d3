package main

import (
	"bytes"
	"log"
	"testing"
)

func TestQuietDropsOnlyTheNoise(t *testing.T) {
	var out bytes.Buffer
	l := log.New(&quiet{to: &out}, "", 0)
	for _, line := range []string{
		"before",
		"Fyne error:  failed to watch theme settings",
		"  Cause: exec: \"dbus-launch\": executable file not found in $PATH",
		"  At: app_xdg.go:152",
		"Fyne error:  something else",
		"  Cause: kept",
		"*** Error in Fyne call thread ***",
	} {
		l.Println(line)
	}
	const want = "before\nFyne error:  something else\n  Cause: kept\n*** Error in Fyne call thread ***\n"
	if got := out.String(); got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}

package main

import (
	"math/rand/v2"
	"testing"
	"time"
)

// Killed at a random moment of editing, the program comes back with the work at the
// next start; at most the edits of the last 2 s are lost.
func TestWindowRecoversAfterAKill(t *testing.T) {
	needScreen(t)
	const first = 6 // Er, of depth x, a key press makes it one more
	folder, path := t.TempDir(), planFile(t, "skerry-demo", "killed.json")
	s := startIn(t, folder, "killed.json", path)
	s.keys("Tab", "Tab")
	after := 2500*time.Millisecond + rand.N(2500*time.Millisecond)
	var pressed []time.Time
	for end := time.Now().Add(after); time.Now().Before(end); time.Sleep(30 * time.Millisecond) {
		s.do("xdotool", "key", "Up")
		pressed = append(pressed, time.Now())
	}
	if err := s.command.Process.Kill(); err != nil {
		t.Fatal(err)
	}
	<-s.ended
	s.checkLog()

	s = startIn(t, folder, "skerry-demo")
	s.keys("Return") // the first button recovers
	s.waitForTitle("killed.json (edited) - Hilltop")
	s.keys("ctrl+s")
	s.waitForTitle("killed.json - Hilltop")
	s.quit()
	stages := saved(t, path).Stages
	back := int(stages[len(stages)-2].DepthEr[0]) - first
	if back < 1 || back > len(pressed) {
		t.Fatalf("%d steps came back of %d", back, len(pressed))
	}
	lost := time.Duration(0)
	if back < len(pressed) {
		lost = pressed[len(pressed)-1].Sub(pressed[back])
	}
	t.Logf("killed after %v: %d of %d steps came back, the last %v are lost", after, back, len(pressed), lost.Round(time.Millisecond))
	if lost > 2*time.Second {
		t.Errorf("the edits of the last %v are lost, want at most 2 s", lost)
	}
}

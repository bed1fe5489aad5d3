package main

import (
	"flag"
	"image"
	"image/color"
	"os"
	"path/filepath"
	"syscall"
	"testing"
	"time"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// planFile writes a template to a file of a name.
func planFile(t *testing.T, template, name string) string {
	t.Helper()
	data, err := assets.Plan(template)
	if err != nil {
		t.Fatal(err)
	}
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, data, 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

// saved reads a plan that the window has written.
func saved(t *testing.T, path string) *plan.Plan {
	t.Helper()
	document, err := plan.Load(path)
	if err != nil {
		t.Fatal(err)
	}
	return document.Plan()
}

func verdict(t *testing.T, p *plan.Plan) string {
	t.Helper()
	r, err := report.NewJudge().Judge(t.Context(), p)
	if err != nil {
		t.Fatal(err)
	}
	return r.Verdict
}

func TestWindowChangesAKnobAndSaves(t *testing.T) {
	needScreen(t)
	path := planFile(t, "skerry-demo", "bench.json")
	stages := saved(t, path).Stages
	lower := len(stages) - 2 // the last stage that moves a knob, which the window begins with
	before := stages[lower].DepthEr[0]

	s := start(t, "bench.json", path)
	s.picture("demo")
	s.keys("Tab", "Tab") // past the rail to the first knob, the depth along x
	s.keys("7", "period", "5", "Return")
	s.waitForTitle("bench.json (edited) - Hilltop")
	s.keys("ctrl+s")
	s.waitForTitle("bench.json - Hilltop")
	s.quit()

	got := saved(t, path).Stages[lower].DepthEr[0]
	if before == 7.5 || got != 7.5 {
		t.Errorf("depth x at %q: got %g Er in the file, want 7.5; it was %g", stages[lower].Name, got, before)
	}
}

func TestWindowAppliesAnAdvice(t *testing.T) {
	needScreen(t)
	path := planFile(t, "skerry-trapped", "trapped.json")
	if got := verdict(t, saved(t, path)); got != "open" {
		t.Fatalf("the plan begins %s, want open", got)
	}
	s := start(t, "trapped.json", path)
	s.waitFor("advice", func() bool {
		s.keys("ctrl+Return")
		return s.title() == "trapped.json (edited) - Hilltop"
	})
	s.picture("advice")
	s.keys("ctrl+s")
	s.waitForTitle("trapped.json - Hilltop")
	s.quit()
	if got := verdict(t, saved(t, path)); got != "sealed" {
		t.Errorf("the advice makes the plan %s, want sealed", got)
	}
}

// Work that is not saved is asked about; without an answer the window stays.
func TestWindowAsksBeforeItLosesWork(t *testing.T) {
	needScreen(t)
	path := planFile(t, "skerry-demo", "kept.json")
	s := start(t, "kept.json", path)
	s.keys("Tab", "Tab", "8", "Return")
	s.waitForTitle("kept.json (edited) - Hilltop")
	s.keys("ctrl+q")
	s.picture("question")
	s.keys("Return") // the first button saves, and the window closes
	if err := <-s.ended; err != nil {
		t.Errorf("the program ended with %v", err)
	}
	s.checkLog()
	stages := saved(t, path).Stages
	if got := stages[len(stages)-2].DepthEr[0]; got != 8 {
		t.Errorf("depth x: got %g Er in the file, want 8", got)
	}
}

// Told to end from outside, the program asks nothing, and offers the work at the
// next start.
func TestWindowRecoversAfterASignal(t *testing.T) {
	needScreen(t)
	folder, path := t.TempDir(), planFile(t, "skerry-demo", "lost.json")
	s := startIn(t, folder, "lost.json", path)
	s.keys("Tab", "Tab", "9", "Return")
	s.waitForTitle("lost.json (edited) - Hilltop")
	time.Sleep(2 * time.Second) // at most that much is lost
	if err := s.command.Process.Signal(syscall.SIGTERM); err != nil {
		t.Fatal(err)
	}
	if err := <-s.ended; err != nil {
		t.Errorf("the program ended with %v", err)
	}
	s.checkLog()

	s = startIn(t, folder, "skerry-demo")
	s.picture("recovery")
	s.keys("Return") // the first button recovers
	s.waitForTitle("lost.json (edited) - Hilltop")
	s.keys("ctrl+s")
	s.waitForTitle("lost.json - Hilltop")
	s.quit()
	stages := saved(t, path).Stages
	if got := stages[len(stages)-2].DepthEr[0]; got != 9 {
		t.Errorf("depth x: got %g Er in the file, want 9", got)
	}
}

var update = flag.Bool("update", false, "take the README's screenshot anew")

// The three folds, light and dark, on a real display.
func TestWindowLooks(t *testing.T) {
	needScreen(t)
	for _, look := range []struct {
		name, size, variant, scale string
		dark                       bool
	}{
		{"full", "1280x800", "light", "1", false},
		{"compact", "1024x680", "dark", "1", true},
		{"drawer", "1024x680", "light", "1.5", false},
		{"drawer-dark", "1024x680", "dark", "1.5", true},
	} {
		t.Run(look.name, func(t *testing.T) {
			s := start(t, "skerry-demo", "--size", look.size, "--variant", look.variant, "--text-scale", look.scale)
			shot := s.picture(look.name)
			if *update && look.name == "full" {
				s.write(filepath.Join("..", "..", "assets", "screenshot.png"), shot)
			}
			if dark := luma(shot, shot.Bounds().Dx()-40, shot.Bounds().Dy()/2) < 0x8000; dark != look.dark {
				t.Errorf("the page is dark: %v, want %v", dark, look.dark)
			}
			s.keys("F2", "ctrl+equal", "ctrl+0", "ctrl+e")
			s.picture(look.name + "-keys")
			s.quit()
		})
	}
}

// luma is how light a pixel is, 0 to 65535.
func luma(picture image.Image, x, y int) uint16 {
	return color.Gray16Model.Convert(picture.At(x, y)).(color.Gray16).Y
}

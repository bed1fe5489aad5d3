package gui

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/storage"
	"fyne.io/fyne/v2/test"

	"hilltop/assets"
)

// file writes a template to a file of the test.
func (b *bench) file(template, name string) string {
	b.Helper()
	data, err := assets.Plan(template)
	if err != nil {
		b.Fatal(err)
	}
	path := filepath.Join(b.TempDir(), name)
	if err := os.WriteFile(path, data, 0o644); err != nil {
		b.Fatal(err)
	}
	return path
}

func TestOpenSaveRoundTrip(t *testing.T) {
	b := newBench(t, setup{})
	path := b.file("skerry-demo", "mine.json")
	b.window.dropped(fyne.Position{}, []fyne.URI{storage.NewFileURI(path)})
	b.settle()
	if b.window.state.Path != path || b.window.window.Title() != "mine.json - Hilltop" {
		t.Fatalf("dropped: path %q, title %q", b.window.state.Path, b.window.window.Title())
	}
	b.typeInto(b.field(depthX), "7.5") // saving commits what is being typed
	b.window.save(nothing)
	b.settle()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(string(data), "7.5") || b.window.state.Dirty {
		t.Errorf("saved: dirty %v, 7.5 in the file: %v", b.window.state.Dirty, strings.Contains(string(data), "7.5"))
	}
}

func TestBrokenPlanKeepsThePresentOne(t *testing.T) {
	b := newBench(t, setup{})
	path := filepath.Join(t.TempDir(), "broken.json")
	if err := os.WriteFile(path, []byte(`{"format": "hilltop-plan", "versoin": 1}`), 0o644); err != nil {
		t.Fatal(err)
	}
	b.window.open(path)
	b.settle()
	if b.window.state.Name != "skerry-demo" || b.window.state.Verdict.Word != "Sealed" {
		t.Errorf("shows %q, %q", b.window.state.Name, b.window.state.Verdict.Word)
	}
	if b.question()["Close"] == nil {
		t.Fatal("nothing says why the plan was not opened")
	}
	b.keep("broken")
	b.checkLayout("broken plan")
}

func TestUnsavedWorkIsAskedAbout(t *testing.T) {
	b := newBench(t, setup{})
	path := b.file("skerry-demo", "mine.json")
	b.window.open(path)
	b.enter(depthX, "7.5")
	b.window.askToClose()
	b.keep("question")
	b.checkLayout("question")
	for _, want := range []string{"Save", "Do not save", "Cancel"} {
		if b.question()[want] == nil {
			t.Fatalf("the question has no button %q", want)
		}
	}
	test.Tap(b.question()["Cancel"])
	if len(b.question()) != 0 || !b.window.state.Dirty {
		t.Error("Cancel does not take the question back")
	}
	asked := false
	b.window.ifSaved("testing", func() { asked = true })
	test.Tap(b.question()["Save"])
	b.settle()
	if !asked || b.window.state.Dirty {
		t.Errorf("Save: went on %v, still dirty %v", asked, b.window.state.Dirty)
	}
}

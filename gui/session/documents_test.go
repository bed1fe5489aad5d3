package session

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"hilltop/bosehubbard/plan"
)

// overwrite changes a file as another program would.
func overwrite(t testing.TB, path string, data []byte) {
	t.Helper()
	if err := os.WriteFile(path, data, 0o666); err != nil {
		t.Fatal(err)
	}
	later := time.Now().Add(3 * time.Second) // beyond the resolution of any file system
	if err := os.Chtimes(path, later, later); err != nil {
		t.Fatal(err)
	}
}

func readAll(t testing.TB, path string) string {
	t.Helper()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

func TestTemplates(t *testing.T) {
	s, _ := newTest(t, Options{})
	list := Templates()
	if len(list) < 3 {
		t.Fatalf("templates %v, want the demo plans", list)
	}
	for _, one := range list {
		if err := s.NewFrom(one.Name); err != nil {
			t.Errorf("%s: %v", one.Name, err)
		}
		st := s.State()
		if st.Path != "" || st.Dirty || one.Title != st.Plan.Title {
			t.Errorf("%+v opened with path %q, dirty %v, title %q", one, st.Path, st.Dirty, st.Plan.Title)
		}
	}
	if err := s.NewFrom("no such template"); err == nil {
		t.Error("no error for an unknown template")
	}
}

func TestOpenEditSave(t *testing.T) {
	s, _ := newTest(t, Options{})
	path := writeFile(t, "mine.json", demo(t))
	if err := s.OpenFile(path); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "name", s.State().Name, "mine.json")
	mustBe(t, "needs saving", s.NeedsSaving(), false)
	if err := s.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "needs saving after an edit", s.NeedsSaving(), true)
	s.Undo()
	mustBe(t, "needs saving after undo", s.NeedsSaving(), false)
	s.Redo()
	if err := s.Save(); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "file", readAll(t, path), bytesOf(s))
	mustBe(t, "dirty after saving", s.State().Dirty, false)
	s.Undo()
	mustBe(t, "dirty after undo behind the save", s.State().Dirty, true)
}

func TestSaveAs(t *testing.T) {
	s, _ := newTest(t, Options{})
	mustBe(t, "suggested name", s.SuggestedName(), "Skerry bench, negative temperature.json")
	if err := s.Save(); !errors.Is(err, ErrNoPath) {
		t.Errorf("saving without a file: %v, want ErrNoPath", err)
	}
	path := filepath.Join(t.TempDir(), "new.json")
	if err := s.SaveAs(path); err != nil {
		t.Fatal(err)
	}
	st := s.State()
	mustBe(t, "path", st.Path, path)
	mustBe(t, "recent", st.Recent[0], path)
	mustBe(t, "file", readAll(t, path), string(demo(t)))
	err := s.SaveAs(filepath.Join(t.TempDir(), "no folder", "x.json"))
	if err == nil {
		t.Error("no error for a file that cannot be written")
	}
	mustBe(t, "path after a failure", s.State().Path, path)
	if s.State().Notice == "" {
		t.Error("no notice after a failure")
	}
}

func TestBrokenFileKeepsThePlan(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	before := bytesOf(s)
	text := strings.Replace(string(demo(t)), `"atoms": 80000`, `"atoms": -1`, 1)
	text = strings.Replace(text, `"waist_um": 150`, `"waste_um": 150`, 1)
	err := s.OpenFile(writeFile(t, "broken.json", []byte(text)))
	if _, ok := errors.AsType[plan.Errors](err); !ok {
		t.Errorf("error %v, want plan.Errors", err)
	}
	st := s.State()
	if st.Broken == nil || len(st.Broken.Mistakes) < 2 || st.Broken.Name != "broken.json" {
		t.Fatalf("broken %+v, want both mistakes", st.Broken)
	}
	mustBe(t, "plan", bytesOf(s), before)
	mustBe(t, "undo", st.Undo != "", true)
	if err := s.OpenBytes("cut", demo(t)[:100]); err == nil || s.State().Broken.Reason == "" {
		t.Errorf("truncated: error %v, broken %+v", err, s.State().Broken)
	}
	if err := s.OpenBytes("demo", demo(t)); err != nil {
		t.Fatal(err)
	}
	if s.State().Broken != nil {
		t.Error("broken after a good document")
	}
}

func TestChangedOnDisk(t *testing.T) {
	s, v := newTest(t, Options{Watch: 5 * time.Millisecond})
	path := writeFile(t, "mine.json", demo(t))
	if err := s.OpenFile(path); err != nil {
		t.Fatal(err)
	}
	if err := s.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	mine := bytesOf(s)
	theirs := strings.Replace(string(demo(t)), "80000", "70000", 1)
	overwrite(t, path, []byte(theirs))
	waitFor(t, v, "the notice", func(st State) bool { return st.OnDisk == Changed })
	if err := s.Save(); err == nil {
		t.Error("saving over another program's work: no error")
	} else if _, ok := errors.AsType[*ChangedError](err); !ok {
		t.Errorf("error %v, want *ChangedError", err)
	}
	mustBe(t, "file", readAll(t, path), theirs)
	if err := s.Reload(); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "plan after reloading", bytesOf(s), theirs)
	mustBe(t, "dirty after reloading", s.State().Dirty, false)
	s.Undo()
	mustBe(t, "plan after undo", bytesOf(s), mine)
	overwrite(t, path, demo(t))
	waitFor(t, v, "the second notice", func(st State) bool { return st.OnDisk == Changed })
	s.KeepMine()
	if err := s.Save(); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "file after keeping mine", readAll(t, path), mine)
	if err := os.Remove(path); err != nil {
		t.Fatal(err)
	}
	waitFor(t, v, "the third notice", func(st State) bool { return st.OnDisk == Missing })
	if err := s.Save(); err != nil {
		t.Errorf("saving a file that is gone: %v", err)
	}
	mustBe(t, "state of the file", s.State().OnDisk, Same)
}

// TestTouchedFileIsTheSame changes only the time of the file.
func TestTouchedFileIsTheSame(t *testing.T) {
	s, _ := newTest(t, Options{Watch: time.Millisecond})
	path := writeFile(t, "mine.json", demo(t))
	if err := s.OpenFile(path); err != nil {
		t.Fatal(err)
	}
	overwrite(t, path, demo(t))
	time.Sleep(30 * time.Millisecond)
	mustBe(t, "state of the file", s.State().OnDisk, Same)
}

func TestRecentFiles(t *testing.T) {
	folder := t.TempDir()
	s, _ := newTest(t, Options{Folder: folder})
	var last string
	for range recentCount + 3 {
		last = writeFile(t, "plan.json", demo(t))
		if err := s.OpenFile(last); err != nil {
			t.Fatal(err)
		}
	}
	other, _ := newTest(t, Options{Folder: folder})
	list := other.State().Recent
	mustBe(t, "recent files", len(list), recentCount)
	mustBe(t, "the last one", list[0], last)
	other.ForgetRecent(last)
	if err := s.OpenFile(list[3]); err != nil {
		t.Fatal(err)
	}
	list = s.State().Recent
	mustBe(t, "recent files after forgetting", len(list), recentCount-1)
}

func TestSuggestedNameIsAFileName(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Commit("/title", `a/b\c: "d"?`); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "suggested name", s.SuggestedName(), "a-b-c- -d--.json")
}

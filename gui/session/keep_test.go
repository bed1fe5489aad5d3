package session

import (
	"bufio"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"
)

// crash leaves a session as a killed program would: its lock is gone, its copy is
// not.
func crash(s *Session) {
	s.mu.Lock()
	own, retired := s.keep.own, s.keep.retired
	s.keep.own, s.keep.retired = nil, nil
	s.mu.Unlock()
	own.release()
	for _, orphan := range retired {
		orphan.release()
	}
	s.Close()
}

func waitForCopy(t testing.TB, folder string) {
	t.Helper()
	for range 2000 {
		if files, _ := filepath.Glob(filepath.Join(folder, "recovery", "*.json")); len(files) > 0 {
			return
		}
		time.Sleep(time.Millisecond)
	}
	t.Fatal("no recovery copy after 2 s")
}

func TestRecovery(t *testing.T) {
	folder := t.TempDir()
	path := writeFile(t, "mine.json", demo(t))
	first, _ := newTest(t, Options{Folder: folder, Autosave: time.Millisecond})
	if err := first.OpenFile(path); err != nil {
		t.Fatal(err)
	}
	if err := first.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	waitForCopy(t, folder)
	work := bytesOf(first)

	meanwhile, _ := newTest(t, Options{Folder: folder})
	mustBe(t, "offers while the other program lives", len(meanwhile.State().Recoveries), 0)
	crash(first)

	second, v := newTest(t, Options{Folder: folder, Autosave: time.Millisecond})
	offers := second.State().Recoveries
	if len(offers) != 1 || offers[0].Name != "mine.json" || offers[0].Path != path {
		t.Fatalf("offers %+v, want the one of mine.json", offers)
	}
	third, _ := newTest(t, Options{Folder: folder})
	mustBe(t, "offers to a second program at the same time", len(third.State().Recoveries), 0)

	if err := second.Recover(offers[0].ID); err != nil {
		t.Fatal(err)
	}
	st := settle(t, second, v)
	mustBe(t, "plan", bytesOf(second), work)
	mustBe(t, "path", st.Path, path)
	mustBe(t, "dirty", st.Dirty, true)
	mustBe(t, "offers after recovery", len(st.Recoveries), 0)
	second.Undo()
	mustBe(t, "plan after undo", bytesOf(second), string(demo(t)))
	second.Redo()
	crash(second) // the work must survive a second crash, even at once
	fourth, _ := newTest(t, Options{Folder: folder})
	offers = fourth.State().Recoveries
	if len(offers) == 0 {
		t.Fatal("no offers after the second crash")
	}
	for _, offer := range offers {
		fourth.DropRecovery(offer.ID)
	}
	fourth.Close()
	files, _ := filepath.Glob(filepath.Join(folder, "recovery", "*.json"))
	mustBe(t, "copies at the end", len(files), 0)
}

// TestUnansweredRecoveryIsOfferedAgain closes the program without an answer.
func TestUnansweredRecoveryIsOfferedAgain(t *testing.T) {
	folder := t.TempDir()
	first, _ := newTest(t, Options{Folder: folder, Autosave: time.Millisecond})
	if err := first.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	waitForCopy(t, folder)
	crash(first)
	for range 2 {
		s := New(Options{Folder: folder, Judge: fakeJudge})
		mustBe(t, "offers", len(s.State().Recoveries), 1)
		s.Close()
	}
}

func TestCopyGoesWithTheEdits(t *testing.T) {
	folder := t.TempDir()
	s, _ := newTest(t, Options{Folder: folder, Autosave: time.Millisecond})
	if err := s.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	waitForCopy(t, folder)
	s.Undo()
	for range 2000 {
		if files, _ := filepath.Glob(filepath.Join(folder, "recovery", "*.json")); len(files) == 0 {
			break
		}
		time.Sleep(time.Millisecond)
	}
	files, _ := filepath.Glob(filepath.Join(folder, "recovery", "*.json"))
	mustBe(t, "copies after undo", len(files), 0)
	s.Redo()
	waitForCopy(t, folder)
	s.Close()
	files, _ = filepath.Glob(filepath.Join(folder, "recovery", "*"))
	mustBe(t, "files after closing", len(files), 0)
}

// TestBadCopiesAreLeftAlone has recovery files that hold no plan.
func TestBadCopiesAreLeftAlone(t *testing.T) {
	folder := t.TempDir()
	dir := filepath.Join(folder, "recovery")
	if err := os.MkdirAll(dir, 0o700); err != nil {
		t.Fatal(err)
	}
	for name, text := range map[string]string{"a.json": "", "b.json": "{", "c.json": `{"text": "no plan"}`} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	s, _ := newTest(t, Options{Folder: folder})
	mustBe(t, "offers", len(s.State().Recoveries), 0)
	if err := s.Recover("a"); err == nil {
		t.Error("no error for a copy that is not offered")
	}
}

func TestUnusableFolder(t *testing.T) {
	file := writeFile(t, "file", nil)
	s, _ := newTest(t, Options{Folder: file})
	if err := s.Commit("power_w/sheet", "21"); err != nil {
		t.Fatal(err)
	}
	lost := New(Options{Folder: file, Judge: fakeJudge})
	defer lost.Close()
	if !strings.Contains(lost.State().Notice, "recovery") {
		t.Errorf("notice %q, want that there is no recovery", lost.State().Notice)
	}
}

func TestDefaultFolder(t *testing.T) {
	t.Setenv("XDG_STATE_HOME", "/state")
	if folder, err := DefaultFolder(); err != nil || folder != filepath.FromSlash("/state/hilltop") {
		t.Errorf("folder %q, error %v", folder, err)
	}
	t.Setenv("XDG_STATE_HOME", "relative") // which the convention says to ignore
	if folder, err := DefaultFolder(); err != nil || !filepath.IsAbs(folder) {
		t.Errorf("folder %q, error %v", folder, err)
	}
}

func TestAge(t *testing.T) {
	for d, want := range map[time.Duration]string{
		10 * time.Second: "less than a minute ago", 90 * time.Second: "1 minute ago", 5 * time.Minute: "5 minutes ago",
		3 * time.Hour: "3 hours ago", 50 * time.Hour: "2 days ago", -time.Hour: "less than a minute ago",
	} {
		if got := age(d); got != want {
			t.Errorf("%v: got %q, want %q", d, got, want)
		}
	}
}

// victimFolder tells a child process to edit until it is killed.
const victimFolder = "HILLTOP_TEST_VICTIM"

// TestVictim is the child: it counts in the number of atoms, and says so.
func TestVictim(t *testing.T) {
	folder := os.Getenv(victimFolder)
	if folder == "" {
		t.Skip("only as the child of TestKilled")
	}
	s := New(Options{Folder: folder, Judge: fakeJudge})
	if err := s.OpenBytes("demo", demo(t)); err != nil {
		t.Fatal(err)
	}
	for i := 1; ; i++ {
		if err := s.Commit("/cloud/atoms", strconv.Itoa(i)); err != nil {
			t.Fatal(err)
		}
		fmt.Printf("edit %d at %d\n", i, time.Now().UnixMilli())
		time.Sleep(7 * time.Millisecond)
	}
}

// TestKilled kills an editing program at random moments: what comes back lacks at
// most the edits of the last 2 s. With HILLTOP_LONG=1 it does so 20 times.
func TestKilled(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	times := 2
	if os.Getenv("HILLTOP_LONG") == "1" {
		times = 20
	}
	random := newRandom(uint64(times))
	for range times {
		killOnce(t, time.Duration(300+random.IntN(3500))*time.Millisecond)
	}
}

func killOnce(t *testing.T, after time.Duration) {
	t.Helper()
	folder := t.TempDir()
	child := exec.Command(os.Args[0], "-test.run=^TestVictim$", "-test.count=1")
	child.Env = append(os.Environ(), victimFolder+"="+folder)
	out, err := child.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := child.Start(); err != nil {
		t.Fatal(err)
	}
	timer := time.AfterFunc(after, func() { _ = child.Process.Kill() })
	defer timer.Stop()
	made := map[int]int64{} // when an edit was made, ms
	last := 0
	for lines := bufio.NewScanner(out); lines.Scan(); {
		var edit int
		var at int64
		if n, _ := fmt.Sscanf(lines.Text(), "edit %d at %d", &edit, &at); n == 2 {
			made[edit], last = at, edit
		}
	}
	_ = child.Wait()

	s, _ := newTest(t, Options{Folder: folder})
	offers := s.State().Recoveries
	if len(offers) == 0 && made[last]-made[1] <= 2000 {
		t.Logf("killed after %v: nothing of %d edits came back", after, last)
		return
	}
	if len(offers) != 1 {
		t.Fatalf("killed after %v and %d edits: offers %+v, want one", after, last, offers)
	}
	if err := s.Recover(offers[0].ID); err != nil {
		t.Fatal(err)
	}
	back := int(s.State().Plan.Cloud.Atoms)
	if next, lost := made[back+1]; lost && made[last]-next > 2000 {
		t.Errorf("killed after %v: edit %d of %d came back, the first lost one was made %d ms before the last", after, back, last, made[last]-next)
	}
	t.Logf("killed after %v: %d of %d edits came back", after, back, last)
}

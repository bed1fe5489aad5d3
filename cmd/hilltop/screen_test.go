package main

import (
	"bytes"
	"context"
	"image"
	"image/png"
	"os"
	"os/exec"
	"path/filepath"
	"reflect"
	"strings"
	"sync"
	"testing"
	"time"
)

// screen is the program running on a display, with what it writes to its log.
type screen struct {
	*testing.T
	command *exec.Cmd
	ended   chan error
	window  string // number of the window
	log     safeBuffer
}

// safeBuffer collects what another process writes.
type safeBuffer struct {
	mu    sync.Mutex
	bytes bytes.Buffer
}

func (b *safeBuffer) Write(p []byte) (int, error) {
	b.mu.Lock()
	defer b.mu.Unlock()
	return b.bytes.Write(p)
}

func (b *safeBuffer) String() string {
	b.mu.Lock()
	defer b.mu.Unlock()
	return b.bytes.String()
}

const patience = 20 * time.Second // a slow machine starts a window within that

// needScreen skips a test where no display was asked for.
func needScreen(t *testing.T) {
	t.Helper()
	if os.Getenv("HILLTOP_WINDOW") != "1" || os.Getenv("DISPLAY") == "" {
		t.Skip("HILLTOP_WINDOW=1 and a display are needed, as cmd/verify.sh gives them")
	}
	for _, tool := range []string{"xdotool", "import"} {
		if _, err := exec.LookPath(tool); err != nil {
			t.Fatalf("%v: the real-window test needs it", err)
		}
	}
}

// program is built once for all tests.
var program = sync.OnceValues(func() (string, error) {
	folder, err := os.MkdirTemp("", "hilltop")
	if err != nil {
		return "", err
	}
	path := filepath.Join(folder, "hilltop")
	out, err := exec.Command("go", "build", "-o", path, ".").CombinedOutput()
	if err != nil {
		return string(out), err
	}
	return path, nil
})

func TestMain(m *testing.M) {
	if os.Getenv(inside) == "1" {
		os.Exit(runInside(os.Args[1:]))
	}
	code := m.Run()
	if os.Getenv("HILLTOP_WINDOW") == "1" {
		if path, err := program(); err == nil {
			_ = os.RemoveAll(filepath.Dir(path))
		}
	}
	os.Exit(code)
}

// start runs the program until the test ends, with settings of its own, and waits
// for the window of a document.
func start(t *testing.T, document string, args ...string) *screen {
	t.Helper()
	return startIn(t, t.TempDir(), document, args...)
}

// startIn is start with the settings and recovery files in a folder.
func startIn(t *testing.T, folder, document string, args ...string) *screen {
	t.Helper()
	path, err := program()
	if err != nil {
		t.Fatalf("building the program: %v\n%s", err, path)
	}
	s := &screen{T: t, command: exec.Command(path, args...)}
	s.command.Env = environment(folder)
	s.command.Stdout = &s.log
	s.begin(document)
	return s
}

// environment is that of the program, with its settings and recovery files in a
// folder.
func environment(folder string) []string {
	return append(os.Environ(), "LANG=C.UTF-8", "XDG_STATE_HOME="+folder, "XDG_CONFIG_HOME="+folder)
}

// begin starts the command and waits for the window of a document.
func (s *screen) begin(document string) {
	s.Helper()
	s.command.Stderr = &s.log
	s.ended = make(chan error, 1)
	if err := s.command.Start(); err != nil {
		s.Fatal(err)
	}
	go func() { s.ended <- s.command.Wait() }()
	s.Cleanup(s.stop)
	s.waitFor("the window of "+document, func() bool {
		s.window = lastLine(s.output("xdotool", "search", "--onlyvisible", "--name", "^"+document+".* - Hilltop$"))
		return s.window != ""
	})
	s.waitFor("focus", func() bool {
		s.output("xdotool", "windowfocus", s.window)
		return strings.TrimSpace(s.output("xdotool", "getwindowfocus")) == s.window
	})
}

// stop ends a program that still runs.
func (s *screen) stop() {
	if s.command.ProcessState == nil {
		_ = s.command.Process.Kill()
		<-s.ended
	}
}

// do runs a tool.
func (s *screen) do(tool string, args ...string) {
	s.Helper()
	ctx, cancel := context.WithTimeout(s.Context(), patience)
	defer cancel()
	if out, err := exec.CommandContext(ctx, tool, args...).CombinedOutput(); err != nil {
		s.Fatalf("%s %q: %v\n%s\n%s", tool, args, err, out, s.log.String())
	}
}

// output is what a tool prints; nothing where it fails.
func (s *screen) output(tool string, args ...string) string {
	out, err := exec.CommandContext(s.Context(), tool, args...).Output()
	if err != nil {
		return ""
	}
	return string(out)
}

func lastLine(text string) string {
	lines := strings.Split(strings.TrimSpace(text), "\n")
	return lines[len(lines)-1]
}

// keys presses keys one after the other, slowly enough for the toolkit to draw
// between them.
func (s *screen) keys(keys ...string) {
	s.Helper()
	for _, key := range keys {
		s.do("xdotool", "key", key)
		time.Sleep(100 * time.Millisecond)
	}
}

func (s *screen) title() string {
	return strings.TrimSpace(s.output("xdotool", "getwindowname", s.window))
}

// waitFor waits until something is so.
func (s *screen) waitFor(what string, so func() bool) {
	s.Helper()
	for end := time.Now().Add(patience); !so(); time.Sleep(50 * time.Millisecond) {
		select {
		case err := <-s.ended:
			s.ended <- err
			s.Fatalf("the program ended before %s: %v\n%s", what, err, s.log.String())
		default:
		}
		if time.Now().After(end) {
			s.Fatalf("no %s within %v; the title is %q\n%s", what, patience, s.title(), s.log.String())
		}
	}
}

// waitForTitle waits until the window has a title.
func (s *screen) waitForTitle(title string) {
	s.Helper()
	s.waitFor("title "+title, func() bool { return s.title() == title })
}

// quit closes the window from its menu and checks how the program ended.
func (s *screen) quit() {
	s.Helper()
	s.keys("ctrl+q")
	s.awaitEnd()
}

// awaitEnd waits for the program to end well.
func (s *screen) awaitEnd() {
	s.Helper()
	select {
	case err := <-s.ended:
		if err != nil {
			s.Errorf("the program ended with %v", err)
		}
	case <-time.After(patience):
		s.Fatalf("the window does not close; the title is %q", s.title())
	}
	s.checkLog()
}

// checkLog fails on what must never stand in the log.
func (s *screen) checkLog() {
	s.Helper()
	text := s.log.String()
	for _, bad := range []string{"error in fyne call thread", "fyne error", "panic", "fatal error", "data race"} {
		if strings.Contains(strings.ToLower(text), bad) {
			s.Errorf("the log has %q:\n%s", bad, text)
		}
	}
}

// picture takes a screenshot of the window, waiting until it is drawn and stands
// still. It is kept in the folder that HILLTOP_SHOTS names.
func (s *screen) picture(name string) image.Image {
	s.Helper()
	folder := os.Getenv("HILLTOP_SHOTS")
	if folder == "" {
		folder = s.TempDir()
	}
	path := filepath.Join(folder, name+".png")
	var shot image.Image
	s.waitFor("picture that is not empty and stands still", func() bool {
		before := shot
		shot = s.shoot(path)
		return !empty(shot) && before != nil && reflect.DeepEqual(before, shot)
	})
	return shot
}

// write keeps a picture in a file.
func (s *screen) write(path string, picture image.Image) {
	s.Helper()
	var b bytes.Buffer
	if err := png.Encode(&b, picture); err != nil {
		s.Fatal(err)
	}
	if err := os.WriteFile(path, b.Bytes(), 0o644); err != nil {
		s.Fatal(err)
	}
}

func (s *screen) shoot(path string) image.Image {
	s.Helper()
	time.Sleep(200 * time.Millisecond)
	s.do("import", "-window", s.window, path)
	data, err := os.ReadFile(path)
	if err != nil {
		s.Fatal(err)
	}
	shot, err := png.Decode(bytes.NewReader(data))
	if err != nil {
		s.Fatalf("%s: %v", path, err)
	}
	return shot
}

// empty reports whether a picture shows no window of ours: one that is drawn has
// texts in at least a hundredth of its pixels, and more colours than a few.
func empty(picture image.Image) bool {
	counts := map[[3]uint32]int{}
	bounds, most := picture.Bounds(), 0
	for y := bounds.Min.Y; y < bounds.Max.Y; y++ {
		for x := bounds.Min.X; x < bounds.Max.X; x++ {
			r, g, b, _ := picture.At(x, y).RGBA()
			key := [3]uint32{r, g, b}
			counts[key]++
			most = max(most, counts[key])
		}
	}
	total := bounds.Dx() * bounds.Dy()
	return len(counts) < 20 || float64(most) > 0.99*float64(total)
}

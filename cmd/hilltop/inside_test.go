package main

import (
	"bufio"
	"fmt"
	"io"
	"log"
	"os"
	"os/exec"
	"strings"
	"testing"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/app"
	"fyne.io/fyne/v2/test"

	"hilltop/gui"
)

// inside tells the test's own binary to be the program, and to answer questions
// about its window on its standard input: where every label stands is known only
// there.
const inside = "HILLTOP_TEST_INSIDE"

// runInside is the program with somebody who answers.
func runInside(args []string) int {
	opt, code := options(args, os.Stderr)
	if code >= 0 {
		return code
	}
	log.SetOutput(&quiet{to: os.Stderr})
	program := app.NewWithID(appID)
	window := gui.New(program, opt)
	go answer(window, os.Stdin, os.Stdout)
	return serve(program, window, os.Stderr)
}

// answer answers one question a line, with lines that end with an empty one.
func answer(window *gui.Window, questions io.Reader, answers io.Writer) {
	for lines := bufio.NewScanner(questions); lines.Scan(); {
		word, rest, _ := strings.Cut(lines.Text(), " ")
		var said []string
		fyne.DoAndWait(func() {
			switch word {
			case "pages":
				said = window.PageNames()
			case "turn":
				window.TurnTo(rest)
			case "busy":
				said = []string{fmt.Sprint(window.Busy())}
			case "complaints":
				said = complaints(window)
			}
		})
		for _, line := range said {
			fmt.Fprintln(answers, strings.ReplaceAll(line, "\n", " "))
		}
		fmt.Fprintln(answers)
	}
}

// complaints are those about the window as it stands, with what lies before it.
func complaints(window *gui.Window) []string {
	widgets := func(w fyne.Widget) []fyne.CanvasObject { return test.WidgetRenderer(w).Objects() }
	canvas := window.Native().Canvas()
	list := gui.LayoutComplaints(canvas.Content(), widgets)
	for _, overlay := range canvas.Overlays().List() {
		list = append(list, gui.LayoutComplaints(overlay, widgets)...)
	}
	return list
}

// insider is a window that answers.
type insider struct {
	*screen
	questions io.Writer
	answers   *bufio.Scanner
}

// startInside starts the test's own binary as the program.
func startInside(t *testing.T, document string, args ...string) *insider {
	t.Helper()
	command := exec.Command(os.Args[0], args...)
	command.Env = append(environment(t.TempDir()), inside+"=1")
	questions, err := command.StdinPipe()
	if err != nil {
		t.Fatal(err)
	}
	answers, err := command.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	s := &screen{T: t, command: command}
	s.begin(document)
	return &insider{s, questions, bufio.NewScanner(answers)}
}

// ask returns the lines of an answer.
func (s *insider) ask(question string) []string {
	s.Helper()
	if _, err := fmt.Fprintln(s.questions, question); err != nil {
		s.Fatalf("%q: %v\n%s", question, err, s.log.String())
	}
	var lines []string
	for s.answers.Scan() && s.answers.Text() != "" {
		lines = append(lines, s.answers.Text())
	}
	if err := s.answers.Err(); err != nil {
		s.Fatalf("%q: %v\n%s", question, err, s.log.String())
	}
	return lines
}

// settle waits until nothing is computed and drawn any more.
func (s *insider) settle() {
	s.Helper()
	quiet := 0
	s.waitFor("rest", func() bool {
		if s.ask("busy")[0] == "false" {
			quiet++
		} else {
			quiet = 0
		}
		return quiet > 4 // a part of a page waits a moment before it begins
	})
}

// check keeps a picture and fails for every complaint.
func (s *insider) check(name string) {
	s.Helper()
	s.settle()
	s.picture(name)
	for _, complaint := range s.ask("complaints") {
		s.Errorf("%s: %s", name, complaint)
	}
}

// Every page, light and dark, in the three folds, as it is opened, with every value
// of the plan shown, and with a refused text and the strip: no label is cut or
// overlaps another.
func TestPagesInTheWindow(t *testing.T) {
	needScreen(t)
	for _, look := range []struct{ name, size, variant, scale string }{
		{"full-light", "1280x800", "light", "1"},
		{"full-dark", "1280x800", "dark", "1"},
		{"compact-light", "1024x680", "light", "1"},
		{"compact-dark", "1024x680", "dark", "1"},
		{"drawer-light", "1024x680", "light", "1.5"},
		{"drawer-dark", "1024x680", "dark", "1.5"},
	} {
		t.Run(look.name, func(t *testing.T) {
			s := startInside(t, "skerry-demo", "--size", look.size, "--variant", look.variant, "--text-scale", look.scale)
			pages := s.ask("pages")
			if len(pages) < 3 {
				t.Fatalf("the pages are %q, want at least three", pages)
			}
			for _, page := range pages {
				s.ask("turn " + page)
				s.check("page-" + look.name + "-" + strings.ToLower(page))
			}
			if strings.HasPrefix(look.name, "drawer") {
				s.keys("F2")
			}
			s.act(look.name)
			s.keys("ctrl+q", "Tab", "Return") // the second button does not save
			s.awaitEnd()
		})
	}
}

// act does what a user does with the keys, and looks at what becomes of it.
func (s *insider) act(look string) {
	s.Helper()
	s.ask("turn Ceiling")
	s.keys("Tab", "Tab")
	s.do("xdotool", "type", "--delay", "60", "22 mV")
	s.keys("Tab")
	s.do("xdotool", "type", "--delay", "60", "2*3.5")
	time.Sleep(300 * time.Millisecond)
	s.keys("ctrl+e")
	s.check("act-" + look + "-typed")
	s.keys("Escape", "ctrl+g")
	s.check("act-" + look + "-values")
	s.keys("ctrl+m")
	s.check("act-" + look + "-menu")
	s.keys("Escape", "ctrl+g", "F1")
	s.check("act-" + look + "-cautions")
	s.keys("Escape")
}

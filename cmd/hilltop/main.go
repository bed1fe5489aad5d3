// Command hilltop opens the window on the demo plan, or on the plan given.
//
//	hilltop [flags] [PLAN.json]
package main

import (
	"errors"
	"flag"
	"fmt"
	"io"
	"log"
	"os"
	"os/signal"
	"strings"
	"sync/atomic"
	"syscall"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/app"

	"hilltop/gui"
	"hilltop/gui/session"
)

// appID is that of FyneApp.toml: preferences are kept under it.
const appID = "lab.hilltop.planner"

func main() { os.Exit(run(os.Args[1:], os.Stderr)) }

// show runs the window until it is closed. The toolkit panics where there is no
// display to open it on; that is an error of the machine, not of the program.
func show(window *gui.Window) (err error) {
	defer func() {
		if fault := recover(); fault != nil {
			if !strings.Contains(fmt.Sprint(fault), "GLFW library is not initialized") {
				panic(fault)
			}
			err = fmt.Errorf("cannot open a window on display %q; hilltop-batch judge PLAN needs none", os.Getenv("DISPLAY"))
		}
	}()
	window.Native().ShowAndRun()
	return nil
}

// run opens the window and returns the exit code once it is closed.
func run(args []string, stderr io.Writer) int {
	opt, code := options(args, stderr)
	if code >= 0 {
		return code
	}
	log.SetOutput(&quiet{to: stderr})
	program := app.NewWithID(appID)
	return serve(program, gui.New(program, opt), stderr)
}

// options reads the command line and finds the folder for recovery files. The code
// is the one to exit with, or -1 to go on.
func options(args []string, stderr io.Writer) (opt gui.Options, code int) {
	opt, err := parse(args, stderr)
	switch {
	case errors.Is(err, flag.ErrHelp):
		return opt, 0
	case err != nil:
		fmt.Fprintln(stderr, "hilltop:", err)
		return opt, 2
	}
	if opt.Folder, err = session.DefaultFolder(); err != nil {
		fmt.Fprintln(stderr, "hilltop: no folder for recovery files, going on without:", err)
		opt.Folder = ""
	}
	return opt, -1
}

// serve runs a window until it is closed and returns the exit code.
func serve(program fyne.App, window *gui.Window, stderr io.Writer) int {
	stopped := quitOnSignal(program)
	if err := show(window); err != nil {
		fmt.Fprintln(stderr, "hilltop:", err)
		return 1
	}
	if !stopped.Load() {
		window.Close()
	}
	return 0
}

// quitOnSignal ends the program when it is told to from outside. Nobody was asked
// about unsaved work then, so the window is not closed and its recovery copy
// stays for the next start.
func quitOnSignal(program fyne.App) *atomic.Bool {
	var stopped atomic.Bool
	signals := make(chan os.Signal, 1)
	signal.Notify(signals, os.Interrupt, syscall.SIGTERM)
	go func() {
		<-signals
		stopped.Store(true)
		gui.Post(program.Quit)
	}()
	return &stopped
}

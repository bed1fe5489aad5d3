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
	"syscall"

	"fyne.io/fyne/v2/app"

	"hilltop/gui"
	"hilltop/gui/session"
)

// appID is that of FyneApp.toml: preferences are kept under it.
const appID = "lab.hilltop.planner"

func main() { os.Exit(run(os.Args[1:], os.Stderr)) }

// run opens the window and returns the exit code once it is closed.
func run(args []string, stderr io.Writer) int {
	opt, err := parse(args, stderr)
	switch {
	case errors.Is(err, flag.ErrHelp):
		return 0
	case err != nil:
		fmt.Fprintln(stderr, "hilltop:", err)
		return 2
	}
	if opt.Folder, err = session.DefaultFolder(); err != nil {
		fmt.Fprintln(stderr, "hilltop: no folder for recovery files, going on without:", err)
		opt.Folder = ""
	}
	log.SetOutput(&quiet{to: stderr})
	program := app.NewWithID(appID)
	window := gui.New(program, opt)
	stop := make(chan os.Signal, 1)
	signal.Notify(stop, os.Interrupt, syscall.SIGTERM)
	go func() {
		<-stop
		gui.Post(program.Quit)
	}()
	window.Native().ShowAndRun()
	window.Close()
	return 0
}

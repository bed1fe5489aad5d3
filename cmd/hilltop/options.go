package main

import (
	"flag"
	"fmt"
	"io"

	"fyne.io/fyne/v2"

	"hilltop/gui"
)

const usage = `usage: hilltop [flags] [PLAN.json]

Opens the plan, or the demo plan where none is given.

`

// parse reads the command line.
func parse(args []string, stderr io.Writer) (gui.Options, error) {
	var opt gui.Options
	flags := flag.NewFlagSet("hilltop", flag.ContinueOnError)
	flags.SetOutput(stderr)
	flags.Usage = func() {
		fmt.Fprint(stderr, usage)
		flags.PrintDefaults()
	}
	size := flags.String("size", "1280x800", "size of the window, WIDTHxHEIGHT in pixels")
	variant := flags.String("variant", "", "colours: light, dark or system (as chosen last)")
	scale := flags.Float64("text-scale", 0, "text size, 1 for 100 % (as chosen last)")
	flags.StringVar(&opt.Page, "page", "", "page to begin with, by its name")
	if err := flags.Parse(args); err != nil {
		return opt, err
	}
	if flags.NArg() > 1 {
		return opt, fmt.Errorf("%d plans given, want one", flags.NArg())
	}
	opt.Path = flags.Arg(0)
	opt.TextScale = float32(*scale)
	if *scale != 0 && !(*scale >= 0.5 && *scale <= 3) {
		return opt, fmt.Errorf("text scale %g, want 0.5 to 3", *scale)
	}
	switch opt.Variant = gui.Variant(*variant); opt.Variant {
	case "", gui.Light, gui.Dark, gui.FollowSystem:
	default:
		return opt, fmt.Errorf("variant %q, want light, dark or system", *variant)
	}
	var err error
	opt.Size, err = parseSize(*size)
	return opt, err
}

// parseSize reads a size such as 1280x800.
func parseSize(text string) (fyne.Size, error) {
	var width, height int
	if n, err := fmt.Sscanf(text, "%dx%d", &width, &height); n != 2 || err != nil || width < 480 || height < 360 || width > 16000 || height > 16000 {
		return fyne.Size{}, fmt.Errorf("size %q, want WIDTHxHEIGHT from 480x360 to 16000x16000", text)
	}
	return fyne.NewSize(float32(width), float32(height)), nil
}

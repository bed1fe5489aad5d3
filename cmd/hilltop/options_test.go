package main

import (
	"io"
	"testing"

	"fyne.io/fyne/v2"

	"hilltop/gui"
)

func TestParse(t *testing.T) {
	got, err := parse([]string{"--size", "1024x680", "--variant", "dark", "--text-scale", "1.5", "--page", "Ceiling", "plan.json"}, io.Discard)
	if err != nil {
		t.Fatal(err)
	}
	if got.Size != fyne.NewSize(1024, 680) || got.Variant != gui.Dark || got.TextScale != 1.5 || got.Page != "Ceiling" || got.Path != "plan.json" {
		t.Errorf("got %+v", got)
	}
	for _, args := range [][]string{
		{"--size", "10x10"}, {"--size", "wide"}, {"--size", "1024"}, {"--size", "99999x800"},
		{"--variant", "grey"}, {"--text-scale", "9"}, {"--text-scale", "NaN"}, {"--text-scale", "-1"},
		{"one.json", "two.json"}, {"--unknown"},
	} {
		if _, err := parse(args, io.Discard); err == nil {
			t.Errorf("%q: no error", args)
		}
	}
}

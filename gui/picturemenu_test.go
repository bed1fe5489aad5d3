package gui

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/storage"
)

// Every kind of file begins as such a file does.
func TestPicturesAreSaved(t *testing.T) {
	b := newBench(t, setup{variant: Dark})
	beginnings := map[string]string{".png": "\x89PNG", ".svg": "<?xml", ".pdf": "%PDF", ".csv": "part,name,floor"}
	plot := b.window.plotAtHand()
	if plot != b.ceilingPage().picture {
		t.Fatal("the picture of the page is not at hand")
	}
	picture, frame := plot.picture()
	for _, kind := range pictureKinds {
		path := filepath.Join(t.TempDir(), b.window.pictureName(plot, picture)+kind.extension)
		file, err := storage.Writer(storage.NewFileURI(path))
		if err != nil {
			t.Fatal(err)
		}
		b.window.writePicture(file, kind, picture, frame)
		b.settle()
		data, err := os.ReadFile(path)
		if err != nil || !bytes.HasPrefix(data, []byte(beginnings[kind.extension])) {
			t.Errorf("%s: %.20q, %v; want it to begin with %q", path, data, err, beginnings[kind.extension])
		}
		if !strings.Contains(b.window.status.left.Text, "Saved skerry-demo-ceiling"+kind.extension) {
			t.Errorf("the status line says %q", b.window.status.left.Text)
		}
	}
}

// The items of the Picture menu act on the plot that had the focus last.
func TestPictureMenuActsOnThePlotAtHand(t *testing.T) {
	b := newBench(t, setup{})
	b.turnTo("Lattice")
	page := b.latticePage()
	b.canvas().Focus(page.depths.sheet)
	b.canvas().Focus(b.field(depthX))
	for _, label := range []string{"Zoom in", "Pin a reference", "Move to the right"} {
		b.item(label).Action()
	}
	b.settle()
	if page.depths.view.whole() || page.depths.view.pinned == nil || !page.bands.view.whole() {
		t.Errorf("views: depths %+v, bands %+v", page.depths.view, page.bands.view)
	}
	b.item("Reset the view").Action()
	b.item("Next unit of the picture").Action()
	b.settle()
	if !page.depths.view.whole() || page.depths.view.unit == bandUnits[0] {
		t.Errorf("view %+v, want the whole picture in the next unit", page.depths.view)
	}
	b.item("Read the picture").Action()
	if b.canvas().Focused() != page.depths.sheet {
		t.Error("the menu does not lead to the picture")
	}
	b.item("Show or hide part 2").Action()
	if !page.details[1].open {
		t.Error("the menu does not show a part of the page")
	}
}

// No two items share a shortcut, and each item has one.
func TestShortcutsDiffer(t *testing.T) {
	b := newBench(t, setup{})
	taken := map[string]string{}
	var walk func([]*fyne.MenuItem)
	walk = func(items []*fyne.MenuItem) {
		for _, item := range items {
			switch {
			case item.ChildMenu != nil:
				walk(item.ChildMenu.Items)
			case item.IsSeparator:
			case item.Shortcut == nil:
				t.Errorf("%q has no shortcut", item.Label)
			case taken[item.Shortcut.ShortcutName()] != "":
				t.Errorf("%q and %q share %s", item.Label, taken[item.Shortcut.ShortcutName()], item.Shortcut.ShortcutName())
			default:
				taken[item.Shortcut.ShortcutName()] = item.Label
			}
		}
	}
	for _, menu := range b.window.menu.bar.Items {
		walk(menu.Items)
	}
}

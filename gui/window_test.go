package gui

import (
	"fmt"
	"testing"

	"fyne.io/fyne/v2"
)

// looks are the windows that layout checks run over: the three folds, light and
// dark. The toolkit takes 32 from the height for its menu.
func looks() []setup {
	var list []setup
	for _, v := range variants {
		list = append(list,
			setup{width: 1280, height: 768, variant: v, scale: 1},
			setup{width: 1024, height: 648, variant: v, scale: 1},
			setup{width: 1024, height: 648, variant: v, scale: 1.5})
	}
	return list
}

func (s setup) String() string {
	return fmt.Sprintf("%gx%g-%g-%s", s.width, s.height, 100*s.scale, s.variant)
}

func TestNoLabelIsCutOrOverlaps(t *testing.T) {
	for _, look := range looks() {
		for _, plan := range []string{"skerry-demo", "skerry-trapped", "skerry-shallow", "model-chain"} {
			if testing.Short() && plan != DemoPlan {
				continue
			}
			t.Run(look.String()+"-"+plan, func(t *testing.T) {
				look.plan = plan
				b := newBench(t, look)
				for _, page := range b.window.pages {
					b.turnTo(page.Name())
					if plan == DemoPlan {
						b.settleJobs()
					}
					b.keep(look.String() + "-" + plan + "-" + page.Name())
					b.checkLayout(page.Name() + " as opened")
				}
				b.edge()
				b.keep(look.String() + "-" + plan + "-edge")
				b.checkLayout("with a refused text, a slider and the strip")
			})
		}
	}
}

// edge brings everything onto the screen that can be there at once.
func (b *bench) edge() {
	b.Helper()
	if b.window.metrics.Fold == drawerFold {
		b.window.toggleDrawer()
	}
	first, second := b.window.column.order[0], b.window.column.order[1]
	b.enter(first, "22 mV")
	b.canvas().Focus(b.field(second))
	for _, r := range "2*1.5" {
		b.field(second).TypedRune(r)
	}
	b.window.explain("interaction")
	b.settle()
}

func TestFolds(t *testing.T) {
	for _, tc := range []struct {
		width, scale float32
		want         fold
	}{
		{1280, 1, fullFold},
		{86 * 14, 1, fullFold},
		{86*14 - 1, 1, compactFold},
		{1024, 1, compactFold},
		{64 * 14, 1, compactFold},
		{64*14 - 1, 1, drawerFold},
		{1024, 1.5, drawerFold},
		{1920, 1.5, fullFold},
	} {
		if got := foldFor(tc.width, tc.scale); got != tc.want {
			t.Errorf("width %g at text scale %g: got fold %d, want %d", tc.width, tc.scale, got, tc.want)
		}
	}
}

// The page of the full window is 976 x 628, that of the compact one 768 x 524.
func TestPageSizes(t *testing.T) {
	for _, tc := range []struct {
		look setup
		want fyne.Size
	}{
		{setup{width: 1280, height: 768}, fyne.NewSize(976, 628)},
		{setup{width: 1024, height: 648}, fyne.NewSize(768, 524)},
	} {
		b := newBench(t, tc.look)
		if got := b.window.sheet.Size(); got != tc.want {
			t.Errorf("%s: page is %v, want %v", tc.look, got, tc.want)
		}
	}
}

func TestDrawer(t *testing.T) {
	b := newBench(t, setup{width: 1024, height: 648, scale: 1.5})
	if b.window.column.Visible() {
		t.Error("the knobs of a narrow window are not in a drawer")
	}
	b.window.key(&fyne.KeyEvent{Name: fyne.KeyF2})
	if !b.window.column.Visible() {
		t.Error("F2 does not open the drawer")
	}
	b.window.key(&fyne.KeyEvent{Name: fyne.KeyEscape})
	if b.window.column.Visible() {
		t.Error("Escape does not shut the drawer")
	}
}

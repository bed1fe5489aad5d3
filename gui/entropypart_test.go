package gui

import (
	"strings"
	"testing"

	"fyne.io/fyne/v2"
)

func (b *bench) ceilingGuide() *termGuide {
	b.Helper()
	g, ok := b.ceilingPage().picture.guide().(*termGuide)
	if !ok {
		b.Fatal("the Ceiling picture is not drawn")
	}
	return g
}

func TestCeilingShowsEntropyOfTheChosenSize(t *testing.T) {
	b := newBench(t, setup{})
	b.settleJobs()
	part := b.ceilingPage().entropy
	if e := b.ceilingGuide().geometry.Entropy; e == nil || e.Stale || e.Name != "3×2 sites, 6 atoms" {
		t.Fatalf("S(E) is %+v, want that of 3×2 sites", e)
	}
	if len(part.sizes.Cells) != 4 || part.sizes.Chosen != 0 || !strings.HasPrefix(part.sizes.Cells[3], "4×3: 1,352,078 states, 49 MB, ") {
		t.Errorf("sizes %q, chosen %d", part.sizes.Cells, part.sizes.Chosen)
	}
	if part.run.Visible() || part.job.Visible() {
		t.Error("a size that follows by itself has a button or a bar")
	}
	b.canvas().Focus(part.sizes)
	b.press(part.sizes, fyne.KeyRight)
	b.settleJobs()
	if e := b.ceilingGuide().geometry.Entropy; e == nil || e.Name != "4×2 sites, 8 atoms" {
		t.Fatalf("after the key S(E) is %+v, want that of 4×2 sites", e)
	}
	b.checkLayout("with S(E)")
	b.press(part.sizes, fyne.KeyEnd)
	b.settle()
	if !part.run.Visible() || !strings.HasPrefix(part.run.text.Text, "Compute S(E) of 4×3: 1,352,078 states") {
		t.Errorf("a large size has the button %q, to be seen %v", part.run.text.Text, part.run.Visible())
	}
	b.checkLayout("before a large size")
	part.run.OnTapped()
	b.until("running", func() bool { return b.window.state.Entropy.Job.Running })
	part.job.button.OnTapped()
	b.settleJobs()
	if !part.job.Visible() || part.job.text.Text != "Stopped." {
		t.Errorf("after the stop the bar says %q", part.job.text.Text)
	}
}

func TestKeysLeadThroughEntropy(t *testing.T) {
	b := newBench(t, setup{})
	b.settleJobs()
	p := b.ceilingPage().picture
	b.canvas().Focus(p.sheet)
	for range 60 {
		b.press(p.sheet, fyne.KeyRight)
		if strings.HasPrefix(p.readout.Text, "Largest S: ") {
			break
		}
	}
	for _, want := range []string{"S/N ", "−1/T ", "kB/J", "T "} {
		if !strings.Contains(p.readout.Text, want) {
			t.Errorf("at the peak the picture reads %q, want %q in it", p.readout.Text, want)
		}
	}
}

func TestLevelsAreALadder(t *testing.T) {
	b := newBench(t, setup{})
	err := b.window.desk.OpenBytes("spins", []byte(`{"format":"hilltop-plan","version":1,"levels":{"energies_hz":[-8000,8000],"degeneracies":[1,1],"bodies":1e20,"inner_time_s":1e-4,"outer_time_s":300,"energy_hz_per_body":5000}}`))
	if err != nil {
		t.Fatal(err)
	}
	b.window.did(nil)
	b.settleJobs()
	g := b.ceilingGuide().geometry
	if len(g.Rungs) != 2 || g.Entropy == nil || g.State == nil || g.State.Hz != 5000 {
		t.Fatalf("%d rungs, S(E) %v, state %+v; want two, S(E) and 5000 Hz", len(g.Rungs), g.Entropy != nil, g.State)
	}
	if b.ceilingPage().entropy.body.Visible() {
		t.Error("levels offer sizes")
	}
	if text := b.ceilingPage().sentence.Text; !strings.HasSuffix(text, "per body.") {
		t.Errorf("the page says %q", text)
	}
	b.checkLayout("with levels")
}

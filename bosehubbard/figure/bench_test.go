package figure

import (
	"fmt"
	"image"
	"io"
	"testing"

	"hilltop/bosehubbard/band"
)

// gallery is one picture of every kind, of the demo plan.
func gallery(t testing.TB) []Picture {
	t.Helper()
	p, r := demo(t, "skerry-demo"), judged(t, "skerry-demo")
	a, err := p.Apparatus()
	if err != nil {
		t.Fatal(err)
	}
	w, end := band.NewWorkspace(), last(r)
	budget, ok := NewBudget(r, len(r.Stages)-1)
	if !ok {
		t.Fatal("the demo has no budget")
	}
	bands, err := NewBands(w, "x", end.DepthEr[0], end.RecoilHz[0], 3)
	if err != nil {
		t.Fatal(err)
	}
	depth, err := NewDepthCurves(w, r, DepthOptions{})
	if err != nil {
		t.Fatal(err)
	}
	wannier, err := NewWannier(w, []string{"x", "y", "z"}, end.DepthEr)
	if err != nil {
		t.Fatal(err)
	}
	return []Picture{
		&Ceiling{Report: r}, budget.Chart(), NewScattering(a.Scattering, r).Chart(), bands.Chart(Hertz),
		depth.Chart(Hertz), wannier.Chart(), verdictMap().Chart(),
	}
}

// verdictMap has all four verdicts.
func verdictMap() *VerdictMap {
	m := NewVerdictMap(Range{-1500, 500}, Range{-1, 0.5}, 48, 32, func(u, v float64) string {
		switch {
		case u > 0 || v > 0:
			return "open"
		case v > -0.2:
			return "leaky"
		case u < -1000 && v < -0.5:
			return "astray"
		}
		return "sealed"
	})
	m.AtU, m.AtV = -559, -0.316
	return m
}

func BenchmarkImage(b *testing.B) {
	for _, p := range gallery(b) {
		for _, height := range []int{372, 628} {
			b.Run(fmt.Sprintf("%s/976x%d", p.Stem(), height), func(b *testing.B) {
				f, s := Frame{Width: 976, Height: float64(height)}, Style{Palette: Light()}
				draw := NewRenderer()
				dst := image.NewRGBA(image.Rect(0, 0, 976, height))
				b.ReportAllocs()
				for b.Loop() {
					draw.ImageTo(dst, p, f, s)
				}
			})
		}
	}
}

func BenchmarkGeometry(b *testing.B) {
	r := judged(b, "skerry-demo")
	f, s := Frame{Width: 976, Height: 412}, Style{Palette: Light()}
	b.ReportAllocs()
	for b.Loop() {
		CeilingGeometry(r, f, s, CeilingOptions{})
	}
}

func BenchmarkExport(b *testing.B) {
	f, s := Frame{Width: 976, Height: 412}, Style{Palette: Light()}
	p := gallery(b)[0]
	b.Run("svg", func(b *testing.B) {
		for b.Loop() {
			if err := WriteSVG(io.Discard, p, f, s); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("pdf", func(b *testing.B) {
		for b.Loop() {
			if err := WritePDF(io.Discard, p, f, s); err != nil {
				b.Fatal(err)
			}
		}
	})
}

// BenchmarkData is the cost of computing what the charts show.
func BenchmarkData(b *testing.B) {
	r := judged(b, "skerry-demo")
	a, err := demo(b, "skerry-demo").Apparatus()
	if err != nil {
		b.Fatal(err)
	}
	w, end := band.NewWorkspace(), last(r)
	b.Run("bands", func(b *testing.B) {
		for b.Loop() {
			if _, err := NewBands(w, "x", end.DepthEr[0], end.RecoilHz[0], 3); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("depth", func(b *testing.B) {
		for b.Loop() {
			if _, err := NewDepthCurves(w, r, DepthOptions{}); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("wannier", func(b *testing.B) {
		for b.Loop() {
			if _, err := NewWannier(w, []string{"x", "y", "z"}, end.DepthEr); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("scattering", func(b *testing.B) {
		for b.Loop() {
			NewScattering(a.Scattering, r)
		}
	})
}

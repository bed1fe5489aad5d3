package figure

import (
	"image"
	"testing"
)

func BenchmarkCeiling(b *testing.B) {
	r := judged(b, "skerry-demo")
	for _, height := range []float64{372, 628} {
		b.Run(map[float64]string{372: "976x372", 628: "976x628"}[height], func(b *testing.B) {
			f, s := Frame{Width: 976, Height: height}, Style{Palette: Light()}
			draw := NewRenderer()
			dst := image.NewRGBA(image.Rect(0, 0, 976, int(height)))
			p := &Ceiling{Report: r}
			b.ReportAllocs()
			for b.Loop() {
				draw.ImageTo(dst, p, f, s)
			}
		})
	}
}

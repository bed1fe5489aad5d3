package figure

import (
	"image"
	"image/color"
	"math"

	"golang.org/x/image/font"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

// letters keeps the shapes of letters once drawn. The zero value is ready.
type letters struct {
	buffer sfnt.Buffer
	runs   map[runKey][]placed
	masks  map[maskKey]*mask
	shape  coverage
}

type runKey struct {
	font *sfnt.Font
	text string
}

// placed is a letter and its distance from the start of the text in em.
type placed struct {
	glyph sfnt.GlyphIndex
	at    float64
}

type maskKey struct {
	font       *sfnt.Font
	glyph      sfnt.GlyphIndex
	a, b, c, d float32
	x, y       uint8 // quarters of a pixel
}

// mask is the coverage of a letter; its origin lies at (-x, -y) of the mask.
type mask struct {
	x, y, width, height int
	alpha               []uint8
}

// most numbers of texts and letters kept; they are dropped all at once.
const (
	mostRuns  = 4096
	mostMasks = 8192
)

// run returns where the letters of a text stand.
func (l *letters) run(f *sfnt.Font, text string) []placed {
	key := runKey{f, text}
	if run, ok := l.runs[key]; ok {
		return run
	}
	if l.runs == nil || len(l.runs) >= mostRuns {
		l.runs = make(map[runKey][]placed)
	}
	run := l.place(f, text)
	l.runs[key] = run
	return run
}

func (l *letters) place(f *sfnt.Font, text string) []placed {
	em := fixed.Int26_6(f.UnitsPerEm())
	var run []placed
	at, before := fixed.Int26_6(0), sfnt.GlyphIndex(0)
	for i, r := range text {
		glyph, err := f.GlyphIndex(&l.buffer, r)
		if err != nil {
			continue
		}
		if i > 0 {
			if kern, err := f.Kern(&l.buffer, before, glyph, em, font.HintingNone); err == nil {
				at += kern
			}
		}
		run = append(run, placed{glyph, float64(at) / float64(em)})
		if advance, err := f.GlyphAdvance(&l.buffer, glyph, em, font.HintingNone); err == nil {
			at += advance
		}
		before = glyph
	}
	return run
}

// draw lays a text on dst. m maps em, y upwards, to pixels, y downwards.
func (l *letters) draw(dst *image.RGBA, f *sfnt.Font, text string, m affine, ink color.RGBA) {
	for _, p := range l.run(f, text) {
		origin := m.apply(p.at, 0)
		// Text along a pixel row or column sits on whole rows or columns.
		if m.b == 0 {
			origin.Y = math.Round(origin.Y)
		}
		if m.a == 0 {
			origin.X = math.Round(origin.X)
		}
		x, fx := quarter(origin.X)
		y, fy := quarter(origin.Y)
		l.mask(f, p.glyph, m, fx, fy).blend(dst, x, y, ink)
	}
}

// quarter splits a position into whole pixels and quarters.
func quarter(v float64) (whole int, part uint8) {
	q := math.Floor(v*4 + 0.5)
	whole = int(math.Floor(q / 4))
	return whole, uint8(q - 4*float64(whole))
}

func (l *letters) mask(f *sfnt.Font, glyph sfnt.GlyphIndex, m affine, fx, fy uint8) *mask {
	key := maskKey{f, glyph, float32(m.a), float32(m.b), float32(m.c), float32(m.d), fx, fy}
	if found, ok := l.masks[key]; ok {
		return found
	}
	if l.masks == nil || len(l.masks) >= mostMasks {
		l.masks = make(map[maskKey]*mask)
	}
	m.e, m.f = float64(fx)/4, float64(fy)/4
	made := l.render(f, glyph, m)
	l.masks[key] = made
	return made
}

// render fills the outline of a letter. An unknown letter has an empty mask.
func (l *letters) render(f *sfnt.Font, glyph sfnt.GlyphIndex, m affine) *mask {
	em := fixed.Int26_6(f.UnitsPerEm())
	segments, err := f.LoadGlyph(&l.buffer, glyph, em, nil)
	if err != nil || len(segments) == 0 {
		return &mask{}
	}
	scale := 1 / float64(em)
	at := func(p fixed.Point26_6) Point { return m.apply(float64(p.X)*scale, -float64(p.Y)*scale) }
	outlines := contours(segments, at)
	x0, y0, x1, y1 := math.Inf(1), math.Inf(1), math.Inf(-1), math.Inf(-1)
	for _, outline := range outlines {
		for _, p := range outline {
			x0, y0 = math.Min(x0, p.X), math.Min(y0, p.Y)
			x1, y1 = math.Max(x1, p.X), math.Max(y1, p.Y)
		}
	}
	out := &mask{x: int(math.Floor(x0)), y: int(math.Floor(y0))}
	out.width, out.height = int(math.Ceil(x1))-out.x, int(math.Ceil(y1))-out.y
	out.alpha = make([]uint8, out.width*out.height)
	l.shape.resize(out.width, out.height)
	for _, outline := range outlines {
		for i := range outline {
			outline[i].X -= float64(out.x)
			outline[i].Y -= float64(out.y)
		}
		l.shape.polygon(outline)
	}
	l.shape.take(func(row, low int, covered []float32) {
		for i, part := range covered {
			out.alpha[row*out.width+low+i] = uint8(part*255 + 0.5)
		}
	})
	return out
}

// contours cuts the curves of an outline into straight pieces.
func contours(segments sfnt.Segments, at func(fixed.Point26_6) Point) [][]Point {
	const pieces = 6
	var list [][]Point
	for _, s := range segments {
		if s.Op == sfnt.SegmentOpMoveTo {
			list = append(list, []Point{at(s.Args[0])})
			continue
		}
		last := &list[len(list)-1]
		p := (*last)[len(*last)-1]
		switch a, b, c := at(s.Args[0]), at(s.Args[1]), at(s.Args[2]); s.Op {
		case sfnt.SegmentOpLineTo:
			*last = append(*last, a)
		case sfnt.SegmentOpQuadTo:
			for i := 1; i <= pieces; i++ {
				t := float64(i) / pieces
				*last = append(*last, between(between(p, a, t), between(a, b, t), t))
			}
		case sfnt.SegmentOpCubeTo:
			for i := 1; i <= pieces; i++ {
				t := float64(i) / pieces
				pa, ab, bc := between(p, a, t), between(a, b, t), between(b, c, t)
				*last = append(*last, between(between(pa, ab, t), between(ab, bc, t), t))
			}
		}
	}
	return list
}

func between(p, q Point, t float64) Point { return Point{p.X + t*(q.X-p.X), p.Y + t*(q.Y-p.Y)} }

// blend lays the mask with its origin at pixel (x, y).
func (m *mask) blend(dst *image.RGBA, x, y int, ink color.RGBA) {
	x, y = x+m.x, y+m.y
	bounds := dst.Bounds()
	for row := max(0, bounds.Min.Y-y); row < min(m.height, bounds.Max.Y-y); row++ {
		first, last := max(0, bounds.Min.X-x), min(m.width, bounds.Max.X-x)
		if first >= last {
			return
		}
		line := dst.Pix[dst.PixOffset(x+first, y+row):]
		for i, alpha := range m.alpha[row*m.width+first : row*m.width+last] {
			if alpha != 0 {
				cover(line[4*i:4*i+4:4*i+4], ink, uint32(alpha))
			}
		}
	}
}

package figure

import "image/color"

// Palette is a set of colours for one background.
type Palette struct {
	Name  string
	Paper color.RGBA // behind pictures
	Panel color.RGBA // the sky and the ground
	Field color.RGBA // behind text that is typed
	Ink   color.RGBA // text, curves
	Soft  color.RGBA // inherited, stale, pinned
	Edge  color.RGBA // borders
	Blue  color.RGBA // bounded
	Red   color.RGBA // unbounded
	// Yellow is drained. On a light ground it needs an outline in Ink.
	Yellow color.RGBA
	// OnYellow is the text on Yellow; on Blue and Red it is Paper.
	OnYellow color.RGBA
}

// Light returns the palette for a light ground.
func Light() Palette {
	return Palette{
		Name:  "light",
		Paper: hex(0xFAFAF7), Panel: hex(0xEFEEE9), Field: hex(0xFFFFFF),
		Ink: hex(0x1A1D21), Soft: hex(0x4A5159), Edge: hex(0x666C73),
		Blue: hex(0x004488), Red: hex(0x994455), Yellow: hex(0xEECC66),
		OnYellow: hex(0x1A1D21),
	}
}

// Dark returns the palette for a dark ground.
func Dark() Palette {
	return Palette{
		Name:  "dark",
		Paper: hex(0x14181C), Panel: hex(0x1C2127), Field: hex(0x0E1114),
		Ink: hex(0xE0E3E6), Soft: hex(0xA9B1B8), Edge: hex(0x8A939C),
		Blue: hex(0x6699CC), Red: hex(0xEE99AA), Yellow: hex(0xEECC66),
		OnYellow: hex(0x1A1D21),
	}
}

func hex(rgb uint32) color.RGBA {
	return color.RGBA{R: uint8(rgb >> 16), G: uint8(rgb >> 8), B: uint8(rgb), A: 255}
}

// blend returns part of the way from a to b; part is between 0 and 1.
func blend(a, b color.RGBA, part float64) color.RGBA {
	mix := func(x, y uint8) uint8 { return uint8(float64(x) + part*(float64(y)-float64(x)) + 0.5) }
	return color.RGBA{R: mix(a.R, b.R), G: mix(a.G, b.G), B: mix(a.B, b.B), A: 255}
}

// grey is the neutral fill of areas that are neither bounded nor unbounded.
func (p Palette) grey() color.RGBA { return blend(p.Paper, p.Edge, 0.35) }

// of is the colour of a fill.
func (p Palette) of(f Fill) color.RGBA {
	switch f {
	case Unbounded:
		return p.Red
	case Drained:
		return p.Yellow
	}
	return p.Blue
}

// Fill says what becomes of an energy at the end that counts.
type Fill int

// The fills.
const (
	Bounded   Fill = iota // a lid, solid
	Unbounded             // strips, no lid
	Drained               // a split lid
)

// String returns "bounded", "unbounded" or "drained".
func (f Fill) String() string { return [...]string{"bounded", "unbounded", "drained"}[f] }

package main

import (
	"bytes"
	"encoding/binary"
	"fmt"
	"image"
	"os"
	"testing"
)

// framebuffer is what the X server shows, as it stands in the file that its option
// -fbdir names: reading it takes a millisecond, so that it tells when a pixel has
// changed.
type framebuffer struct {
	*testing.T
	file   *os.File
	data   int64 // where the pixels begin
	stride int   // bytes of a row
	size   image.Point
}

// framebufferFile names the file.
const framebufferFile = "HILLTOP_FRAMEBUFFER"

// openFramebuffer skips a test where the display has no such file.
func openFramebuffer(t *testing.T) *framebuffer {
	t.Helper()
	path := os.Getenv(framebufferFile)
	if path == "" {
		t.Skip(framebufferFile + " does not name the file of the display, as cmd/verify.sh does")
	}
	file, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = file.Close() })
	f := &framebuffer{T: t, file: file}
	if err := f.readHeader(); err != nil {
		t.Fatalf("%s: %v", path, err)
	}
	return f
}

// readHeader reads the header of an X window dump: big-endian words.
//
// Source: XWDFile.h of the X Window System, file version 7.
func (f *framebuffer) readHeader() error {
	words := make([]uint32, 25)
	raw := make([]byte, 4*len(words))
	if _, err := f.file.ReadAt(raw, 0); err != nil {
		return err
	}
	if err := binary.Read(bytes.NewReader(raw), binary.BigEndian, words); err != nil {
		return err
	}
	const version, bits = 7, 32
	if words[1] != version || words[11] != bits {
		return fmt.Errorf("version %d with %d bits a pixel, want %d with %d", words[1], words[11], version, bits)
	}
	colours := int64(words[19])
	const colourBytes = 12
	f.size = image.Pt(int(words[4]), int(words[5]))
	f.stride = int(words[12])
	f.data = int64(words[0]) + colourBytes*colours
	return nil
}

// read returns the pixels of a rectangle, row by row, four bytes each: blue, green,
// red and nothing.
func (f *framebuffer) read(r image.Rectangle) []byte {
	f.Helper()
	r = r.Intersect(image.Rectangle{Max: f.size})
	rows := make([]byte, f.stride*r.Dy())
	if _, err := f.file.ReadAt(rows, f.data+int64(r.Min.Y*f.stride)); err != nil {
		f.Fatal(err)
	}
	out := make([]byte, 0, 4*r.Dx()*r.Dy())
	for y := range r.Dy() {
		begin := y*f.stride + 4*r.Min.X
		out = append(out, rows[begin:begin+4*r.Dx()]...)
	}
	return out
}

// count returns how many pixels of a rectangle have a colour, 0xRRGGBB.
func (f *framebuffer) count(r image.Rectangle, colour uint32) int {
	f.Helper()
	n := 0
	pixels := f.read(r)
	for i := 0; i+3 < len(pixels); i += 4 {
		if colourAt(pixels, i) == colour {
			n++
		}
	}
	return n
}

// colourAt is the colour, 0xRRGGBB, of the pixel that begins at a byte.
func colourAt(pixels []byte, i int) uint32 {
	return uint32(pixels[i+2])<<16 | uint32(pixels[i+1])<<8 | uint32(pixels[i])
}

// span is a range of lengths in pixels.
type span struct{ least, most int }

func (s span) has(n int) bool { return n >= s.least && n <= s.most }

// bar finds the first upright dark bar in a rectangle whose width and height lie
// within bounds, and returns its middle.
func (f *framebuffer) bar(r image.Rectangle, wide, high span) (image.Point, bool) {
	f.Helper()
	pixels := f.read(r)
	dark := func(x, y int) bool {
		const limit = 0x60
		i := 4 * (y*r.Dx() + x)
		return x >= 0 && x < r.Dx() && y >= 0 && y < r.Dy() && max(pixels[i], pixels[i+1], pixels[i+2]) < limit
	}
	for y := range r.Dy() {
		for x := range r.Dx() {
			if !dark(x, y) || dark(x-1, y) || dark(x, y-1) {
				continue
			}
			width, height := 0, 0
			for dark(x+width, y) {
				width++
			}
			for dark(x, y+height) && dark(x+width-1, y+height) && !dark(x+width, y+height) && !dark(x-1, y+height) {
				height++
			}
			if wide.has(width) && high.has(height) {
				return r.Min.Add(image.Pt(x+width/2, y+height/2)), true
			}
		}
	}
	return image.Point{}, false
}

package figure

import (
	"bytes"
	"fmt"
	"image/png"
	"io"
	"strings"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/vgsvg"
)

// WritePNG writes an image of a picture; Scale sets its resolution.
func (r *Renderer) WritePNG(w io.Writer, p Picture, f Frame, s Style) error {
	if err := png.Encode(w, r.Image(p, f, s)); err != nil {
		return fmt.Errorf("figure: PNG of %q: %w", p.Stem(), err)
	}
	return nil
}

// WriteSVG writes a picture as lines and text. The fonts are named, not embedded.
func WriteSVG(w io.Writer, p Picture, f Frame, s Style) error {
	c := vgsvg.New(vg.Length(f.Width)*px, vg.Length(f.Height)*px)
	p.Draw(c, f, s)
	var text bytes.Buffer
	_, err := c.WriteTo(&text)
	if err == nil {
		_, err = fontFamilies.WriteString(w, text.String())
	}
	if err != nil {
		return fmt.Errorf("figure: SVG of %q: %w", p.Stem(), err)
	}
	return nil
}

// fontFamilies adds fonts of the same widths for readers without ours.
var fontFamilies = strings.NewReplacer(
	"font-family:Liberation Sans;", "font-family:'Liberation Sans',Arial,Helvetica,sans-serif;",
	"font-family:Liberation Mono;", "font-family:'Liberation Mono','Courier New',monospace;",
)

// WritePDF writes a picture on one page of its size, with the fonts embedded.
func WritePDF(w io.Writer, p Picture, f Frame, s Style) error {
	c := newPDF(f, p.Stem())
	p.Draw(c, f, s)
	if err := c.writeTo(w); err != nil {
		return fmt.Errorf("figure: PDF of %q: %w", p.Stem(), err)
	}
	return nil
}

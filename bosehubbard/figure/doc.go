// Package figure draws pictures of a report and of what stands behind it, the
// same on screen and in print.
//
// A Picture has one drawing routine, Draw, which speaks to a vg.Canvas; Renderer
// makes images of it, WritePNG, WriteSVG and WritePDF make files, and WriteCSV
// writes the numbers that are shown. Ceiling is the picture of the bounds of the
// energy, with Geometry as its layout to be read back; Chart is a picture with two
// axes, with Area as its link between pixels and data.
//
// Lengths are in px, 1/96 inch, at 100 %; positions count from the upper left
// corner, y downwards, as a screen does. Energies are E/h in Hz unless a Unit says
// otherwise.
//
// Colour says only whether an energy is bounded (blue), unbounded (red) or drained
// (yellow), and never alone: a lid is bounded, thinning strips are unbounded, a
// split lid is drained. The axes x, y, z are solid, dashed, dotted lines named at
// their ends.
//
// Colours: Paul Tol, "Colour Schemes", SRON/EPS/TN/09-002 issue 3.2 (2021), the
// medium-contrast set; the neutral ones are ours. Fonts: Liberation Sans for words,
// Liberation Mono for numbers.
package figure

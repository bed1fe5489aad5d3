package figure

import (
	"fmt"
	"slices"

	"hilltop/bosehubbard/band"
)

// Bands is the band structure of one lattice axis.
type Bands struct {
	Axis         string
	Depth        float64     // Er
	Recoil       float64     // Er/h in Hz
	QuasiMomenta []float64   // in units of pi/d
	Energies     [][]float64 // Er, a row per band
	GapLow       float64     // the ends of the smallest gap, Er
	GapHigh      float64
}

// NewBands computes so many bands over the first zone.
//
// It returns the error of the band solver, as for a depth out of range.
func NewBands(w *band.Workspace, axis string, depth, recoil float64, bands int) (*Bands, error) {
	const points = 61
	b := &Bands{Axis: axis, Depth: depth, Recoil: recoil, Energies: make([][]float64, bands)}
	level := make([]float64, bands)
	for i := range points {
		q := -1 + 2*float64(i)/(points-1)
		if err := w.Energies(level, depth, q); err != nil {
			return nil, fmt.Errorf("figure: bands along %s: %w", axis, err)
		}
		b.QuasiMomenta = append(b.QuasiMomenta, q)
		for n, e := range level {
			b.Energies[n] = append(b.Energies[n], e)
		}
	}
	if bands > 1 {
		b.GapLow, b.GapHigh = b.Energies[0][points-1], b.Energies[1][points-1]
	}
	return b, nil
}

// Chart draws the bands, in Hz, Er or nK, with the gap bracketed.
func (b *Bands) Chart(u Unit) *Chart {
	m := measureOf{Recoil.String(), 1} // of energies in Er
	if u != Recoil && b.Recoil > 0 {
		top := 0.0
		for _, row := range b.Energies {
			top = max(top, slices.Max(row))
		}
		m = u.ofRecoil(b.Recoil, top*b.Recoil)
		m.hz /= b.Recoil
	}
	c := &Chart{
		Name:  "bands",
		Title: "Bands along " + b.Axis + " at " + Number(b.Depth, 3) + " Er",
		X:     Axis{Label: "quasi-momentum", Unit: "π/d", Range: Range{-1, 1}},
		Y:     Axis{Label: "energy", Unit: m.name},
	}
	for n, row := range b.Energies {
		c.Curves = append(c.Curves, Curve{Name: fmt.Sprintf("band %d", n), X: b.QuasiMomenta, Y: m.list(row)})
	}
	if gap := b.GapHigh - b.GapLow; gap > 0 {
		c.Brackets = append(c.Brackets, Bracket{
			Name: "gap " + Number(gap/m.hz, 3) + " " + m.name, X: 1, Low: b.GapLow / m.hz, High: b.GapHigh / m.hz,
		})
	}
	return c
}

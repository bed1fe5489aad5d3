package band

import "math"

// MeanCurve is the mean energy of the lowest band against depth as a table for
// scanning potentials. It is immutable and safe for concurrent use.
type MeanCurve struct {
	maxDepth float64
	step     float64   // in x = sqrt(s)
	value    []float64 // eps, Er
	slope    []float64 // d eps/dx, Er
}

// curveStep is the spacing of the table in x = sqrt(s). A cubic Hermite piece is
// off by step^4/384 of the fourth derivative of eps in x, which is largest, about
// 3 ln(1/x) + 1, in the first pieces: there the error is 3e-8 Er.
const curveStep = 0.05

// NewMeanCurve tabulates eps(s) from 0 to maxDepth, in Er.
//
// Cost: 20 solutions of the band per unit of sqrt(maxDepth), 4 ms for 30 Er.
//
// It returns ErrDepth if maxDepth is out of range.
func NewMeanCurve(maxDepth float64) (*MeanCurve, error) {
	if err := checkDepth(maxDepth); err != nil {
		return nil, err
	}
	top := math.Sqrt(maxDepth)
	n := 1 + int(math.Ceil(top/curveStep))
	c := &MeanCurve{
		maxDepth: maxDepth, step: top / float64(max(n-1, 1)),
		value: make([]float64, n), slope: make([]float64, n),
	}
	w := NewWorkspace()
	for i := range n {
		x := math.Min(float64(i)*c.step, top)
		b := w.solveMean(math.Min(x*x, MaxDepth))
		c.value[i], c.slope[i] = b.Mean, 2*x*b.MeanSlope
	}
	return c, nil
}

// solveMean fills only what the swept band gives.
func (w *Workspace) solveMean(depth float64) Bands {
	if depth < almostFree {
		return freeBands(depth)
	}
	b := Bands{Depth: depth}
	w.edges(&b)
	w.sweep(w.rules.at(depth), &b)
	w.integrals(&b)
	return b
}

// At returns eps(s) in Er, good to 1e-7 Er. A depth outside the table counts as
// its nearer end. No allocation.
func (c *MeanCurve) At(depth float64) float64 {
	i, u := c.locate(depth)
	if i+1 == len(c.value) {
		return c.value[i]
	}
	v := 1 - u
	return v*v*((1+2*u)*c.value[i]+u*c.step*c.slope[i]) +
		u*u*((1+2*v)*c.value[i+1]-v*c.step*c.slope[i+1])
}

// Slope returns d eps/ds, the derivative of At, good to 1e-6 above 1 Er, 1e-5
// above 0.01 Er and 4e-4 near 0. No allocation.
func (c *MeanCurve) Slope(depth float64) float64 {
	i, u := c.locate(depth)
	x := (float64(i) + u) * c.step
	if x == 0 {
		return 0.5
	}
	if i+1 == len(c.value) {
		return c.slope[i] / (2 * x)
	}
	v := 1 - u
	chord := (c.value[i+1] - c.value[i]) / c.step
	d := 6*u*v*chord + v*(1-3*u)*c.slope[i] + u*(1-3*v)*c.slope[i+1]
	return d / (2 * x)
}

// locate returns the piece of the table and the place 0 <= u < 1 in it.
func (c *MeanCurve) locate(depth float64) (piece int, u float64) {
	last := len(c.value) - 1
	if !(depth > 0) || last == 0 {
		return 0, 0
	}
	if depth >= c.maxDepth {
		return last, 0
	}
	x := math.Sqrt(depth) / c.step
	piece = min(int(x), last-1)
	return piece, x - float64(piece)
}

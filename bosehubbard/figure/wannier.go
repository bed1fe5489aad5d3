package figure

import (
	"fmt"
	"math"

	"hilltop/bosehubbard/band"
)

// Wannier shows the Wannier functions of the axes.
type Wannier struct {
	Sites  []float64 // x/d from the centre
	Curves []WannierCurve
}

// WannierCurve is the function of the axes at one depth.
type WannierCurve struct {
	Axes   string  // such as "x, y"
	Axis   int     // the first of them, which gives the line
	Depth  float64 // Er
	Values []float64
}

// NewWannier computes w(x) sqrt(d) of every axis from its depth in Er; axes of the
// same depth share a curve.
//
// It returns the error of the band solver, as for a depth out of range.
func NewWannier(w *band.Workspace, names []string, depths []float64) (*Wannier, error) {
	const points, reach = 301, 2.5
	out := &Wannier{}
	xi := make([]float64, points)
	for i := range xi {
		site := reach * (2*float64(i)/(points-1) - 1)
		out.Sites = append(out.Sites, site)
		xi[i] = math.Pi * site
	}
next:
	for k, depth := range depths {
		for i := range out.Curves {
			if c := &out.Curves[i]; c.Depth == depth {
				c.Axes += ", " + names[k]
				continue next
			}
		}
		values := make([]float64, points)
		if err := w.Wannier(values, xi, depth); err != nil {
			return nil, fmt.Errorf("figure: Wannier function along %s: %w", names[k], err)
		}
		for i := range values {
			values[i] *= math.Sqrt(math.Pi)
		}
		out.Curves = append(out.Curves, WannierCurve{Axes: names[k], Axis: k, Depth: depth, Values: values})
	}
	return out, nil
}

// Chart draws the functions, the line of each as its axis has it.
func (w *Wannier) Chart() *Chart {
	c := &Chart{
		Name:  "wannier",
		Title: "Wannier function",
		X:     Axis{Label: "x/d", Unit: "sites"},
		Y:     Axis{Label: "w √d"},
	}
	c.X.Range = around(Linear, 0, w.Sites)
	for _, u := range w.Curves {
		c.Curves = append(c.Curves, Curve{
			Name: u.Axes + ": " + Number(u.Depth, 3) + " Er", X: w.Sites, Y: u.Values, Dash: AxisDash(u.Axis),
		})
	}
	return c
}

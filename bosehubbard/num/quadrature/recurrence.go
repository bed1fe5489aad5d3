package quadrature

import (
	"fmt"
	"math"
	"sync"

	"gonum.org/v1/gonum/floats"
)

// closed is the coupling, relative to the size of T, below which a Krylov space
// counts as exhausted.
const closed = 1e-12

// Product computes dst[i] = a A x[i] + b x[i] + c dst[i] for every vector i of a
// group and, where it is not nil, xy[i] = x[i].dst[i]; xx is always nil. With
// c = 0 it does not read dst. dst and x do not overlap.
type Product func(a, b, c float64, dst, x [][]float64, xy, xx []float64) error

// Recurrence runs Lanczos from each vector of a group, side by side.
type Recurrence struct {
	Product Product
	Steps   int // of each run, at least 1
	Workers int // goroutines for the work between products; below 2: none

	// Project, if not nil, keeps the run in a subspace: it is called on the start and
	// on every new vector, by several goroutines at a time if Workers > 1. What it
	// takes away may be close to an invariant subspace of A but need not be one.
	Project func(w []float64)

	// Visit, if not nil, is called before each product with the unit Lanczos
	// vectors of that step, 0 in a run that has ended. It does not change them.
	Visit func(step int, v [][]float64) error
}

// Run overwrites t[i] with the tridiagonal matrix of the run from v[i], which need
// not have unit length; norms[i] is its length after Project. A run ends early
// when its Krylov space is exhausted. v and prev, of the same shape, are
// overwritten.
//
// The numbers depend neither on the group nor on Workers. Cost: Steps products
// and six passes over the vectors each.
//
// It returns the error of a product or a visit. It panics if the lengths do not
// match or Steps < 1.
func (r *Recurrence) Run(t []Tridiagonal, norms []float64, v, prev [][]float64) error {
	if r.Steps < 1 || len(t) == 0 || len(v) != len(t) || len(prev) != len(t) || len(norms) != len(t) {
		panic(fmt.Sprintf("quadrature: %d steps, %d results and %d norms for %d and %d vectors, want as many of each",
			r.Steps, len(t), len(norms), len(v), len(prev)))
	}
	v, prev = append([][]float64(nil), v...), append([][]float64(nil), prev...)
	r.each(len(v), func(i int) {
		t[i].reset(r.Steps)
		norms[i] = r.normalise(v[i])
	})
	alpha := make([]float64, len(v))
	c := 0.0
	for step := range r.Steps {
		if r.Visit != nil {
			if err := r.Visit(step, v); err != nil {
				return err
			}
		}
		if err := r.Product(1, 0, c, prev, v, alpha, nil); err != nil {
			return err
		}
		c = -1
		r.each(len(v), func(i int) {
			r.advance(&t[i], alpha[i], v[i], prev[i])
			v[i], prev[i] = prev[i], v[i]
		})
	}
	return nil
}

// normalise projects and scales a vector; a zero vector stays.
func (r *Recurrence) normalise(v []float64) float64 {
	if r.Project != nil {
		r.Project(v)
	}
	norm := math.Sqrt(floats.Dot(v, v))
	if norm > 0 {
		floats.Scale(1/norm, v)
	}
	return norm
}

// advance ends a step of one run: w holds A v - beta v_before and becomes the next
// unit vector, v becomes beta times itself, as the next product wants to subtract
// it.
func (r *Recurrence) advance(t *Tridiagonal, alpha float64, v, w []float64) {
	if t.ended {
		return
	}
	floats.AddScaled(w, -alpha, v)
	if r.Project != nil {
		r.Project(w)
	}
	beta := math.Sqrt(floats.Dot(w, w))
	t.Diagonal = append(t.Diagonal, alpha)
	t.size = max(t.size, math.Abs(alpha), beta)
	if !(beta > closed*t.size) {
		t.ended = true
		clear(v)
		clear(w)
		return
	}
	t.Coupling = append(t.Coupling, beta)
	floats.Scale(1/beta, w)
	floats.Scale(beta, v)
}

// each calls do for every vector, on Workers goroutines if more than one.
func (r *Recurrence) each(n int, do func(i int)) {
	if r.Workers < 2 {
		for i := range n {
			do(i)
		}
		return
	}
	var wait sync.WaitGroup
	for worker := range min(r.Workers, n) {
		wait.Go(func() {
			for i := worker; i < n; i += r.Workers {
				do(i)
			}
		})
	}
	wait.Wait()
}

package gutzwiller

import "math"

// finish ends a step for a block: error, new amplitudes in the resting frame, norm
// and sums.
func (e *Engine) finish(w *scratch, block int, y, next []float64) {
	from := block * len(next)
	t := &e.tallies[block]
	*t = tally{}
	if e.method.fifth != nil {
		t.err = e.estimate(w, from)
	}
	e.sum(w, next, y, e.rows[len(e.rows)-1], from)
	if e.options.PlainStep == 0 {
		e.rest(w, block, next)
		t.norm = setNorm(&w.a, next)
	}
	e.count(block, next)
}

// estimate returns the largest error of a site of a block: that of order 5, damped
// by that of order 3 as in DOP853.
func (e *Engine) estimate(w *scratch, from int) float64 {
	fifth, third := &w.a, &w.b
	e.squares(w, fifth, e.fifth, from)
	e.squares(w, third, e.third, from)
	largest := 0.0
	for s, five := range fifth {
		if five > 0 {
			largest = max(largest, five/math.Sqrt(five+0.01*third[s]))
		} else if math.IsNaN(five) {
			return math.Inf(1)
		}
	}
	return largest
}

// squares writes the square of step sum_j c_j k_j of every site to dst.
func (e *Engine) squares(w *scratch, dst *lane, row weights, from int) {
	clear(w.block)
	e.sum(w, w.block, w.block, row, from)
	*dst = lane{}
	addSquares(dst, w.block)
}

// addSquares adds the squares of all rows of a block to dst.
func addSquares(dst *lane, f []float64) {
	for at := 0; at < len(f); at += width {
		v := (*lane)(f[at:])
		for s := range width {
			dst[s] += v[s] * v[s]
		}
	}
}

// rest turns the amplitudes of a block from the frame of the step to the resting one.
func (e *Engine) rest(w *scratch, block int, f []float64) {
	w.powerRe, w.powerIm = lane{}, lane{}
	for s := range width {
		w.powerRe[s] = 1
	}
	tRe, tIm := &w.psiRe, &w.psiIm
	turning := e.turning()
	if turning {
		e.setTurn(tRe, tIm, e.stages[len(e.stages)-1].angles, block)
	}
	for n := 1; n < e.system.Levels; n++ {
		if turning {
			multiply(&w.powerRe, &w.powerIm, tRe, tIm)
		}
		re, im, c := row(f, 2*n), row(f, 2*n+1), e.final[n]
		for s := range width {
			pr, pi := w.powerRe[s], w.powerIm[s]
			ar, ai := pr*c.re-pi*c.im, pr*c.im+pi*c.re
			a, b := re[s], im[s]
			re[s], im[s] = a*ar-b*ai, a*ai+b*ar
		}
	}
}

// setNorm gives every site of a block the norm 1 and returns the largest |norm - 1|
// found. Sites without amplitudes, which only pad, stay.
func setNorm(scale *lane, f []float64) float64 {
	*scale = lane{}
	addSquares(scale, f)
	worst := 0.0
	for s, square := range scale {
		if square > 0 {
			norm := math.Sqrt(square)
			worst = max(worst, math.Abs(norm-1))
			scale[s] = 1 / norm
		}
	}
	for at := 0; at < len(f); at += width {
		v := (*lane)(f[at:])
		for s := range width {
			v[s] *= scale[s]
		}
	}
	return worst
}

// count adds up the atoms of a block, the spread of their number and the last level.
func (e *Engine) count(block int, f []float64) {
	t := &e.tallies[block]
	var mean, square, weight lane
	for n := 1; n < e.system.Levels; n++ {
		re, im, number := row(f, 2*n), row(f, 2*n+1), float64(n)
		for s := range width {
			weight[s] = re[s]*re[s] + im[s]*im[s]
			mean[s] += number * weight[s]
			square[s] += number * number * weight[s]
		}
	}
	for s := range width {
		t.number += mean[s]
		t.spread += square[s] - mean[s]*mean[s]
		if weight[s] > t.top {
			t.top, t.topSite = weight[s], block*width+s
		}
	}
}

// correct brings a block back to the number of atoms of the start of the run: every
// f_n is multiplied by exp(scale n) and the site set to norm 1, the shortest way for
// a small scale.
func (e *Engine) correct(worker, block int) {
	size := 2 * width * e.system.Levels
	f := e.state.amplitudes[block*size : (block+1)*size]
	for n := 1; n < e.system.Levels; n++ {
		grow := math.Exp(e.scale * float64(n))
		for i := 2 * n * width; i < 2*(n+1)*width; i++ {
			f[i] *= grow
		}
	}
	setNorm(&e.scratch[worker].a, f)
	re, im := e.phi[0].block(block)
	field(re, im, f, e.plain)
	e.tallies[block] = tally{}
	e.count(block, f)
}

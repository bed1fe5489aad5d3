package gutzwiller

// tally is what one block reports of a finished step.
type tally struct {
	err     float64 // largest error of a site, amplitude
	norm    float64 // largest |norm - 1| of a site before it is set right
	top     float64 // largest probability of the last level
	topSite int
	number  float64 // atoms
	spread  float64 // sum of the variances of the occupations
}

// begin prepares a block for the first step of a run: phi and the sums.
func (e *Engine) begin(_, block int) {
	size := 2 * width * e.system.Levels
	y := e.state.amplitudes[block*size : (block+1)*size]
	re, im := e.phi[0].block(block)
	field(re, im, y, e.plain)
	e.tallies[block] = tally{}
	e.count(block, y)
}

// pass does one stage of a step for a block: the rate from the field that the stage
// before left, then the amplitudes and the field of the next one. The fields of
// stages lie in two lists in turn.
func (e *Engine) pass(worker, stage, block int) {
	size := 2 * width * e.system.Levels
	from, to := block*size, (block+1)*size
	y, next := e.state.amplitudes[from:to], e.next[from:to]
	w := &e.scratch[worker]
	if stage > 0 || !e.known {
		g := next
		if stage == 0 {
			g = y
		}
		e.rate(w, stage, block, e.k[e.method.slots[stage]][from:to], g)
	}
	stage++
	re, im := e.phi[stage%2].block(block)
	if stage == len(e.method.nodes) {
		e.finish(w, block, y, next)
		field(re, im, next, e.plain)
		return
	}
	e.sum(w, next, y, e.rows[stage-1], from)
	field(re, im, next, e.stages[stage].factors)
	if e.turning() {
		tRe, tIm := e.turn.block(block)
		e.setTurn(tRe, tIm, e.stages[stage].angles, block)
		multiply(re, im, tRe, tIm)
	}
}

// turning says whether the potential is taken out of the amplitudes.
func (e *Engine) turning() bool { return len(e.shapes) > 0 && e.options.PlainStep == 0 }

// rate sets k to the rate of g at a stage.
func (e *Engine) rate(w *scratch, stage, block int, k, g []float64) {
	st := &e.stages[stage]
	e.gather(w, st, &e.phi[stage%2], block)
	if e.turning() && stage > 0 {
		tRe, tIm := e.turn.block(block)
		multiplyConjugate(&w.psiRe, &w.psiIm, tRe, tIm)
	}
	rate(k, g, &w.psiRe, &w.psiIm, st.factors, st.left)
	if e.options.PlainStep > 0 {
		e.angle(&w.a, st.weights, block)
		addPotential(k, g, &w.a, e.system.Levels)
	}
}

// gather writes J Phi of a block to psi.
func (e *Engine) gather(w *scratch, st *stage, phi *wave, block int) {
	grid := e.system.Grid
	for d := range grid.sides {
		w.scaled[d] = st.tunnelling[d/2]
	}
	all := w.scaled[:len(grid.sides)]
	for d := range grid.sides {
		w.picked[d] = grid.sides[d].values(&w.sides[d], phi.re, block)
	}
	w.psiRe = lane{}
	combine(w.psiRe[:], w.psiRe[:], all, w.picked[:])
	for d := range grid.sides {
		w.picked[d] = grid.sides[d].values(&w.sides[d], phi.im, block)
	}
	w.psiIm = lane{}
	combine(w.psiIm[:], w.psiIm[:], all, w.picked[:])
}

// sum writes base + step sum_j c_j k_j of one row to dst; from is where the block
// begins.
func (e *Engine) sum(w *scratch, dst, base []float64, row weights, from int) {
	for i, j := range row.stages {
		w.scaled[i], w.picked[i] = e.step*row.c[i], e.k[e.method.slots[j]][from:from+len(dst)]
	}
	combine(dst, base, w.scaled[:len(row.c)], w.picked[:len(row.c)])
}

// angle writes the sum of weights times shapes to dst.
func (e *Engine) angle(dst *lane, weights []float64, block int) {
	*dst = lane{}
	for k, weight := range weights {
		shape := row(e.shapes[k], block)
		for s := range width {
			dst[s] += weight * shape[s]
		}
	}
}

// setTurn writes exp(-i angle) of every site.
func (e *Engine) setTurn(re, im *lane, angles []float64, block int) {
	var angle lane
	e.angle(&angle, angles, block)
	circle(re, im, &angle)
}

// multiply and multiplyConjugate turn (re, im) by (tRe, tIm) and back.
func multiply(re, im, tRe, tIm *lane) {
	for s := range width {
		a, b, c, d := re[s], im[s], tRe[s], tIm[s]
		re[s], im[s] = a*c-b*d, a*d+b*c
	}
}

func multiplyConjugate(re, im, tRe, tIm *lane) {
	for s := range width {
		a, b, c, d := re[s], im[s], tRe[s], tIm[s]
		re[s], im[s] = a*c+b*d, b*c-a*d
	}
}

// addPotential adds -i n potential g_n to k; the potential is in rad/s.
func addPotential(k, g []float64, potential *lane, levels int) {
	for n := 1; n < levels; n++ {
		kRe, kIm, gRe, gIm := row(k, 2*n), row(k, 2*n+1), row(g, 2*n), row(g, 2*n+1)
		for s := range width {
			d := float64(n) * potential[s]
			kRe[s] += d * gIm[s]
			kIm[s] -= d * gRe[s]
		}
	}
}

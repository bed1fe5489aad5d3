package gutzwiller

import (
	"fmt"
	"math"
)

// begin sets every site to a coherent state of about the filling that it will have.
func (r *relaxation) begin(mu float64) {
	r.mu = mu
	for site := range r.v {
		n := r.guess(site, mu)
		f := r.f[site*r.levels : (site+1)*r.levels]
		f[0] = 1
		for i := 1; i < r.levels; i++ {
			f[i] = f[i-1] * math.Sqrt(n/float64(i))
		}
		r.phi[site] = settle(f, r.roots)
	}
}

// stir gives every level a little weight again, so that a site whose filling has to
// change after a change of mu is not stuck.
func (r *relaxation) stir(little float64) {
	for site := range r.v {
		v := little
		n := r.guess(site, r.mu)
		f := r.f[site*r.levels : (site+1)*r.levels]
		f[0] += v
		for i := 1; i < r.levels; i++ {
			v *= math.Sqrt(n / float64(i))
			f[i] += v
		}
		r.phi[site] = settle(f, r.roots)
	}
}

// guess is the filling in local equilibrium without fluctuations, not quite 0.
func (r *relaxation) guess(site int, mu float64) float64 {
	above := mu - r.v[site] + 2*(r.j[0]+r.j[1]+r.j[2])
	most := float64(r.levels - 1)
	if r.u*most <= above {
		return most
	}
	return min(most, max(1e-3, above/max(r.u, 1e-300)+0.5))
}

// settle sets a site to norm 1 and returns its phi.
func settle(f, roots []float64) float64 {
	square, phi := 0.0, 0.0
	for _, v := range f {
		square += v * v
	}
	scale := 1 / math.Sqrt(square)
	for n := range f {
		f[n] *= scale
		if n > 0 {
			phi += roots[n] * f[n] * f[n-1]
		}
	}
	return phi
}

// relax sweeps until phi changes by less than the tolerance.
func (r *relaxation) relax(tolerance float64) error {
	grid := r.system.Grid
	for {
		r.residual = 0
		for site := range r.v {
			if site%4096 == 0 {
				if err := r.ctx.Err(); err != nil {
					return err
				}
			}
			field := 0.0
			for a := range grid.Axes {
				field += r.j[a] * (r.phi[grid.near[2*a][site]] + r.phi[grid.near[2*a+1][site]])
			}
			f := r.f[site*r.levels : (site+1)*r.levels]
			r.cool(f, r.mu-r.v[site], field)
			phi := settle(f, r.roots)
			r.residual = max(r.residual, math.Abs(phi-r.phi[site]))
			r.phi[site] = phi
		}
		r.sweeps++
		if r.opt.Progress != nil {
			r.opt.Progress(r.sweeps, r.opt.MaxSweeps)
		}
		switch {
		case r.residual <= tolerance:
			return nil
		case r.sweeps >= r.opt.MaxSweeps:
			return &NotConvergedError{r.sweeps, r.residual, tolerance}
		}
	}
}

// cool takes one implicit step in imaginary time,
//
//	f <- (h - sigma)^(-1) f    h = U n(n-1)/2 - mu n - field (b + b^+)
//
// with sigma below the lowest energy of the site by about as much as f is from it:
// as the steps go on they become as good as a diagonalisation. h - sigma has only
// positive pivots then, and if not, sigma goes down.
func (r *relaxation) cool(f []float64, mu, field float64) {
	mean, square := 0.0, 0.0
	scale := math.Abs(field)
	for n := range f {
		x := float64(n)
		r.diagonal[n] = r.u*x*(x-1)/2 - mu*x
		hf := r.diagonal[n] * f[n]
		if n > 0 {
			hf -= field * r.roots[n] * f[n-1]
		}
		if n+1 < len(f) {
			hf -= field * r.roots[n+1] * f[n+1]
		}
		mean += f[n] * hf
		square += hf * hf
		scale = max(scale, math.Abs(r.diagonal[n]))
	}
	away := math.Sqrt(max(0, square-mean*mean)) + 1e-13*scale
	if away == 0 {
		return // a site without energies
	}
	for !r.eliminate(mean-away, field) {
		away *= 2
	}
	r.solve(f, field)
}

// eliminate finds the pivots of h - sigma and says whether all are positive.
func (r *relaxation) eliminate(sigma, field float64) bool {
	for n, d := range r.diagonal {
		d -= sigma
		if n > 0 {
			d -= field * field * float64(n) / r.pivots[n-1]
		}
		if !(d > 0) {
			return false
		}
		r.pivots[n] = d
	}
	return true
}

// solve replaces f by (h - sigma)^(-1) f.
func (r *relaxation) solve(f []float64, field float64) {
	for n := 1; n < len(f); n++ {
		f[n] += field * r.roots[n] / r.pivots[n-1] * f[n-1]
	}
	last := len(f) - 1
	f[last] /= r.pivots[last]
	for n := last - 1; n >= 0; n-- {
		f[n] = (f[n] + field*r.roots[n+1]*f[n+1]) / r.pivots[n]
	}
}

// number returns the atoms.
func (r *relaxation) number() float64 {
	sum := 0.0
	for i, v := range r.f {
		sum += float64(i%r.levels) * v * v
	}
	return sum
}

// findAtoms searches for the chemical potential that gives the atoms wanted, and
// sets what is left right by f_n -> f_n e^(scale n). Far from the goal it sweeps only
// as long as the sign of the excess needs.
func (r *relaxation) findAtoms() error {
	low, high := r.bracket()
	r.begin((low + high) / 2)
	var atLow, atHigh float64 // atoms too many, once known
	tolerance := max(1e-4, r.opt.Tolerance)
	for range 200 {
		if err := r.relax(tolerance); err != nil {
			return err
		}
		excess := r.number() - r.opt.Atoms
		if tolerance > r.opt.Tolerance && math.Abs(excess) < max(100*tolerance, 1e-7)*r.opt.Atoms {
			tolerance = max(tolerance/30, r.opt.Tolerance)
			continue
		}
		if math.Abs(excess) <= 1e-7*r.opt.Atoms {
			return r.trim()
		}
		if excess < 0 {
			low, atLow = r.mu, excess
		} else {
			high, atHigh = r.mu, excess
		}
		next := (low + high) / 2
		if atLow < 0 && atHigh > 0 {
			secant := (low*atHigh - high*atLow) / (atHigh - atLow)
			margin := 0.02 * (high - low)
			next = min(max(secant, low+margin), high-margin)
		}
		if next == low || next == high {
			break
		}
		r.mu = next
		r.stir(max(1e-6, tolerance))
	}
	return fmt.Errorf("gutzwiller: no chemical potential gives %g atoms: %g at mu/h = %g Hz", r.opt.Atoms, r.number(), r.mirror*r.mu)
}

// bracket returns chemical potentials that give no atoms and too many.
func (r *relaxation) bracket() (low, high float64) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, v := range r.v {
		low, high = min(low, v), max(high, v)
	}
	band := 2 * (r.j[0] + r.j[1] + r.j[2])
	top := float64(r.levels)
	return low - band - 1e-9*(band+r.u), high + r.u*top + band*(top+1)
}

// trim sets the number of atoms right to rounding.
func (r *relaxation) trim() error {
	for range 8 {
		excess, spread := -r.opt.Atoms, 0.0
		for site := range r.v {
			mean, square := 0.0, 0.0
			for n, v := range r.f[site*r.levels : (site+1)*r.levels] {
				mean += float64(n) * v * v
				square += float64(n) * float64(n) * v * v
			}
			excess += mean
			spread += square - mean*mean
		}
		if math.Abs(excess) <= 1e-12*r.opt.Atoms || spread <= 0 {
			return nil
		}
		scale := math.Exp(-excess / (2 * spread))
		for site := range r.v {
			f := r.f[site*r.levels : (site+1)*r.levels]
			grow := 1.0
			for n := range f {
				f[n] *= grow
				grow *= scale
			}
			r.phi[site] = settle(f, r.roots)
		}
	}
	return nil
}

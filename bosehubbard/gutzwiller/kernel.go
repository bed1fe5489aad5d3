package gutzwiller

// row returns one row of a block.
func row(v []float64, i int) *lane { return (*lane)(v[i*width:]) }

// factor is sqrt(n+1) exp(-i theta_U n) for n = 0, 1, ...: the matrix element
// between n and n+1 in the frame that turns with the interaction.
type factor struct{ re, im float64 }

// rate writes dg/dt = i [conj(e_(n-1)) g_(n-1) + e_n g_(n+1) - left[n] g_n] with
// e_n = conj(psi) factors[n] to k. psi is J Phi in the turning frame and left the
// energies that do not turn with it, rad/s. k and g are one block each, factors has
// one entry per level but the last, left one per level.
func rate(k, g []float64, psiRe, psiIm *lane, factors []factor, left []float64) {
	if vectors {
		_, _, _ = k[2*width*(len(factors)+1)-1], g[2*width*(len(factors)+1)-1], left[len(factors)]
		rateAVX2(k, g, psiRe, psiIm, factors, left)
		return
	}
	ratePlain(k, g, psiRe, psiIm, factors, left)
}

// field writes sum_n factors[n] conj(g_n) g_(n+1) to phi: <b> in the frame that
// turns with the potential alone.
func field(phiRe, phiIm *lane, g []float64, factors []factor) {
	if vectors {
		_ = g[2*width*(len(factors)+1)-1]
		fieldAVX2(phiRe, phiIm, g, factors)
		return
	}
	fieldPlain(phiRe, phiIm, g, factors)
}

// combine writes base + sum_j c[j] k[j] to dst. All have the length of dst, a
// multiple of width; dst may be base.
func combine(dst, base []float64, c []float64, k [][]float64) {
	if vectors && len(dst) > 0 {
		_ = base[len(dst)-1]
		for _, v := range k[:len(c)] {
			_ = v[len(dst)-1]
		}
		combineAVX2(dst, base, c, k)
		return
	}
	combinePlain(dst, base, c, k)
}

func ratePlain(k, g []float64, psiRe, psiIm *lane, factors []factor, left []float64) {
	var restRe, restIm lane
	for n, c := range factors {
		fRe, fIm, gRe, gIm := row(g, 2*n), row(g, 2*n+1), row(g, 2*n+2), row(g, 2*n+3)
		kRe, kIm, l := row(k, 2*n), row(k, 2*n+1), left[n]
		for s := range width {
			pr, pi := psiRe[s], psiIm[s]
			er, ei := pr*c.re+pi*c.im, pr*c.im-pi*c.re
			gr, gi, fr, fi := gRe[s], gIm[s], fRe[s], fIm[s]
			kRe[s] = restRe[s] - (er*gi + ei*gr) + l*fi
			kIm[s] = restIm[s] + (er*gr - ei*gi) - l*fr
			restRe[s] = ei*fr - er*fi
			restIm[s] = er*fr + ei*fi
		}
	}
	last := len(factors)
	kRe, kIm, fRe, fIm, l := row(k, 2*last), row(k, 2*last+1), row(g, 2*last), row(g, 2*last+1), left[last]
	for s := range width {
		kRe[s] = restRe[s] + l*fIm[s]
		kIm[s] = restIm[s] - l*fRe[s]
	}
}

func fieldPlain(phiRe, phiIm *lane, g []float64, factors []factor) {
	*phiRe, *phiIm = lane{}, lane{}
	for n, c := range factors {
		fRe, fIm, gRe, gIm := row(g, 2*n), row(g, 2*n+1), row(g, 2*n+2), row(g, 2*n+3)
		for s := range width {
			re := fRe[s]*gRe[s] + fIm[s]*gIm[s]
			im := fRe[s]*gIm[s] - fIm[s]*gRe[s]
			phiRe[s] += c.re*re - c.im*im
			phiIm[s] += c.re*im + c.im*re
		}
	}
}

func combinePlain(dst, base []float64, c []float64, k [][]float64) {
	for len(c) > 2 {
		a, b, d, u, v, w := c[0], c[1], c[2], k[0][:len(dst)], k[1][:len(dst)], k[2][:len(dst)]
		base = base[:len(dst)]
		for i := range dst {
			dst[i] = base[i] + a*u[i] + b*v[i] + d*w[i]
		}
		base, c, k = dst, c[3:], k[3:]
	}
	for j, a := range c {
		u := k[j][:len(dst)]
		base = base[:len(dst)]
		for i := range dst {
			dst[i] = base[i] + a*u[i]
		}
		base = dst
	}
}

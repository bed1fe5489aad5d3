//go:build !amd64

package gutzwiller

// vectors says that there are only the plain kernels.
const vectors = false

func rateAVX2(k, g []float64, psiRe, psiIm *lane, factors []factor, left []float64) {
	ratePlain(k, g, psiRe, psiIm, factors, left)
}

func fieldAVX2(phiRe, phiIm *lane, g []float64, factors []factor) {
	fieldPlain(phiRe, phiIm, g, factors)
}

func combineAVX2(dst, base []float64, c []float64, k [][]float64) {
	combinePlain(dst, base, c, k)
}

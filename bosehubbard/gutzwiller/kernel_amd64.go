package gutzwiller

import "golang.org/x/sys/cpu"

// vectors says whether the kernels run on four sites at a time. They do the same
// operations in the same order as the plain ones, without fused multiply-add, and
// so give the same bits.
var vectors = cpu.X86.HasAVX2

//go:noescape
func rateAVX2(k, g []float64, psiRe, psiIm *lane, factors []factor, left []float64)

//go:noescape
func fieldAVX2(phiRe, phiIm *lane, g []float64, factors []factor)

//go:noescape
func combineAVX2(dst, base []float64, c []float64, k [][]float64)

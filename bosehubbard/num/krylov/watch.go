package krylov

import "math"

// watch follows how far the Lanczos vectors are from orthogonal, without looking
// at them: the products omega_jk = v_j.v_k obey the recurrence of the vectors,
//
//	beta_j omega_(j+1)k = beta_k omega_j(k+1) + (alpha_k - alpha_j) omega_jk
//	                      + beta_(k-1) omega_j(k-1) - beta_(j-1) omega_(j-1)k + rounding,
//
// here with beta[j] between vectors j and j+1.
//
// Source: Simon, Math. Comp. 42, 115 (1984), from memory.
type watch struct {
	before, now, next []float64 // omega of the vectors j-1, j, j+1
	floor             float64   // of one product after orthogonalisation
}

func newWatch(length, most int) *watch {
	row := func() []float64 { return make([]float64, most+2) }
	return &watch{before: row(), now: row(), next: row(), floor: unitRoundoff * math.Sqrt(float64(length))}
}

// start begins with the first vector.
func (w *watch) start() { w.now[0] = 1 }

// step moves on to vector j+1 and returns the largest |omega_(j+1)k|, k <= j.
func (w *watch) step(alpha, beta []float64) float64 {
	j := len(alpha) - 1
	// The product rounds to some units of its size, of which beta_j is what is left.
	size := math.Abs(alpha[j]) + beta[j]
	if j > 0 {
		size += beta[j-1]
	}
	most := w.floor * size / beta[j]
	for k := range j {
		sum := beta[k]*w.now[k+1] + (alpha[k]-alpha[j])*w.now[k]
		if k > 0 {
			sum += beta[k-1] * w.now[k-1]
		}
		sum -= beta[j-1] * w.before[k]
		sum += math.Copysign(w.floor*(beta[k]+beta[j]), sum)
		w.next[k] = sum / beta[j]
		most = max(most, math.Abs(w.next[k]))
	}
	w.next[j], w.next[j+1] = w.floor*size/beta[j], 1
	w.before, w.now, w.next = w.now, w.next, w.before
	return most
}

// reset notes that vector j+1 has been made orthogonal to all before it.
func (w *watch) reset(j int) {
	for k := range j + 1 {
		w.now[k] = w.floor
	}
}

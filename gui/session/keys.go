package session

import (
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// PageKeys are the key numbers under the names of the pages, for the selected
// stage; "" before the first report.
type PageKeys struct {
	Bench    string // net trap of the moving axis that is nearest to the wrong sign
	Lattice  string // J of the fastest axis
	Ceiling  string // the bound that counts
	Sequence string // its length
}

// pageKeys reads the key numbers from a report.
func pageKeys(r *report.Report, stage *report.Stage) PageKeys {
	var k PageKeys
	if stage != nil {
		k.Bench = netTrap(r, stage)
		fastest := 0.0
		for _, j := range stage.TunnellingHz {
			fastest = max(fastest, j, -j)
		}
		k.Lattice = "J " + withUnit(hertz.formatDigits(fastest, bestUnit(fastest), 3), bestUnit(fastest))
	}
	bound := r.Ceiling.Total.Ceiling
	if r.AimSign == plan.Positive {
		bound = r.Ceiling.Total.Floor
	}
	switch {
	case bound.Unbounded():
		k.Ceiling = "none"
	case bound.Known:
		k.Ceiling = withUnit(signedHertz.formatDigits(bound.Hz, bestUnit(bound.Hz), 4), bestUnit(bound.Hz))
	}
	if n := len(r.Stages); n > 0 {
		k.Sequence = milliseconds.Fit(r.Stages[n-1].EndMS, "ms", 10)
	}
	return k
}

// netTrap picks the moving axis whose trap is worst for the wanted sign.
func netTrap(r *report.Report, stage *report.Stage) string {
	sign := 1.0
	if r.AimSign == plan.Positive {
		sign = -1
	}
	worst := -1
	for i, trap := range stage.TrapHz {
		if moves(r, i) && (worst < 0 || sign*trap > sign*stage.TrapHz[worst]) {
			worst = i
		}
	}
	if worst < 0 {
		return ""
	}
	return axisName(worst) + " " + withUnit(signedHertz.formatDigits(stage.TrapHz[worst], "Hz", 3), "Hz")
}

// moves reports whether an axis moves in the hold.
func moves(r *report.Report, axis int) bool {
	for _, t := range r.Ceiling.Terms {
		if t.Term == "trap_"+axisName(axis) {
			return t.Reason == ""
		}
	}
	return true
}

package gutzwiller

import (
	"fmt"
	"math"
)

// Site is one site in the field of its neighbours in equilibrium, energies in Hz.
//
//	h = U n(n-1)/2 - mu n - zJ phi (b + b^+)        phi = <b>
//
// The temperature has the sign of U; T = 0 means the floor for U > 0 and the
// ceiling for U < 0. On a bipartite lattice the sign of zJ is a choice of phases
// and T < 0 of (zJ, U, mu) is T > 0 of (zJ, -U, -mu).
type Site struct {
	ChemicalPotential float64 // mu/h, Hz; from the centre of the band
	Interaction       float64 // U/h, Hz, not 0
	Coupling          float64 // zJ/h, Hz: the tunnelling to all neighbours together
	Temperature       float64 // kT/h, Hz
}

// Equilibrium is what a site is like on average. Energies are per site in Hz, and
// Kinetic + Interaction - T Entropy - mu Filling is GrandPotential.
type Equilibrium struct {
	Order          float64 // |phi|
	Filling        float64 // <n>
	Variance       float64 // <n^2> - <n>^2
	Kinetic        float64 // -zJ phi^2 in the arrangement of phases that belongs to the end
	Interaction    float64 // U <n(n-1)>/2
	Entropy        float64 // in kB
	GrandPotential float64

	// Distribution is the probability of 0, 1, ... atoms. It belongs to the Solver
	// and holds until its next call. TopWeight is its last entry.
	Distribution []float64
	TopWeight    float64
}

// Solver finds the equilibrium of single sites. It owns its scratch; one per
// goroutine.
type Solver struct {
	mirror      float64 // +1, or -1 where floor and ceiling change places
	u, mu, zj   float64 // of the mirrored site, zj >= 0, Hz
	temperature float64

	levels       int
	energies     []float64 // E_n
	order        float64
	free         float64   // grand potential of the mirrored site without zJ phi^2
	values       []float64 // of h, ascending
	vectors      []float64 // row n, column k
	weights      []float64 // of the states k
	off, work    []float64
	distribution []float64
}

// NewSolver returns a solver.
func NewSolver() *Solver { return &Solver{} }

// topAllowed is the largest probability that Solve leaves in the last level.
const topAllowed = 1e-15

// Solve finds the equilibrium of a site to about 1e-12.
//
// The number of levels grows until the last one is empty to 1e-15. Some ten
// diagonalisations where phi != 0, none where phi = 0.
//
// It returns an error if a number is not finite, if U is 0 or has not the sign of
// T, where there is no bound, or if MaxLevels are too few.
func (w *Solver) Solve(site Site) (Equilibrium, error) {
	if err := w.prepare(site); err != nil {
		return Equilibrium{}, err
	}
	for {
		w.grow()
		w.order = 0
		if w.zj*w.susceptibility() > 1 {
			w.findOrder()
		}
		if w.order > 0 {
			w.average(w.order)
		} else {
			w.atomic()
		}
		out := w.collect()
		if out.TopWeight <= topAllowed {
			return out, nil
		}
		w.levels += w.levels/2 + 2
		if w.levels > MaxLevels {
			return Equilibrium{}, w.tooMany(site)
		}
	}
}

func (w *Solver) tooMany(site Site) error {
	return fmt.Errorf("gutzwiller: mu = %g, U = %g, zJ = %g, T = %g Hz: more than %d levels are needed",
		site.ChemicalPotential, site.Interaction, site.Coupling, site.Temperature, MaxLevels)
}

// prepare mirrors the site to T >= 0 and guesses the number of levels.
func (w *Solver) prepare(site Site) error {
	for _, v := range []float64{site.ChemicalPotential, site.Interaction, site.Coupling, site.Temperature} {
		if math.IsNaN(v) || math.Abs(v) > maxHz {
			return fmt.Errorf("gutzwiller: mu = %g, U = %g, zJ = %g, T = %g Hz: want finite numbers",
				site.ChemicalPotential, site.Interaction, site.Coupling, site.Temperature)
		}
	}
	if site.Interaction == 0 || site.Interaction*site.Temperature < 0 {
		return fmt.Errorf("gutzwiller: U = %g Hz at T = %g Hz has no bound, want both of one sign and U not 0",
			site.Interaction, site.Temperature)
	}
	w.mirror = math.Copysign(1, site.Interaction)
	w.u, w.mu = math.Abs(site.Interaction), w.mirror*site.ChemicalPotential
	w.zj, w.temperature = math.Abs(site.Coupling), math.Abs(site.Temperature)
	guess := w.guessLevels()
	if !(guess <= MaxLevels) {
		return w.tooMany(site)
	}
	w.levels = int(guess)
	return nil
}

// guessLevels finds where a thermal weight falls below 1e-16, as if the field of the
// neighbours lowered every atom by zJ, and adds the width of a coherent state.
func (w *Solver) guessLevels() float64 {
	half, slope, rise := w.u/2, w.mu+w.u/2+w.zj, 37*w.temperature
	mean, thermal := 0.0, 0.0 // the parabola half n^2 - slope n: its middle, and the way up from its lowest point
	if slope > 0 {
		mean, thermal = slope/w.u, math.Sqrt(rise/half)
	} else {
		thermal = 2 * rise / (math.Sqrt(slope*slope+4*half*rise) - slope)
	}
	if rise == 0 {
		thermal = 0
	}
	return mean + thermal + 5 + 6*math.Sqrt(mean*min(1, w.zj/w.u))
}

// grow sets up the levels.
func (w *Solver) grow() {
	n := w.levels
	if cap(w.energies) < n {
		w.energies, w.values, w.weights = make([]float64, n), make([]float64, n), make([]float64, n)
		w.vectors, w.distribution = make([]float64, n*n), make([]float64, n)
		w.off, w.work = make([]float64, n), make([]float64, 2*n)
	}
	w.energies, w.values, w.weights = w.energies[:n], w.values[:n], w.weights[:n]
	w.vectors, w.distribution = w.vectors[:n*n], w.distribution[:n]
	for i := range w.energies {
		x := float64(i)
		w.energies[i] = w.u*x*(x-1)/2 - w.mu*x
	}
}

// maxHz bounds the parameters so that no square of one overflows.
const maxHz = 1e100

// MaxLevels is the largest number of occupations 0, 1, ... that a site can have.
const MaxLevels = 256

// Infinite returns the site with a mean filling nbar at infinite temperature, of
// either sign, where only N is held:
//
//	p_n = nbar^n / (1+nbar)^(n+1)    S = (1+nbar) ln(1+nbar) - nbar ln nbar
//
// with the energy U nbar^2. Distribution and GrandPotential are not given.
//
// It returns an error unless filling >= 0 and both are finite.
func Infinite(filling, interaction float64) (Equilibrium, error) {
	if !(filling >= 0 && filling < maxHz) || !(math.Abs(interaction) <= maxHz) {
		return Equilibrium{}, fmt.Errorf("gutzwiller: filling %g, U = %g Hz at infinite temperature, want at least 0 atoms and a finite U",
			filling, interaction)
	}
	e := Equilibrium{Filling: filling, Variance: filling * (1 + filling), Interaction: interaction * filling * filling}
	if filling > 0 {
		e.Entropy = math.Log1p(filling) + filling*math.Log1p(1/filling)
	}
	return e, nil
}

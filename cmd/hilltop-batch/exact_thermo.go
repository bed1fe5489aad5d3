package main

import (
	"context"
	"fmt"
	"strings"

	"hilltop/bosehubbard/thermo"
)

// entropyKeys is S(E) in kB and beta(E) = dS/dE in one over the unit of the flags;
// lists run over the energies. The errors are half widths of 95 % confidence of
// the random vectors; beside them stands the broadening.
type entropyKeys struct {
	Energy        []float64 `json:"energy"`
	Entropy       []float64 `json:"entropy"`
	EntropyError  []float64 `json:"entropy_error"`
	Beta          []float64 `json:"beta"`
	BetaError     []float64 `json:"beta_error"`
	VolumeEntropy []float64 `json:"volume_entropy,omitempty"`
	VolumeBeta    []float64 `json:"volume_beta,omitempty"`
	Peak          float64   `json:"peak"` // where beta changes sign
	Mean          float64   `json:"mean"` // Tr H/dimension
	Broadening    float64   `json:"broadening"`
	Moments       int       `json:"moments"`
	Vectors       int       `json:"vectors"`
	Seed          uint64    `json:"seed"`
}

// canonical is the ensemble at one beta; entropy in kB.
type canonical struct {
	Beta          float64 `json:"beta"`
	Energy        float64 `json:"energy"`
	Entropy       float64 `json:"entropy"`
	Variance      float64 `json:"variance"`
	EnergyError   float64 `json:"energy_error"`
	EntropyError  float64 `json:"entropy_error"`
	VarianceError float64 `json:"variance_error"`
}

// addThermo computes what --entropy and --beta ask for.
func (a *exactAnswer) addThermo(ctx context.Context, s exactSystem, f exactFlags, bar *bar) error {
	system := thermo.System{Lattice: s.lattice, Model: s.model, Atoms: f.atoms, MaxOccupation: f.most}
	defer bar.clear()
	if f.entropy {
		options := thermo.Options{Volume: f.volume, Workers: f.workers, Progress: bar.progress("entropy")}
		if a.Floor < a.Ceiling {
			options.Floor, options.Ceiling = a.Floor-a.FloorResidual, a.Ceiling+a.CeilingResidual
		}
		curve, err := thermo.Entropy(ctx, system, options)
		if err != nil {
			return err
		}
		a.Entropy = entropyOf(curve)
		a.Seconds.Build += curve.BuildSeconds
		a.Seconds.Solve += curve.SolveSeconds
	}
	if f.beta == nil {
		return nil
	}
	averages, err := thermo.Canonical(ctx, system, f.beta, thermo.CanonicalOptions{Workers: f.workers, Progress: bar.progress("averages")})
	if err != nil {
		return err
	}
	a.Seconds.Build += averages.BuildSeconds
	a.Seconds.Solve += averages.SolveSeconds
	for _, p := range averages.Points {
		a.Canonical = append(a.Canonical, canonical{p.Beta, p.Energy, p.Entropy, p.Variance, p.EnergyError, p.EntropyError, p.VarianceError})
	}
	return nil
}

func entropyOf(c *thermo.Curve) *entropyKeys {
	return &entropyKeys{
		Energy: c.Energy, Entropy: c.Entropy, EntropyError: c.EntropyError, Beta: c.Beta, BetaError: c.BetaError,
		VolumeEntropy: c.VolumeEntropy, VolumeBeta: c.VolumeBeta, Peak: c.Peak, Mean: c.Mean,
		Broadening: c.Resolution, Moments: c.Moments, Vectors: c.Vectors, Seed: c.Seed,
	}
}

// writeThermo prints the averages and every tenth point of the curve.
func (a *exactAnswer) writeThermo(b *strings.Builder) {
	if e := a.Entropy; e != nil {
		fmt.Fprintf(b, "S(E) of %d moments and %d vectors, broadened by %.4g; beta is 0 at %.6g, the mean is %.6g\n", e.Moments, e.Vectors, e.Broadening, e.Peak, e.Mean)
		fmt.Fprintf(b, "%14s %10s %8s %12s\n", "E", "S/kB", "+-", "beta")
		for i := 0; i < len(e.Energy); i += max(1, len(e.Energy)/20) {
			fmt.Fprintf(b, "%14.6g %10.5f %8.4f %12.6g\n", e.Energy[i], e.Entropy[i], e.EntropyError[i], e.Beta[i])
		}
	}
	for _, c := range a.Canonical {
		fmt.Fprintf(b, "beta %.6g  E %.10g +- %.1e  S %.8g +- %.1e kB  var E %.8g\n", c.Beta, c.Energy, c.EnergyError, c.Entropy, c.EntropyError, c.Variance)
	}
}

package main

import (
	"fmt"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard/band"
)

// bandsAnswer holds the keys of the verb bands; energies in recoil energies.
type bandsAnswer struct {
	DepthEr             float64      `json:"depth_er"`
	TunnellingEr        [3]float64   `json:"tunnelling_er"`
	WidthEr             float64      `json:"width_er"`
	GapEr               float64      `json:"gap_er"`
	WannierFourthMoment float64      `json:"wannier_fourth_moment"`
	BandEdgesEr         [][2]float64 `json:"band_edges_er"` // at q = 0 and q = 1
}

func (p *program) bands() *cobra.Command {
	var depth float64
	cmd := &cobra.Command{
		Use:   "bands --depth ER",
		Short: "Bloch bands, tunnelling and Wannier moment of one lattice axis",
		Args:  args(cobra.NoArgs),
		RunE: func(cmd *cobra.Command, _ []string) error {
			b, err := band.NewWorkspace().Solve(depth)
			if err != nil {
				return usageError{fmt.Errorf("--depth %g: %w", depth, err)}
			}
			answer := bandsAnswer{
				DepthEr: depth, TunnellingEr: b.Tunnelling, WidthEr: b.Width, GapEr: b.Gap,
				WannierFourthMoment: b.WannierFourthMoment, BandEdgesEr: b.Edges[:],
			}
			if p.json {
				return p.print(answer)
			}
			_, err = fmt.Fprintf(p.stdout, "depth %g Er\nJ1, J2, J3  %.10g, %.10g, %.10g Er\nwidth  %.10g Er\ngap (q = 1)  %.10g Er\nint w^4 d(kx)  %.10g\n",
				depth, b.Tunnelling[0], b.Tunnelling[1], b.Tunnelling[2], b.Width, b.Gap, b.WannierFourthMoment)
			return err
		},
	}
	cmd.Flags().Float64Var(&depth, "depth", 0, "lattice depth, peak to peak, in recoil energies h^2/(8 m d^2)")
	must(cmd.MarkFlagRequired("depth"))
	return cmd
}

// must panics on a mistake in the definition of a command.
func must(err error) {
	if err != nil {
		panic(err)
	}
}

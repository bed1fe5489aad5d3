package report

import (
	"context"
	"testing"
)

// TestVariations: at its own U and V the plan keeps its verdict; either sign the
// other way opens it; no curvature holds nothing.
func TestVariations(t *testing.T) {
	for _, name := range []string{"skerry-demo", "skerry-trapped", "model-chain"} {
		p := shipped(t, name).Plan()
		v, err := NewJudge().Vary(context.Background(), p)
		if err != nil {
			t.Fatal(err)
		}
		flat := "leaky"
		if name == "model-chain" {
			flat = "sealed" // a box has walls
		}
		for _, tc := range []struct {
			u, c float64
			want string
		}{
			{v.InteractionHz, -0.3, "sealed"}, {-v.InteractionHz, -0.3, "open"}, {v.InteractionHz, 0.3, "open"}, {v.InteractionHz, 0, flat},
		} {
			got, err := v.Verdict(tc.u, tc.c)
			if err != nil || got != tc.want {
				t.Errorf("%s at U %g V %g: %s, %v; want %s", name, tc.u, tc.c, got, err, tc.want)
			}
		}
		if own, _ := v.Verdict(v.InteractionHz, v.CurvatureHz); name != "skerry-trapped" && own != judge(t, p).Verdict {
			t.Errorf("%s: its own values give %s", name, own)
		}
	}
}

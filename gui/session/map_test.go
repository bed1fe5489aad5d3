package session

import (
	"context"
	"errors"
	"testing"

	"hilltop/bosehubbard/figure"
)

func TestMapOfTheVerdict(t *testing.T) {
	s, v, st := judged(t, "skerry-demo")
	s.StartMap(24, 16)
	st = waitFor(t, v, "the map", func(st State) bool { return st.Jobs[MapJob].Result != nil })
	m := st.Jobs[MapJob].Result.(*figure.VerdictMap)
	if len(m.Verdicts) != 24*16 || m.AtU >= 0 || m.AtV >= 0 {
		t.Fatalf("map of %d cells around U %g, V %g", len(m.Verdicts), m.AtU, m.AtV)
	}
	if got := m.At(m.AtU, m.AtV); got != "sealed" {
		t.Errorf("at the plan: %q, want sealed", got)
	}
	for _, tc := range []struct{ u, v float64 }{{-0.9 * m.AtU, m.AtV}, {m.AtU, -0.9 * m.AtV}, {-0.9 * m.AtU, -0.9 * m.AtV}} {
		if got := m.At(tc.u, tc.v); got != "open" {
			t.Errorf("at U %g, V %g: %q, want open", tc.u, tc.v, got)
		}
	}
}

func TestMapStops(t *testing.T) {
	_, _, st := judged(t, "skerry-demo")
	ctx, cancel := context.WithCancel(context.Background())
	rows := 0
	_, err := verdictMap(ctx, st.Plan, 8, 1000, func(done, total int) {
		if rows = done; done == 3 {
			cancel()
		}
	})
	if !errors.Is(err, context.Canceled) || rows != 3 {
		t.Errorf("%v after %d rows, want context.Canceled after 3", err, rows)
	}
}

package report

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"
	"unicode/utf8"

	"hilltop/bosehubbard/plan"
)

// broken returns the n-th seeded broken plan: the demo or the model with a few
// knobs turned at random, until something breaks.
func broken(t *testing.T, rng *rand.Rand) (*plan.Document, *Report) {
	t.Helper()
	for range 200 {
		d := spoiled(t, rng)
		if d == nil {
			continue
		}
		if r := judge(t, d.Plan()); r.Verdict != "sealed" {
			return d, r
		}
	}
	t.Fatal("no broken plan in 200 tries")
	return nil, nil
}

// spoiled turns one to three knobs; nil where the plan refuses the values.
func spoiled(t *testing.T, rng *rand.Rand) *plan.Document {
	between := func(low, high float64) float64 { return low + (high-low)*rng.Float64() }
	turns := []func() (string, any){
		func() (string, any) { return "/stages/2/power_w/sheet", between(0.03, 0.5) },
		func() (string, any) { return "/stages/2/power_w/cross", between(0.03, 0.5) },
		func() (string, any) { return "/stages/1/field_g", between(150, 397) },
		func() (string, any) { return "/stages/3/depth_er/0", between(0.5, 8) },
		func() (string, any) { return "/stages/3/depth_er/1", between(0.5, 8) },
		func() (string, any) { return "/stages/3/depth_er/2", between(3, 22) },
		func() (string, any) { return "/stages/4/duration_ms", between(10, 20000) },
	}
	name := "skerry-demo"
	if rng.IntN(4) == 0 {
		name = "model-chain"
		turns = []func() (string, any){
			func() (string, any) { return "/model/interaction_hz", between(-4, 4) },
			func() (string, any) { return "/model/curvature_hz/0", between(-0.1, 0.1) },
			func() (string, any) { return "/model/tunnelling_hz", between(-2, 2) },
			func() (string, any) { return "/model/curvature_hz/0", 0.0 },
			func() (string, any) { return "/model/fock", []int{12, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0} },
		}
	}
	d := shipped(t, name)
	if name == "skerry-demo" && rng.IntN(5) == 0 {
		d = mirroredDemo(t, d)
	}
	for range 1 + rng.IntN(3) {
		path, value := turns[rng.IntN(len(turns))]()
		next, err := d.With(path, value)
		if err != nil {
			return nil
		}
		d = next
	}
	return d
}

// mirroredDemo wants T > 0: repulsion and a trap.
func mirroredDemo(t *testing.T, d *plan.Document) *plan.Document {
	t.Helper()
	for _, set := range []Set{
		{"/aim_sign", "positive"}, {"/stages/1/field_g", 378.0},
		{"/stages/2/power_w/sheet", 0.35}, {"/stages/2/power_w/cross", 0.35},
	} {
		next, err := d.With(set.Path, set.Value)
		if err != nil {
			t.Fatal(err)
		}
		d = next
	}
	return d
}

// TestAdviceMendsItsCriterion applies every advice of 100 seeded broken plans:
// the criterion must then hold, a promise to seal must be kept, and a criterion
// that the change breaks must have been named.
func TestAdviceMendsItsCriterion(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 13))
	given, absent := 0, map[string]int{}
	for n := range 100 {
		d, r := broken(t, rng)
		if length := utf8.RuneCountInString(r.Sentence); length > sentenceLength {
			t.Errorf("plan %d: sentence of %d runes: %q", n, length, r.Sentence)
		}
		for _, c := range r.Ceiling.Criteria {
			switch {
			case c.Passed:
				if c.Advice != nil {
					t.Errorf("plan %d: advice for %s, which holds", n, c.Name)
				}
			case c.Advice == nil:
				absent[c.Name]++
			default:
				given++
				follow(t, fmt.Sprintf("plan %d (%s), %s", n, d.Plan().Title, c.Name), d, r, c)
			}
		}
	}
	if len(absent) > 0 || given < 100 {
		t.Errorf("%d advices followed, none found for %v", given, absent)
	}
}

func follow(t *testing.T, what string, d *plan.Document, r *Report, c Criterion) {
	t.Helper()
	edits := make([]plan.Edit, len(c.Advice.Set))
	for i, set := range c.Advice.Set {
		edits[i] = plan.Edit{Path: set.Path, Value: set.Value}
	}
	d, err := d.Apply(edits...)
	if err != nil {
		t.Errorf("%s: %+v is refused: %v", what, c.Advice.Set, err)
		return
	}
	after := judge(t, d.Plan())
	if mended := after.criterion(c.Name); mended != nil && !mended.Passed {
		t.Errorf("%s: %q leaves it broken: %s", what, c.Advice.Text, mended.Detail)
	}
	if strings.Contains(c.Advice.Text, "to seal") != after.Sealed() {
		t.Errorf("%s: %q, but the plan is then %s: %s", what, c.Advice.Text, after.Verdict, after.Sentence)
	}
	for _, other := range after.Ceiling.Criteria {
		was := r.criterion(other.Name)
		if !other.Passed && (was == nil || was.Passed) && !strings.Contains(c.Advice.Text, criterionWords[other.Name]) {
			t.Errorf("%s: %q does not say that %s breaks", what, c.Advice.Text, other.Name)
		}
	}
	if len(c.Advice.Set) == 0 || strings.Contains(c.Advice.Text, "−0 ") {
		t.Errorf("%s: %+v", what, c.Advice)
	}
}

// TestAdviceKeepsToTheLimits: a power that the lab cannot lower any further is
// left alone.
func TestAdviceKeepsToTheLimits(t *testing.T) {
	d := shipped(t, "skerry-trapped")
	c := judge(t, d.Plan()).worst()
	path, value := c.Advice.Set[0].Path, c.Advice.Set[0].Value.(float64)
	d, err := d.With("/limits", map[string]any{path: map[string]any{"min": value * 1.2}})
	if err != nil {
		t.Fatal(err)
	}
	limited := judge(t, d.Plan()).worst()
	if limited.Advice == nil {
		return
	}
	for _, set := range limited.Advice.Set {
		if v, ok := set.Value.(float64); ok && set.Path == path && v < value*1.2 {
			t.Errorf("advice %q goes below the limit %g", limited.Advice.Text, value*1.2)
		}
	}
}

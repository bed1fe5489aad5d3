package gutzwiller

import "testing"

// Every stage of every block comes once, after all that it needs, and no list of
// fields is written while somebody still has to read what it held two stages ago.
func TestSchedule(t *testing.T) {
	grids := append(shapes[:len(shapes):len(shapes)], []struct {
		sites    []int
		periodic []bool
	}{
		{[]int{3000}, []bool{false}},
		{[]int{3000}, []bool{true}},
		{[]int{100, 40}, []bool{true, false}},
		{[]int{256, 64}, []bool{false, false}},
		{[]int{20, 20, 20}, []bool{false, true, false}},
	}...)
	waves := 0
	for i, shape := range grids {
		g := mustGrid(t, shape.sites, shape.periodic)
		const stages = 12
		order := newSchedule(g, stages, 50_000<<(i%4)) // groups of some and of all stages
		count := g.padded / width
		if len(order.tasks) != stages*count {
			t.Fatalf("%v: %d tasks, want %d", shape.sites, len(order.tasks), stages*count)
		}
		if !order.ring {
			waves++
		}
		done := make([]int, count)
		for _, task := range order.tasks {
			if done[task.block] != task.stage {
				t.Fatalf("%v: stage %d of block %d after %d stages", shape.sites, task.stage, task.block, done[task.block])
			}
			for _, list := range g.near {
				for _, to := range list[task.block*width : (task.block+1)*width] {
					if int(to) == g.padded {
						continue
					}
					near := int(to) / width
					d := max(near-task.block, task.block-near)
					if order.ring {
						d = min(d, count-d)
					}
					if d > order.reach {
						t.Fatalf("%v: block %d is %d from its neighbour %d, reach %d", shape.sites, task.block, d, near, order.reach)
					}
					// The neighbour may not be two stages ahead either: it waits for this one.
					if done[near] < task.stage {
						t.Fatalf("%v: stage %d of block %d before stage %d of its neighbour %d",
							shape.sites, task.stage, task.block, task.stage-1, near)
					}
				}
			}
			done[task.block]++
		}
	}
	if waves < 4 {
		t.Errorf("%d grids run in waves, want at least 4", waves)
	}
}

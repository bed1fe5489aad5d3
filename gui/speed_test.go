package gui

import (
	"testing"
	"time"
)

// A state is shown well within a frame of 20 updates a second. Slow machines get
// ten times what one with two cores takes.
func TestShowIsQuick(t *testing.T) {
	if testing.Short() {
		t.Skip("measures time")
	}
	b := newBench(t, setup{})
	state := b.window.state
	const rounds = 20
	began := time.Now()
	for range rounds {
		state.Number++
		b.window.Show(state)
	}
	if each := time.Since(began) / rounds; each > 50*time.Millisecond {
		t.Errorf("showing a state takes %v, want less than 50 ms", each)
	}
}

func BenchmarkShow(b *testing.B) {
	t := &testing.T{}
	bench := newBench(t, setup{})
	state := bench.window.state
	b.ReportAllocs()
	for b.Loop() {
		state.Number++
		bench.window.Show(state)
	}
}

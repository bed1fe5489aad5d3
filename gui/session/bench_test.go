package session

import (
	"testing"

	"hilltop/bosehubbard/plan"
)

func BenchmarkCatalogue(b *testing.B) {
	doc, err := plan.Open(demo(b))
	if err != nil {
		b.Fatal(err)
	}
	s := New(Options{Judge: fakeJudge})
	defer s.Close()
	b.ReportAllocs()
	for b.Loop() {
		s.catalogueOf(doc.Plan(), 3)
	}
}

func BenchmarkState(b *testing.B) {
	s, v := newTest(b, Options{})
	settle(b, s, v)
	b.ReportAllocs()
	for b.Loop() {
		s.State()
	}
}

func BenchmarkOpen(b *testing.B) {
	data := demo(b)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := plan.Open(data); err != nil {
			b.Fatal(err)
		}
	}
}

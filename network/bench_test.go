package network_test

import (
	"context"
	"os"
	"testing"

	"workheat/library"
	"workheat/network"
	"workheat/network/diag"
)

// BenchmarkSmallBrake runs problem A of the benchmark set (12 nodes, 45 segments) at the tolerance of its
// name, with and without the recount. Allocations are those of a whole run: set-up, tape and summary.
func BenchmarkSmallBrake(b *testing.B) {
	text, err := os.ReadFile("testdata/yardstick-a.json")
	if err != nil {
		b.Fatal(err)
	}
	m, problems := network.Load(&diag.Source{Name: "yardstick-a.json", Text: text}, library.Catalogue(), nil)
	if m == nil {
		b.Fatal(problems)
	}
	for _, c := range []struct {
		name string
		opt  network.Options
	}{
		{"1e-4", network.Options{Rel: 1e-4}},
		{"1e-6", network.Options{Rel: 1e-6}},
		{"1e-6 with recount", network.Options{Rel: 1e-6, Audit: true}},
		{"1e-8", network.Options{Rel: 1e-8}},
	} {
		b.Run(c.name, func(b *testing.B) {
			steps := 0
			b.ReportAllocs()
			for b.Loop() {
				steps += m.Run(context.Background(), c.opt).Stats.Steps
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(steps), "ns/step")
		})
	}
}

// A run allocates to set up, for blocks of the tape and for its summary, but not for a step: ten times the
// steps must not bring more than the tape's blocks and the growth of its lists.
func TestStepsDoNotAllocate(t *testing.T) {
	text, err := os.ReadFile("testdata/yardstick-a.json")
	if err != nil {
		t.Fatal(err)
	}
	m, _ := network.Load(&diag.Source{Name: "yardstick-a.json", Text: text}, library.Catalogue(), nil)
	count := func(rel float64) (allocations float64, steps int) {
		allocations = testing.AllocsPerRun(3, func() {
			steps = m.Run(context.Background(), network.Options{Rel: rel}).Stats.Steps
		})
		return allocations, steps
	}
	few, fewSteps := count(1e-3)
	many, manySteps := count(1e-9)
	if perStep := (many - few) / float64(manySteps-fewSteps); perStep > 0.05 {
		t.Errorf("%.3f allocations a step: %g for %d steps, %g for %d", perStep, few, fewSteps, many, manySteps)
	}
}

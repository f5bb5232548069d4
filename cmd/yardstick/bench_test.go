package main

import (
	"context"
	"os"
	"testing"

	"workheat/library"
	"workheat/network"
	"workheat/network/diag"
)

// BenchmarkSmallBrake runs problem A of the benchmark set at 1e-6, without samples.
func BenchmarkSmallBrake(b *testing.B) {
	text, err := os.ReadFile(os.Getenv("PROB"))
	if err != nil {
		b.Fatal(err)
	}
	p, _ := readProblem(text)
	m, problems := network.Load(&diag.Source{Name: p.Name, Text: p.netlist()}, library.Catalogue(), nil)
	if m == nil {
		b.Fatal(problems)
	}
	steps := 0
	b.ReportAllocs()
	for b.Loop() {
		res := m.Run(context.Background(), network.Options{Rel: 1e-6})
		steps += res.Stats.Steps
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(steps), "ns/step")
}

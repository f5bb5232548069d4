package library_test

import (
	"testing"

	"workheat/library"
)

// The catalogue is made anew at every start of the program.
func BenchmarkCatalogue(b *testing.B) {
	b.ReportAllocs()
	for range b.N {
		library.Catalogue()
	}
}

// The flows and slopes of every kind, per path.
func BenchmarkFlows(b *testing.B) {
	c := library.Catalogue()
	for _, k := range c.Kinds {
		if k.Batch == nil {
			continue
		}
		l, list := load(b, c, k), states(5)
		q, dep, rate := make([]float64, len(l.paths)), make([]float64, len(l.paths)*l.deps), make([]float64, len(l.paths))
		b.Run(k.Name, func(b *testing.B) {
			for i := range b.N {
				l.Flows(q, list[i%len(list)])
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(l.paths)), "ns/path")
		})
		b.Run(k.Name+" slopes", func(b *testing.B) {
			for i := range b.N {
				l.Slopes(dep, rate, list[i%len(list)])
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(l.paths)), "ns/path")
		})
	}
}

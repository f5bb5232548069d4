package sparse

import "testing"

// benchCases are the networks whose cost matters: the sizes users run.
var benchCases = []struct {
	name    string
	pattern func() *Pattern
}{
	{"brake12", brakeTwelve},
	{"brake60", func() *Pattern { return brake(5) }},
	{"chain12", func() *Pattern { return chainOf(12) }},
	{"chain100", func() *Pattern { return chainOf(100) }},
	{"chain1e3", func() *Pattern { return chainOf(1000) }},
	{"chain1e5", func() *Pattern { return chainOf(100000) }},
	{"hub1e5", func() *Pattern { return hub(100, 1000) }},
	{"disc5x10", func() *Pattern { return grid(5, 10) }},
	{"disc10x50", func() *Pattern { return grid(10, 50) }},
	{"disc8x16", func() *Pattern { return grid(8, 16) }},
	{"disc16x16", func() *Pattern { return grid(16, 16) }},
	{"grid32", func() *Pattern { return grid(32, 32) }},
	{"grid100", func() *Pattern { return grid(100, 100) }},
	{"grid316", func() *Pattern { return grid(316, 316) }},
}

func BenchmarkOrder(b *testing.B) {
	for _, c := range benchCases {
		p := c.pattern()
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				Order(p)
			}
		})
	}
}

func BenchmarkAnalyse(b *testing.B) {
	for _, c := range benchCases {
		p := c.pattern()
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				NewSolver(p, true)
			}
		})
	}
}

func BenchmarkFactor(b *testing.B) {
	eachKind(b, func(b *testing.B, v *Solver, a, shift []float64) {
		for b.Loop() {
			if err := v.Factor(a, shift); err != nil {
				b.Fatal(err)
			}
		}
	})
}

func BenchmarkSolve(b *testing.B) {
	eachKind(b, func(b *testing.B, v *Solver, a, shift []float64) {
		if err := v.Factor(a, shift); err != nil {
			b.Fatal(err)
		}
		x := make([]float64, len(shift))
		for b.Loop() {
			v.Solve(x, shift)
		}
		b.ReportMetric(float64(fill(v)), "entries")
	})
}

// eachKind runs a benchmark on every network, symmetric and not, numbered as
// it comes and numbered in elimination order.
func eachKind(b *testing.B, run func(b *testing.B, v *Solver, a, shift []float64)) {
	for _, c := range benchCases {
		p := c.pattern()
		ordered := renumbered(p, Order(p))
		natural := make([]int32, p.N)
		for i := range natural {
			natural[i] = int32(i)
		}
		for _, k := range []struct {
			name string
			v    *Solver
		}{
			{"/ldl", NewSolver(p, true)},
			{"/lu", NewSolver(p, false)},
			{"/ldl/ordered", newSolver(ordered, true, natural)},
		} {
			b.Run(c.name+k.name, func(b *testing.B) {
				a, shift := conduction(k.v.pattern, 1, !k.v.symmetric)
				run(b, k.v, a, shift)
			})
		}
	}
}

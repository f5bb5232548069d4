package integrators_test

import (
	"testing"

	"workheat/integrators"
	"workheat/integrators/ode"
	"workheat/integrators/sparse"
)

// A chainSystem conducts heat from state to state, with a driven first one, a loss from each and a
// quadrature for each link: as cheap as equations can be, so that the method's own cost shows.
type chainSystem struct {
	n, reach int // each state is linked to the reach states behind it
	slots    [][4]int
	pairs    [][2]int
	ends     []int32
}

// newChain returns a chain of n states; with reach n−1 every state is linked to every other.
func newChain(n, reach int) *ode.Problem {
	s := &chainSystem{n: n, reach: reach}
	var pairs [][2]int32
	for i := range n {
		for j := i + 1; j <= min(i+reach, n-1); j++ {
			pairs = append(pairs, [2]int32{int32(i), int32(j)})
			s.pairs = append(s.pairs, [2]int{i, j})
		}
	}
	p := sparse.NewPattern(n, pairs)
	for _, e := range s.pairs {
		s.slots = append(s.slots, [4]int{p.Slot(e[0], e[0]), p.Slot(e[0], e[1]), p.Slot(e[1], e[0]), p.Slot(e[1], e[1])})
	}
	s.ends = p.Diag
	return &ode.Problem{System: s, N: n, NQ: len(pairs), Pattern: p, Symmetric: true}
}

func (s *chainSystem) Rates(f, q []float64, t float64, y []float64) {
	for i := range f {
		f[i] = -0.01 * y[i]
	}
	f[0] += 1 + t
	for k, e := range s.pairs {
		flow := 10 * (y[e[0]] - y[e[1]])
		q[k] = flow
		f[e[0]] -= flow
		f[e[1]] += flow
	}
}

func (s *chainSystem) Jacobian(a, d, ft []float64, _ float64, _ []float64) {
	clear(a)
	for i := range d {
		d[i], ft[i] = 1, 0
		a[s.ends[i]] = -0.01
	}
	ft[0] = 1
	for _, t := range s.slots {
		a[t[0]] -= 10
		a[t[1]] += 10
		a[t[2]] += 10
		a[t[3]] -= 10
	}
}

func (s *chainSystem) AddSlopes(dq []float64, h float64, v []float64, _ float64) {
	for k, e := range s.pairs {
		dq[k] += h * 10 * (v[e[0]] - v[e[1]])
	}
}

var benchCases = []struct {
	name     string
	n, reach int
}{
	{"chain12", 12, 1},
	{"chain100", 100, 1},
	{"chain1000", 1000, 1},
	{"dense12", 12, 11},
}

// BenchmarkStep takes steps of a fixed length.
func BenchmarkStep(b *testing.B) {
	for _, m := range integrators.Methods {
		for _, c := range benchCases {
			b.Run(m.Name()+"/"+c.name, func(b *testing.B) {
				st := m.Bind(newChain(c.n, c.reach))
				st.Start(0, make([]float64, c.n))
				b.ReportAllocs()
				to := 0.0
				for b.Loop() {
					to += 0.01
					if !st.Try(to) || !st.Finish() {
						b.Fatal("a step failed")
					}
					st.Accept()
				}
			})
		}
	}
}

// TestNoAllocations takes steps, their dense output and event values without allocating.
func TestNoAllocations(t *testing.T) {
	for _, m := range integrators.Methods {
		for _, c := range benchCases {
			p := newChain(c.n, c.reach)
			st := m.Bind(p)
			st.Start(0, make([]float64, c.n))
			coef := make([]float64, (m.Degree()+1)*c.n)
			to := 0.0
			step := func() {
				to += 0.01
				st.Try(to)
				st.Finish()
				st.Dense(coef)
				st.Accept()
			}
			if got := testing.AllocsPerRun(20, step); got != 0 {
				t.Errorf("%s, %s: %g allocations a step", m.Name(), c.name, got)
			}
		}
	}
}

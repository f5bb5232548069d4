// Package problems holds published test problems for stiff and differential-algebraic equations with their
// published answers. Only tests import it.
//
// Most come from two collections: the Test Set for Initial Value Problem Solvers (CWI Amsterdam, later
// University of Bari; Mazzia and Magherini) and the stiff test set of Hairer and Wanner, Solving Ordinary
// Differential Equations II. The answers were taken from open copies of those sets and compared with an
// independent calculation in extended precision; each problem says to how many digits they agreed.
package problems

import (
	"fmt"

	"workheat/integrators/ode"
	"workheat/integrators/sparse"
)

// A Case is a problem diag(Mass)·y' = f(t, y) with what is known of its solution.
type Case struct {
	Name   string
	Source string
	Start  []float64
	Mass   []float64 // nil: all ones
	Breaks []float64 // times at which f jumps, ascending
	Rates  func(f []float64, t float64, y []float64)
	// Slopes reports every entry of df/dy that may differ from zero to add, in the same order each time,
	// and writes ∂f/∂t into ft, which is zero before.
	Slopes func(add func(i, j int, v float64), ft []float64, t float64, y []float64)
	// Enter is called with the start of every segment between breaks; nil if there are none.
	Enter   func(t float64)
	Floor   []float64 // size below which a state's relative error does not matter; one entry: for all
	Answers []Answer
	// Sums lists linear relations Σ Weights·y that stay as they are.
	Sums [][]float64
	// Heavy problems are left for long runs.
	Heavy bool
	// Steps is how many steps, rejected ones with them, a good method of order 5 takes in all for a relative
	// error of 1e-4: Rodas5P's count.
	Steps int
	// Loses is how many digits less than the tolerance's the answer may have; zero: two. Why says why.
	Loses float64
	Why   string
}

// An Answer is the solution at a time.
type Answer struct {
	T      float64
	Index  []int     // states that Y lists; nil: all
	Y      []float64 // in the published variables
	Digits float64   // to which the answer is sure
}

// A system is a case as equations. Quadratures, if asked for, integrate f itself: their totals must be
// Mass·(y − start).
type system struct {
	*Case
	scale   func(d, y []float64) // nil: ones
	pattern *sparse.Pattern
	slots   []int32 // of the entries in the order in which Slopes reports them
	cols    []int32
	rows    []int32
	a, d    []float64
	ft      []float64
	next    int
	nq      int
	add     func(i, j int, v float64)
}

// N returns the number of states.
func (c *Case) N() int { return len(c.Start) }

// FloorOf returns the floor of state i.
func (c *Case) FloorOf(i int) float64 {
	if len(c.Floor) == 1 {
		return c.Floor[0]
	}
	return c.Floor[i]
}

// Relative returns the scale |y| + floor, with which an absolute tolerance becomes a relative one.
func (c *Case) Relative() func(d, y []float64) {
	return func(d, y []float64) {
		for i, v := range y {
			d[i] = max(v, -v) + c.FloorOf(i)
		}
	}
}

// Bind makes a problem of the case. scale may be nil; quadratures says whether f is to be integrated too.
func (c *Case) Bind(scale func(d, y []float64), quadratures bool) *ode.Problem {
	n := c.N()
	s := &system{Case: c, scale: scale, d: make([]float64, n), ft: make([]float64, n)}
	var pairs [][2]int32
	c.Slopes(func(i, j int, _ float64) {
		pairs = append(pairs, [2]int32{int32(i), int32(j)})
	}, make([]float64, n), 0, c.Start)
	s.pattern = sparse.NewPattern(n, pairs)
	for _, e := range pairs {
		s.slots = append(s.slots, int32(s.pattern.Slot(int(e[0]), int(e[1]))))
		s.rows, s.cols = append(s.rows, e[0]), append(s.cols, e[1])
	}
	s.a = make([]float64, s.pattern.NNZ())
	if quadratures {
		s.nq = n
	}
	s.add = s.collect
	return &ode.Problem{
		System: s, N: n, NQ: s.nq, Pattern: s.pattern, Mass: c.Mass,
		Name: func(i int) string { return fmt.Sprintf("y%d", i+1) },
	}
}

// Rates meets ode.System.
func (s *system) Rates(f, q []float64, t float64, y []float64) {
	s.Case.Rates(f, t, y)
	copy(q, f[:s.nq])
}

// collect takes an entry of df/dy.
func (s *system) collect(_, j int, v float64) {
	s.a[s.slots[s.next]] += v * s.d[j]
	s.next++
}

// Jacobian meets ode.System.
func (s *system) Jacobian(a, d, ft []float64, t float64, y []float64) {
	for i := range d {
		s.d[i] = 1
	}
	if s.scale != nil {
		s.scale(s.d, y)
	}
	copy(d, s.d)
	clear(s.a)
	clear(s.ft)
	s.next = 0
	s.Slopes(s.add, s.ft, t, y)
	copy(a, s.a)
	copy(ft, s.ft)
}

// AddSlopes meets ode.System.
func (s *system) AddSlopes(dq []float64, h float64, v []float64, c float64) {
	for i := range dq {
		row := s.pattern.RowStart[i]
		sum := 0.0
		for k, j := range s.pattern.Row(i) {
			sum += s.a[int(row)+k] * v[j]
		}
		dq[i] += h*sum + c*s.ft[i]
	}
}

// A term is a species and how many of it a reaction makes, or takes if negative.
type term struct {
	species int
	count   float64
}

// A reaction runs at rate k times the product of its species (counted from one, as published).
type reaction struct {
	k    float64
	of   []int
	does []term
}

// massAction returns rates and slopes of a set of reactions, with a constant supply to each species; supply
// may be nil.
func massAction(reactions []reaction, supply []float64) (func([]float64, float64, []float64), func(func(i, j int, v float64), []float64, float64, []float64)) {
	rates := func(f []float64, _ float64, y []float64) {
		clear(f)
		copy(f, supply)
		for _, r := range reactions {
			rate := r.k
			for _, s := range r.of {
				rate *= y[s-1]
			}
			for _, d := range r.does {
				f[d.species-1] += d.count * rate
			}
		}
	}
	slopes := func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
		for _, r := range reactions {
			for k, by := range r.of {
				slope := r.k
				for l, s := range r.of {
					if l != k {
						slope *= y[s-1]
					}
				}
				for _, d := range r.does {
					add(d.species-1, by-1, d.count*slope)
				}
			}
		}
	}
	return rates, slopes
}

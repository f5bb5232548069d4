package integrators_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"workheat/integrators/ode"
	"workheat/integrators/problems"
)

// march takes n equal steps from time 0 to end and returns the last state and the quadratures.
func march(t *testing.T, m ode.Method, p *ode.Problem, y0 []float64, end float64, n int) (y, q []float64) {
	t.Helper()
	st := m.Bind(p)
	if !st.Start(0, y0) {
		t.Fatal("no finite value at the start")
	}
	q = make([]float64, p.NQ)
	for k := 1; k <= n; k++ {
		if !st.Try(end*float64(k)/float64(n)) || !st.Finish() {
			t.Fatal("a step failed")
		}
		for i, dq := range st.Step().Quad {
			q[i] += dq
		}
		st.Accept()
	}
	return append([]float64(nil), st.Step().Y0...), q
}

// eval returns the dense polynomial of state i at θ.
func eval(coef []float64, n, i int, theta float64) float64 {
	v := 0.0
	for k := len(coef)/n - 1; k >= 0; k-- {
		v = v*theta + coef[k*n+i]
	}
	return v
}

// apart returns the largest difference of two states.
func apart(a, b []float64) float64 {
	worst := 0.0
	for i := range a {
		worst = math.Max(worst, math.Abs(a[i]-b[i]))
	}
	return worst
}

// randomCase returns a system of n states that is stiff (rates up to 10^spread), nonlinear and driven in
// time, with some of its last states algebraic.
func randomCase(rng *rand.Rand, n, algebraic int, spread float64) *problems.Case {
	c := &problems.Case{Name: "random", Start: make([]float64, n), Floor: []float64{1}, Mass: make([]float64, n)}
	own, link := make([]float64, n), make([][]float64, n)
	for i := range n {
		c.Start[i] = rng.NormFloat64()
		if i < n-algebraic {
			c.Mass[i] = 0.5 + rng.Float64()
		}
		own[i] = math.Pow(10, spread*rng.Float64())
		link[i] = make([]float64, n)
		for j := range n {
			link[i][j] = rng.NormFloat64() / float64(n)
		}
	}
	c.Rates = func(f []float64, t float64, y []float64) {
		for i := range n {
			f[i] = own[i] * (math.Sin(t+float64(i)) - y[i] - 0.5*math.Sin(y[i]))
			for j := range n {
				f[i] += link[i][j] * y[j]
			}
		}
	}
	c.Slopes = func(add func(i, j int, v float64), ft []float64, t float64, y []float64) {
		for i := range n {
			ft[i] = own[i] * math.Cos(t+float64(i))
			add(i, i, -own[i]*(1+0.5*math.Cos(y[i])))
			for j := range n {
				add(i, j, link[i][j])
			}
		}
	}
	return c
}

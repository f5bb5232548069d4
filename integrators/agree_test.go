package integrators_test

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"workheat/integrators"
	"workheat/integrators/ode"
	"workheat/integrators/problems"
)

// A radau is Radau IIA with three stages (order 5) at fixed steps with a dense Newton iteration: a method of
// another family, written for agreement only.
//
// Source: Hairer and Wanner, Solving Ordinary Differential Equations II, table IV.5.6; the weights follow
// here from the nodes (4 ∓ √6)/10 and 1 by collocation.
type radau struct {
	c *problems.Case
	b [3][3]float64
	x [3]float64
}

func newRadau(c *problems.Case) *radau {
	r := &radau{c: c, x: [3]float64{(4 - math.Sqrt(6)) / 10, (4 + math.Sqrt(6)) / 10, 1}}
	for i := range 3 { // Σⱼ bᵢⱼ xⱼᵏ = xᵢᵏ⁺¹/(k+1) for k = 0, 1, 2
		powers, row := make([][]float64, 3), make([]float64, 3)
		for k := range 3 {
			powers[k] = []float64{math.Pow(r.x[0], float64(k)), math.Pow(r.x[1], float64(k)), 1}
			row[k] = math.Pow(r.x[i], float64(k+1)) / float64(k+1)
		}
		eliminate(powers, row)
		copy(r.b[i][:], row)
	}
	return r
}

// eliminate solves a·x = b by Gaussian elimination with row exchanges; x replaces b.
func eliminate(a [][]float64, b []float64) {
	n := len(b)
	for k := range n {
		p := k
		for i := k; i < n; i++ {
			if math.Abs(a[i][k]) > math.Abs(a[p][k]) {
				p = i
			}
		}
		a[k], a[p], b[k], b[p] = a[p], a[k], b[p], b[k]
		for i := k + 1; i < n; i++ {
			l := a[i][k] / a[k][k]
			for j := k; j < n; j++ {
				a[i][j] -= l * a[k][j]
			}
			b[i] -= l * b[k]
		}
	}
	for k := n - 1; k >= 0; k-- {
		for j := k + 1; j < n; j++ {
			b[k] -= a[k][j] * b[j]
		}
		b[k] /= a[k][k]
	}
}

// run takes steps equal steps from y0 at time 0.
func (r *radau) run(y0 []float64, end float64, steps int) []float64 {
	y := append([]float64(nil), y0...)
	h := end / float64(steps)
	for k := range steps {
		r.step(float64(k)*h, h, y)
	}
	return y
}

// step solves M zᵢ = h Σ bᵢⱼ f(t + xⱼh, y + zⱼ) by Newton's method and moves y by z₃.
func (r *radau) step(t, h float64, y []float64) {
	n := len(y)
	z := make([]float64, 3*n)
	f, ft, at := make([]float64, n), make([]float64, n), make([]float64, n)
	for range 20 {
		jac, rhs := make([][]float64, 3*n), make([]float64, 3*n)
		for i := range jac {
			jac[i] = make([]float64, 3*n)
			jac[i][i] = r.c.Mass[i%n]
			rhs[i] = -r.c.Mass[i%n] * z[i]
		}
		for j := range 3 {
			for k := range n {
				at[k] = y[k] + z[j*n+k]
			}
			r.c.Rates(f, t+r.x[j]*h, at)
			for i := range rhs {
				rhs[i] += h * r.b[i/n][j] * f[i%n]
			}
			r.c.Slopes(func(k, l int, v float64) {
				for i := range 3 {
					jac[i*n+k][j*n+l] -= h * r.b[i][j] * v
				}
			}, ft, t+r.x[j]*h, at)
		}
		eliminate(jac, rhs)
		change := 0.0
		for i, dz := range rhs {
			z[i] += dz
			change = math.Max(change, math.Abs(dz))
		}
		if change < 1e-14 {
			break
		}
	}
	for k := range y {
		y[k] += z[2*n+k]
	}
}

// TestAgreesWithRadau runs every method at a tight tolerance against Radau IIA on random stiff nonlinear
// driven systems with and without algebraic states.
func TestAgreesWithRadau(t *testing.T) {
	rounds := 8
	if *long {
		rounds = 100
	}
	rng := rand.New(rand.NewPCG(11, 13))
	for _, m := range integrators.Methods {
		for round := range rounds {
			n := 2 + rng.IntN(5)
			c := randomCase(rng, n, rng.IntN(n), 3)
			p := c.Bind(nil, false)
			y0 := consistent(t, m, c, p)
			// Let the fast transient pass under control, then compare from there: the fixed steps need that.
			g := ode.New(p, m, ode.Tolerance{Abs: 1e-11})
			shifted := *c
			const past = 0.5
			shifted.Rates = func(f []float64, t float64, y []float64) { c.Rates(f, t+past, y) }
			shifted.Slopes = func(add func(i, j int, v float64), ft []float64, t float64, y []float64) {
				c.Slopes(add, ft, t+past, y)
			}
			if f := g.Restart(0, y0); f != nil {
				t.Fatal(f)
			}
			g.Run(context.Background(), past, 0, nil, nil)
			start := append([]float64(nil), g.State()...)
			if stop := g.Run(context.Background(), 2*past, 0, nil, nil); stop.Reason != ode.Reached {
				t.Fatal(stop.Failure)
			}
			want := newRadau(&shifted).run(start, past, 100)
			if gap := apart(g.State(), want); gap > 1e-8 {
				t.Errorf("%s, system %d of %d states: differs from Radau IIA by %g", m.Name(), round, n, gap)
			}
		}
	}
}

package integrators_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"workheat/integrators"
	"workheat/integrators/ode"
	"workheat/integrators/problems"
)

// TestQuadraturesClose integrates f of random nonlinear stiff systems, some with algebraic states, as
// quadratures: the totals must be the change of the states to round-off at any step length, since quadratures
// run with the method's own stages. The algebraic rows' totals must vanish as the rows do at the ends, to
// the error of the step, so they are left out.
func TestQuadraturesClose(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 5))
	for _, m := range integrators.Methods {
		for round := range 200 {
			n := 1 + rng.IntN(9)
			algebraic := rng.IntN(n)
			c := randomCase(rng, n, algebraic, 4*rng.Float64())
			p := c.Bind(nil, true)
			y0 := consistent(t, m, c, p)
			steps := 1 + rng.IntN(20)
			y, q := march(t, m, p, y0, 3*rng.Float64(), steps)
			for i := range n - algebraic {
				change := c.Mass[i] * (y[i] - y0[i])
				if gap := math.Abs(q[i] - change); gap > 1e-11*(1+math.Abs(change)) {
					t.Errorf("%s, system %d: quadrature %d of %d is %.16g, the state changed by %.16g", m.Name(), round, i, n, q[i], change)
				}
			}
		}
	}
}

// consistent returns the start of a case with its algebraic states solved.
func consistent(t *testing.T, m ode.Method, c *problems.Case, p *ode.Problem) []float64 {
	t.Helper()
	g := ode.New(p, m, ode.Tolerance{Abs: 1e-10})
	if f := g.Restart(0, c.Start); f != nil {
		t.Fatal(f)
	}
	return append([]float64(nil), g.State()...)
}

// TestQuadratureIsState appends the integral of a nonlinear rate, y1² + sin t, as one more state: the
// quadrature must give the same number to round-off.
func TestQuadratureIsState(t *testing.T) {
	inner := problems.Hires()
	n := inner.N()
	c := &problems.Case{Name: "appended", Start: append(append([]float64(nil), inner.Start...), 0), Floor: []float64{1}}
	c.Rates = func(f []float64, t float64, y []float64) {
		inner.Rates(f[:n], t, y[:n])
		f[n] = y[0]*y[0] + math.Sin(t)
	}
	c.Slopes = func(add func(i, j int, v float64), ft []float64, t float64, y []float64) {
		inner.Slopes(add, ft, t, y)
		add(n, 0, 2*y[0])
		ft[n] = math.Cos(t)
	}
	for _, m := range integrators.Methods {
		for _, steps := range []int{1, 7, 50} {
			y, q := march(t, m, c.Bind(nil, true), c.Start, 5, steps)
			if math.Abs(q[n]-y[n]) > 1e-13*math.Abs(y[n]) {
				t.Errorf("%s, %d steps: the quadrature is %.17g, the state %.17g", m.Name(), steps, q[n], y[n])
			}
		}
	}
}

// TestSumsStay checks that linear relations of the published problems stay through whole runs, to round-off.
func TestSumsStay(t *testing.T) {
	for _, m := range integrators.Methods {
		for _, c := range problems.All() {
			for _, w := range c.Sums {
				want := dot(w, c.Start)
				_, err := solve(c, m, c.Bind(c.Relative(), false), ode.Tolerance{Abs: 1e-5}, 10*stepBound(c, 1e-5), func(k int, y []float64) {
					if got := dot(w, y); math.Abs(got-want) > 1e-12*math.Abs(want) {
						t.Errorf("%s, %s, t = %g: the relation is %.16g, was %.16g", m.Name(), c.Name, c.Answers[k].T, got, want)
					}
				})
				if err != nil {
					t.Error(err)
				}
			}
		}
	}
}

func dot(w, y []float64) float64 {
	sum := 0.0
	for i, x := range w {
		sum += x * y[i]
	}
	return sum
}

// TestScale takes the same steps with no scale, a constant and a state-dependent one: the scale is a way to
// write the Jacobian and must not change the answer beyond round-off.
func TestScale(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 9))
	for _, m := range integrators.Methods {
		for range 50 {
			n := 2 + rng.IntN(6)
			c := randomCase(rng, n, rng.IntN(2), 3)
			fixed := make([]float64, n)
			for i := range fixed {
				fixed[i] = math.Pow(10, 6*rng.Float64()-3)
			}
			scales := []func(d, y []float64){
				func(d, _ []float64) { copy(d, fixed) },
				func(d, y []float64) {
					for i, v := range y {
						d[i] = fixed[i] * (1 + v*v)
					}
				},
			}
			plain := c.Bind(nil, true)
			y0 := consistent(t, m, c, plain)
			wantY, wantQ := march(t, m, plain, y0, 1, 10)
			for k, scale := range scales {
				y, q := march(t, m, c.Bind(scale, true), y0, 1, 10)
				if gap := apart(y, wantY); gap > 1e-12 {
					t.Errorf("%s, scale %d: states differ by %g", m.Name(), k, gap)
				}
				if gap := apart(q, wantQ); gap > 1e-11 {
					t.Errorf("%s, scale %d: quadratures differ by %g", m.Name(), k, gap)
				}
			}
		}
	}
}

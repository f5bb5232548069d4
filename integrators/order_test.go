package integrators_test

import (
	"math"
	"testing"

	"workheat/integrators"
	"workheat/integrators/ode"
	"workheat/integrators/problems"
)

// mildCase is smooth, nonlinear and driven in time: y1' = −y1² + z, y2' = y1 y2 cos 3t − y2, with z algebraic
// if index1, 0 = y2 + sin 3t − z − z³/10, else written out as y2 + sin 3t.
func mildCase(index1 bool) *problems.Case {
	c := &problems.Case{Name: "mild", Start: []float64{1, 0.5}, Floor: []float64{1}}
	c.Rates = func(f []float64, t float64, y []float64) {
		z := y[1] + math.Sin(3*t)
		if index1 {
			z = y[2]
			f[2] = y[1] + math.Sin(3*t) - z - 0.1*z*z*z
		}
		f[0] = -y[0]*y[0] + z
		f[1] = y[0]*y[1]*math.Cos(3*t) - y[1]
	}
	c.Slopes = func(add func(i, j int, v float64), ft []float64, t float64, y []float64) {
		add(0, 0, -2*y[0])
		add(1, 0, y[1]*math.Cos(3*t))
		add(1, 1, y[0]*math.Cos(3*t)-1)
		ft[1] = -3 * y[0] * y[1] * math.Sin(3*t)
		if index1 {
			add(0, 2, 1)
			add(2, 1, 1)
			add(2, 2, -1-0.3*y[2]*y[2])
			ft[2] = 3 * math.Cos(3*t)
			return
		}
		add(0, 1, 1)
		ft[0] = 3 * math.Cos(3*t)
	}
	if index1 {
		z := 0.5
		for range 50 {
			z = 0.5 - 0.1*z*z*z
		}
		c.Start, c.Mass = append(c.Start, z), []float64{1, 1, 0}
	}
	return c
}

// observed returns the order from errors at halved steps.
func observed(coarse, fine float64) float64 { return math.Log2(coarse / fine) }

// TestOrder halves the steps on smooth problems, ordinary and with an algebraic state. Every component must
// show the order of the table: the ordinary one within 0.3, the other not less than 0.2 below.
func TestOrder(t *testing.T) {
	for _, m := range integrators.Methods {
		for _, index1 := range []bool{false, true} {
			c := mildCase(index1)
			p := c.Bind(nil, false)
			exact, _ := march(t, m, p, c.Start, 2, 2048)
			coarse, _ := march(t, m, p, c.Start, 2, 64)
			fine, _ := march(t, m, p, c.Start, 2, 128)
			got, order := observed(apart(coarse, exact), apart(fine, exact)), float64(m.Order())
			t.Logf("%s, index 1 %v: observed order %.2f", m.Name(), index1, got)
			if got < order-0.2 || got > order+0.6 || (!index1 && math.Abs(got-order) > 0.3) {
				t.Errorf("%s, index 1 %v: observed order %.2f, want %g", m.Name(), index1, got, order)
			}
		}
	}
}

// TestStiffOrder follows the moving value of Prothero and Robinson at a rate far beyond 1/h, where methods
// without the extra conditions fall to order 1. Few steps: the error soon meets round-off.
func TestStiffOrder(t *testing.T) {
	for _, m := range integrators.Methods {
		c := problems.ProtheroRobinson(-1e6, 2)
		p := c.Bind(nil, false)
		miss := func(n int) float64 {
			y, _ := march(t, m, p, c.Start, 2, n)
			return math.Abs(y[0] - c.Answers[0].Y[0])
		}
		got := observed(miss(8), miss(16))
		t.Logf("%s: observed order %.2f", m.Name(), got)
		if got < 2.9 {
			t.Errorf("%s: observed order %.2f, want at least 2.9", m.Name(), got)
		}
	}
}

// TestEstimateOrder checks that the error estimate of one step falls as the embedded order says.
func TestEstimateOrder(t *testing.T) {
	c := mildCase(false)
	for _, m := range integrators.Methods {
		st := m.Bind(c.Bind(nil, false))
		st.Start(0, c.Start)
		estimate := func(h float64) float64 {
			st.Try(h)
			return apart(st.Step().Err, make([]float64, 2))
		}
		got, want := observed(estimate(0.02), estimate(0.01)), float64(m.Estimate()+1)
		t.Logf("%s: the estimate falls with power %.2f", m.Name(), got)
		if math.Abs(got-want) > 0.3 {
			t.Errorf("%s: the estimate falls with power %.2f, want %g", m.Name(), got, want)
		}
	}
}

// TestDenseOrder compares the dense output inside one step with fine steps to the same place. Its error must
// fall with the power degree + 1 of the step for differential states and one power less for algebraic ones.
func TestDenseOrder(t *testing.T) {
	for _, m := range integrators.Methods {
		for _, index1 := range []bool{false, true} {
			c := mildCase(index1)
			coarse, fine := denseErrors(t, m, c, 0.008), denseErrors(t, m, c, 0.004)
			for i := range coarse {
				got, want := observed(coarse[i], fine[i]), float64(m.Degree())+0.8
				if c.Mass != nil && c.Mass[i] == 0 {
					want--
				}
				t.Logf("%s, index 1 %v: the dense output of y%d errs with power %.2f", m.Name(), index1, i+1, got)
				if got < want {
					t.Errorf("%s, index 1 %v: the dense output of y%d errs with power %.2f, want %g", m.Name(), index1, i+1, got, want)
				}
			}
		}
	}
}

// denseErrors returns the largest error of each state inside a first step of length h.
func denseErrors(t *testing.T, m ode.Method, c *problems.Case, h float64) []float64 {
	p := c.Bind(nil, false)
	st := m.Bind(p)
	st.Start(0, c.Start)
	st.Try(h)
	coef := make([]float64, (m.Degree()+1)*p.N)
	st.Dense(coef)
	worst := make([]float64, p.N)
	for _, theta := range []float64{0.15, 0.4, 0.65, 0.9} {
		want, _ := march(t, m, p, c.Start, theta*h, 64)
		for i, w := range want {
			worst[i] = math.Max(worst[i], math.Abs(eval(coef, p.N, i, theta)-w))
		}
	}
	return worst
}

// TestDenseEnds checks that the dense output meets the states at both ends of a step.
func TestDenseEnds(t *testing.T) {
	for _, m := range integrators.Methods {
		c := problems.Hires()
		p := c.Bind(c.Relative(), false)
		st := m.Bind(p)
		st.Start(0, c.Start)
		st.Try(0.01)
		coef := make([]float64, (m.Degree()+1)*p.N)
		st.Dense(coef)
		for i := range p.N {
			for theta, want := range []float64{st.Step().Y0[i], st.Step().Y1[i]} {
				if got := eval(coef, p.N, i, float64(theta)); math.Abs(got-want) > 1e-14 {
					t.Errorf("%s: y%d(%d) is %.17g, want %.17g", m.Name(), i+1, theta, got, want)
				}
			}
		}
	}
}

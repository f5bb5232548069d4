package ode

import (
	"fmt"
	"math"
	"sort"
)

const newtonMost = 50 // damped Newton steps for the algebraic states

// makeConsistent solves the algebraic rows for the algebraic states at the current point by Newton's
// method, halving the step while the residual does not fall.
func (g *Integrator) makeConsistent() *Failure {
	if !g.hasAlgebraic() {
		return nil
	}
	v, old := make([]float64, g.problem.N), make([]float64, g.problem.N)
	residual := g.residual()
	for range newtonMost {
		if !g.stepper.Newton(v) {
			return g.failure("the algebraic equations have no solution here (a singular matrix)", 0)
		}
		copy(old, g.y)
		change, damp := 0.0, 1.0
		for {
			change = 0
			for i := range g.y {
				if g.problem.Algebraic(i) {
					g.y[i] = old[i] + damp*v[i]*g.stepper.Step().D[i]
					change = math.Max(change, math.Abs(damp*v[i]))
				}
			}
			ok := g.stepper.Start(g.t, g.y)
			if r := g.residual(); ok && (r <= residual || change < 0.01*g.tol.Abs) {
				residual = r
				break
			}
			if damp /= 2; damp < 1e-6 {
				return g.failure("the algebraic equations have no solution near the start", 0)
			}
		}
		if change < 1e-6*g.tol.Abs || residual == 0 {
			return nil
		}
		if change < 1e-3*g.tol.Abs && damp == 1 { // quadratic: the next change is below round-off
			return nil
		}
	}
	return g.failure("the algebraic equations did not settle", 0)
}

func (g *Integrator) hasAlgebraic() bool {
	for i := range g.y {
		if g.problem.Algebraic(i) {
			return true
		}
	}
	return false
}

func (g *Integrator) residual() float64 {
	sum := 0.0
	for i, f := range g.stepper.Step().F {
		if g.problem.Algebraic(i) {
			sum += math.Abs(f)
		}
	}
	return sum
}

// A Failure says where and how the numbers failed.
type Failure struct {
	Text  string
	T, H  float64
	Worst []Worst // the states with the largest error over tolerance, at most three
}

// A Worst is a state that held a step back.
type Worst struct {
	Name  string
	Ratio float64 // error over tolerance; not finite if a value was not
	Rate  float64 // f of that state at the start of the step, over its scale
}

func (f *Failure) Error() string {
	text := fmt.Sprintf("at t = %.6g s with a step of %.3g s: %s", f.T, f.H, f.Text)
	for _, w := range f.Worst {
		text += fmt.Sprintf("; %s: error over tolerance %.3g, rate %.3g per s", w.Name, w.Ratio, w.Rate)
	}
	return text
}

func (g *Integrator) failure(text string, h float64) *Failure {
	f := &Failure{Text: text, T: g.t, H: h}
	s := g.stepper.Step()
	for i := range s.Err {
		tol := s.D[i] * (g.tol.Abs + g.tol.Rel*g.rise[i])
		f.Worst = append(f.Worst, Worst{g.problem.Name(i), math.Abs(s.Err[i]) / tol, s.F[i] / s.D[i]})
	}
	rank := func(w Worst) float64 {
		if math.IsNaN(w.Ratio) {
			return math.Inf(1)
		}
		return w.Ratio
	}
	sort.SliceStable(f.Worst, func(i, j int) bool { return rank(f.Worst[i]) > rank(f.Worst[j]) })
	f.Worst = f.Worst[:min(3, len(f.Worst))]
	return f
}

package ode

import "math"

// Newton's method for the algebraic states.
const (
	newtonMost = 50   // steps
	leastDamp  = 1e-6 // a step that must be shorter than this part of itself leads nowhere
	settled    = 1e-6 // of the absolute tolerance: a smaller change ends the search
	quadratic  = 1e-3 // the same for a full step: the next change is smaller by its square
	noise      = 1e-2 // a smaller change is taken even if round-off makes the residual rise
)

// makeConsistent solves the algebraic rows for the algebraic states at the current point by Newton's
// method, halving the step while the residual does not fall.
func (g *Integrator) makeConsistent() *Failure {
	if g.algebraic == nil {
		return nil
	}
	residual := g.residual()
	for range newtonMost {
		if residual == 0 {
			return nil
		}
		if !g.stepper.Newton(g.change) {
			return g.failure("the algebraic equations have no solution here (a singular matrix)", 0)
		}
		before := residual
		way, damp, ok := g.descend(&residual)
		if !ok {
			return g.failure("the algebraic equations have no solution near the start", 0)
		}
		if way < settled*g.tol.Abs || (damp == 1 && way < quadratic*g.tol.Abs) {
			return nil
		}
		if way < g.tol.Abs && !(residual < before) {
			return nil // round-off is all that is left
		}
	}
	return g.failure("the algebraic equations did not settle", 0)
}

// descend moves the algebraic states by the longest half, quarter ... of g.change that lowers the residual.
// It returns the largest change, in units of y/D, and the part; ok is false if there was none.
func (g *Integrator) descend(residual *float64) (way, damp float64, ok bool) {
	d, full := g.stepper.Step().D, 0.0
	for _, i := range g.algebraic {
		full = math.Max(full, math.Abs(g.change[i]))
		g.old[i] = g.y[i]
		g.change[i] *= d[i]
	}
	for damp = 1; damp >= leastDamp; damp /= 2 {
		for _, i := range g.algebraic {
			g.y[i] = g.old[i] + damp*g.change[i]
		}
		finite := g.stepper.Start(g.t, g.y)
		way = damp * full
		if r := g.residual(); finite && (r <= *residual || way < noise*g.tol.Abs) {
			*residual = r
			return way, damp, true
		}
	}
	return way, damp, false
}

// residual returns the sum of the sizes of the algebraic rows.
func (g *Integrator) residual() float64 {
	sum := 0.0
	f := g.stepper.Step().F
	for _, i := range g.algebraic {
		sum += math.Abs(f[i])
	}
	return sum
}

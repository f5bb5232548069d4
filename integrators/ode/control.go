package ode

import "math"

// Step control. The values are chosen by trial on the brake networks of the benchmark set: plain integral
// control took fewer steps there than a proportional-integral one at equal error.
const (
	safety    = 0.9   // aim below the tolerance by this factor
	growMost  = 6.0   // a step grows by this much at the most
	shrinkTo  = 0.2   // and shrinks to this part at the least
	badShrink = 0.25  // after a value that is not finite
	badMost   = 10    // such failures in a row end the run
	stretch   = 1.05  // a step that would leave less than 5 % is stretched to the end
	leastStep = 1e-13 // of the time scale: below it the run has failed
)

// norm returns the largest error of the step over its tolerance. It is not finite if an error is not.
func (g *Integrator) norm(s *Step) float64 {
	worst := 0.0
	errs, d, rise := s.Err, s.D, g.rise
	d, rise = d[:len(errs)], rise[:len(errs)]
	rel, abs := g.tol.Rel, g.tol.Abs
	for i, e := range errs {
		r := math.Abs(e) / (d[i] * (abs + rel*rise[i]))
		if !(r <= worst) {
			worst = r // also when r is not a number, which then stays
			if math.IsNaN(r) {
				return r
			}
		}
	}
	return worst
}

// remember raises the largest distance from the start that each state has had.
func (g *Integrator) remember(s *Step) {
	y1, d, y0, rise := s.Y1, s.D, g.origin, g.rise
	d, y0, rise = d[:len(y1)], y0[:len(y1)], rise[:len(y1)]
	for i, y := range y1 {
		if r := math.Abs(y-y0[i]) / d[i]; r > rise[i] {
			rise[i] = r
		}
	}
}

// factor returns what to multiply the step by after an error of the given norm.
func (g *Integrator) factor(norm float64) float64 {
	if norm == 0 {
		return growMost
	}
	return math.Min(growMost, math.Max(shrinkTo, safety*math.Pow(norm, -1/float64(g.method.Estimate()+1))))
}

// firstStep guesses a first step from the slope at the start of a segment of length span: the state that
// moves fastest may go a hundredth part of the way that the loosest useful step would take it.
func (g *Integrator) firstStep(s *Step, span float64) float64 {
	h := span
	for i, f := range s.F {
		if g.problem.Algebraic(i) {
			continue
		}
		if rate := math.Abs(f) / s.D[i]; rate > 0 {
			scale := g.tol.Abs + g.tol.Rel*g.rise[i]
			h = math.Min(h, math.Pow(scale, 1/float64(g.method.Order()))/rate)
		}
	}
	return h
}

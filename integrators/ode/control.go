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
	leastStep = 1e-14 // of the time: some 50 roundings of it, below which a step's length means little
	atLeast   = 1.05  // a step up to so many least ones counts as one: its ends are rounded
)

// A pace is the length of the next step and what it must respect.
type pace struct {
	h, end float64
	held   bool // the last try failed: the next step may not grow
	bad    int  // tries in a row without a finite value
}

// predict returns the time to which the next step goes from t. The end is met by assignment: sums of steps
// do not hit it.
func (p *pace) predict(t float64) float64 {
	h := math.Max(p.h, least(t))
	if t+h*stretch >= p.end {
		return p.end
	}
	return t + h
}

// least returns the shortest step to try at time t.
func least(t float64) float64 { return leastStep*math.Abs(t) + math.SmallestNonzeroFloat64*0x1p60 }

// reject shortens the step after a try of length h whose factor is not a number if a value was not finite.
// It returns why the run cannot go on, or nothing.
func (p *pace) reject(h, factor, t float64) string {
	p.held = true
	finite := factor < 1
	if !finite {
		factor = badShrink
		p.bad++
	}
	p.h = h * factor
	shortest := h <= atLeast*least(t)
	switch {
	case !finite && (p.bad > badMost || shortest):
		return "a value is not finite however small the step"
	case shortest:
		return "the step has become too small to go on"
	}
	return ""
}

// grow sets the length after an accepted step.
func (p *pace) grow(h, factor float64) {
	if p.held {
		factor = math.Min(1, factor)
	}
	p.h, p.held, p.bad = h*factor, false, 0
}

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

// factor returns what to multiply the step by after an error of the given norm; not a number if the norm is
// not.
func (g *Integrator) factor(norm float64) float64 {
	// Exp and Log take half the time of Pow, whose last digits are not needed here. Log(0) is −Inf.
	return math.Min(growMost, math.Max(shrinkTo, safety*math.Exp(-math.Log(norm)/float64(g.method.Estimate()+1))))
}

// firstStep guesses a first step from the slope at the start of a segment of length span: the state that
// moves fastest may go a way of tol^(1/order), in the unit of y/D. For the tolerances in use that is a
// hundredth to a fifth of a unit, little enough for kelvins; where it is wrong, a rejection or some steps
// of growth set it right.
func (g *Integrator) firstStep(s *Step, span float64) float64 {
	h := span
	for i, f := range s.F {
		if g.problem.Algebraic(i) {
			continue
		}
		if rate := math.Abs(f) / (s.D[i] * g.mass(i)); rate > 0 {
			scale := g.tol.Abs + g.tol.Rel*g.rise[i]
			h = math.Min(h, math.Pow(scale, 1/float64(g.method.Order()))/rate)
		}
	}
	return h
}

// mass returns the factor of the derivative in row i.
func (g *Integrator) mass(i int) float64 {
	if g.problem.Mass == nil {
		return 1
	}
	return g.problem.Mass[i]
}

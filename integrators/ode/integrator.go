package ode

import (
	"context"
	"math"
)

// An Integrator drives one method over the segments of a run. Within a segment f must be smooth; at its
// ends the caller calls Restart. It is not safe for concurrent use.
type Integrator struct {
	problem   *Problem
	method    Method
	stepper   Stepper
	tol       Tolerance
	algebraic []int // states without a derivative

	t       float64
	y       []float64
	origin  []float64 // y at the first start
	rise    []float64 // largest |y - origin|/D so far
	quad    []float64 // totals, with their compensation
	comp    []float64
	started bool
	fresh   bool // the stepper has been started at (t, y) and nobody has moved since

	before, after []float64 // event values
	dense, point  []float64
	polynomial    func(dst []float64) // the stepper's Dense, bound once
	change, old   []float64           // of Newton's method for the algebraic states
}

// New binds a method to a problem. A tolerance that is not positive panics.
func New(p *Problem, m Method, tol Tolerance) *Integrator {
	if !(tol.Abs > 0) || !(tol.Rel >= 0) {
		panic("ode: the tolerance must be positive")
	}
	g := &Integrator{
		problem: p, method: m, stepper: m.Bind(p), tol: tol,
		y: make([]float64, p.N), origin: make([]float64, p.N), rise: make([]float64, p.N),
		quad: make([]float64, p.NQ), comp: make([]float64, p.NQ),
		dense: make([]float64, (m.Degree()+1)*p.N), point: make([]float64, p.N),
	}
	g.polynomial = g.stepper.Dense
	for i := range g.y {
		if p.Algebraic(i) {
			g.algebraic = append(g.algebraic, i)
		}
	}
	if g.algebraic != nil {
		g.change, g.old = make([]float64, p.N), make([]float64, p.N)
	}
	return g
}

// A Reason says why a run came back.
type Reason int

// The reasons.
const (
	Reached     Reason = iota // the end time
	Passed                    // an event
	Interrupted               // the context was cancelled
	Failed                    // the numbers failed; Stop.Failure says how
)

// A Stop is where and why a run came back.
type Stop struct {
	Reason  Reason
	T       float64
	Event   int      // which event passed
	First   float64  // what the first accepted step could have been, for a later run with the same drive
	Failure *Failure // when Failed
}

// An Observer is shown every accepted step; dense writes its polynomial as Stepper.Dense does. It must not
// keep s, nor call the system.
type Observer func(s *Step, dense func(dst []float64))

// Time returns where the integrator is.
func (g *Integrator) Time() float64 { return g.t }

// State returns y at Time. The slice is the integrator's own.
func (g *Integrator) State() []float64 { return g.y }

// Quadratures returns the totals since the first start. The slice is the integrator's own.
func (g *Integrator) Quadratures() []float64 { return g.quad }

// Compensation returns what must be added to Quadratures for the best totals.
func (g *Integrator) Compensation() []float64 { return g.comp }

// Stats returns the counters of the run so far.
func (g *Integrator) Stats() Stats { return *g.stepper.Stats() }

// Restart places the integrator at (t, y) at the start of a run or after a jump or slope break of f. The
// algebraic states are solved anew, the others keep their values exactly.
func (g *Integrator) Restart(t float64, y []float64) *Failure {
	copy(g.y, y)
	g.t = t
	g.stepper.Stats().Restarts++
	if !g.stepper.Start(t, g.y) {
		return g.failure("the equations have no finite value here", 0)
	}
	if f := g.makeConsistent(); f != nil {
		return f
	}
	if !g.started {
		g.started = true
		copy(g.origin, g.y)
	}
	g.fresh = true
	return nil
}

// Run advances to the time end, or to the first event that passes. first is a guess of the first step, or
// zero. observe may be nil. The first call must follow a Restart; a later one without a Restart goes on from
// where the last one stopped. An end that is not finite panics.
func (g *Integrator) Run(ctx context.Context, end, first float64, events []Event, observe Observer) Stop {
	stop := Stop{Reason: Reached, T: g.t}
	if !g.begin(end, events) {
		return g.fail(stop, "the equations have no finite value here", 0)
	}
	p := pace{h: first, end: end}
	if !(first > 0) {
		p.h = g.firstStep(g.stepper.Step(), end-g.t)
	}
	for g.t < end {
		if ctx.Err() != nil {
			stop.Reason = Interrupted
			return stop
		}
		norm := g.testError(g.stepper.Try(p.predict(g.t)))
		h, factor := g.stepper.Step().H, g.factor(norm) // an event may shorten the step
		which := -1
		if norm <= 1 && len(events) > 0 {
			which, norm = g.landOnEvent(events, norm)
		}
		if !(norm <= 1) || !g.acceptStep(observe) {
			if text := g.rejectStep(&p, norm); text != "" {
				return g.fail(stop, text, h)
			}
			continue
		}
		stop.T = g.t
		if stop.First == 0 {
			stop.First = h * factor
		}
		if which >= 0 {
			g.stepper.Stats().Events++
			stop.Reason, stop.Event = Passed, which
			return stop
		}
		p.grow(h, factor)
	}
	return stop
}

// begin makes ready for a run; false if the stepper had to be started again and could not.
func (g *Integrator) begin(end float64, events []Event) bool {
	if math.IsNaN(end) || math.IsInf(end, 0) {
		panic("ode: the end of a run is not finite")
	}
	if len(g.before) != len(events) {
		g.before, g.after = make([]float64, len(events)), make([]float64, len(events))
	}
	ok := g.fresh || g.stepper.Start(g.t, g.y)
	g.fresh = false
	return ok
}

// fail completes a stop with what went wrong at a step of length h.
func (g *Integrator) fail(stop Stop, text string, h float64) Stop {
	stop.Reason, stop.Failure = Failed, g.failure(text, h)
	return stop
}

// testError returns the error norm of a tried step; it is not a number if the try failed or a value of the
// step is not finite.
func (g *Integrator) testError(tried bool) float64 {
	if !tried {
		return math.NaN()
	}
	norm := g.norm(g.stepper.Step())
	if math.IsInf(norm, 0) {
		return math.NaN()
	}
	return norm
}

// rejectStep shortens the step after a try with the given error norm. It returns why the run cannot go on,
// or nothing.
func (g *Integrator) rejectStep(p *pace, norm float64) string {
	g.stepper.Stats().Rejected++
	if norm <= 1 { // the step was good, but not the point that it led to
		norm = math.NaN()
	}
	return p.reject(g.stepper.Step().H, g.factor(norm), g.t)
}

// acceptStep takes the tried step over: observer, state, quadratures. It reports false, and changes nothing,
// if the equations have no finite value at its end.
func (g *Integrator) acceptStep(observe Observer) bool {
	if !g.stepper.Finish() {
		return false
	}
	s := g.stepper.Step()
	if observe != nil {
		observe(s, g.polynomial)
	}
	g.remember(s)
	copy(g.y, s.Y1)
	g.t = s.End
	g.addQuadratures(s.Quad)
	g.stepper.Stats().Steps++
	g.stepper.Accept()
	return true
}

// addQuadratures adds the increments of a step to the totals by Neumaier's compensated sum.
func (g *Integrator) addQuadratures(dq []float64) {
	quad, comp := g.quad, g.comp
	comp, dq = comp[:len(quad)], dq[:len(quad)]
	for i, q := range quad {
		x := dq[i]
		t := q + x
		if math.Abs(q) >= math.Abs(x) {
			comp[i] += (q - t) + x
		} else {
			comp[i] += (x - t) + q
		}
		quad[i] = t
	}
}

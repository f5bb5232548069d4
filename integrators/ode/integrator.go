package ode

import (
	"context"
	"math"
)

// An Integrator drives one method over the segments of a run. Within a segment f must be smooth; at its
// ends the caller calls Restart. It is not safe for concurrent use.
type Integrator struct {
	problem *Problem
	method  Method
	stepper Stepper
	tol     Tolerance

	t      float64
	y      []float64
	origin []float64 // y at the first start
	rise   []float64 // largest |y - origin|/D so far
	quad   []float64 // totals, with their compensation
	comp   []float64

	started       bool
	before, after []float64 // event values
	dense, point  []float64
}

// New binds a method to a problem.
func New(p *Problem, m Method, tol Tolerance) *Integrator {
	if !(tol.Abs > 0) || !(tol.Rel >= 0) {
		panic("ode: the tolerance must be positive")
	}
	return &Integrator{
		problem: p, method: m, stepper: m.Bind(p), tol: tol,
		y: make([]float64, p.N), origin: make([]float64, p.N), rise: make([]float64, p.N),
		quad: make([]float64, p.NQ), comp: make([]float64, p.NQ),
		dense: make([]float64, (m.Degree()+1)*p.N), point: make([]float64, p.N),
	}
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

// An Observer is shown every accepted step; the stepper serves its dense output. It must not call Try,
// Accept or Start.
type Observer func(s *Step, dense func(dst []float64))

// Time, State, Quadratures and Stats return where the integrator is. The slices are its own.
func (g *Integrator) Time() float64 { return g.t }

// State returns y at Time.
func (g *Integrator) State() []float64 { return g.y }

// Quadratures returns the totals since the first start. The slice is the integrator's own.
func (g *Integrator) Quadratures() []float64 { return g.quad }

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
	return nil
}

// Run advances to the time end, or to the first event that passes. first is a guess of the first step, or
// zero. observe may be nil.
func (g *Integrator) Run(ctx context.Context, end, first float64, events []Event, observe Observer) Stop {
	stop := Stop{Reason: Reached}
	if len(g.before) != len(events) {
		g.before, g.after = make([]float64, len(events)), make([]float64, len(events))
	}
	h := first
	if !(h > 0) {
		h = g.firstStep(g.stepper.Step(), end-g.t)
	}
	grow := true
	for bad := 0; g.t < end; {
		if ctx.Err() != nil {
			stop.Reason = Interrupted
			break
		}
		last := g.t+h*stretch >= end
		if last {
			h = end - g.t
		}
		if h < leastStep*math.Max(math.Abs(g.t), math.Abs(end)) && !last {
			stop.Reason, stop.Failure = Failed, g.failure("the step has become too small to go on", h)
			break
		}
		ok := g.stepper.Try(h)
		s := g.stepper.Step()
		norm := math.NaN()
		if ok {
			norm = g.norm(s)
		}
		if math.IsNaN(norm) || math.IsInf(norm, 0) {
			if bad++; bad > badMost {
				stop.Reason, stop.Failure = Failed, g.failure("a value is not finite however small the step", h)
				break
			}
			g.stepper.Stats().Rejected++
			h, grow = h*badShrink, false
			continue
		}
		bad = 0
		if norm > 1 {
			g.stepper.Stats().Rejected++
			h, grow = h*math.Min(1, g.factor(norm)), false
			continue
		}
		if len(events) > 0 {
			if low, high, which := g.crossing(s, events); which >= 0 {
				if !g.land(g.t, low, high, h, events[which]) {
					h *= badShrink
					continue
				}
				stop.Reason, stop.Event = Passed, which
				g.stepper.Stats().Events++
				last = false
			}
		}
		if stop.First == 0 {
			stop.First = s.H * g.factor(norm)
		}
		if !g.accept(s, last, end, observe) {
			stop.Reason, stop.Failure = Failed, g.failure("the equations have no finite value at the end of a step", s.H)
			break
		}
		if stop.Reason == Passed {
			break
		}
		f := g.factor(norm)
		if !grow {
			f = math.Min(1, f)
		}
		h, grow = h*f, true
	}
	stop.T = g.t
	return stop
}

// accept takes the tried step over: state, quadratures, observer, evaluation at the new point.
func (g *Integrator) accept(s *Step, last bool, end float64, observe Observer) bool {
	if observe != nil {
		observe(s, g.stepper.Dense)
	}
	g.remember(s)
	copy(g.y, s.Y1)
	g.t = s.T + s.H
	if last {
		g.t = end // by assignment: sums of steps do not hit it
	}
	quad, comp, dq := g.quad, g.comp, s.Quad
	comp, dq = comp[:len(quad)], dq[:len(quad)]
	for i, q := range quad { // Neumaier's compensated sum
		x := dq[i]
		t := q + x
		if math.Abs(q) >= math.Abs(x) {
			comp[i] += (q - t) + x
		} else {
			comp[i] += (x - t) + q
		}
		quad[i] = t
	}
	g.stepper.Stats().Steps++
	return g.stepper.Accept()
}

// Compensation returns what must be added to Quadratures for the best totals.
func (g *Integrator) Compensation() []float64 { return g.comp }

package ode

import "math"

// An Event is a value whose passing from below zero to zero or above ends a run. A value that is zero or
// above at the start of a run has passed before: it must fall below zero first. For the other direction the
// caller changes the sign.
type Event struct {
	Name     string
	Value    func(t float64, y []float64) float64 // a function of its arguments alone
	Accuracy float64                              // the value may be this far past zero when the run ends
	Coarse   bool                                 // a step that ends before zero need not be searched for it
}

const (
	looks    = 10    // points of the dense output at which events are tested within a step
	landings = 12    // step attempts to land on an event
	narrow   = 1e-10 // of a step: events closer together than this count as simultaneous
	back     = 1e-3  // of a step, over which the slope of an event's value at its end is taken
)

// landOnEvent looks for an event in the tried step, whose error norm is given, and tries again up to just
// past the first one. It returns the event, or -1, and the norm of the step as it is now tried, which is
// not a number if that is not finite. Of simultaneous events the first in the list is returned.
func (g *Integrator) landOnEvent(events []Event, norm float64) (int, float64) {
	s := g.stepper.Step()
	if !mayPass(s, events) {
		return -1, norm
	}
	g.stepper.Dense(g.dense)
	theta, which := g.crossing(s, events)
	if which < 0 {
		return -1, norm
	}
	full := s.End
	landed, ok := g.land(theta, &events[which])
	if !ok {
		return -1, math.NaN()
	}
	if !landed { // only the dense output touched zero
		which = -1
		ok = g.stepper.Try(full)
	}
	return which, g.testError(ok)
}

// mayPass reports whether the tried step must be searched: not if all events are coarse and before zero at its end.
func mayPass(s *Step, events []Event) bool {
	for k := range events {
		if e := &events[k]; !e.Coarse || e.Value(s.End, s.Y1) >= 0 {
			return true
		}
	}
	return false
}

// crossing returns the place θ in the step, just past zero, at which the first event passes by the dense
// output, and its index, or -1.
func (g *Integrator) crossing(s *Step, events []Event) (theta float64, which int) {
	for k := range g.before {
		g.before[k] = events[k].Value(s.T, s.Y0)
	}
	last := 0.0
	for j := 1; j <= looks; j++ {
		theta := float64(j) / looks
		if which := g.look(s, events, theta); which >= 0 {
			return g.earliest(s, events, last, theta, which)
		}
		g.before, g.after = g.after, g.before
		last = theta
	}
	return 0, -1
}

// look evaluates the events at θ into g.after and returns the first in the list that is past zero there and
// was before it at the last look, or -1.
func (g *Integrator) look(s *Step, events []Event, theta float64) int {
	t, y := s.T+theta*s.H, g.probe(s, theta)
	which := -1
	for k := range events {
		g.after[k] = events[k].Value(t, y)
		if which < 0 && g.before[k] < 0 && g.after[k] >= 0 {
			which = k
		}
	}
	return which
}

// earliest halves the interval between two looks until it is narrow. which is the event that has passed at
// its upper end; the one that has passed at the final upper end is returned with that end.
func (g *Integrator) earliest(s *Step, events []Event, low, high float64, which int) (float64, int) {
	for high-low > narrow {
		mid := 0.5 * (low + high)
		if k := g.look(s, events, mid); k >= 0 {
			high, which = mid, k
		} else {
			low = mid
		}
	}
	return high, which
}

// probe returns the dense output at θ; at the end the state of the step itself.
func (g *Integrator) probe(s *Step, theta float64) []float64 {
	if theta == 1 {
		return s.Y1
	}
	n := len(g.point)
	k := g.method.Degree()
	copy(g.point, g.dense[k*n:])
	for k--; k >= 0; k-- {
		for i, c := range g.dense[k*n : (k+1)*n] {
			g.point[i] = g.point[i]*theta + c
		}
	}
	return g.point
}

// land takes the step again so that it ends just past the event: the dense output says about where (theta)
// and how steep; the secant method on the end of the step itself, kept between ends that are too early and
// too late, says exactly. landed is false if no length was past zero: the dense output had only touched it. ok is
// false if a try failed.
func (g *Integrator) land(theta float64, e *Event) (landed, ok bool) {
	s := g.stepper.Step()
	start, short, long := s.T, s.T, s.End
	past := e.Value(s.End, s.Y1) >= 0
	next := math.Min(start+theta*s.H, long)
	if !(next > start) {
		next = math.Nextafter(start, long)
	}
	lastEnd, lastValue := math.NaN(), math.NaN()
	for range landings {
		if next != s.End && !g.stepper.Try(next) {
			return false, false
		}
		v := e.Value(next, s.Y1)
		if v >= 0 && v <= e.Accuracy {
			return true, true
		}
		if v >= 0 {
			long, past = next, true
		} else {
			short = next
		}
		rate := (v - lastValue) / (next - lastEnd)
		if math.IsNaN(rate) {
			rate = g.eventRate(e)
		}
		lastEnd, lastValue = next, v
		next += (0.5*e.Accuracy - v) / rate
		if !(next > short && next < long) {
			next = 0.5 * (short + long)
		}
		if !(next > short && next < long) {
			break // the two are neighbours
		}
	}
	if past && s.End != long {
		ok = g.stepper.Try(long)
		return ok, ok
	}
	return past, true
}

// eventRate returns the slope in time of the event's value at the end of the tried step, by its dense output.
func (g *Integrator) eventRate(e *Event) float64 {
	s := g.stepper.Step()
	g.stepper.Dense(g.dense)
	end := e.Value(s.End, s.Y1)
	return (end - e.Value(s.T+(1-back)*s.H, g.probe(s, 1-back))) / (back * s.H)
}

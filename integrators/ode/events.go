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
	landings = 20    // step attempts to land on an event
	secants  = 4     // of these by the secant method
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
// and how steep; the zero of the event's value at the end of the step itself says exactly. landed is false if no
// length was past zero: the dense output had only touched it. ok is false if a try failed.
func (g *Integrator) land(theta float64, e *Event) (landed, ok bool) {
	s := g.stepper.Step()
	goal := 0.5 * e.Accuracy
	z := bracket{low: s.T, high: s.End, under: e.Value(s.T, s.Y0) - goal, over: e.Value(s.End, s.Y1) - goal}
	past := z.over >= -goal
	next := math.Min(s.T+theta*s.H, s.End)
	if !(next > s.T) {
		next = math.Nextafter(s.T, s.End)
	}
	for k := range landings {
		if next != s.End && !g.stepper.Try(next) {
			return false, false
		}
		v := e.Value(next, s.Y1)
		if v >= 0 && v <= e.Accuracy {
			return true, true
		}
		past = past || v >= 0
		z.take(next, v-goal, v >= 0)
		switch {
		case k == 0:
			next -= (v - goal) / g.eventRate(e)
		case k < secants:
			next = z.secant()
		default:
			next = z.cut()
		}
		if !(next > z.low && next < z.high) {
			next = 0.5 * (z.low + z.high)
		}
		if !(next > z.low && next < z.high) {
			break // the two are neighbours
		}
	}
	if past && s.End != z.high {
		ok = g.stepper.Try(z.high)
		return ok, ok
	}
	return past, true
}

// A bracket holds a zero between two places, with the values there and at the two places tried last.
type bracket struct {
	low, high   float64
	under, over float64
	x, y        [2]float64
	side        int
}

// take takes in the value y at x, which is past the zero or before it. When one end stays twice in a row its value
// counts half (the Illinois rule; Dowell and Jarratt, BIT 11 (1971) 168).
func (z *bracket) take(x, y float64, past bool) {
	z.x, z.y = [2]float64{z.x[1], x}, [2]float64{z.y[1], y}
	side := -1
	if past {
		side = 1
	}
	switch {
	case past && z.side == side:
		z.under /= 2
	case z.side == side:
		z.over /= 2
	}
	if z.side = side; past {
		z.high, z.over = x, y
	} else {
		z.low, z.under = x, y
	}
}

// secant returns where the line through the two places tried last is zero.
func (z *bracket) secant() float64 {
	return z.x[1] - z.y[1]*(z.x[1]-z.x[0])/(z.y[1]-z.y[0])
}

// cut returns where the line through the two ends is zero. It serves where the value breaks its slope at the zero,
// which leads the secant astray.
func (z *bracket) cut() float64 {
	return z.low + (z.high-z.low)*z.under/(z.under-z.over)
}

// eventRate returns the slope in time of the event's value at the end of the tried step, by its dense output.
func (g *Integrator) eventRate(e *Event) float64 {
	s := g.stepper.Step()
	g.stepper.Dense(g.dense)
	end := e.Value(s.End, s.Y1)
	return (end - e.Value(s.T+(1-back)*s.H, g.probe(s, 1-back))) / (back * s.H)
}

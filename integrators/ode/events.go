package ode

import "math"

// An Event is a value whose passing from below zero to zero or above ends a run.
type Event struct {
	Name     string
	Value    func(t float64, y []float64) float64
	Accuracy float64 // the value may be this far past zero when the run ends
}

const (
	looks    = 10 // points of the dense output at which events are tested within a step
	landings = 8  // step attempts to land on an event before the last one is taken
)

// crossing returns the earliest place within the accepted-to-be step at which an event has passed zero: a
// bracket in θ and the event's index, or -1.
func (g *Integrator) crossing(s *Step, events []Event) (low, high float64, which int) {
	g.stepper.Dense(g.dense)
	for k := range g.before {
		g.before[k] = events[k].Value(s.T, s.Y0)
	}
	last := 0.0
	for j := 1; j <= looks; j++ {
		theta := float64(j) / looks
		y := g.probe(s, theta)
		which = -1
		for k := range events {
			v := events[k].Value(s.T+theta*s.H, y)
			if g.before[k] < 0 && v >= 0 && which < 0 {
				which = k
			}
			g.after[k] = v
		}
		if which >= 0 {
			return g.earliest(s, events, last, theta)
		}
		copy(g.before, g.after)
		last = theta
	}
	return 0, 0, -1
}

// earliest halves the interval between two looks until it separates one event from the others or is
// narrow, and returns the bracket of the first one to pass.
func (g *Integrator) earliest(s *Step, events []Event, low, high float64) (float64, float64, int) {
	which := -1
	for range 60 {
		mid := 0.5 * (low + high)
		y := g.probe(s, mid)
		passed := -1
		for k := range events {
			if g.before[k] < 0 && events[k].Value(s.T+mid*s.H, y) >= 0 {
				passed = k
				break
			}
		}
		if passed >= 0 {
			high, which = mid, passed
		} else {
			low = mid
		}
		if high-low < 1e-14 {
			break
		}
	}
	if which < 0 { // it passes at the upper end itself
		y := g.probe(s, high)
		for k := range events {
			if g.before[k] < 0 && events[k].Value(s.T+high*s.H, y) >= 0 {
				which = k
				break
			}
		}
	}
	return low, high, which
}

// probe returns the dense output at θ; at the ends the states of the step themselves.
func (g *Integrator) probe(s *Step, theta float64) []float64 {
	if theta == 1 {
		return s.Y1
	}
	n := g.problem.N
	for i := range g.point {
		g.point[i] = Eval(g.dense, n, i, theta)
	}
	return g.point
}

// land takes the step again so that it ends just past the event: the dense output says about where, and
// tries of the method itself say exactly. It reports false if a try failed.
func (g *Integrator) land(t, low, high, h float64, e Event) bool {
	short, long := low*h, h // the event lies between these lengths
	gShort := math.NaN()
	next := high * h
	for k := 0; k < landings; k++ {
		if !g.stepper.Try(next) {
			return false
		}
		v := e.Value(t+next, g.stepper.Step().Y1)
		if v >= 0 && v <= e.Accuracy {
			return true
		}
		if v < 0 {
			short, gShort = next, v
			rate := g.eventRate(e, t, next)
			step := (0.5*e.Accuracy - v) / rate
			if !(rate > 0) || next+step >= long {
				step = 0.5 * (long - next)
			}
			next += step
			continue
		}
		long = next
		if math.IsNaN(gShort) || !(v > gShort) {
			next = 0.5 * (short + long)
			if rate := g.eventRate(e, t, long); rate > 0 {
				next = math.Max(short, long-(v-0.5*e.Accuracy)/rate)
			}
			continue
		}
		next = short + (long-short)*(0.5*e.Accuracy-gShort)/(v-gShort)
	}
	if e.Value(t+next, g.stepper.Step().Y1) >= 0 {
		return true
	}
	return g.stepper.Try(long)
}

// eventRate returns the slope in time of the event's value at the end of the tried step, from its dense
// output.
func (g *Integrator) eventRate(e Event, t, h float64) float64 {
	g.stepper.Dense(g.dense)
	const back = 1e-3
	end := e.Value(t+h, g.stepper.Step().Y1)
	return (end - e.Value(t+(1-back)*h, g.probe(g.stepper.Step(), 1-back))) / (back * h)
}

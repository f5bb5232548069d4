package network

import (
	"context"
	"math"
	"slices"

	"workheat/integrators/ode"
	"workheat/network/element"
)

// A jumper is a node whose heat capacity jumps, as at a latent heat. Where its stored energy passes such a place its
// temperature breaks its slope, and a step across would err by more than its estimate says.
type jumper struct {
	state int
	at    []float64 // J, the states at the jumps, rising
	scale float64   // J/K, its least capacity
}

// leastJump is the part of the capacity by which it must jump to end a step: what a smaller one bends within a
// step stays below the tolerance. The steel of EN 1993-1-2 jumps by a two-thousandth.
const leastJump = 0.01

// jumpers lists the nodes whose capacity jumps.
func (m *Model) jumpers() []jumper {
	var list []jumper
	for i, n := range m.Net.Nodes {
		if n.Form != element.Stored {
			continue
		}
		x, c := n.Capacity.X, n.Capacity.Y
		j := jumper{state: i, scale: slices.Min(c)}
		for k := 1; k < len(x); k++ {
			if x[k] == x[k-1] && math.Abs(c[k]-c[k-1]) > leastJump*math.Min(c[k], c[k-1]) {
				j.at = append(j.at, m.system.Energy(i, x[k]))
			}
		}
		if j.at != nil {
			list = append(list, j)
		}
	}
	return list
}

// appendEvents appends the events that the state, now y, passes the nearest jump below and above.
func (j *jumper) appendEvents(events []ode.Event, y, accuracy float64) []ode.Event {
	above := len(j.at)
	for above > 0 && j.at[above-1] > y {
		above--
	}
	if above > 0 {
		events = append(events, j.event(-1, j.at[above-1], accuracy))
	}
	if above < len(j.at) {
		events = append(events, j.event(1, j.at[above], accuracy))
	}
	return events
}

// event returns the event that the state passes u, upwards if sign is 1 and downwards if it is -1.
func (j *jumper) event(sign, u, accuracy float64) ode.Event {
	state, scale := j.state, j.scale
	value := func(_ float64, y []float64) float64 { return sign * (y[state] - u) / scale }
	return ode.Event{Name: "jump of a heat capacity", Value: value, Accuracy: accuracy, Coarse: true}
}

// advance runs to the end of a segment or to one of the events, and ends a step wherever a heat capacity jumps.
func (r *runner) advance(ctx context.Context, end, first float64, events []ode.Event) ode.Stop {
	if r.jumpers == nil {
		return r.integ.Run(ctx, end, first, events, r.observe)
	}
	began := 0.0
	for {
		all := slices.Clone(events)
		for i := range r.jumpers {
			j := &r.jumpers[i]
			all = j.appendEvents(all, r.integ.State()[j.state], r.result.Abs)
		}
		stop := r.integ.Run(ctx, end, first, all, r.observe)
		if began == 0 {
			began = stop.First
		}
		if stop.Reason != ode.Passed || stop.Event < len(events) {
			stop.First = began
			return stop
		}
		if stop.T >= end {
			return ode.Stop{Reason: ode.Reached, T: stop.T, First: began}
		}
		first = 0 // the slope has changed: guess anew
	}
}

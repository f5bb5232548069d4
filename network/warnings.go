package network

import (
	"math"
	"slices"

	"workheat/integrators/ode"
	"workheat/network/duty"
	"workheat/network/record"
	"workheat/network/unit"
)

// rangeWarnings looks, at the end of every step, for laws used outside their range, and for materials.
func (r *runner) rangeWarnings() {
	r.lawWarnings()
	for j, i := range r.model.Net.Order {
		r.materialWarning(i, r.result.Summary[j])
		r.heatWarning(r.result.Summary[j])
	}
}

// hottest [K] is above what any solid known to date stands: hafnium carbonitride melts near 4300 K (from memory).
const hottest = 4300

// heatWarning says when a node has become hotter than any part can be.
func (r *runner) heatWarning(s record.Summary) {
	if s.Highest > hottest {
		r.warn("%s: no solid stands %s: check powers, masses, conductances and their units", s.Name, unit.Temperature.Format(s.Highest, 4))
	}
}

// A delay is how late the legs of one label began, because what comes before takes longer than its interval.
type delay struct {
	label string
	times int
	most  float64 // s
}

// late takes note of a leg that begins late.
func (r *runner) late(leg *duty.Leg) {
	i := slices.IndexFunc(r.delays, func(d delay) bool { return d.label == leg.Label })
	if i < 0 {
		i = len(r.delays)
		r.delays = append(r.delays, delay{label: leg.Label})
	}
	d := &r.delays[i]
	d.times++
	d.most = math.Max(d.most, leg.Late)
}

// lateWarnings says once for each label how often and how much its legs were late: a round may be late by
// another amount each time.
func (r *runner) lateWarnings() {
	for _, d := range r.delays {
		r.warn("%s began late %d times, by up to %.3g s: what comes before takes longer than its interval", d.label, d.times, d.most)
	}
}

// legWarnings says when a leg did not do what its author surely meant; brake is the work [J] that the
// brakes took in it.
func (r *runner) legWarnings(leg *duty.Leg, reason ode.Reason, brake float64) {
	if leg.Brakes && reason == ode.Reached && brake == 0 {
		r.warn("%s: the road and the air alone slow the vehicle as much as asked, so the brakes took no work", leg.Label)
	}
	u := leg.Until
	if u == nil {
		return
	}
	name, mark := r.model.Net.Nodes[u.Node].Name, unit.Temperature.Format(u.Temperature, 4)
	switch {
	case reason == ode.Reached && leg.Longest:
		r.warn("%s: the longest time passed before %s came to %s", leg.Label, name, mark)
	case reason == ode.Passed && r.t == leg.Start:
		r.warn("%s took no time: %s had passed %s before it began", leg.Label, name, mark)
	}
}

// lawWarnings warns once for each path and text.
func (r *runner) lawWarnings() {
	tape, sys := r.result.Tape, r.model.system
	y := make([]float64, tape.States())
	type fault struct {
		path int
		text string
	}
	seen := map[fault]bool{}
	at, entered := 0.0, -1
	report := func(path int, text string) {
		if f := (fault{path, text}); !seen[f] {
			seen[f] = true
			r.warn("%s: %s, first at %.4g s", sys.Paths[path].Element, text, at)
		}
	}
	watch := sys.Watch(report)
	if watch == nil {
		return
	}
	for k := 0; k < tape.Steps(); k++ {
		start, h, segment, coef := tape.Step(k)
		for i := range y {
			y[i] = tape.Value(coef, i, 1)
		}
		if segment != entered {
			r.result.enter(segment)
			entered = segment
		}
		at = start + h
		watch(sys.State(at, y, nil))
	}
}

// materialWarning says when a node has left the range of its material's data.
func (r *runner) materialWarning(i int, s record.Summary) {
	m := r.model.Net.Material[i]
	if m == nil || m.Capacity == nil {
		return
	}
	const slack = 20 // K below the range that the end value surely serves
	if s.Highest > m.High {
		r.warn("%s: the heat capacity of %s is known up to %s; above it the end value %.4g J/(kg K) was used", s.Name, m.Name,
			unit.Temperature.Format(m.High, 4), m.Capacity.At(m.High))
	}
	if low := math.Min(s.Start, s.End); low < m.Low-slack {
		r.warn("%s: the heat capacity of %s is known from %s; below it the end value %.4g J/(kg K) was used", s.Name, m.Name,
			unit.Temperature.Format(m.Low, 4), m.Capacity.At(m.Low))
	}
}

package network

import (
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/energy"
)

// book makes the energy book of the run: it hands the recount the laws one flow at a time, the recorded
// solution and the duty as it was run, and nothing of how the equations were solved.
func (r *runner) book() *energy.Book {
	res, sys := r.result, r.model.system
	run := &energy.Run{
		Tape: res.Tape, Legs: r.legs, Tables: r.model.Net.Tables, Rel: res.Rel, Abs: res.Abs,
		NumSignals: r.model.signals.Count(), Flow: sys.Recount, Expected: map[string]float64{},
	}
	for i, n := range r.model.Net.Nodes {
		node := energy.Node{Name: n.Name, State: res.Nodes[i].State, Capacity: n.Capacity, Start: n.Start, Signal: n.Signal}
		if node.State >= 0 {
			node.EndState = r.y[i]
			node.EndTemp = sys.Temperature(i, r.y[i])
		}
		run.Nodes = append(run.Nodes, node)
	}
	quad, comp := r.integ.Quadratures(), r.integ.Compensation()
	for i := range sys.Paths {
		p := &sys.Paths[i]
		kind := sys.Groups[p.Group].Kind
		run.Paths = append(run.Paths, energy.Path{
			Element: p.Element, Path: p.Name, Kind: kind.Name, Section: kind.Section, From: p.A, To: p.B, Deps: p.Deps,
			Total: quad[i] + comp[i], Meter: meter(p.Path),
		})
	}
	r.handSignals(run)
	r.handVehicle(run)
	return energy.Make(run)
}

// handSignals gives the book the signals and the slopes of any recorded segment.
func (r *runner) handSignals(run *energy.Run) {
	signals := duty.NewSignals(r.model.Net.Tables) // its own: the run's stay where they are
	at := -1
	run.Signals = func(segment int, t float64, value, rate []float64) {
		if segment != at {
			m := r.result.motions[segment]
			signals.Enter(m.start, m.end, m.plan)
			at = segment
		}
		signals.At(t, value, rate)
	}
	run.Slopes = func(segment int, t float64, y []float64) ([][]float64, []float64) {
		r.result.enter(segment)
		return r.model.system.PathSlopes(t, y)
	}
}

// handVehicle gives the book the vehicle's own account, and from it the work due to each dissipator.
func (r *runner) handVehicle(run *energy.Run) {
	if r.model.Net.Body == "" {
		return
	}
	a := r.account
	run.Vehicle = &energy.VehicleLine{
		Name: r.model.Net.Body, Distance: a.Distance, Drive: a.Drive, Kinetic: a.Kinetic,
		Climb: a.Climb, Rolling: a.Rolling, Air: a.Air, Brake: a.Brake,
	}
	for _, g := range r.model.Net.Groups {
		if g.Kind.Section != element.Dissipators {
			continue
		}
		for _, d := range g.Elements {
			if d.Has("part of braking") {
				work := d.Number("part of braking") * a.Brake
				run.Expected[d.Name] = work
				run.Vehicle.Modelled += work
			}
		}
	}
}

package network

import (
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/energy"
)

// evidence is what the energy book is made from: the laws one flow at a time, the recorded solution and the
// duty as it was run, and nothing of how the equations were solved.
func (r *runner) evidence() *energy.Run {
	res, sys := r.result, r.model.system
	run := &energy.Run{
		Tape: res.Tape, Legs: r.legs, Tables: r.model.Net.Tables, Rel: res.Rel, Abs: res.Abs, FirstTable: duty.FirstTable,
		NumSignals: r.model.signals.Count(), Flow: sys.Recount, Expected: map[string]float64{},
	}
	for i, n := range r.model.Net.Nodes {
		node := energy.Node{Name: n.Name, State: res.Nodes[i].State, Capacity: n.Capacity, Start: n.Start, Signal: n.Signal}
		if node.State >= 0 {
			node.EndState = r.y[i]
			node.Reported = res.Nodes[i].Temperature
		}
		run.Nodes = append(run.Nodes, node)
	}
	for j, i := range r.model.Net.Order {
		run.Nodes[i].Highest, run.Nodes[i].When = res.Summary[j].Highest, res.Summary[j].When
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
	r.handGiven(run)
	return run
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
	run.Temperatures = func(segment int, t float64, y []float64) []float64 {
		r.result.enter(segment)
		return r.model.system.State(t, y, nil).T
	}
	f, q := make([]float64, len(r.y)), make([]float64, len(run.Paths))
	a, d, ft := make([]float64, r.model.system.Pattern().NNZ()), make([]float64, len(r.y)), make([]float64, len(r.y))
	still := make([]float64, len(r.y))
	run.Slopes = func(segment int, t float64, y []float64) ([][]float64, []float64) {
		r.result.enter(segment)
		dep, _ := r.model.system.PathSlopes(t, y)
		r.system.Rates(f, q, t, y)
		r.system.Jacobian(a, d, ft, t, y)
		clear(q)
		r.system.AddSlopes(q, 0, still, 1) // the slopes by time, as the integrator has them
		return dep, q
	}
	pattern, product := r.model.system.Pattern(), make([]float64, len(r.y))
	run.Matrix = func(v []float64) (av, rate []float64) {
		for i := range product {
			product[i] = 0
			for s := pattern.RowStart[i]; s < pattern.RowStart[i+1]; s++ {
				product[i] += a[s] * v[pattern.Col[s]]
			}
		}
		return product, ft
	}
}

// handVehicle gives the book the vehicle's own account, and from it the work due to each dissipator.
func (r *runner) handVehicle(run *energy.Run) {
	if r.model.Net.Body == "" {
		return
	}
	run.Road = energy.Road{Vehicle: *r.model.Net.Duty.Vehicle, Speed: duty.SpeedSignal, Brake: duty.BrakeSignal,
		Grade: func(segment int) float64 {
			if m := r.result.motions[segment].plan; m != nil {
				return m.Grade()
			}
			return 0
		}}
	a := r.account
	run.Vehicle = &energy.VehicleLine{
		Name: r.model.Net.Body, Distance: a.Distance, Drive: a.Drive, Kinetic: a.Kinetic,
		Climb: a.Climb, Rolling: a.Rolling, Air: a.Air, Brake: a.Brake,
	}
	if a.Brake > 0 {
		run.Torqued = a.Torqued / a.Brake
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

// handGiven gives the book the sources whose power is known over time.
func (r *runner) handGiven(run *energy.Run) {
	for _, g := range r.model.Net.Groups {
		if g.Kind.Section != element.Sources {
			continue
		}
		for _, d := range g.Elements {
			if signal := d.Signal("power"); signal >= duty.FirstTable {
				run.Given = append(run.Given, energy.Given{
					Element: d.Name, Power: r.model.Net.Tables[signal-duty.FirstTable], Factor: d.Number("factor"),
				})
			}
		}
	}
}

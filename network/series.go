package network

import (
	"math"

	"workheat/network/duty"
	"workheat/network/record"
	"workheat/network/unit"
)

// Series samples the run every interval [s], which must be positive, and at its end: temperatures of all nodes in the order of the
// netlist, then speed and braking power if something moves, then the heat flow of every path.
func (res *Result) Series(interval float64) *record.Series {
	s := &record.Series{Segments: res.Segments}
	n := int(math.Floor(res.End/interval*(1+1e-12))) + 1
	for k := range n {
		s.Time = append(s.Time, math.Min(float64(k)*interval, res.End))
	}
	if last := s.Time[n-1]; res.End-last > 1e-9*res.End {
		s.Time = append(s.Time, res.End)
	}
	order := res.Model.Net.Order
	column := func(name string, g record.Group, want unit.Want) *record.Column {
		s.Columns = append(s.Columns, record.Column{Name: name, Group: g, Want: want, Values: make([]float64, len(s.Time))})
		return &s.Columns[len(s.Columns)-1]
	}
	for _, i := range order {
		column(res.Nodes[i].Name, record.Temperatures, unit.Temperature).Limits = res.Nodes[i].Limits
	}
	if body := res.Model.Net.Body; body != "" {
		column("speed of "+body, record.Vehicle, unit.RoadSpeed)
		column("braking power of "+body, record.Vehicle, unit.Power)
	}
	flows := len(s.Columns)
	sys := res.Model.system
	for i := range sys.Paths {
		if !meter(sys.Paths[i].Path) {
			column(res.Model.pathName(&sys.Paths[i]), record.Flows, unit.Power)
		}
	}
	res.fill(s, flows)
	return s
}

// fill evaluates every sample.
func (res *Result) fill(s *record.Series, firstFlow int) {
	if res.Tape.Steps() == 0 {
		return
	}
	sys, order := res.Model.system, res.Model.Net.Order
	y, q := make([]float64, res.Tape.States()), make([]float64, len(sys.Paths))
	at := -1
	for k, t := range s.Time {
		step, theta := res.Tape.Find(t)
		_, _, segment, coef := res.Tape.Step(step)
		for i := range y {
			y[i] = res.Tape.Value(coef, i, theta)
		}
		if segment != at {
			res.enter(segment)
			at = segment
		}
		state := sys.State(t, y, q)
		for c, i := range order {
			s.Columns[c].Values[k] = state.T[i]
		}
		if res.Model.Net.Body != "" {
			s.Columns[len(order)].Values[k] = state.Signal[duty.SpeedSignal]
			s.Columns[len(order)+1].Values[k] = state.Signal[duty.BrakeSignal]
		}
		c := firstFlow
		for i := range sys.Paths {
			if !meter(sys.Paths[i].Path) {
				s.Columns[c].Values[k] = q[i]
				c++
			}
		}
	}
}

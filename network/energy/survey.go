package energy

import (
	"math"
	"sort"
)

const (
	roundOff  = 1e-11   // share of the energy moved that the ledger may miss: above roundings, far below errors of a law
	epsilon   = 0x1p-52 // relative spacing of float64
	alike     = 1e-6    // K, difference of temperatures that are computed in two ways from the same state
	looksMost = 40      // steps that the survey looks at
)

// A survey is a first look at the recorded solution: how much has moved, how stiff the paths are, and at
// which steps the equations are worth questioning.
type survey struct {
	steps    []int   // to be looked at, rising
	swing    float64 // J, the largest stored gains or losses of all nodes together
	softness float64 // J/K, energy that all nodes shift when every temperature is off
	strain   float64 // J, energy that the paths carry over the run when every temperature is off by its tolerance
	flowing  float64 // J, what round-off of the temperatures lets the paths carry unseen
	rounding float64 // J, the same with the round-off of the end temperatures
}

// survey looks over the run.
func (w *witness) survey() *survey {
	s := &survey{}
	s.spread(w.run)
	reach := s.extremes(w)
	s.stiffness(w, reach)
	w.slight = w.run.Rel * s.swing / float64(w.run.Tape.Steps()) // together a tenth of what the recount may miss
	return s
}

// extremes finds the swing of every node, and marks the steps after which its state was highest and lowest. It
// returns by node how far its temperature went [K].
func (s *survey) extremes(w *witness) (reach []float64) {
	tape := w.run.Tape
	reach = make([]float64, len(w.run.Nodes))
	for i := range w.run.Nodes {
		n := &w.run.Nodes[i]
		if n.State < 0 {
			continue
		}
		high, low, atHigh, atLow := math.Inf(-1), math.Inf(1), 0, 0
		for k := range tape.Steps() {
			_, _, _, coef := tape.Step(k)
			y := coef[n.State] // the state at the start of the step
			if y > high {
				high, atHigh = y, k
			}
			if y < low {
				low, atLow = y, k
			}
		}
		if n.Capacity != nil {
			s.swing += math.Max(math.Max(high, -low), abs(n.EndState))
		}
		reach[i] = w.temperature(i, high) - w.temperature(i, low)
		s.mark(atHigh)
		s.mark(atLow)
	}
	return reach
}

// spread marks steps spread over the run, and two in the first leg of every label, so that every sort of drive
// is among them.
func (s *survey) spread(r *Run) {
	const even = 16
	n := r.Tape.Steps()
	for j := range min(even, n) {
		s.mark(j * n / min(even, n))
	}
	seen := map[string]bool{}
	for _, l := range r.Legs {
		if !(l.End > l.Start) || seen[l.Label] {
			continue
		}
		seen[l.Label] = true
		for _, part := range [...]float64{0.25, 0.75} {
			k, _ := r.Tape.Find(l.Start + part*(l.End-l.Start))
			s.mark(k)
		}
	}
	s.mark(n - 1)
}

// mark adds a step to those to be looked at.
func (s *survey) mark(k int) {
	i := sort.SearchInts(s.steps, k)
	if i < len(s.steps) && s.steps[i] == k || len(s.steps) >= looksMost {
		return
	}
	s.steps = append(s.steps, 0)
	copy(s.steps[i+1:], s.steps[i:])
	s.steps[i] = k
}

// stiffness finds how much heat the paths carry for a change of temperature: what a temperature's own
// round-off makes of it cannot be told from nothing. The slopes are the equations' own; too large ones would
// widen what is allowed, and fail the check of slopes.
func (s *survey) stiffness(w *witness, reach []float64) {
	r := w.run
	y, hot := make([]float64, r.Tape.States()), 0.0
	node := make([]float64, len(r.Nodes)) // W/K, the largest
	now := make([]float64, len(r.Nodes))
	for _, k := range s.steps {
		start, h, segment, coef := r.Tape.Step(k)
		for i := range y {
			y[i] = r.Tape.Value(coef, i, 0.5)
		}
		dep, _ := r.Slopes(segment, start+0.5*h, y)
		w.at(start+0.5*h, 0.5, segment, coef)
		clear(now)
		for p := range r.Paths {
			for j, i := range r.Paths[p].Deps {
				now[i] += abs(dep[p][j])
			}
		}
		for i := range node {
			node[i] = math.Max(node[i], now[i])
			hot = math.Max(hot, w.state.T[i])
		}
	}
	w.stiff = node
	for i, n := range r.Nodes {
		carried := node[i] * r.Tape.End() // J/K
		s.strain += (r.Abs + r.Rel*reach[i]) * carried
		s.flowing += epsilon * hot * carried
		s.rounding += 4 * epsilon * hot * carried
		if n.Capacity != nil {
			c := w.stores[i].value(n.Reported(n.EndState))
			s.softness += math.Min(c, carried)
			s.rounding += 4 * epsilon * hot * c
		}
	}
}

// checkTemperatures compares, at the steps of the survey, the temperatures that the equations used and
// those that the run reports with the witness's own.
func (s *survey) checkTemperatures(w *witness) Check {
	c := Check{Layer: 2, Name: "temperatures", Unit: "K", Allowed: alike,
		About: "temperatures that the equations used and that are reported, against the states by the material tables " +
			"and the tables in time"}
	r := w.run
	y := make([]float64, r.Tape.States())
	for _, k := range s.steps {
		start, h, segment, coef := r.Tape.Step(k)
		for _, theta := range [...]float64{0, 0.5} {
			for i := range y {
				y[i] = r.Tape.Value(coef, i, theta)
			}
			t := start + theta*h
			if theta == 0 { // a table may jump there: tell its side from within
				t = start + 1e-6*h
			}
			w.at(t, theta, segment, coef)
			for i, x := range r.Temperatures(segment, t, y) {
				n := &r.Nodes[i]
				c.worst(abs(x-w.state.T[i]), n.Name)
				if n.State >= 0 {
					c.worst(abs(n.Reported(y[n.State])-w.state.T[i]), n.Name)
				}
			}
		}
	}
	c.close()
	return c
}

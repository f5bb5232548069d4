package energy

import (
	"sort"

	"workheat/network/element"
)

// A witness sees the recorded solution: temperatures from the recorded states by stores of its own, tables
// in time read by itself, and nothing from the equations that were solved.
type witness struct {
	run    *Run
	stores []*store
	tables []*store // over time
	state  element.State
	stiff  []float64 // W/K by node, the largest slope of all its flows together
	cuts   []float64 // places within a step, for the recount
	bends  float64   // J, what corners within steps may have bent the recorded solution by
	slight float64   // J, bends so small that a step need not be cut there
}

func newWitness(r *Run) *witness {
	w := &witness{run: r, stores: make([]*store, len(r.Nodes)), tables: make([]*store, len(r.Tables))}
	for i, n := range r.Nodes {
		if n.Capacity != nil {
			w.stores[i] = newStore(n.Capacity, n.Start)
		}
	}
	for i, c := range r.Tables {
		w.tables[i] = newStore(c, 0)
	}
	w.state = element.State{
		T: make([]float64, len(r.Nodes)), Signal: make([]float64, r.NumSignals), Rate: make([]float64, r.NumSignals),
	}
	return w
}

// at sets the state at θ of a step, which is at time t.
func (w *witness) at(t, theta float64, segment int, coef []float64) {
	w.signals(t, segment)
	for i := range w.run.Nodes {
		if n := &w.run.Nodes[i]; n.State >= 0 {
			w.state.T[i] = w.temperature(i, w.run.Tape.Value(coef, n.State, theta))
		}
	}
}

// signals sets the signals at a time, and the held temperatures, which are among them.
func (w *witness) signals(t float64, segment int) {
	r := w.run
	r.Signals(segment, t, w.state.Signal, w.state.Rate)
	for i, table := range w.tables {
		w.state.Signal[r.FirstTable+i] = table.value(t)
	}
	for i := range r.Nodes {
		if n := &r.Nodes[i]; n.State < 0 {
			w.state.T[i] = w.state.Signal[n.Signal]
		}
	}
}

// temperature returns the temperature of node i at a state value.
func (w *witness) temperature(i int, y float64) float64 {
	if w.stores[i] == nil {
		return y
	}
	return w.stores[i].temperature(y)
}

// split returns the places within a step of length h, 0 and 1 among them, between which the temperature of
// every node is a smooth function of time: where the energy of a node passes a corner of its capacity, T(u)
// breaks its slope, and a quadrature across it would err by more than the solution does.
func (w *witness) split(coef []float64, h float64) []float64 {
	const looks = 4
	w.cuts = append(w.cuts[:0], 0, 1)
	for i, s := range w.stores {
		if s == nil || len(s.x) == 1 {
			continue
		}
		n, tape := w.run.Nodes[i].State, w.run.Tape
		first := tape.Value(coef, n, 0)
		moved := tape.Value(coef, n, 1) - first
		a, ya := 0.0, first+s.start
		for j := 1; j <= looks; j++ {
			b := float64(j) / looks
			yb := tape.Value(coef, n, b) + s.start
			for k := sort.SearchFloat64s(s.h, min(ya, yb)); k < len(s.h) && s.h[k] < max(ya, yb); k++ {
				if u := s.h[k] - s.start; min(abs(u-first), abs(u-first-moved)) <= s.landing(w.run.Abs) {
					continue // the step begins or ends there
				}
				bend := h * w.stiff[i] * abs(moved) * s.kink(k, abs(moved))
				w.bends += bend
				if bend <= w.slight {
					continue
				}
				before := func(x float64) bool { return (tape.Value(coef, n, x)+s.start < s.h[k]) == (ya < yb) }
				w.cuts = append(w.cuts, meet(a, b, before))
			}
			a, ya = b, yb
		}
	}
	if len(w.cuts) > 2 {
		sort.Float64s(w.cuts)
	}
	return w.cuts
}

// meet returns about where before(x) turns false in [a, b].
func meet(a, b float64, before func(x float64) bool) float64 {
	for range 40 {
		if m := a + (b-a)/2; before(m) {
			a = m
		} else {
			b = m
		}
	}
	return b
}

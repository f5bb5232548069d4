package energy

import (
	"workheat/network/element"
)

// Gauss-Legendre points and weights on [0, 1], four of them: exact to degree 7, while the dense output
// has degree 4. Abramowitz and Stegun, Handbook of Mathematical Functions, table 25.4, halved.
var (
	gaussPoint  = [4]float64{0.06943184420297371, 0.33000947820757187, 0.6699905217924281, 0.9305681557970263}
	gaussWeight = [4]float64{0.17392742256872692, 0.32607257743127307, 0.32607257743127307, 0.17392742256872692}
)

// A witness sees the recorded solution: temperatures from the recorded states by the recount's own stores.
type witness struct {
	run    *Run
	stores []*store
	state  element.State
}

func newWitness(r *Run) *witness {
	w := &witness{run: r, stores: make([]*store, len(r.Nodes))}
	for i, n := range r.Nodes {
		if n.Capacity != nil {
			w.stores[i] = newStore(n.Capacity, n.Start)
		}
	}
	w.state = element.State{
		T: make([]float64, len(r.Nodes)), Signal: make([]float64, r.NumSignals), Rate: make([]float64, r.NumSignals),
	}
	return w
}

// at sets the state at θ of a step.
func (w *witness) at(t, theta float64, segment int, coef []float64) {
	w.run.Signals(segment, t, w.state.Signal, w.state.Rate)
	for i, n := range w.run.Nodes {
		if n.State < 0 {
			w.state.T[i] = w.state.Signal[n.Signal]
			continue
		}
		w.state.T[i] = w.temperature(i, w.run.Tape.Value(coef, n.State, theta))
	}
}

// temperature returns the temperature of node i at a state value.
func (w *witness) temperature(i int, y float64) float64 {
	if w.stores[i] == nil {
		return y
	}
	return w.stores[i].temperature(y)
}

// recount returns the energy that each path carried by Gauss quadrature of its law over the dense output.
func recount(r *Run) []float64 {
	w := newWitness(r)
	total := make([]float64, len(r.Paths))
	comp := make([]float64, len(r.Paths))
	for k := 0; k < r.Tape.Steps(); k++ {
		start, h, segment, coef := r.Tape.Step(k)
		for g, theta := range gaussPoint {
			w.at(start+theta*h, theta, segment, coef)
			for p := range total {
				x := gaussWeight[g]*h*r.Flow(p, &w.state) - comp[p] // Kahan's compensated sum
				sum := total[p] + x
				comp[p] = (sum - total[p]) - x
				total[p] = sum
			}
		}
	}
	return total
}

// takeRecount books layer 2: for each node, the energy that its end temperature says it has gained,
// against the recounted flows.
func (b *Book) takeRecount(r *Run, totals []float64) {
	c := Check{Layer: 2, Name: "recount", Unit: "J",
		About: "each node's gain by its end temperature and material table against flows counted again from the recorded temperatures"}
	net := make([]float64, len(r.Nodes))
	for i, p := range r.Paths {
		if p.Meter {
			continue
		}
		if p.From != element.Outside {
			net[p.From] -= totals[i]
		}
		if p.To != element.Outside {
			net[p.To] += totals[i]
		}
	}
	for i, n := range r.Nodes {
		if n.State < 0 {
			continue
		}
		gain := 0.0
		if n.Capacity != nil {
			s := newStore(n.Capacity, n.Start)
			gain = s.enthalpy(n.EndTemp) - s.start
		}
		b.Nodes[i].Recount = gain - net[i]
		c.add(b.Nodes[i].Recount, n.Name)
	}
	b.IndependentGap = c.Gap
	c.Allowed = recountSlack(r) * b.scale()
	c.Passed = c.Gap <= c.Allowed
	b.Checks = append(b.Checks, c)
}

// recountSlack is the share of the book's scale that the recount may miss: ten times the relative tolerance,
// or what round-off leaves.
func recountSlack(r *Run) float64 { return max(10*r.Rel, 1e-10) }

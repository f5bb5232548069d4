package network

import (
	"fmt"
	"math"
	"strings"

	"workheat/integrators/ode"
	"workheat/network/element"
	"workheat/network/unit"
)

const (
	frozen    = 1.0 // K: a node at which the equations fail that is colder than this has met absolute zero
	mostFlows = 4   // flows of a node that are told
	quick     = 10  // a node whose time constant is less than so many failed steps is too quick for the clock
)

// explain says in the words of the network why the numbers failed at a state, and what can be done about it, where
// that can be told from the node that held the step back.
func (r *runner) explain(f *ode.Failure, y []float64) {
	q := make([]float64, len(r.model.system.Paths))
	temps := append([]float64(nil), r.model.system.State(f.T, y, q).T...)
	for _, w := range f.Worst {
		i := r.nodeNamed(w.Name)
		n := r.model.Net.Nodes[i]
		switch {
		case temps[i] < frozen:
			f.Text = fmt.Sprintf("%s has cooled to absolute zero (%s)", n.Name, r.flowsOf(i, q))
			f.Help = "let the heat that is taken out fall with the temperature: a held node behind a conductance, or a table that ends it"
		case n.Form == element.Massless && !r.anchored(i, f.T, y):
			f.Text = fmt.Sprintf("%s has no mass and nothing sets its temperature: no path with a conductance above zero leads to a node that stores or is held (%s)",
				n.Name, r.flowsOf(i, q))
			f.Help = fmt.Sprintf("give a path of %s a conductance that is never zero, such as a film at rest (\"still\" or \"coefficient\"), or the node a heat capacity", n.Name)
		case n.Form == element.Massless && f.H == 0:
			f.Text = fmt.Sprintf("no temperature above absolute zero balances %s, which has no mass (%s)", n.Name, r.flowsOf(i, q))
			f.Help = fmt.Sprintf("check the heat that is put into %s or taken from it, or give it a heat capacity", n.Name)
		case n.Form == element.Stored && r.tooQuick(i, f, y):
			f.Help = fmt.Sprintf("%s follows its neighbours within %s, which a clock at %s cannot tell: make it \"massless\"",
				n.Name, unit.Time.Format(r.pace(i, f.T, y), 2), unit.Time.Format(f.T, 3))
			return
		default:
			continue
		}
		f.Worst = nil // errors without a meaning
		return
	}
}

// nodeNamed returns the node of that name; a failure names no other.
func (r *runner) nodeNamed(name string) int {
	for i := range r.model.Net.Nodes {
		if r.model.Net.Nodes[i].Name == name {
			return i
		}
	}
	panic("network: a failure names an unknown node")
}

// flowsOf lists what the paths of a node bring to it [W].
func (r *runner) flowsOf(i int, q []float64) string {
	var list []string
	for k := range r.model.system.Paths {
		p := &r.model.system.Paths[k]
		if p.A != i && p.B != i {
			continue
		}
		if len(list) == mostFlows {
			list = append(list, "...")
			break
		}
		flow := q[k]
		if p.A == i {
			flow = 0 - flow // not a negative zero
		}
		list = append(list, fmt.Sprintf("%q brings %.4g W", p.Element, flow))
	}
	return strings.Join(list, ", ")
}

// anchored reports whether a node without mass reaches, by paths whose flow depends on the temperature of both of
// their ends, a node that stores heat or is held.
func (r *runner) anchored(start int, t float64, y []float64) bool {
	dep, _ := r.model.system.PathSlopes(t, y)
	seen, ahead := map[int]bool{start: true}, []int{start}
	for len(ahead) > 0 {
		i := ahead[len(ahead)-1]
		ahead = ahead[:len(ahead)-1]
		if r.model.Net.Nodes[i].Form != element.Massless {
			return true
		}
		for k := range r.model.system.Paths {
			p := &r.model.system.Paths[k]
			other := p.A + p.B - i
			if p.A != i && p.B != i || p.A == element.Outside || p.B == element.Outside || seen[other] || steepest(dep[k]) == 0 {
				continue
			}
			seen[other] = true
			ahead = append(ahead, other)
		}
	}
	return false
}

// steepest returns the largest of some slopes, without sign.
func steepest(slopes []float64) float64 {
	most := 0.0
	for _, x := range slopes {
		most = math.Max(most, math.Abs(x))
	}
	return most
}

// pace returns the time constant [s] of a node whose neighbours stand still.
func (r *runner) pace(i int, t float64, y []float64) float64 {
	dep, _ := r.model.system.PathSlopes(t, y)
	sum := 0.0
	for k := range r.model.system.Paths {
		for j, node := range r.model.system.Paths[k].Deps {
			if node == i {
				sum += math.Abs(dep[k][j])
			}
		}
	}
	return r.model.system.CapacityAt(i, r.model.system.Temperature(i, y[i])) / sum
}

// tooQuick reports whether a node's time constant is too short for the step at which the numbers failed.
func (r *runner) tooQuick(i int, f *ode.Failure, y []float64) bool {
	return f.H > 0 && r.pace(i, f.T, y) < quick*f.H
}

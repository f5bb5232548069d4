package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/element"
)

// checkNetwork looks for what only shows when the whole network is known: nodes that nothing reaches,
// islands, massless nodes that hang in the air. When an element could not be placed these cannot be told.
func (r *reader) checkNetwork(root object) {
	if r.noNodes || r.torn || r.full() || r.noElement(root) {
		return
	}
	for _, i := range r.net.Order {
		if r.used[i] || r.full() {
			continue
		}
		name := quote(r.net.Nodes[i].Name)
		if r.net.Nodes[i].Form == element.Held {
			r.list.Warn(r.nodeSpan[i], "the held node "+name+" is used by no element", "remove it, or link it")
			continue
		}
		r.list.At(r.nodeSpan[i], "the node "+name+" is an island: no element reaches it", "link it to the network, or remove it")
	}
	groups := newUnion(len(r.net.Nodes))
	for _, l := range r.links {
		groups.join(l[0], l[1])
	}
	r.islands(groups)
	r.hanging(groups)
}

// A union is a set of disjoint groups of nodes.
type union []int

func newUnion(n int) union {
	u := make(union, n)
	for i := range u {
		u[i] = i
	}
	return u
}

func (u union) root(i int) int {
	for u[i] != i {
		u[i] = u[u[i]]
		i = u[i]
	}
	return i
}

func (u union) join(a, b int) {
	a, b = u.root(a), u.root(b)
	u[max(a, b)] = min(a, b)
}

// islands reports groups of linked nodes in which nothing can ever happen: no heat or work comes in, no
// held node touches them, and all start at one temperature.
func (r *reader) islands(groups union) {
	n := len(r.net.Nodes)
	alive, size, start := make([]bool, n), make([]int, n), make([]float64, n)
	for i := range r.net.Nodes {
		g, t := groups.root(i), r.start(i)
		size[g]++
		if size[g] == 1 || math.IsNaN(start[g]) {
			start[g] = t
		}
		if r.fed[i] || r.net.Nodes[i].Form == element.Held || t < start[g] || t > start[g] {
			alive[g] = true
		}
	}
	for _, i := range r.net.Order {
		g := groups.root(i)
		if alive[g] || !r.used[i] || size[g] < 2 || r.full() {
			continue
		}
		alive[g] = true // one report for each island
		others := "the node linked to it"
		if size[g] > 2 {
			others = fmt.Sprintf("the %d nodes linked to it", size[g]-1)
		}
		r.list.At(r.nodeSpan[i], fmt.Sprintf("the node %s and %s are an island: no heat or work can reach or leave them", quote(r.net.Nodes[i].Name), others),
			"link them to the rest, to a held node, or to a source")
	}
}

// hanging reports massless nodes with no way to a node that has a temperature of its own: their heat
// balance says nothing about their temperature.
func (r *reader) hanging(groups union) {
	grounded := make([]bool, len(r.net.Nodes))
	for i, n := range r.net.Nodes {
		if n.Form != element.Massless {
			grounded[groups.root(i)] = true
		}
	}
	for _, i := range r.net.Order {
		if r.net.Nodes[i].Form == element.Massless && r.used[i] && !grounded[groups.root(i)] && !r.full() {
			grounded[groups.root(i)] = true // one report for each group
			r.list.At(r.nodeSpan[i], fmt.Sprintf("the massless node %s has no way to a node with a heat capacity or a held one", quote(r.net.Nodes[i].Name)),
				"its temperature would be undefined: add a conductance")
		}
	}
}

// A doubt is the place of a material whose data are not well supported.
type doubt struct {
	at diag.Span
	of *element.Material
}

// doubtful warns once for each material whose data are not well supported. When something is wrong with the
// netlist that comes first.
func (r *reader) doubtful() {
	if r.list.Failed() {
		return
	}
	seen := map[*element.Material]bool{}
	for _, d := range r.doubts {
		if !seen[d.of] {
			seen[d.of] = true
			r.list.Warn(d.at, fmt.Sprintf("the data of %s are indicative; its entry in the catalogue says why", d.of.Name), "give measured data if the margin is small")
		}
	}
}

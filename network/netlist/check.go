package netlist

import (
	"fmt"
	"math"

	"workheat/network/element"
)

// checkNetwork looks for what only shows when the whole network is known: nodes that nothing reaches,
// islands, massless nodes that hang in the air.
func (r *reader) checkNetwork() {
	n := len(r.net.Nodes)
	if n == 0 {
		return
	}
	for _, i := range r.net.Order {
		if r.used[i] {
			continue
		}
		if r.net.Nodes[i].Form == element.Held {
			r.warn(i, fmt.Sprintf("the held node %s is used by no element", quote(r.net.Nodes[i].Name)), "remove it, or link it")
			continue
		}
		r.list.At(r.nodeSpan[i], fmt.Sprintf("the node %s is an island: no element reaches it", quote(r.net.Nodes[i].Name)),
			"link it to the network, or remove it")
	}
	r.islands()
	r.hanging()
	r.doubtful()
}

func (r *reader) warn(i int, text, help string) { r.list.Warn(r.nodeSpan[i], text, help) }

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

func (u union) join(a, b int) { u[u.root(max(a, b))] = u.root(min(a, b)) }

// islands reports groups of linked nodes in which nothing can ever happen: no heat or work comes in, no
// held node touches them, and all start at one temperature.
func (r *reader) islands() {
	u := newUnion(len(r.net.Nodes))
	fed := make([]bool, len(r.net.Nodes))
	for _, e := range r.net.elements {
		for _, v := range e.d.Values {
			if len(v.Nodes) == 2 && v.Shares == nil {
				u.join(v.Nodes[0], v.Nodes[1])
				continue
			}
			for _, i := range v.Nodes {
				fed[i] = true
			}
		}
	}
	alive := map[int]bool{}
	size := map[int]int{}
	start := map[int]float64{}
	for i := range r.net.Nodes {
		g := u.root(i)
		size[g]++
		t := r.start(i)
		if first, ok := start[g]; !ok || math.IsNaN(first) {
			start[g] = t
		} else if !math.IsNaN(t) && t != first {
			alive[g] = true
		}
		if fed[i] || r.net.Nodes[i].Form == element.Held {
			alive[g] = true
		}
	}
	for _, i := range r.net.Order {
		if g := u.root(i); r.used[i] && size[g] > 1 && !alive[g] {
			alive[g] = true // one report for each island
			r.list.At(r.nodeSpan[i], fmt.Sprintf("the node %s and the %d linked to it are an island: no heat or work can reach or leave them", quote(r.net.Nodes[i].Name), size[g]-1),
				"link them to the rest, to a held node, or to a source")
		}
	}
}

// hanging reports massless nodes with no way to a node that has a temperature of its own: their heat
// balance says nothing about their temperature.
func (r *reader) hanging() {
	u := newUnion(len(r.net.Nodes))
	grounded := make([]bool, len(r.net.Nodes))
	for i, n := range r.net.Nodes {
		grounded[i] = n.Form != element.Massless
	}
	for _, e := range r.net.elements {
		for _, v := range e.d.Values {
			if len(v.Nodes) == 2 && v.Shares == nil {
				u.join(v.Nodes[0], v.Nodes[1])
			}
		}
	}
	ok := map[int]bool{}
	for i := range r.net.Nodes {
		ok[u.root(i)] = ok[u.root(i)] || grounded[i]
	}
	for _, i := range r.net.Order {
		if r.net.Nodes[i].Form == element.Massless && r.used[i] && !ok[u.root(i)] {
			r.list.At(r.nodeSpan[i], fmt.Sprintf("the massless node %s has no way to a node with a heat capacity or a held one", quote(r.net.Nodes[i].Name)),
				"its temperature would be undefined: add a conductance")
		}
	}
}

// doubtful warns once for each material whose data are not well supported.
func (r *reader) doubtful() {
	seen := map[*element.Material]bool{}
	for _, i := range r.net.Order {
		m := r.net.Material[i]
		if m == nil || seen[m] || m.Doubtful == "" {
			continue
		}
		seen[m] = true
		r.warn(i, fmt.Sprintf("the data of %s are indicative; its entry in the catalogue says why", m.Name), "where the margin is small, give a measured heat capacity")
	}
}

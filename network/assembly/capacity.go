package assembly

import (
	"math"

	"workheat/network/element"
)

// capacities turns stored energies into temperatures. Where the heat capacity C is piecewise linear in T,
// the energy is piecewise quadratic and both directions are exact: within a piece that starts at (U, T)
// with capacity C and slope s,
//
//	T(u) = T + 2e/(C + √(C² + 2se)),  e = u − U,
//
// and the root itself is the capacity at T(u). The form has no cancellation and holds for s = 0.
type capacities struct {
	fixed    []fixed    // nodes whose capacity never changes
	varying  []varying  // nodes whose capacity does
	massless []int32    // nodes whose state is their temperature
	tables   [][]corner // by node; nil unless varying
}

// A fixed node has one capacity.
type fixed struct {
	node     int32
	start, c float64
}

// A corner starts a piece of a table.
type corner struct {
	u, width float64 // energy at the start, and to the next corner
	t, c, s  float64 // temperature, capacity, slope of the capacity
}

// A varying node works on the piece in which it last was.
type varying struct {
	node  int32
	piece int32
	corner
}

func newCapacities(nodes []element.Node) capacities {
	c := capacities{tables: make([][]corner, len(nodes))}
	for i, n := range nodes {
		switch {
		case n.Form == element.Massless:
			c.massless = append(c.massless, int32(i))
		case n.Capacity.IsConstant():
			c.fixed = append(c.fixed, fixed{int32(i), n.Start, n.Capacity.Y[0]})
		default:
			c.tables[i] = table(n)
			c.varying = append(c.varying, varying{node: int32(i), piece: -1})
		}
	}
	for k := range c.varying {
		c.find(&c.varying[k], 0)
	}
	return c
}

// table lists the pieces of a node's capacity, with energies from its start temperature, so that a long
// run at small rises loses nothing to a far zero. The end values go on for ever on both sides.
func table(n element.Node) []corner {
	x, y := n.Capacity.X, n.Capacity.Y
	zero := n.Capacity.Integral(n.Start)
	first := corner{u: math.Inf(-1), width: 0, t: x[0], c: y[0]} // left as soon as e > 0
	list := []corner{first}
	for i := range x {
		u := n.Capacity.Integral(x[i]) - zero
		if i+1 == len(x) {
			list = append(list, corner{u: u, width: math.Inf(1), t: x[i], c: y[i]})
			break
		}
		if x[i+1] > x[i] {
			next := n.Capacity.Integral(x[i+1]) - zero
			list = append(list, corner{u, next - u, x[i], y[i], (y[i+1] - y[i]) / (x[i+1] - x[i])})
		}
	}
	return list
}

// find sets v to the piece that holds the energy u.
func (c *capacities) find(v *varying, u float64) {
	list := c.tables[v.node]
	low, high := 0, len(list)-1
	for low < high {
		mid := (low + high + 1) / 2
		if list[mid].u <= u {
			low = mid
		} else {
			high = mid - 1
		}
	}
	v.piece, v.corner = int32(low), list[low]
	if low == 0 { // measured from the first corner, downwards
		v.u = list[1].u
	}
}

// temperatures writes the temperatures of all states.
func (c *capacities) temperatures(t, y []float64) {
	for i := range c.fixed {
		f := &c.fixed[i]
		t[f.node] = f.start + y[f.node]/f.c
	}
	for i := range c.varying {
		v := &c.varying[i]
		e := y[v.node] - v.u
		if (e < 0 && v.piece > 0) || e > v.width {
			c.find(v, y[v.node])
			e = y[v.node] - v.u
		}
		t[v.node] = v.t + 2*e/(v.c+math.Sqrt(v.c*v.c+2*v.s*e))
	}
	for _, i := range c.massless {
		t[i] = y[i]
	}
}

// scales writes the capacities at the state, one for massless nodes.
func (c *capacities) scales(d, y []float64) {
	for i := range c.fixed {
		d[c.fixed[i].node] = c.fixed[i].c
	}
	for i := range c.varying {
		v := &c.varying[i]
		d[v.node] = math.Sqrt(v.c*v.c + 2*v.s*(y[v.node]-v.u))
	}
	for _, i := range c.massless {
		d[i] = 1
	}
}

// Temperature returns the temperature [K] of node i at the state value y.
func (s *System) Temperature(i int, y float64) float64 {
	n := s.Nodes[i]
	switch {
	case n.Form == element.Massless:
		return y
	case s.caps.tables[i] == nil:
		return n.Start + y/n.Capacity.Y[0]
	}
	v := varying{node: int32(i)}
	s.caps.find(&v, y)
	e := y - v.u
	return v.t + 2*e/(v.c+math.Sqrt(v.c*v.c+2*v.s*e))
}

// Energy returns the state value of node i at a temperature [K]: the stored energy [J] above the start,
// or for a massless node the temperature itself.
func (s *System) Energy(i int, t float64) float64 {
	n := s.Nodes[i]
	if n.Form == element.Massless {
		return t
	}
	if n.Capacity.IsConstant() {
		return n.Capacity.Y[0] * (t - n.Start)
	}
	return n.Capacity.Integral(t) - n.Capacity.Integral(n.Start)
}

// CapacityAt returns the heat capacity [J/K] of node i at a temperature, zero for a massless node.
func (s *System) CapacityAt(i int, t float64) float64 {
	if s.Nodes[i].Form != element.Stored {
		return 0
	}
	return s.Nodes[i].Capacity.At(t)
}

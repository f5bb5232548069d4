// Package assembly turns nodes and elements into one flat system of equations: a state vector, heat
// balances, slopes in a fixed sparse pattern, and the flows of all paths as quadratures.
package assembly

import (
	"workheat/integrators/ode"
	"workheat/integrators/sparse"
	"workheat/network/element"
)

// A Path is one way for heat, with the element that it belongs to.
type Path struct {
	element.Path
	Element string
	Group   int // index into the groups
	Local   int // its number within the group's batch
}

// A Drive gives the signals and their rates at a time within the current segment.
type Drive interface {
	At(t float64, value, rate []float64)
}

// A batch is one group at work.
type batch struct {
	element.Batch
	first, end    int // its paths in the list of paths, end excluded
	deps, depsEnd int // their dependencies in the list of dependencies
	stride        int // how many dependencies each of its paths has
}

// A System is the network as equations. It meets ode.System. Nodes that are not held must come first.
type System struct {
	Nodes  []element.Node
	Groups []element.Group
	Paths  []Path

	states  int // the first so many nodes carry a state
	batches []batch
	caps    capacities
	a, b    []int32 // ends of the paths; the number of nodes stands for Outside
	dep     []int32 // dependencies of all paths, batch by batch
	slotA   []int32 // where the slope by a dependency goes in the rows of the ends
	slotB   []int32

	drive  Drive
	state  element.State
	time   float64
	net    []float64 // balance of every node, the outside last
	slopes []float64 // by dependency
	rates  []float64 // by path
	moving bool      // some signal changes at the latest Jacobian
	wide   []float64 // v of AddSlopes, widened to all nodes: zero for the held ones
	values []float64 // Jacobian values with a last slot that catches what has no place

	pattern   *sparse.Pattern
	symmetric bool
}

// New assembles a network. signals is the number of signals that the drive gives.
func New(nodes []element.Node, groups []element.Group, signals int, drive Drive) *System {
	s := &System{Nodes: nodes, Groups: groups, drive: drive}
	for _, n := range nodes {
		if n.Form != element.Held {
			s.states++
		}
	}
	for i, n := range nodes {
		if (n.Form == element.Held) != (i >= s.states) {
			panic("assembly: held nodes must come last")
		}
	}
	s.caps = newCapacities(nodes[:s.states])
	s.addPaths()
	s.analyse()
	n := len(nodes)
	s.state = element.State{T: make([]float64, n), Signal: make([]float64, signals), Rate: make([]float64, signals)}
	s.net = make([]float64, n+1)
	s.wide = make([]float64, n)
	s.slopes = make([]float64, len(s.dep))
	s.rates = make([]float64, len(s.Paths))
	s.values = make([]float64, s.pattern.NNZ()+1)
	s.Restart()
	return s
}

// addPaths makes the batches and numbers the paths.
func (s *System) addPaths() {
	s.symmetric = true
	outside := int32(len(s.Nodes))
	end := func(i int) int32 {
		if i == element.Outside {
			return outside
		}
		return int32(i)
	}
	for g, group := range s.Groups {
		b := batch{Batch: group.Kind.Batch(), first: len(s.Paths), deps: len(s.dep)}
		for _, d := range group.Elements {
			for _, p := range b.Add(d) {
				s.Paths = append(s.Paths, Path{p, d.Name, g, len(s.Paths) - b.first})
				s.a, s.b = append(s.a, end(p.A)), append(s.b, end(p.B))
				for _, j := range p.Deps {
					s.dep = append(s.dep, int32(j))
				}
				b.stride = len(p.Deps)
				s.symmetric = s.symmetric && s.keepsSymmetry(&p)
			}
		}
		b.end = len(s.Paths)
		b.depsEnd = len(s.dep)
		s.batches = append(s.batches, b)
	}
}

// keepsSymmetry reports whether the slopes of a path leave the matrix symmetric: they come in equal and
// opposite pairs, or the only ones with a place in the matrix stand on its diagonal.
func (s *System) keepsSymmetry(p *element.Path) bool {
	if p.Balanced {
		return true
	}
	for _, row := range [2]int{p.A, p.B} {
		for _, col := range p.Deps {
			if row != element.Outside && row < s.states && col < s.states && row != col {
				return false
			}
		}
	}
	return true
}

// analyse lays out the pattern and the slots of every slope.
func (s *System) analyse() {
	n := int32(s.states)
	var pairs [][2]int32
	each := func(visit func(k int, row, col int32, first bool)) {
		for _, b := range s.batches {
			k := b.deps
			for p := b.first; p < b.end; p++ {
				for range b.stride {
					visit(k, s.a[p], s.dep[k], true)
					visit(k, s.b[p], s.dep[k], false)
					k++
				}
			}
		}
	}
	each(func(_ int, row, col int32, _ bool) {
		if row < n && col < n && row != col {
			pairs = append(pairs, [2]int32{row, col})
		}
	})
	s.pattern = sparse.NewPattern(s.states, pairs)
	s.slotA, s.slotB = make([]int32, len(s.dep)), make([]int32, len(s.dep))
	nowhere := int32(s.pattern.NNZ())
	each(func(k int, row, col int32, first bool) {
		slot := nowhere
		if row < n && col < n {
			slot = int32(s.pattern.Slot(int(row), int(col)))
		}
		if first {
			s.slotA[k] = slot
		} else {
			s.slotB[k] = slot
		}
	})
}

// Problem returns the system as the integrators want it.
func (s *System) Problem() *ode.Problem {
	p := &ode.Problem{
		System: s, N: s.states, NQ: len(s.Paths), Pattern: s.pattern, Symmetric: s.symmetric,
		Name: func(i int) string { return s.Nodes[i].Name },
	}
	for i, node := range s.Nodes[:s.states] {
		if node.Form == element.Massless && p.Mass == nil {
			p.Mass = make([]float64, s.states)
			for j := range p.Mass {
				p.Mass[j] = 1
			}
		}
		if node.Form == element.Massless {
			p.Mass[i] = 0
		}
	}
	return p
}

// Pattern returns the structure of the equations.
func (s *System) Pattern() *sparse.Pattern { return s.pattern }

// States returns the number of nodes that carry a state.
func (s *System) States() int { return s.states }

// Start writes the state at the start temperatures: stored energies count from there, so they are zero.
// It also forgets the pieces of the capacity tables that earlier runs were on, so that every run gives the
// same bits.
func (s *System) Start(y []float64) {
	for k := range s.caps.varying {
		s.caps.find(&s.caps.varying[k], 0)
	}
	for i, n := range s.Nodes[:s.states] {
		y[i] = 0
		if n.Form == element.Massless {
			y[i] = n.Start
		}
	}
}

package network

import (
	"workheat/integrators/ode"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/modes"
	"workheat/network/netlist"
)

// A Description is a resolved network, in SI, at the start of its duty.
type Description struct {
	Nodes    []NodeInfo
	Paths    []PathInfo
	Phases   []PhaseInfo
	States   int
	Entries  int     // of the sparse matrix
	Slowest  float64 // s, time constant; infinite when a part of the network can lose heat to nowhere
	Fastest  float64 // s
	HasModes bool    // the two were found: the network is not too large, and something in it stores heat
}

// A NodeInfo is one node in the order of the netlist.
type NodeInfo struct {
	Name     string
	Form     element.Form
	Material string
	Start    float64 // K
	Capacity float64 // J/K at the start; zero unless it stores energy
	Limits   []element.Limit
}

// A PathInfo is one path at the start of the duty.
type PathInfo struct {
	Name, Kind, From, To string  // From or To is empty for the world outside
	Work                 bool    // it is a dissipator's: work turned into heat
	Conductance          float64 // W/K, slope by the temperature of From; zero for sources
	Flow                 float64 // W
}

// A PhaseInfo is one phase of the duty with its repeats unrolled once.
type PhaseInfo struct {
	Label string
	Depth int    // how many repeats it stands in
	Words string // what it does
}

// Describe resolves the network at the state and drive at which its duty begins.
func (m *Model) Describe() *Description {
	d := &Description{States: m.system.States(), Entries: m.system.Pattern().NNZ()}
	cursor := duty.NewCursor(&m.Net.Duty)
	if leg, ok := cursor.Next(); ok {
		var plan *duty.Motion
		end := leg.End
		if len(leg.Motions) > 0 {
			plan, end = &leg.Motions[0], leg.Motions[0].T1
		}
		m.signals.Enter(0, m.signals.NextBreak(0, end), plan)
		m.system.Restart()
	}
	y, q := make([]float64, d.States), make([]float64, len(m.system.Paths))
	m.system.Start(y)
	m.settle(y)
	temps := append([]float64(nil), m.system.State(0, y, q).T...)
	dep, _ := m.system.PathSlopes(0, y)
	m.nodes(d, temps)
	m.paths(d, q, dep)
	m.modes(d, temps, y)
	m.phases(d, m.Net.Duty.Phases, 0)
	return d
}

// nodes describes the nodes at the given temperatures.
func (m *Model) nodes(d *Description, temps []float64) {
	for _, i := range m.Net.Order {
		n := m.Net.Nodes[i]
		info := NodeInfo{Name: n.Name, Form: n.Form, Start: temps[i], Limits: m.Net.Limits[i]}
		if mat := m.Net.Material[i]; mat != nil {
			info.Material = mat.Name
		}
		if n.Form == element.Stored {
			info.Capacity = m.system.CapacityAt(i, temps[i])
		}
		d.Nodes = append(d.Nodes, info)
	}
}

// paths describes the paths, meters aside, with the given flows and slopes.
func (m *Model) paths(d *Description, q []float64, dep [][]float64) {
	for i := range m.system.Paths {
		p := &m.system.Paths[i]
		if meter(p.Path) {
			continue
		}
		kind := m.system.Groups[p.Group].Kind
		info := PathInfo{Name: m.pathName(p), Kind: kind.Name, Work: kind.Section == element.Dissipators, Flow: q[i]}
		if p.A != element.Outside {
			info.From = m.Net.Nodes[p.A].Name
		}
		if p.B != element.Outside {
			info.To = m.Net.Nodes[p.B].Name
		}
		if len(dep[i]) > 0 {
			info.Conductance = dep[i][0]
		}
		d.Paths = append(d.Paths, info)
	}
}

// settle sets the temperatures of the nodes without mass to what their balances say at the start. Where they
// have no solution the first guesses stay, and a run will say why.
func (m *Model) settle(y []float64) {
	integrator := ode.New(m.system.Problem(), method, ode.Tolerance{Rel: netlist.DefaultRel, Abs: netlist.DefaultAbs})
	if integrator.Restart(0, y) == nil {
		copy(y, integrator.State())
	}
}

// modes finds the time constants at the start.
func (m *Model) modes(d *Description, temps, y []float64) {
	if d.States > modes.Most {
		return
	}
	p := m.system.Pattern()
	a, scale, ft := make([]float64, p.NNZ()), make([]float64, d.States), make([]float64, d.States)
	m.system.State(0, y, nil)
	m.system.Jacobian(a, scale, ft, 0, y)
	capacity := make([]float64, d.States)
	for i := range capacity {
		capacity[i] = m.system.CapacityAt(i, temps[i])
	}
	d.Slowest, d.Fastest, d.HasModes = modes.Constants(capacity, func(i, j int) float64 {
		if s := p.Slot(i, j); s >= 0 {
			return a[s]
		}
		return 0
	})
}

func (m *Model) phases(d *Description, list []duty.Phase, depth int) {
	name := func(i int) string { return m.Net.Nodes[i].Name }
	for i := range list {
		d.Phases = append(d.Phases, PhaseInfo{Label: list[i].Label, Depth: depth, Words: list[i].Words(name)})
		if list[i].Verb == duty.Repeat {
			m.phases(d, list[i].Phases, depth+1)
		}
	}
}

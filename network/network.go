// Package network is the front door of the network's rooms: it loads a netlist with a catalogue of kinds,
// runs its duty and returns what came of it.
package network

import (
	"fmt"

	"workheat/integrators"
	"workheat/integrators/ode"
	"workheat/network/assembly"
	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/energy"
	"workheat/network/netlist"
	"workheat/network/record"
)

// Caution is the line that goes with every result.
const Caution = "Design estimate, no proof of safety: brakes, clutches and dampers must be tested and approved " +
	"under the rules that apply where they are used, by those licensed to do so."

// A Model is a netlist that can be run. It may be run many times, by one goroutine at a time.
type Model struct {
	Net      *netlist.Netlist
	Warnings []diag.Problem // of the netlist itself
	system   *assembly.System
	signals  *duty.Signals
}

// Load reads a netlist with the kinds and materials of a catalogue. open gives the content of files that
// the netlist names, and may be nil. When the problems hold one that is not a warning, the model is nil.
func Load(src *diag.Source, cat *element.Catalogue, open netlist.Opener) (*Model, []diag.Problem) {
	net, problems := netlist.Read(src, cat, open)
	for _, p := range problems {
		if !p.Warning {
			return nil, problems
		}
	}
	m := &Model{Net: net, Warnings: problems, signals: duty.NewSignals(net.Tables)}
	m.system = assembly.New(net.Nodes, net.Groups, m.signals.Count(), m.signals)
	return m, problems
}

// The relative tolerances that can be used.
const (
	LeastRel = netlist.LeastRel
	MostRel  = netlist.MostRel
)

// Options says how to run.
type Options struct {
	// Rel and Abs [K] are the tolerance; zero: what the netlist says. A Rel without an Abs is both.
	Rel, Abs float64
	// Audit makes the energy book, layers 1 and 2.
	Audit bool
	// Tolerance adds layer 3 to the book: a second run at a tenth of the tolerance. It needs Audit.
	Tolerance bool
	// Progress, if not nil, is told the time reached [s] and the label of the leg, after each leg.
	Progress func(t float64, label string)
}

// A Result is what came of a run. Series and the functions of Nodes work on the model: they must not be called
// while it runs again.
type Result struct {
	Model       *Model
	Method      string
	Rel, Abs    float64       // tolerance: relative, and in K
	End         float64       // s, where the run ended
	Nodes       []record.Node // by node index; Model.Net.Order is that of the netlist
	Segments    []record.Segment
	Tape        *record.Tape
	Summary     []record.Summary // in the order of the netlist
	Book        *energy.Book     // nil without Options.Audit, or when no step was taken
	Stats       ode.Stats
	Warnings    []string
	Interrupted bool         // the run, or its second one at a tenth of the tolerance
	Failure     *ode.Failure // nil unless the numbers failed; what was recorded before is kept

	motions []motion // of the segments
}

// A motion is what a segment's signals followed.
type motion struct {
	start, end float64
	plan       *duty.Motion // nil: nothing moves
}

// method is the integration method in use.
var method = integrators.Default

// recordNodes describes the nodes to the record.
func (m *Model) recordNodes() []record.Node {
	nodes := make([]record.Node, len(m.Net.Nodes))
	for i, n := range m.Net.Nodes {
		nodes[i] = record.Node{Name: n.Name, State: i, Limits: m.Net.Limits[i], Start: n.Start}
		if n.Form == element.Held {
			nodes[i].State = -1
			nodes[i].Given = m.Net.Tables[n.Signal-duty.FirstTable]
			continue
		}
		nodes[i].Temperature = func(y float64) float64 { return m.system.Temperature(i, y) }
		nodes[i].Value = func(t float64) float64 { return m.system.Energy(i, t) }
	}
	return nodes
}

// pathName names a path for reports.
func (m *Model) pathName(p *assembly.Path) string {
	if p.Name == "" && p.A == element.Outside && p.B != element.Outside {
		return fmt.Sprintf("%s to %s", p.Element, m.Net.Nodes[p.B].Name)
	}
	if p.Name != "" {
		return p.Element + ", " + p.Name
	}
	return p.Element
}

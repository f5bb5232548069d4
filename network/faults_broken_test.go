package network

import (
	"context"
	"slices"
	"testing"

	"workheat/integrators/ode"
	"workheat/library"
	"workheat/network/assembly"
	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/energy"
)

// A fault is a mistake made on purpose somewhere in the program, and the checks that must see it.
type fault struct {
	name string
	// Where the mistake is made; nil where it is not.
	kind     string                                 // a kind of the catalogue,
	batch    func(b *brokenBatch)                   // whose batch is made wrong
	model    func(m *Model)                         // the loaded model
	wrap     func(s *assembly.System) *brokenSystem // the equations
	runner   func(r *runner)                        // the run
	progress func(r *runner)                        // the run, after every leg
	evidence func(run *energy.Run)                  // what the book is given
	must     []string                               // checks that must fail, as "layer name"
	may      []string                               // checks that may fail too
}

// A brokenBatch spoils what a batch computes. Functions that are nil spoil nothing.
type brokenBatch struct {
	element.Batch
	flows   func(q []float64)
	slopes  func(dep, rate []float64)
	recount func(path int, q float64) float64
}

func (b *brokenBatch) Flows(q []float64, s *element.State) {
	b.Batch.Flows(q, s)
	if b.flows != nil {
		b.flows(q)
	}
}

func (b *brokenBatch) Slopes(dep, rate []float64, s *element.State) {
	b.Batch.Slopes(dep, rate, s)
	if b.slopes != nil {
		b.slopes(dep, rate)
	}
}

func (b *brokenBatch) Recount(path int, s *element.State) float64 {
	q := b.Batch.Recount(path, s)
	if b.recount != nil {
		q = b.recount(path, q)
	}
	return q
}

// A brokenSystem spoils the equations between the network and the integrator.
type brokenSystem struct {
	*assembly.System
	rates    func(f, q []float64)
	jacobian func(a, ft []float64)
	add      func(before, dq []float64)
	old      []float64
}

func (s *brokenSystem) Rates(f, q []float64, t float64, y []float64) {
	s.System.Rates(f, q, t, y)
	if s.rates != nil {
		s.rates(f, q)
	}
}

func (s *brokenSystem) Jacobian(a, d, ft []float64, t float64, y []float64) {
	s.System.Jacobian(a, d, ft, t, y)
	if s.jacobian != nil {
		s.jacobian(a, ft)
	}
}

func (s *brokenSystem) AddSlopes(dq []float64, h float64, v []float64, c float64) {
	s.old = append(s.old[:0], dq...)
	s.System.AddSlopes(dq, h, v, c)
	if s.add != nil {
		s.add(s.old, dq)
	}
}

// A brokenDrive spoils the signals of the equations; the book reads its own.
type brokenDrive struct {
	*duty.Signals
	spoil func(value, rate []float64)
}

func (d brokenDrive) At(t float64, value, rate []float64) {
	d.Signals.At(t, value, rate)
	d.spoil(value, rate)
}

// rebuild assembles the model's equations anew.
func rebuild(m *Model, nodes []element.Node, drive assembly.Drive) {
	m.system = assembly.New(nodes, m.Net.Groups, m.signals.Count(), drive)
}

// node and path find an index by name.
func node(m *Model, name string) int {
	return slices.IndexFunc(m.Net.Nodes, func(n element.Node) bool { return n.Name == name })
}

func path(s *assembly.System, name string) int {
	return slices.IndexFunc(s.Paths, func(p assembly.Path) bool { return p.Element == name })
}

// book runs the brake corner with a fault, or without one, and returns its book.
func book(t *testing.T, f fault) *energy.Book {
	t.Helper()
	cat := library.Catalogue()
	if f.batch != nil {
		k := cat.Find(element.Dissipators, f.kind)
		for _, section := range []element.Section{element.Conductances, element.Sources} {
			if k == nil {
				k = cat.Find(section, f.kind)
			}
		}
		sound := k.Batch
		k.Batch = func() element.Batch {
			b := &brokenBatch{Batch: sound()}
			f.batch(b)
			return b
		}
	}
	m, problems := Load(&diag.Source{Name: "corner", Text: []byte(corner)}, cat, nil)
	if m == nil {
		t.Fatalf("the netlist has problems: %v", problems)
	}
	if f.model != nil {
		f.model(m)
	}
	var wrap func(ode.System) ode.System
	if f.wrap != nil {
		wrap = func(s ode.System) ode.System { return f.wrap(s.(*assembly.System)) }
	}
	r := newRunner(m, Options{}, wrap)
	opt := Options{}
	if f.runner != nil {
		f.runner(r)
	}
	if f.progress != nil {
		opt.Progress = func(float64, string) { f.progress(r) }
	}
	if res := r.run(context.Background(), opt); res.Failure != nil || res.Interrupted {
		t.Fatalf("the run did not come to its end: %v", res.Failure)
	}
	run := r.evidence()
	if f.evidence != nil {
		f.evidence(run)
	}
	return energy.Make(run)
}

// Every fault is seen by the checks that are there to see it, and by no check that has nothing to do with
// it; without a fault the same run passes all.
func TestFaultsAreCaught(t *testing.T) {
	if b := book(t, fault{}); !b.Closed {
		t.Fatalf("the sound run does not close\n%s", account(b))
	}
	for _, f := range slices.Concat(faultsOfElements, faultsOfEquations, faultsOfRun) {
		t.Run(f.name, func(t *testing.T) {
			b := book(t, f)
			if b.Closed {
				t.Errorf("the book is closed")
			}
			for _, c := range b.Checks {
				name := string(rune('0'+c.Layer)) + " " + c.Name
				if slices.Contains(f.must, name) == c.Passed && !slices.Contains(f.may, name) {
					t.Errorf("check %q: passed %t, want %t", name, c.Passed, !c.Passed)
				}
			}
			for _, name := range f.must {
				if !slices.ContainsFunc(b.Checks, func(c energy.Check) bool { return name[2:] == c.Name }) {
					t.Errorf("there is no check %q", name)
				}
			}
			if t.Failed() || testing.Verbose() {
				t.Log(account(b))
			}
		})
	}
}

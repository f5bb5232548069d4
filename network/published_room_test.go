package network_test

import (
	"context"
	"fmt"
	"math"
	"strings"
	"testing"

	"workheat/library"
	"workheat/network"
	"workheat/network/diag"
	"workheat/network/netlist"
)

// tight is the relative tolerance of runs that are compared with closed forms.
const tight = 1e-10

// celsius turns a temperature from degC, in which the sources give them, to K.
func celsius(t float64) float64 { return t + 273.15 }

// load reads a netlist with the whole catalogue; any problem but a warning fails the test.
func load(t testing.TB, text string, open netlist.Opener) *network.Model {
	t.Helper()
	src := &diag.Source{Name: "netlist", Text: []byte(text)}
	m, problems := network.Load(src, library.Catalogue(), open)
	for _, p := range problems {
		if !p.Warning {
			t.Errorf("%s", p.Error())
		}
	}
	if m == nil {
		t.Fatalf("the netlist cannot be read:\n%s", text)
	}
	return m
}

// An outcome is a result that a test asks for temperatures.
type outcome struct {
	*network.Result
	t testing.TB
}

// run runs a netlist at a relative tolerance, and asks of every run that the numbers held and the energy
// book closed, the ledger to 1e-12 of what was moved.
func run(t testing.TB, text string, rel float64) outcome {
	t.Helper()
	return finish(t, load(t, text, nil), rel)
}

func finish(t testing.TB, m *network.Model, rel float64) outcome {
	t.Helper()
	res := m.Run(context.Background(), network.Options{Rel: rel, Audit: true})
	if res.Failure != nil {
		t.Fatalf("the run failed: %v", res.Failure)
	}
	for _, c := range res.Book.Checks {
		if !c.Passed {
			t.Errorf("energy book, %s: gap %g, allowed %g, worst at %s", c.Name, c.Gap, c.Allowed, c.Where)
		}
	}
	if most := 1e-12 * turnover(res); res.Book.LedgerGap > most {
		t.Errorf("the ledger misses %g J, more than %g J", res.Book.LedgerGap, most)
	}
	return outcome{res, t}
}

// turnover is the size of the energies that a run moved: its throughput, or what one path carried between two
// nodes if that is more, as in a network without a border.
func turnover(res *network.Result) float64 {
	most := res.Book.Throughput
	for _, p := range res.Book.Paths {
		if p.Inside {
			most = math.Max(most, math.Abs(p.Net))
		}
	}
	return most
}

// at returns the temperature [K] of a node at a time [s].
func (o outcome) at(name string, time float64) float64 {
	o.t.Helper()
	for _, n := range o.Nodes {
		if n.Name != name {
			continue
		}
		if n.State < 0 {
			return n.Given.At(time)
		}
		k, theta := o.Tape.Find(time)
		_, _, _, coef := o.Tape.Step(k)
		return n.Temperature(o.Tape.Value(coef, n.State, theta))
	}
	o.t.Fatalf("no node is named %s", name)
	return 0
}

// end returns the temperature [K] of a node at the end of the run.
func (o outcome) end(name string) float64 { o.t.Helper(); return o.at(name, o.End) }

// legs returns when each phase of the duty ended, in s.
func (o outcome) legs() []float64 {
	var ends []float64
	for k, s := range o.Segments {
		if s.First && k > 0 {
			ends = append(ends, s.Start)
		}
	}
	return append(ends, o.End)
}

// flow returns the mean heat flow [W] of an element with one path.
func (o outcome) flow(name string) float64 {
	o.t.Helper()
	for _, p := range o.Book.Paths {
		if p.Element == name {
			return p.Net / o.End
		}
	}
	o.t.Fatalf("no path belongs to %s", name)
	return 0
}

// work returns the work [J] of a dissipator.
func (o outcome) work(name string) float64 {
	o.t.Helper()
	for _, d := range o.Book.Dissipators {
		if d.Name == name {
			return d.Work
		}
	}
	o.t.Fatalf("no dissipator is named %s", name)
	return 0
}

// peak returns the highest temperature [K] of a node and when it had it.
func (o outcome) peak(name string) (highest, when float64) {
	o.t.Helper()
	for _, s := range o.Summary {
		if s.Name == name {
			return s.Highest, s.When
		}
	}
	o.t.Fatalf("no summary belongs to %s", name)
	return 0, 0
}

// near fails when got is further than tol from want.
func near(t testing.TB, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.12g, want %.12g within %g", what, got, want, tol)
	}
}

// rest is a duty that only passes time.
func rest(seconds float64) string { return fmt.Sprintf(`[{"rest": {"for": "%.17g s"}}]`, seconds) }

// lump is a netlist of one node in air at a held temperature, with other sections added before the duty.
func lump(node, air, film, more, duty string) string {
	return fmt.Sprintf(`{"workheat": 1,
	"nodes": {"body": %s, "air": {"held": "%s"}},
	"conductances": {"film": {"kind": "convection", "between": ["body", "air"], %s}},
	%s "duty": %s}`, node, air, film, more, duty)
}

// replaceOnce replaces the only place of a text.
func replaceOnce(t testing.TB, text, old, fresh string) string {
	t.Helper()
	if n := strings.Count(text, old); n != 1 {
		t.Fatalf("%q stands %d times in the netlist", old, n)
	}
	return strings.Replace(text, old, fresh, 1)
}

// gauss integrates f over [a, b] in n panels of four Gauss-Legendre points each (Abramowitz and Stegun,
// table 25.4, from memory).
func gauss(f func(float64) float64, a, b float64, n int) float64 {
	x := [2]float64{0.8611363115940526, 0.3399810435848563}
	w := [2]float64{0.3478548451374538, 0.6521451548625461}
	h, sum := (b-a)/float64(n)/2, 0.0
	for i := range n {
		mid := a + h*float64(2*i+1)
		for k := range x {
			sum += h * w[k] * (f(mid-h*x[k]) + f(mid+h*x[k]))
		}
	}
	return sum
}

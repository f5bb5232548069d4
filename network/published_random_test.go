package network_test

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"workheat/library"
	"workheat/network"
	"workheat/network/energy"
)

// networks is how many random networks a test runs.
const networks = 60

// eachNetwork calls visit with random netlists of 2 to 30 nodes.
func eachNetwork(t *testing.T, heated bool, visit func(t *testing.T, text string)) {
	t.Helper()
	for _, k := range library.Catalogue().Kinds {
		if writers[k.Name] == nil {
			t.Fatalf("no writer for the kind %q of %s: random networks would leave it out", k.Name, k.Section)
		}
	}
	for seed := range uint64(networks) {
		m := &maker{Rand: rand.New(rand.NewPCG(seed, 5)), heated: heated}
		text := m.netlist(2 + int(seed)%29)
		visit(t, text)
		if t.Failed() {
			t.Fatalf("seed %d:\n%s", seed, text)
		}
	}
}

// On random networks of all kinds the ledger closes to round-off, the whole book is closed, the run at a tenth
// of the tolerance agrees, and a second run gives the same bits.
func TestRandomNetworks(t *testing.T) {
	steps, open, worst := 0, 0, 0.0
	eachNetwork(t, true, func(t *testing.T, text string) {
		opt := network.Options{Rel: 1e-6, Audit: true, Tolerance: true}
		m := load(t, text, nil)
		first := m.Run(context.Background(), opt)
		if first.Failure != nil {
			t.Errorf("the run failed: %v", first.Failure)
			return
		}
		for _, c := range first.Book.Checks {
			if !c.Passed && !measured(c) {
				t.Errorf("%s: gap %g, allowed %g, worst at %s", c.Name, c.Gap, c.Allowed, c.Where)
			}
		}
		if first.Book.Checks[len(first.Book.Checks)-1].Layer != 3 {
			t.Error("the book has no third layer")
		}
		if !first.Book.Closed {
			open++
		}
		gap := first.Book.LedgerGap / first.Book.Throughput
		if worst = math.Max(worst, gap); !(gap <= 1e-12) {
			t.Errorf("ledger gap %g of the throughput of %g J", gap, first.Book.Throughput)
		}
		steps += first.Stats.Steps
		sameBits(t, "again", first, m.Run(context.Background(), opt))
		sameBits(t, "read again", first, load(t, text, nil).Run(context.Background(), opt))
	})
	if open > networks/50 {
		t.Errorf("%d books of %d are not closed", open, networks)
	}
	t.Logf("%d networks, %d steps, worst ledger gap %.2g of the throughput", networks, steps, worst)
}

// measured reports whether a check that has not passed measures the error of the integration and is near what it
// allows. Networks with nodes that follow their neighbours at once may come to that: one in three hundred here.
func measured(c energy.Check) bool {
	return (c.Name == "recount" || c.Name == "tolerance") && c.Gap <= 2*c.Allowed
}

// sameBits compares two runs without any tolerance.
func sameBits(t *testing.T, what string, a, b *network.Result) {
	t.Helper()
	if a.End != b.End || a.Tape.Steps() != b.Tape.Steps() || a.Book.LedgerGap != b.Book.LedgerGap || a.Book.IndependentGap != b.Book.IndependentGap {
		t.Fatalf("%s: end %v and %v, %d and %d steps, gaps %v and %v", what, a.End, b.End, a.Tape.Steps(), b.Tape.Steps(), a.Book.LedgerGap, b.Book.LedgerGap)
	}
	for k := range a.Tape.Steps() {
		startA, hA, _, x := a.Tape.Step(k)
		startB, hB, _, y := b.Tape.Step(k)
		for i := range x {
			if x[i] != y[i] || startA != startB || hA != hB {
				t.Fatalf("%s: step %d differs: %v and %v", what, k, x[i], y[i])
			}
		}
	}
	for i := range a.Book.Paths {
		if a.Book.Paths[i] != b.Book.Paths[i] {
			t.Fatalf("%s: path %s carried %v and %v", what, a.Book.Paths[i].Element, a.Book.Paths[i].Net, b.Book.Paths[i].Net)
		}
	}
}

// Without heat or work from outside no temperature leaves the range of those at the start and of the held ones
// (the maximum principle of conduction), and the ledger closes all the same.
func TestRandomNetworksWithoutHeat(t *testing.T) {
	eachNetwork(t, false, func(t *testing.T, text string) {
		res := load(t, text, nil).Run(context.Background(), network.Options{Rel: 1e-6, Audit: true})
		if res.Failure != nil {
			t.Errorf("the run failed: %v", res.Failure)
			return
		}
		if gap := res.Book.LedgerGap / turnover(res); !(gap <= 1e-12) {
			t.Errorf("ledger gap %g of what was moved", gap)
		}
		o := outcome{res, t}
		low, high := math.Inf(1), math.Inf(-1)
		for _, n := range o.Nodes {
			switch {
			case n.State < 0:
				for _, y := range n.Given.Y {
					low, high = math.Min(low, y), math.Max(high, y)
				}
			case o.Model.Net.Nodes[n.State].Capacity != nil:
				start := o.at(n.Name, 0)
				low, high = math.Min(low, start), math.Max(high, start)
			}
		}
		const slack = 1e-3 // K, of the integration at 1e-6 of up to 300 K
		for _, n := range o.Nodes {
			for k := range o.Tape.Steps() {
				start, h, _, _ := o.Tape.Step(k)
				if x := o.at(n.Name, start+h); x < low-slack || x > high+slack {
					t.Errorf("%s at %g s: %g K is outside %g to %g K", n.Name, start+h, x, low, high)
					return
				}
			}
		}
	})
}

package network_test

import (
	"context"
	"encoding/json"
	"math"
	"os"
	"slices"
	"testing"

	"workheat/network"
)

// A reference is what a run of a problem must come to; the file says where it is from.
type reference struct {
	Start, Sample       float64
	Segments, End, Peak []float64
	Nodes               []string
}

func readYardstick(t testing.TB) (string, reference) {
	t.Helper()
	text, err := os.ReadFile("testdata/yardstick-a.json")
	if err != nil {
		t.Fatal(err)
	}
	stored, err := os.ReadFile("testdata/yardstick-a-reference.json")
	if err != nil {
		t.Fatal(err)
	}
	var ref reference
	if err := json.Unmarshal(stored, &ref); err != nil {
		t.Fatal(err)
	}
	return string(text), ref
}

// highest returns the largest temperature of a node over uniform samples and the ends of the drive's segments.
func (r reference) highest(o outcome, node string) float64 {
	most := math.Inf(-1)
	for k := 0; float64(k)*r.Sample <= o.End; k++ {
		most = math.Max(most, o.at(node, float64(k)*r.Sample))
	}
	for _, x := range r.Segments {
		most = math.Max(most, o.at(node, x))
	}
	return most
}

// Problem A of the benchmark set: a front corner of twelve nodes with films by speed, radiation and heat capacities
// that vary, through 15 snubs and half an hour of driving, 45 segments. The reference is by an independent
// program (SUNDIALS CVODE at 1e-12, confirmed by an implicit Runge-Kutta method).
func TestYardstickA(t *testing.T) {
	text, ref := readYardstick(t)
	const rel = 1e-8
	o := run(t, text, rel)
	for k, node := range ref.Nodes {
		rise := math.Max(ref.Peak[k]-ref.Start, 1)
		near(t, node+" at the end", o.end(node), ref.End[k], 1e-6*rise)
		near(t, node+" at its highest", ref.highest(o, node), ref.Peak[k], 1e-6*rise)
	}
	b := o.Book
	if closure := math.Abs(b.Stored - b.WorkIn - b.HeatIn + b.HeatOut); closure > 1e-13*b.Throughput {
		t.Errorf("closure %g of the throughput, want at most 1e-13", closure/b.Throughput)
	}
	if b.LedgerGap > 1e-13*b.Throughput {
		t.Errorf("ledger gap %g of the throughput, want at most 1e-13", b.LedgerGap/b.Throughput)
	}
	if b.IndependentGap > 10*rel*b.Throughput {
		t.Errorf("independent gap %g of the throughput, want at most %g", b.IndependentGap/b.Throughput, 10*rel)
	}
	// Every end of the drive's segments is the end of a step.
	ends := []float64{0}
	for k := range o.Tape.Steps() {
		start, h, _, _ := o.Tape.Step(k)
		ends = append(ends, start+h)
	}
	for _, x := range ref.Segments {
		i, _ := slices.BinarySearch(ends, x-1e-9)
		if i == len(ends) || math.Abs(ends[i]-x) > 1e-9 {
			t.Errorf("no step ends at %g s", x)
		}
	}
	// A bound on the work: 893 steps when this was written.
	if o.Stats.Steps > 1200 {
		t.Errorf("%d steps", o.Stats.Steps)
	}
}

// The error against the reference falls with the tolerance, and the gap of the recount with it.
func TestYardstickAByTolerance(t *testing.T) {
	text, ref := readYardstick(t)
	m := load(t, text, nil)
	last := math.Inf(1)
	for _, rel := range []float64{1e-4, 1e-5, 1e-6, 1e-7} {
		o := outcome{m.Run(context.Background(), network.Options{Rel: rel, Audit: true}), t}
		worst := 0.0
		for k, node := range ref.Nodes {
			rise := math.Max(ref.Peak[k]-ref.Start, 1)
			worst = math.Max(worst, math.Abs(o.end(node)-ref.End[k])/rise)
			worst = math.Max(worst, math.Abs(ref.highest(o, node)-ref.Peak[k])/rise)
		}
		if worst > rel || worst > last/2 {
			t.Errorf("rtol %g: error %.3g of the rise, want at most %g and below half of %.3g", rel, worst, rel, last)
		}
		if b := o.Book; b.LedgerGap > 1e-13*b.Throughput || b.IndependentGap > 10*rel*b.Throughput {
			t.Errorf("rtol %g: ledger gap %.3g, independent gap %.3g of the throughput", rel, b.LedgerGap/b.Throughput, b.IndependentGap/b.Throughput)
		}
		t.Logf("rtol %g: error %.3g, ledger %.3g, recount %.3g, %d steps", rel, worst, o.Book.LedgerGap/o.Book.Throughput, o.Book.IndependentGap/o.Book.Throughput, o.Stats.Steps)
		last = worst
	}
}

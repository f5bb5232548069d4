package main

import (
	"context"
	"fmt"
	"io"
	"math"
	"os"
	"slices"
	"time"

	"github.com/goccy/go-json"

	"workheat/cmd/cpu"
	"workheat/library"
	"workheat/network"
	"workheat/network/diag"
)

// An answer is what is printed: the keys that the comparison reads.
type answer struct {
	Method  string    `json:"method"`
	Rtol    float64   `json:"rtol"`
	CPU     float64   `json:"cpu"`
	Wall    float64   `json:"wall"`
	Steps   int       `json:"steps"`
	Rates   int       `json:"rhs"`
	Jac     int       `json:"jac"`
	Fact    int       `json:"fact"`
	Closure float64   `json:"closure"`
	Gap     float64   `json:"independent_gap"` // share of the throughput, by the recount
	End     []float64 `json:"end"`
	Peak    []float64 `json:"peak"`
}

// A short run is done repeats times, and the median of its times counts; one of longRun or more is timed once.
const (
	repeats = 15
	longRun = 2 // s
)

// run reads a problem, runs it and prints the answer.
func run(name string, rtol float64, w io.Writer) error {
	text, err := os.ReadFile(name)
	if err != nil {
		return err
	}
	p, err := readProblem(text)
	if err != nil {
		return err
	}
	source := &diag.Source{Name: p.Name, Text: p.netlist()}
	var cpus, walls []float64
	var a answer
	for k := 0; k < repeats; k++ {
		m, problems := network.Load(source, library.Catalogue(), nil)
		if m == nil {
			return fmt.Errorf("the netlist of %s has problems: %w", p.Name, problems[0])
		}
		c0, t0 := cpu.Seconds(), time.Now()
		res := m.Run(context.Background(), network.Options{Rel: rtol})
		if res.Failure != nil {
			return res.Failure
		}
		a = p.measure(res)
		cpus, walls = append(cpus, cpu.Seconds()-c0), append(walls, time.Since(t0).Seconds())
		if walls[0] > longRun {
			break
		}
	}
	a.Rtol, a.CPU, a.Wall = rtol, median(cpus), median(walls)
	a.Closure, a.Gap = p.audit(source, rtol)
	return json.NewEncoder(w).Encode(a)
}

// audit runs once more with the whole energy book.
func (p *problem) audit(source *diag.Source, rtol float64) (closure, gap float64) {
	m, _ := network.Load(source, library.Catalogue(), nil)
	b := m.Run(context.Background(), network.Options{Rel: rtol, Audit: true}).Book
	in := b.WorkIn + b.HeatIn
	if in == 0 {
		in = b.Throughput
	}
	return math.Abs(b.Stored-b.WorkIn-b.HeatIn+b.HeatOut) / in, b.IndependentGap / b.Throughput
}

// measure reads the end, and the peak over all sample times and segment ends, of every probe.
func (p *problem) measure(res *network.Result) answer {
	s := res.Stats
	a := answer{Method: res.Method, Steps: s.Steps, Rates: s.Rates, Jac: s.Jacobians, Fact: s.Factorizations,
		End: make([]float64, len(p.Probe)), Peak: make([]float64, len(p.Probe))}
	high := make([]float64, len(p.Probe))
	for j := range high {
		high[j] = math.Inf(-1)
	}
	tape := res.Tape
	next := 0
	for k := 0; k < tape.Steps(); k++ {
		start, h, _, coef := tape.Step(k)
		first, atEnd := next, p.segmentEnd(start+h)
		for ; float64(next)*p.DtOut <= start+h; next++ {
		}
		for j, i := range p.Probe {
			if tape.Bound(coef, i) <= high[j] {
				continue // no sample of this step can be the peak
			}
			for s := first; s < next; s++ {
				high[j] = max(high[j], tape.Value(coef, i, (float64(s)*p.DtOut-start)/h))
			}
			if atEnd {
				high[j] = max(high[j], tape.Value(coef, i, 1))
			}
		}
	}
	_, _, _, last := tape.Step(tape.Steps() - 1)
	for j, i := range p.Probe {
		a.Peak[j] = res.Nodes[i].Temperature(high[j])
		a.End[j] = res.Nodes[i].Temperature(tape.Value(last, i, 1))
	}
	return a
}

// segmentEnd reports whether t is the end of one of the problem's segments.
func (p *problem) segmentEnd(t float64) bool {
	for _, x := range p.Segment.T {
		if math.Abs(x-t) < 1e-9 {
			return true
		}
	}
	return false
}

func median(x []float64) float64 {
	return slices.Sorted(slices.Values(x))[len(x)/2]
}

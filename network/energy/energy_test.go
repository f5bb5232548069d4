package energy

import (
	"math"
	"testing"

	"workheat/network/element"
	"workheat/network/record"
)

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(abs(got-want) <= tol) {
		t.Errorf("%s: got %.15g, want %.15g", what, got, want)
	}
}

// A store's ways from temperature to energy and back meet, on every piece, beyond both ends and at jumps.
func TestStoreGoesBothWays(t *testing.T) {
	s := newStore(element.MustCurve([]float64{300, 350, 350, 400, 600}, []float64{100, 200, 900, 300, 300}), 330)
	// by hand: 50·150 = 7500 J to 350 K, 50·600 = 30000 J more to 400 K, 200·300 = 60000 J more to 600 K
	for _, c := range []struct{ t, h float64 }{{280, -2000}, {300, 0}, {325, 25 * 125}, {350, 7500}, {400, 37500}, {500, 67500}, {600, 97500}, {610, 100500}} {
		near(t, "enthalpy", s.enthalpy(c.t), c.h, 1e-9)
		near(t, "temperature", s.temperature(c.h-s.start), c.t, 1e-11)
	}
	near(t, "start", s.start, 30*(100+60.0/2), 1e-9)
	for _, c := range []struct{ t, c float64 }{{200, 100}, {325, 150}, {350, 200}, {351, 888}, {700, 300}} {
		near(t, "capacity", s.value(c.t), c.c, 1e-9)
	}
}

// The points and weights integrate powers to degree 7 exactly, and not degree 8.
func TestGaussPoints(t *testing.T) {
	for degree := 0; degree <= 8; degree++ {
		sum := 0.0
		for g, x := range gaussPoint {
			sum += gaussWeight[g] * math.Pow(x, float64(degree))
		}
		off := abs(sum - 1/float64(degree+1))
		if (off < 1e-15) != (degree <= 7) {
			t.Errorf("degree %d is off by %g", degree, off)
		}
	}
}

// lump is a run of one node that stores by a table and takes 1 W for 100 s, which a path of known law brings, in
// steps that end at the given times.
func lump(capacity *element.Curve, ends ...float64) *Run {
	tape, from := record.NewTape(1, 4), 0.0
	for _, end := range append(ends, 100) {
		coef := tape.Add(from, end-from, 0)
		coef[0], coef[1] = from, end-from
		from = end
	}
	same := newStore(capacity, 300)
	return &Run{
		Nodes: []Node{{Name: "lump", Capacity: capacity, Start: 300, EndState: 100, Reported: same.temperature,
			Highest: same.temperature(100), When: 100}},
		Paths: []Path{{Element: "heater", Section: element.Sources, From: element.Outside, To: 0, Total: 100}},
		Tape:  tape, Rel: 1e-6, Abs: 1e-6, FirstTable: 0,
		Flow:         func(int, *element.State) float64 { return 1 },
		Signals:      func(int, float64, []float64, []float64) {},
		Temperatures: func(_ int, _ float64, y []float64) []float64 { return []float64{same.temperature(y[0])} },
		Slopes:       func(int, float64, []float64) ([][]float64, []float64) { return [][]float64{nil}, []float64{0} },
		Matrix:       func([]float64) ([]float64, []float64) { return []float64{0}, []float64{0} },
		Given:        []Given{{Element: "heater", Power: element.Constant(1), Factor: 1}},
	}
}

// The account of one heated lump, by hand; then the same with single numbers wrong, each seen by its check.
func TestAccountByHand(t *testing.T) {
	capacity := element.MustCurve([]float64{300, 310, 310, 400}, []float64{2, 4, 9, 9})
	b := Make(lump(capacity, 30)) // at 30 J the capacity jumps
	if !b.Closed {
		t.Errorf("a sound account does not close: %+v", b.Checks)
	}
	near(t, "heat in", b.HeatIn, 100, 0)
	near(t, "stored", b.Stored, 100, 0)
	near(t, "throughput", b.Throughput, 100, 0)
	near(t, "gap by the recount", b.IndependentGap, 0, 1e-12)
	for _, c := range []struct {
		name string
		set  func(r *Run)
		want string
	}{
		{"end state", func(r *Run) { r.Nodes[0].EndState = 100.001 }, "ledger"},
		{"total", func(r *Run) { r.Paths[0].Total = 99.999 }, "ledger"},
		{"law", func(r *Run) { r.Flow = func(int, *element.State) float64 { return 1.001 } }, "recount"},
		{"temperature of the equations", func(r *Run) {
			sound := r.Temperatures
			r.Temperatures = func(s int, x float64, y []float64) []float64 { return []float64{sound(s, x, y)[0] + 1e-5} }
		}, "temperatures"},
		{"peak too low", func(r *Run) { r.Nodes[0].Highest -= 0.9 }, "peaks"},
		{"peak too high", func(r *Run) { r.Nodes[0].Highest += 1e-3 }, "peaks"},
		{"peak at another time", func(r *Run) { r.Nodes[0].When = 50 }, "peaks"},
		{"power of the source", func(r *Run) { r.Given[0].Factor = 1.0001 }, "given"},
		{"a slope by time", func(r *Run) {
			r.Slopes = func(int, float64, []float64) ([][]float64, []float64) { return [][]float64{nil}, []float64{1} }
		}, "slopes"},
		{"the matrix", func(r *Run) {
			r.Matrix = func([]float64) ([]float64, []float64) { return []float64{1e-3}, []float64{0} }
		}, "matrix"},
		{"a break within a step", func(r *Run) { r.Legs = []Leg{{Label: "l", End: 100, Node: -1, Corners: []float64{40}}} }, "breaks"},
		{"a jump of a heat capacity within a step", func(r *Run) { r.Tape = lump(capacity, 29).Tape }, "breaks"},
		{"a phase that ended late", func(r *Run) {
			r.Legs = []Leg{{Label: "l", End: 100, Node: 0, Target: 305, Ended: true, Seen: math.NaN()}}
		}, "ends"},
		{"a phase that ended early", func(r *Run) {
			r.Legs = []Leg{{Label: "l", End: 100, Node: 0, Target: 350, Ended: true, Seen: math.NaN()}}
		}, "ends"},
	} {
		r := lump(capacity, 30)
		c.set(r)
		b := Make(r)
		seen := false
		for _, k := range b.Checks {
			seen = seen || k.Name == c.want && !k.Passed
		}
		if !seen || b.Closed {
			t.Errorf("%s: check %q has not seen it: %+v", c.name, c.want, b.Checks)
		}
	}
}

// A step in which the energy passes corners is cut there: u = 100 θ meets 30 J and its jump at 310 K.
func TestStepsAreCutAtCorners(t *testing.T) {
	r := lump(element.MustCurve([]float64{300, 310, 310, 400}, []float64{2, 4, 9, 9}))
	w := newWitness(r)
	w.stiff = []float64{1}
	_, h, _, coef := r.Tape.Step(0)
	cuts := w.split(coef, h)
	if len(cuts) < 3 {
		t.Fatalf("cut at %v", cuts)
	}
	for _, x := range cuts[1 : len(cuts)-1] {
		near(t, "cut, or the corner where the step begins", min(x, abs(x-0.3)), 0, 1e-10)
	}
	if w.bends <= 0 {
		t.Error("the jump bends nothing")
	}
	w.slight = 1e9
	if cuts := w.split(coef, h); len(cuts) != 2 {
		t.Errorf("slight bends are cut too: %v", cuts)
	}
}

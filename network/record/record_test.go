package record_test

import (
	"math"
	"testing"

	"workheat/network/element"
	"workheat/network/record"
)

// shifted returns the coefficients in θ of the polynomial Σ p[k] tᵏ over a step from t0 of length h.
func shifted(p []float64, t0, h float64) []float64 {
	c := append([]float64(nil), p...)
	for i := range c { // Horner's repeated division by t - t0
		for k := len(c) - 2; k >= i; k-- {
			c[k] += t0 * c[k+1]
		}
	}
	scale := 1.0
	for k := range c {
		c[k] *= scale
		scale *= h
	}
	return c
}

// tape returns a tape of one state that follows a polynomial of degree 4, in steps between the times.
func tape(p [5]float64, times ...float64) *record.Tape {
	t := record.NewTape(1, 4)
	extend(t, p, times...)
	return t
}

func extend(t *record.Tape, p [5]float64, times ...float64) {
	for i := 1; i < len(times); i++ {
		h := times[i] - times[i-1]
		copy(t.Add(times[i-1], h, i-1), shifted(p[:], times[i-1], h))
	}
}

// plain is a node whose state is its temperature.
func plain(limits ...element.Limit) record.Node {
	same := func(x float64) float64 { return x }
	return record.Node{Name: "n", Limits: limits, Temperature: same, Value: same}
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.15g, want %.15g", what, got, want)
	}
}

// The rise and fall 300 + 80 t - 20 t² has its peak of 380 at t = 2, wherever the steps end.
func TestPeakBetweenSteps(t *testing.T) {
	p := [5]float64{300, 80, -20}
	for _, times := range [][]float64{{0, 5}, {0, 1, 5}, {0, 1.999, 2.001, 5}, {0, 2, 5}, {0, 1.3, 2.9, 4, 5}} {
		s := record.Summarise(tape(p, times...), plain())
		near(t, "start", s.Start, 300, 0)
		near(t, "highest", s.Highest, 380, 1e-12)
		near(t, "when", s.When, 2, 1e-7) // flat at the top
		near(t, "end", s.End, 200, 1e-12)
		near(t, "lowest after the peak", s.Lowest, 200, 1e-12)
	}
}

// The quartic 300 + 100 (t-1)²(t-3)² - 60 t: three turns within one step, all found, with the peak between.
func TestTurnsWithinOneStep(t *testing.T) {
	// (t-1)²(t-3)² = 9 - 24 t + 22 t² - 8 t³ + t⁴
	p := [5]float64{300 + 900, -2400 - 60, 2200, -800, 100}
	at := func(x float64) float64 { return p[0] + x*(p[1]+x*(p[2]+x*(p[3]+x*p[4]))) }
	low1, high, low2 := turn(p, 0.5, 1.5), turn(p, 1.5, 2.5), turn(p, 2.5, 3.5)
	s := record.Summarise(tape(p, 0, 3.4), plain())
	near(t, "highest is the start", s.Highest, 1200, 1e-9)
	near(t, "lowest", s.Lowest, math.Min(at(low1), at(low2)), 1e-9)

	s = record.Summarise(tape(p, 0.9, 3.4), plain())
	near(t, "highest", s.Highest, at(high), 1e-9)
	near(t, "when", s.When, high, 1e-7)
	near(t, "lowest after", s.Lowest, at(low2), 1e-9)
}

// turn halves [a, b] to the root of the slope of p.
func turn(p [5]float64, a, b float64) float64 {
	slope := func(x float64) float64 { return p[1] + x*(2*p[2]+x*(3*p[3]+x*4*p[4])) }
	for range 60 {
		if m := (a + b) / 2; slope(m)*slope(a) > 0 {
			a = m
		} else {
			b = m
		}
	}
	return a
}

// A temperature that only rises has no peak before its end, and one whose wiggle is below the ripple none
// either.
func TestNoPeak(t *testing.T) {
	s := record.Summarise(tape([5]float64{300, 5}, 0, 1, 2), plain())
	near(t, "highest", s.Highest, 310, 1e-12)
	near(t, "when", s.When, 2, 0)
	if !math.IsNaN(s.Lowest) {
		t.Errorf("lowest after the first peak: got %g, want none", s.Lowest)
	}
	s = record.Summarise(tape([5]float64{300, 0.2, -1}, 0, 0.15), plain()) // falls by 1/400 K at the most
	if !math.IsNaN(s.Lowest) {
		t.Errorf("lowest after a ripple: got %g, want none", s.Lowest)
	}
}

// A second, higher peak keeps the lowest value between the two.
func TestLowestAfterFirstPeak(t *testing.T) {
	tp := tape([5]float64{300, 80, -20}, 0, 3)    // peak 380 at 2, 360 at 3
	extend(tp, [5]float64{360 - 3*60, 60}, 3, 5)  // to 480
	extend(tp, [5]float64{480 + 5*10, -10}, 5, 9) // to 440
	s := record.Summarise(tp, plain())
	near(t, "highest", s.Highest, 480, 1e-10)
	near(t, "when", s.When, 5, 0)
	near(t, "lowest", s.Lowest, 360, 1e-10)
}

// A node without mass may jump between two steps: its highest value can stand at the start of a step.
func TestPeakAtJump(t *testing.T) {
	tp := tape([5]float64{300, 1}, 0, 4)
	extend(tp, [5]float64{500, -2}, 4, 10)
	s := record.Summarise(tp, plain(element.Limit{Name: "hot", Temperature: 490}))
	near(t, "highest", s.Highest, 492, 0)
	near(t, "when", s.When, 4, 0)
	near(t, "above", s.Limits[0].Above, 1, 1e-12)
	near(t, "first", s.Limits[0].First, 4, 0)
}

// Time above limits and first passing of 300 + 80 t - 20 t²: above 380 - 20 d² for 2 d about t = 2.
func TestTimeAboveLimits(t *testing.T) {
	limits := []element.Limit{{Name: "a", Temperature: 380 - 20*0.25}, {Name: "b", Temperature: 380 - 20*2.25}, {Name: "c", Temperature: 381}, {Name: "d", Temperature: 250}}
	for _, times := range [][]float64{{0, 5}, {0, 2, 5}, {0, 0.5, 1.5, 3.5, 5}, {0, 1, 1.7, 2.6, 5}} {
		s := record.Summarise(tape([5]float64{300, 80, -20}, times...), plain(limits...))
		near(t, "above a", s.Limits[0].Above, 1, 1e-9)
		near(t, "first a", s.Limits[0].First, 1.5, 1e-9)
		near(t, "margin a", s.Limits[0].Margin, -5, 1e-9)
		near(t, "above b", s.Limits[1].Above, 3, 1e-9)
		near(t, "first b", s.Limits[1].First, 0.5, 1e-9)
		near(t, "above c", s.Limits[2].Above, 0, 0)
		near(t, "margin c", s.Limits[2].Margin, 1, 1e-9)
		if !math.IsNaN(s.Limits[2].First) {
			t.Errorf("first passing of a limit never reached: %g", s.Limits[2].First)
		}
		// 300 + 80 t - 20 t² = 250 at t = 2 + √6.5
		near(t, "above d", s.Limits[3].Above, 2+math.Sqrt(6.5), 1e-9)
		near(t, "first d", s.Limits[3].First, 0, 0)
	}
}

// The level of a limit is turned into the node's state: here stored energy with T = 300 + √u.
func TestLimitThroughState(t *testing.T) {
	n := record.Node{Name: "n", Limits: []element.Limit{{Temperature: 302}},
		Temperature: func(u float64) float64 { return 300 + math.Sqrt(u) },
		Value:       func(x float64) float64 { return (x - 300) * (x - 300) }}
	s := record.Summarise(tape([5]float64{0, 1}, 0, 3, 9), n) // u = t, 4 at the limit
	near(t, "highest", s.Highest, 303, 1e-12)
	near(t, "above", s.Limits[0].Above, 5, 1e-9)
	near(t, "first", s.Limits[0].First, 4, 1e-9)
}

// A held node is read from its table alone.
func TestHeldNodes(t *testing.T) {
	given := element.MustCurve([]float64{-5, 10, 20, 20, 30}, []float64{290, 320, 340, 300, 330})
	n := record.Node{Name: "air", State: -1, Given: given, Limits: []element.Limit{{Temperature: 330}, {Temperature: 325}, {Temperature: 400}}}
	s := record.Summarise(tape([5]float64{1}, 0, 40), n)
	if !s.Held {
		t.Error("not marked as held")
	}
	near(t, "start", s.Start, 300, 1e-12)
	near(t, "highest", s.Highest, 340, 0)
	near(t, "when", s.When, 20, 0)
	near(t, "end", s.End, 330, 0)
	near(t, "above 330", s.Limits[0].Above, 5, 1e-12)
	near(t, "first above 330", s.Limits[0].First, 15, 1e-12)
	near(t, "above 325", s.Limits[1].Above, 7.5+(10-25.0/3)+10, 1e-12)
	near(t, "margin to 400", s.Limits[2].Margin, 60, 0)

	s = record.Summarise(tape([5]float64{1}, 0, 5), n) // ends before the corner: highest at the end
	near(t, "highest", s.Highest, 310, 1e-12)
	near(t, "when", s.When, 5, 0)
	s = record.Summarise(tape([5]float64{1}, 0, 5), record.Node{State: -1, Given: element.Constant(400), Limits: []element.Limit{{Temperature: 390}}})
	near(t, "above when constant", s.Limits[0].Above, 5, 0)
	near(t, "first when constant", s.Limits[0].First, 0, 0)
}

// An empty tape gives an empty summary.
func TestEmptyTape(t *testing.T) {
	tp := record.NewTape(3, 4)
	if tp.Steps() != 0 || tp.End() != 0 {
		t.Errorf("an empty tape has %d steps to %g s", tp.Steps(), tp.End())
	}
	if s := record.Summarise(tp, plain()); s.Name != "n" || s.Highest != 0 {
		t.Errorf("got %+v", s)
	}
}

// Find gives the earlier step at a shared end, and the ends for times outside.
func TestFind(t *testing.T) {
	tp := tape([5]float64{1, 1}, 10, 11, 13, 17)
	for _, c := range []struct {
		at    float64
		step  int
		theta float64
	}{{9, 0, 0}, {10, 0, 0}, {10.25, 0, 0.25}, {11, 0, 1}, {12, 1, 0.5}, {13, 1, 1}, {16, 2, 0.75}, {17, 2, 1}, {99, 2, 1}} {
		if k, theta := tp.Find(c.at); k != c.step || theta != c.theta {
			t.Errorf("at %g s: step %d at %g, want step %d at %g", c.at, k, theta, c.step, c.theta)
		}
	}
	near(t, "end", tp.End(), 17, 0)
}

// What was written stays where it is while the tape grows over many blocks, and values, slopes and bounds
// are those of the polynomial.
func TestTapeGrows(t *testing.T) {
	const n, degree, steps = 37, 4, 1000
	tp := record.NewTape(n, degree)
	for k := range steps {
		c := tp.Add(float64(k), 1, k%7)
		if len(c) != n*(degree+1) {
			t.Fatalf("room for %d coefficients, want %d", len(c), n*(degree+1))
		}
		for j := range c {
			c[j] = float64(k*1000 + j)
		}
	}
	for k := range steps {
		start, h, segment, c := tp.Step(k)
		if start != float64(k) || h != 1 || segment != k%7 || c[0] != float64(k*1000) || c[len(c)-1] != float64(k*1000+len(c)-1) {
			t.Fatalf("step %d has changed", k)
		}
	}
	_, _, _, c := tp.Step(3)
	at := func(x float64) float64 {
		sum := 0.0
		for k := range degree + 1 {
			sum += c[k*n+5] * math.Pow(x, float64(k))
		}
		return sum
	}
	near(t, "value", tp.Value(c, 5, 0.3), at(0.3), 1e-9)
	near(t, "slope", tp.Slope(c, 5, 0.3), (at(0.3+1e-4)-at(0.3-1e-4))/2e-4, 1e-3)
	if tp.Bound(c, 5) < at(1) {
		t.Errorf("bound %g is below the value %g", tp.Bound(c, 5), at(1))
	}
}

// Adding a step allocates only when a block or a list is full: on the mean far less than once a step.
func TestAddDoesNotAllocatePerStep(t *testing.T) {
	tp := record.NewTape(20, 4)
	x := 0.0
	if per := testing.AllocsPerRun(2000, func() { tp.Add(x, 1, 0); x++ }); per >= 1 {
		t.Errorf("%g allocations a step", per)
	}
}

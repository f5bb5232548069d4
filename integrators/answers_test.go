package integrators_test

import (
	"context"
	"flag"
	"fmt"
	"math"
	"testing"

	"workheat/integrators"
	"workheat/integrators/ode"
	"workheat/integrators/problems"
)

var long = flag.Bool("long", false, "run the heavy problems and the tightest tolerances too")

// solve runs a case from answer to answer and hands each state over. It gives up after most steps.
func solve(c *problems.Case, m ode.Method, p *ode.Problem, tol ode.Tolerance, most int, at func(k int, y []float64)) (ode.Stats, error) {
	g := ode.New(p, m, tol)
	ctx, stopped := context.WithCancel(context.Background())
	defer stopped()
	count := func(*ode.Step, func([]float64)) {
		if g.Stats().Steps > most {
			stopped()
		}
	}
	from, y := 0.0, c.Start
	for k, a := range c.Answers {
		cuts := append([]float64(nil), a.T)
		for i := len(c.Breaks) - 1; i >= 0; i-- {
			if b := c.Breaks[i]; from < b && b < a.T {
				cuts = append([]float64{b}, cuts...)
			}
		}
		for _, end := range cuts {
			if c.Enter != nil {
				c.Enter(from)
			}
			if f := g.Restart(from, y); f != nil {
				return g.Stats(), f
			}
			switch stop := g.Run(ctx, end, 0, nil, count); stop.Reason {
			case ode.Failed:
				return g.Stats(), stop.Failure
			case ode.Interrupted:
				return g.Stats(), fmt.Errorf("%d steps come only to t = %g", g.Stats().Steps, stop.T)
			}
			from, y = end, append([]float64(nil), g.State()...)
		}
		at(k, y)
	}
	return g.Stats(), nil
}

// digits returns how many digits of an answer are right in the worst state.
func digits(c *problems.Case, a problems.Answer, y []float64) float64 {
	worst := 0.0
	for k, want := range a.Y {
		i := k
		if a.Index != nil {
			i = a.Index[k]
		}
		worst = math.Max(worst, math.Abs(y[i]-want)/(math.Abs(want)+c.FloorOf(i)))
	}
	return -math.Log10(worst)
}

// TestPublishedAnswers solves every problem by every method at falling tolerances, with the error of each
// state judged relative to its size. The answers must be right to the digits of the tolerance less two,
// within a bounded number of steps.
func TestPublishedAnswers(t *testing.T) {
	tolerances := []float64{1e-4, 1e-6, 1e-8}
	if *long {
		tolerances = append(tolerances, 1e-10)
	}
	for _, m := range integrators.Methods {
		for _, c := range problems.All() {
			t.Run(m.Name()+"/"+c.Name, func(t *testing.T) {
				if c.Heavy && !*long {
					t.Skip("heavy: needs -long")
				}
				for _, rtol := range tolerances {
					checkAnswers(t, c, m, rtol)
				}
			})
		}
	}
}

// stepBound is half as much again as a good method takes, growing as it does for order 4 or 5.
func stepBound(c *problems.Case, rtol float64) int {
	return int(1.5 * float64(c.Steps) * math.Pow(1e-4/rtol, 0.27))
}

func checkAnswers(t *testing.T, c *problems.Case, m ode.Method, rtol float64) {
	t.Helper()
	loses := c.Loses
	if loses == 0 {
		loses = 2
	}
	worst := math.Inf(1)
	p := c.Bind(c.Relative(), false)
	bound := stepBound(c, rtol)
	stats, err := solve(c, m, p, ode.Tolerance{Abs: rtol}, bound, func(k int, y []float64) {
		a := c.Answers[k]
		got := digits(c, a, y)
		worst = math.Min(worst, got)
		if want := math.Min(-math.Log10(rtol)-loses, a.Digits); got < want {
			t.Errorf("rtol %.0e, t = %g: %.2f digits, want %.1f", rtol, a.T, got, want)
		}
	})
	if err != nil {
		t.Fatalf("rtol %.0e: %v", rtol, err)
	}
	t.Logf("rtol %.0e: %.2f digits, %d steps, %d rejected", rtol, worst, stats.Steps, stats.Rejected)
	if stats.Steps+stats.Rejected > bound {
		t.Errorf("rtol %.0e: %d steps and %d rejected, want at most %d", rtol, stats.Steps, stats.Rejected, bound)
	}
}

package ode_test

import (
	"context"
	"math"
	"strings"
	"testing"

	"workheat/integrators/ode"
	"workheat/integrators/problems"
	"workheat/integrators/rosenbrock"
)

// single is one equation with its slopes.
func single(y0 float64, f, fy, ft func(t, y float64) float64) *problems.Case {
	return &problems.Case{
		Name: "single", Start: []float64{y0}, Floor: []float64{1},
		Rates: func(dst []float64, t float64, y []float64) { dst[0] = f(t, y[0]) },
		Slopes: func(add func(i, j int, v float64), dst []float64, t float64, y []float64) {
			add(0, 0, fy(t, y[0]))
			dst[0] = ft(t, y[0])
		},
	}
}

func none(_, _ float64) float64 { return 0 }

// TestEndIsExact runs to ends that no sum of steps meets, one after the other without a restart; the steps
// shown must join without a gap.
func TestEndIsExact(t *testing.T) {
	g := start(t, swing(), 1e-7)
	at := 0.0
	observe := func(s *ode.Step, _ func([]float64)) {
		if s.T != at {
			t.Errorf("a step starts at %.17g, the last ended at %.17g", s.T, at)
		}
		at = s.End
	}
	for k := 1; k <= 50; k++ {
		end := float64(k) * 0.1
		stop := g.Run(context.Background(), end, 0, nil, observe)
		if stop.Reason != ode.Reached || stop.T != end || g.Time() != end || at != end {
			t.Fatalf("stopped at %.17g (%.17g), want %.17g", stop.T, at, end)
		}
		if want := math.Sin(end); math.Abs(g.State()[0]-want) > 1e-6 {
			t.Errorf("y1(%g) is %g, want %g", end, g.State()[0], want)
		}
		total := g.Quadratures()[0] + g.Compensation()[0]
		if math.Abs(total-g.State()[0]) > 1e-15*float64(g.Stats().Steps) {
			t.Errorf("the quadrature to %g is %.17g, the state %.17g", end, total, g.State()[0])
		}
	}
	if stop := g.Run(context.Background(), 5, 0, nil, observe); stop.Reason != ode.Reached || stop.T != g.Time() {
		t.Errorf("a run of no length: reason %d at %g", stop.Reason, stop.T)
	}
	next := math.Nextafter(g.Time(), 9)
	if stop := g.Run(context.Background(), next, 0, nil, observe); stop.Reason != ode.Reached || stop.T != next {
		t.Errorf("a run of the least length: reason %d at %g", stop.Reason, stop.T)
	}
}

// TestBadCalls makes calls that only a fault of ours can make.
func TestBadCalls(t *testing.T) {
	g := start(t, swing(), 1e-6)
	for name, call := range map[string]func(){
		"tolerance": func() { ode.New(swing().Bind(nil, false), rosenbrock.Rodas5P, ode.Tolerance{}) },
		"end":       func() { g.Run(context.Background(), math.Inf(1), 0, nil, nil) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			call()
		}()
	}
}

// TestSameBits runs twice and compares bits.
func TestSameBits(t *testing.T) {
	var last []float64
	for range 3 {
		g := start(t, problems.Hires(), 1e-6)
		g.Run(context.Background(), 50, 0, nil, nil)
		now := append(append([]float64(nil), g.State()...), g.Quadratures()...)
		for i := range last {
			if now[i] != last[i] {
				t.Errorf("number %d is %.17g and %.17g", i, now[i], last[i])
			}
		}
		last = now
	}
}

// TestInterrupt cancels a run from an observer: it comes back at the end of that step.
func TestInterrupt(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	g := start(t, swing(), 1e-7)
	steps := 0
	stop := g.Run(ctx, 1e6, 0, nil, func(*ode.Step, func([]float64)) {
		if steps++; steps == 5 {
			cancel()
		}
	})
	if stop.Reason != ode.Interrupted || steps != 5 || stop.T != g.Time() || !(stop.T > 0) {
		t.Errorf("reason %d after %d steps at %g", stop.Reason, steps, stop.T)
	}
}

// TestFailures meets equations that cannot be carried on: the run stops just before the trouble, within few
// tries, and says where.
func TestFailures(t *testing.T) {
	root := single(0, func(t, _ float64) float64 { return math.Sqrt(1 - t) }, none,
		func(t, _ float64) float64 { return -0.5 / math.Sqrt(1-t) })
	burst := single(1, func(_, y float64) float64 { return y * y }, func(_, y float64) float64 { return 2 * y }, none)
	wall := single(0, func(t, _ float64) float64 {
		if t > 1 {
			return math.Inf(1)
		}
		return 1
	}, none, none)
	for _, c := range []struct {
		name string
		c    *problems.Case
		text string
	}{
		{"not a number after 1", root, "not finite"},
		{"infinite at 1", burst, ""},
		{"infinite after 1", wall, "not finite"},
	} {
		g := start(t, c.c, 1e-6)
		stop := g.Run(context.Background(), 2, 0, nil, nil)
		if stop.Reason != ode.Failed {
			t.Errorf("%s: reason %d at %g, want a failure", c.name, stop.Reason, stop.T)
			continue
		}
		text := stop.Failure.Error()
		if !strings.Contains(text, c.text) || !strings.Contains(text, "y1") || math.Abs(stop.T-1) > 0.01 || stop.Failure.T != stop.T {
			t.Errorf("%s: at %g: %s", c.name, stop.T, text)
		}
		if s := g.Stats(); s.Steps+s.Rejected > 400 {
			t.Errorf("%s: %d steps and %d rejections", c.name, s.Steps, s.Rejected)
		}
	}
}

// TestFailureNamesState has one bad state among coupled ones; it must be named first.
func TestFailureNamesState(t *testing.T) {
	c := problems.Hires()
	rates := c.Rates
	c.Rates = func(f []float64, t float64, y []float64) {
		rates(f, t, y)
		if t > 3 {
			f[4] = math.NaN()
		}
	}
	g := start(t, c, 1e-6)
	stop := g.Run(context.Background(), 10, 0, nil, nil)
	if stop.Reason != ode.Failed || stop.Failure.Worst[0].Name != "y5" {
		t.Errorf("reason %d: %v", stop.Reason, stop.Failure)
	}
	if f := g.Restart(4, g.State()); f == nil || f.Worst[0].Name != "y5" {
		t.Errorf("a restart in the bad part says %v", f)
	}
}

// TestBadQuadrature has a quadrature that is not a number while all states are fine.
func TestBadQuadrature(t *testing.T) {
	p := swing().Bind(nil, true)
	p.System = badQuadrature{p.System}
	g := ode.New(p, rosenbrock.Rodas5P, ode.Tolerance{Abs: 1e-6})
	if f := g.Restart(0, []float64{0, 1}); f != nil {
		t.Fatal(f)
	}
	if stop := g.Run(context.Background(), 5, 0, nil, nil); stop.Reason != ode.Failed || math.Abs(stop.T-2) > 0.01 {
		t.Errorf("reason %d at %g", stop.Reason, stop.T)
	}
}

type badQuadrature struct{ ode.System }

func (b badQuadrature) Rates(f, q []float64, t float64, y []float64) {
	b.System.Rates(f, q, t, y)
	if t > 2 {
		q[1] = math.NaN()
	}
}

// TestFirst runs the same segment again and again from the same state: with the step that the last run
// offered, it must take fewer steps than from the guess, and none may be rejected.
func TestFirst(t *testing.T) {
	c := single(0, func(_, y float64) float64 { return 100 - y }, func(_, _ float64) float64 { return -1 }, none)
	run := func(first float64) (ode.Stop, ode.Stats) {
		g := start(t, c, 1e-6)
		return g.Run(context.Background(), 0.5, first, nil, nil), g.Stats()
	}
	guessed, before := run(0)
	_, after := run(guessed.First)
	if after.Steps >= before.Steps || after.Rejected > 0 {
		t.Errorf("%d steps and %d rejected with a first step, %d without", after.Steps, after.Rejected, before.Steps)
	}
}

// TestNoAllocationsInRuns compares the allocations of a short and a long run with events.
func TestNoAllocationsInRuns(t *testing.T) {
	g := start(t, swing(), 1e-8)
	events := []ode.Event{height(1, 2)}
	end := 0.0
	run := func(span float64) float64 {
		return testing.AllocsPerRun(5, func() {
			end += span
			g.Run(context.Background(), end, 0, events, nil)
		})
	}
	run(1)
	if short, long := run(1), run(100); long > short || short > 2 {
		t.Errorf("%g allocations in a short run, %g in a long one", short, long)
	}
}

// TestConsistent solves algebraic states at a restart: linear, strongly bent, without a solution, singular.
func TestConsistent(t *testing.T) {
	algebraic := func(f, fz func(y, z float64) float64) *problems.Case {
		return &problems.Case{
			Name: "algebraic", Start: []float64{2, 30}, Mass: []float64{1, 0}, Floor: []float64{1},
			Rates: func(dst []float64, _ float64, y []float64) { dst[0], dst[1] = -y[0], f(y[0], y[1]) },
			Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
				const h = 1e-6
				add(0, 0, -1)
				add(1, 0, (f(y[0]+h, y[1])-f(y[0]-h, y[1]))/(2*h))
				add(1, 1, fz(y[0], y[1]))
			},
		}
	}
	for _, c := range []struct {
		name  string
		f, fz func(y, z float64) float64
		want  float64 // not a number: no solution
	}{
		{"linear, with a large coupling", func(y, z float64) float64 { return 1e6*y - z }, func(_, _ float64) float64 { return -1 }, 2e6},
		{"cubic", func(y, z float64) float64 { return y - z*z*z }, func(_, z float64) float64 { return -3 * z * z }, math.Cbrt(2)},
		{"arc tangent from far", func(_, z float64) float64 { return -math.Atan(z - 1) }, func(_, z float64) float64 { return -1 / (1 + (z-1)*(z-1)) }, 1},
		{"no solution", func(_, z float64) float64 { return -1 - z*z }, func(_, z float64) float64 { return -2 * z }, math.NaN()},
		{"singular", func(y, _ float64) float64 { return y }, func(_, _ float64) float64 { return 0 }, math.NaN()},
	} {
		p := algebraic(c.f, c.fz).Bind(nil, false)
		g := ode.New(p, rosenbrock.Rodas5P, ode.Tolerance{Abs: 1e-6})
		f := g.Restart(0, []float64{2, 30})
		switch {
		case math.IsNaN(c.want):
			if f == nil || f.Error() == "" {
				t.Errorf("%s: solved as %v", c.name, g.State())
			}
		case f != nil:
			t.Errorf("%s: %v", c.name, f)
		case g.State()[0] != 2 || math.Abs(g.State()[1]-c.want) > 1e-6*math.Max(1, c.want):
			t.Errorf("%s: the states are %v, want 2 and %g", c.name, g.State(), c.want)
		}
	}
}

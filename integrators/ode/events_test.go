package ode_test

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"workheat/integrators/ode"
	"workheat/integrators/problems"
	"workheat/integrators/rosenbrock"
)

// swing is y1 = sin t, y2 = cos t.
func swing() *problems.Case {
	return &problems.Case{
		Name: "swing", Start: []float64{0, 1}, Floor: []float64{1},
		Rates: func(f []float64, _ float64, y []float64) { f[0], f[1] = y[1], -y[0] },
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, _ []float64) {
			add(0, 1, 1)
			add(1, 0, -1)
		},
	}
}

// start returns an integrator of the case at time zero.
func start(t *testing.T, c *problems.Case, tol float64) *ode.Integrator {
	t.Helper()
	g := ode.New(c.Bind(nil, true), rosenbrock.Rodas5P, ode.Tolerance{Rel: tol, Abs: tol})
	if f := g.Restart(0, c.Start); f != nil {
		t.Fatal(f)
	}
	return g
}

// height is an event of the swing: sign·(y1 − level) passes zero.
func height(sign, level float64) ode.Event {
	return ode.Event{
		Name: "height", Accuracy: 1e-9,
		Value: func(_ float64, y []float64) float64 { return sign * (y[0] - level) },
	}
}

// clock is an event at a phase of time alone.
func clock(phase func(t float64) float64) ode.Event {
	return ode.Event{Name: "clock", Accuracy: 1e-9, Value: func(t float64, _ []float64) float64 { return phase(t) }}
}

// TestEvents finds events at known times of the swing, whose steps at this tolerance are about a second long.
func TestEvents(t *testing.T) {
	third := math.Asin(1. / 3)
	cases := []struct {
		name   string
		end    float64
		events []ode.Event
		which  int // -1: none
		at     float64
	}{
		{"rising", 4, []ode.Event{height(1, 1./3)}, 0, third},
		{"falling", 4, []ode.Event{height(-1, 1./3)}, 0, math.Pi - third},
		{"falling though it starts past", 4, []ode.Event{height(-1, -1./3)}, 0, math.Pi + third},
		{"at the start does not count", 7, []ode.Event{height(1, 0)}, 0, 2 * math.Pi},
		{"never", 10, []ode.Event{height(1, 1.1)}, -1, 10},
		{"the earlier of two, later in the list", 4, []ode.Event{height(1, 0.9), height(1, 1./3)}, 1, third},
		{"both at once: the first in the list", 4, []ode.Event{height(1, 2), height(1, 1./3), height(1, 1./3)}, 1, third},
		{"both directions", 9, []ode.Event{height(1, -0.5), height(-1, -0.5)}, 1, math.Pi + math.Asin(0.5)},
		{"the first of many in a step", 1, []ode.Event{clock(func(t float64) float64 { return math.Sin(20*t - 3) })}, 0, 3. / 20},
		{"there and back in a step", 1, []ode.Event{clock(func(t float64) float64 { return 0.01 - (t-0.31)*(t-0.31) })}, 0, 0.21},
		{"past, back and past again", 2, []ode.Event{clock(func(t float64) float64 { return (t - 0.2) * (t - 0.5) })}, 0, 0.5},
		{"at the end of the run", 0.75, []ode.Event{clock(func(t float64) float64 { return t - 0.75 })}, 0, 0.75},
		{"just after the start", 1, []ode.Event{clock(func(t float64) float64 { return t - 1e-7 })}, 0, 1e-7},
		{"steep", 1, []ode.Event{clock(func(t float64) float64 { return 1e6 * math.Tanh(1e3*(t-0.4)) })}, 0, 0.4},
		{"flat", 1, []ode.Event{clock(func(t float64) float64 { return math.Pow(t-0.4, 3) })}, 0, 0.4},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			g := start(t, swing(), 1e-8)
			stop := g.Run(context.Background(), c.end, 0, c.events, nil)
			if c.which < 0 {
				if stop.Reason != ode.Reached || stop.T != c.end {
					t.Errorf("stopped at %g for reason %d, want the end", stop.T, stop.Reason)
				}
				return
			}
			if stop.Reason != ode.Passed || stop.Event != c.which {
				t.Fatalf("reason %d, event %d at %g, want event %d", stop.Reason, stop.Event, stop.T, c.which)
			}
			e := &c.events[c.which]
			v := e.Value(g.Time(), g.State())
			if v < 0 || (c.name != "steep" && v > e.Accuracy) {
				t.Errorf("the value at the stop is %g, want from 0 to %g", v, e.Accuracy)
			}
			tolerance := 3e-8
			if c.name == "flat" {
				tolerance = 2e-3 // the cube root of the accuracy
			}
			if math.Abs(stop.T-c.at) > tolerance || stop.T > c.end {
				t.Errorf("stopped at %.12g, want %.12g", stop.T, c.at)
			}
			if q := g.Quadratures(); math.Abs(q[0]-g.State()[0]) > 1e-14 {
				t.Errorf("the quadrature is %.16g, the state %.16g", q[0], g.State()[0])
			}
		})
	}
}

// TestEventSeries goes on after each event: none is found twice, none is missed, and the times do not drift.
func TestEventSeries(t *testing.T) {
	for _, tol := range []float64{1e-4, 1e-6, 1e-9} {
		g := start(t, swing(), tol)
		events := []ode.Event{height(1, 0.25), height(-1, 0.25)}
		base := math.Asin(0.25)
		for k := range 20 {
			stop := g.Run(context.Background(), 100, 0, events, nil)
			turn := float64(k / 2)
			want := base + 2*math.Pi*turn
			if k%2 == 1 {
				want = math.Pi - base + 2*math.Pi*turn
			}
			if stop.Reason != ode.Passed || stop.Event != k%2 || math.Abs(stop.T-want) > 100*tol*(1+want) {
				t.Fatalf("tolerance %g, event %d: %d at %.9g, want %d at %.9g", tol, k, stop.Event, stop.T, k%2, want)
			}
		}
	}
}

// TestEventsAtRandom stops at random heights in both directions; the stop must be on the right side, within
// the accuracy, and at the closed form's time.
func TestEventsAtRandom(t *testing.T) {
	rng := rand.New(rand.NewPCG(17, 19))
	for range 300 {
		level := 1.98*rng.Float64() - 0.99
		want := math.Asin(level)
		if want <= 0 {
			want += 2 * math.Pi // it starts past
		}
		e := height(1, level)
		if rng.IntN(2) == 0 {
			e, want = height(-1, level), math.Pi-math.Asin(level)
		}
		g := start(t, swing(), 1e-9)
		stop := g.Run(context.Background(), 8, 3*rng.Float64(), []ode.Event{e}, nil)
		v := e.Value(g.Time(), g.State())
		slope := math.Sqrt(1 - level*level)
		if stop.Reason != ode.Passed || v < 0 || v > e.Accuracy || math.Abs(stop.T-want)*slope > 2e-8 {
			t.Errorf("level %g: reason %d at %.12g with value %g, want %.12g", level, stop.Reason, stop.T, v, want)
		}
	}
}

// TestCoarseEvents finds a coarse event that a step ends past as any other, and may leave one that passes there and
// back within a step.
func TestCoarseEvents(t *testing.T) {
	coarse := func(e ode.Event) ode.Event {
		e.Coarse = true
		return e
	}
	back := clock(func(t float64) float64 { return 0.01 - (t-0.31)*(t-0.31) })
	cases := []struct {
		name   string
		events []ode.Event
		which  int // -1: none
		at     float64
	}{
		{"alone", []ode.Event{coarse(height(1, 1./3))}, 0, math.Asin(1. / 3)},
		{"the later of two", []ode.Event{coarse(height(-1, 0.9)), height(1, 1./3)}, 1, math.Asin(1. / 3)},
		{"the earlier of two", []ode.Event{height(-1, 0.9), coarse(height(1, 1./3))}, 1, math.Asin(1. / 3)},
		{"there and back in a step", []ode.Event{coarse(back)}, -1, 0.7},
		{"there and back beside one that is not coarse", []ode.Event{coarse(back), height(1, 2)}, 0, 0.21},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			g := start(t, swing(), 1e-4)
			stop := g.Run(context.Background(), 0.7, 0.7, c.events, nil)
			if c.which < 0 && stop.Reason != ode.Reached || c.which >= 0 && (stop.Reason != ode.Passed || stop.Event != c.which) {
				t.Fatalf("reason %d, event %d, want event %d", stop.Reason, stop.Event, c.which)
			}
			if math.Abs(stop.T-c.at) > 1e-4 {
				t.Errorf("stopped at %.12g, want %.12g", stop.T, c.at)
			}
		})
	}
}

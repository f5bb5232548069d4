package ode_test

import (
	"context"
	"math"
	"testing"

	"workheat/integrators/ode"
)

// A fake steps y = t exactly, with a dense output that bulges by bump·θ(1−θ) in between, with ends that
// refuse to be finished as often as refuse says, and with an infinite error for steps longer than most.
type fake struct {
	bump   float64
	refuse int
	most   float64 // 0: no limit
	wall   float64 // steps that start here or later have an error of twice the tolerance; 0: none have
	tries  int
	step   ode.Step
	stats  ode.Stats
}

func (f *fake) Name() string                  { return "fake" }
func (f *fake) Order() int                    { return 2 }
func (f *fake) Estimate() int                 { return 1 }
func (f *fake) Degree() int                   { return 2 }
func (f *fake) Bind(*ode.Problem) ode.Stepper { return f }

func (f *fake) Start(t float64, y []float64) bool {
	f.step = ode.Step{T: t, Y0: []float64{y[0]}, Y1: []float64{0}, Err: []float64{0}, D: []float64{1}, F: []float64{1}}
	return true
}

func (f *fake) Try(to float64) bool {
	f.step.End, f.step.H, f.step.Y1[0], f.step.Err[0] = to, to-f.step.T, to, 0
	if f.most > 0 && f.step.H > f.most {
		f.step.Err[0] = math.Inf(1)
	}
	if f.wall > 0 && f.step.T >= f.wall {
		f.step.Err[0] = 2
	}
	if f.tries++; f.tries > 1e4 {
		panic("the run does not end")
	}
	return true
}

func (f *fake) Step() *ode.Step { return &f.step }

func (f *fake) Finish() bool {
	f.refuse--
	return f.refuse < 0
}

func (f *fake) Accept() { f.step.T, f.step.Y0[0] = f.step.End, f.step.End }

func (f *fake) Dense(dst []float64) {
	dst[0], dst[1], dst[2] = f.step.T, f.step.H+f.bump, -f.bump
}

func (f *fake) Newton([]float64) bool { return true }
func (f *fake) Suspect() int          { return -1 }
func (f *fake) Stats() *ode.Stats     { return &f.stats }

func runFake(f *fake, end, level float64) (*ode.Integrator, ode.Stop) {
	g := ode.New(&ode.Problem{N: 1}, f, ode.Tolerance{Abs: 1})
	g.Restart(0, []float64{0})
	e := ode.Event{Accuracy: 1e-9, Value: func(_ float64, y []float64) float64 { return y[0] - level }}
	return g, g.Run(context.Background(), end, end, []ode.Event{e}, nil)
}

// TestBulge has a dense output that touches an event which the step itself never meets: the whole step must
// be taken. Where the step meets it later than the dense output, the step counts.
func TestBulge(t *testing.T) {
	if g, stop := runFake(&fake{bump: 2}, 1, 1.02); stop.Reason != ode.Reached || stop.T != 1 || g.State()[0] != 1 {
		t.Errorf("reason %d at %g with y = %v, want the end", stop.Reason, stop.T, g.State())
	}
	for _, bump := range []float64{2, 0.1, -0.1, -0.5} {
		g, stop := runFake(&fake{bump: bump}, 1, 0.95)
		if y := g.State()[0]; stop.Reason != ode.Passed || y < 0.95 || y > 0.95+1e-9 || stop.T != y {
			t.Errorf("bump %g: reason %d at %.12g with y = %.12g, want 0.95", bump, stop.Reason, stop.T, y)
		}
	}
}

// TestRefusedEnd refuses to finish steps: some are rejections, many end the run with nothing changed.
func TestRefusedEnd(t *testing.T) {
	g, stop := runFake(&fake{refuse: 3}, 1, 2)
	if s := g.Stats(); stop.Reason != ode.Reached || s.Rejected != 3 {
		t.Errorf("reason %d, %d rejected, want the end and 3", stop.Reason, s.Rejected)
	}
	g, stop = runFake(&fake{refuse: 100}, 1, 2)
	if s := g.Stats(); stop.Reason != ode.Failed || s.Steps != 0 || g.Time() != 0 || stop.Failure.Worst[0].Name != "state 0" {
		t.Errorf("reason %d at %g, want a failure at the start", stop.Reason, stop.T)
	}
}

// TestInfiniteError has an infinite error for long steps: they are rejected and a quarter as long tried.
func TestInfiniteError(t *testing.T) {
	g, stop := runFake(&fake{most: 0.1}, 1, 2)
	if s := g.Stats(); stop.Reason != ode.Reached || s.Rejected < 2 || s.Steps < 10 {
		t.Errorf("reason %d, %d steps, %d rejected", stop.Reason, s.Steps, s.Rejected)
	}
}

// TestWall meets an error that no step makes smaller, at times whose last digits differ: the shortest step, which is
// rounded where it starts, must end the run each time.
func TestWall(t *testing.T) {
	for k := 1; k <= 500; k++ {
		wall := 1e-3 * float64(k) / 7
		f := &fake{wall: wall}
		g := ode.New(&ode.Problem{N: 1}, f, ode.Tolerance{Abs: 1})
		g.Restart(0, []float64{0})
		g.Run(context.Background(), wall, wall, nil, nil)
		if stop := g.Run(context.Background(), 2*wall, wall, nil, nil); stop.Reason != ode.Failed || stop.T != wall {
			t.Errorf("reason %d at %g, want a failure at %g", stop.Reason, stop.T, wall)
		}
	}
}

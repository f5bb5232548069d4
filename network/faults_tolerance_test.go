package network

import (
	"context"
	"testing"

	"workheat/network/energy"
)

// check returns the check of a name.
func check(t *testing.T, b *energy.Book, name string) energy.Check {
	t.Helper()
	for _, c := range b.Checks {
		if c.Name == name {
			return c
		}
	}
	t.Fatalf("the book has no check %q", name)
	return energy.Check{}
}

// The third layer passes at every tolerance of a sound run, and its gap falls with the tolerance.
func TestToleranceOfSoundRun(t *testing.T) {
	last := 1e3
	for _, rel := range []float64{1e-3, 1e-5, 1e-7} {
		b := load(t, corner).Run(context.Background(), Options{Rel: rel, Audit: true, Tolerance: true}).Book
		c := check(t, b, "tolerance")
		if c.Layer != 3 || !c.Passed || !b.Closed {
			t.Errorf("at %g:\n%s", rel, account(b))
		}
		if !(c.Gap > 0 && c.Gap < last/5) {
			t.Errorf("at %g: gap %g K, want above zero and below a fifth of %g K", rel, c.Gap, last)
		}
		last = c.Gap
	}
}

// A run that is less accurate than it says is seen by the third layer.
func TestToleranceNotKept(t *testing.T) {
	opt := Options{Rel: 1e-2, Audit: true}
	r := newRunner(load(t, corner), opt, nil)
	res := r.run(context.Background(), opt)
	if !res.Book.Closed {
		t.Fatalf("at the tolerance kept:\n%s", account(res.Book))
	}
	res.Rel, res.Abs = 1e-8, 1e-8
	r.toleranceCheck(context.Background())
	if c := check(t, res.Book, "tolerance"); c.Passed || res.Book.Closed || c.Where == "" {
		t.Errorf("not seen:\n%s", account(res.Book))
	}
	if c := recountAt(res.Rel, r); c.Passed {
		t.Errorf("the recount lets a run at 1e-2 pass for one at 1e-8: gap %g J of %g J", c.Gap, c.Allowed)
	}
}

// recountAt makes the book anew with another tolerance and returns its recount.
func recountAt(rel float64, r *runner) energy.Check {
	run := r.evidence()
	run.Rel, run.Abs = rel, rel
	for _, c := range energy.Make(run).Checks {
		if c.Name == "recount" {
			return c
		}
	}
	return energy.Check{Passed: true}
}

// A temperature that is not a number does not pass.
func TestToleranceOfNoNumber(t *testing.T) {
	b := &energy.Book{}
	zero := 0.0
	b.AddTolerance([]string{"disc"}, []float64{zero / zero}, []float64{300}, 1)
	if b.Closed || b.Checks[0].Where != "disc" {
		t.Errorf("got %+v", b.Checks[0])
	}
}

// An interrupted run keeps what it had, and its book closes over that.
func TestInterruptedRunsClose(t *testing.T) {
	for stop := range 6 {
		ctx, cancel := context.WithCancel(context.Background())
		legs := 0
		opt := Options{Audit: true, Tolerance: true, Progress: func(float64, string) {
			if legs++; legs == stop {
				cancel()
			}
		}}
		if stop == 0 {
			cancel()
		}
		res := load(t, corner).Run(ctx, opt)
		cancel()
		if !res.Interrupted {
			t.Fatalf("stop after %d legs: not interrupted", stop)
		}
		switch {
		case stop == 0 && res.Book != nil:
			t.Errorf("interrupted before the first step: a book of nothing\n%s", account(res.Book))
		case stop > 0 && (res.Book == nil || !res.Book.Closed):
			t.Errorf("stop after %d legs: the book does not close", stop)
		case stop > 0:
			consistent(t, res.Book)
		}
	}
}

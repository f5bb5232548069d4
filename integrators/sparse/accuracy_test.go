package sparse

import (
	"math"
	"slices"
	"testing"

	"gonum.org/v1/gonum/mat"
)

func TestReciprocalCondition(t *testing.T) {
	for _, p := range []*Pattern{NewPattern(1, nil), chainOf(12), brakeTwelve(), brake(5), grid(6, 6)} {
		for _, symmetric := range []bool{true, false} {
			for _, capacity := range []float64{1, 1e-4, 1e-8} {
				a, shift := conduction(p, 2, !symmetric)
				for i := range shift {
					shift[i] *= capacity
				}
				v := NewSolver(p, symmetric)
				if err := v.Factor(a, shift); err != nil {
					t.Fatal(err)
				}
				got, want := v.ReciprocalCondition(a, shift), 1/mat.Cond(full(p, symmetric, a, shift), 1)
				if got < want*(1-1e-4) || got > 3*want { // round-off of 1e-16 over 1e-12
					t.Errorf("%d unknowns, symmetric %t, capacity %g: %g, want %g", p.N, symmetric, capacity, got, want)
				}
			}
		}
	}
}

// One column of the inverse outweighs all others by far.
func TestReciprocalConditionOfOneWeakNode(t *testing.T) {
	p := NewPattern(50, nil)
	a, shift := make([]float64, 50), slices.Repeat([]float64{1}, 50)
	shift[31] = 1e-6
	v := NewSolver(p, true)
	if err := v.Factor(a, shift); err != nil {
		t.Fatal(err)
	}
	if got := v.ReciprocalCondition(a, shift); math.Abs(got-1e-6) > 1e-18 {
		t.Errorf("reciprocal condition %g, want 1e-6", got)
	}
	if least, most := v.PivotRange(); math.Abs(least-1e-6) > 1e-21 || most != 1 {
		t.Errorf("pivots from %g to %g, want 1e-6 to 1", least, most)
	}
}

// Factors of a nearby matrix serve as a preconditioner.
func TestRefineConverges(t *testing.T) {
	p := brake(5)
	a, shift := conduction(p, 6, true)
	v := NewSolver(p, false)
	if err := v.Factor(a, shift); err != nil {
		t.Fatal(err)
	}
	for i := range shift {
		shift[i] *= 1.2
	}
	b := ramp(p.N)
	x := make([]float64, p.N)
	v.Solve(x, b)
	correction := 1.0
	for sweep := 0; correction > 1e-15; sweep++ {
		if sweep == 30 {
			t.Fatal("refinement does not converge")
		}
		correction = v.Refine(x, b, a, shift)
	}
	if d := distance(x, oracle(t, full(p, false, a, shift), b)); d > 1e-14 {
		t.Errorf("off by %g", d)
	}
	if e := v.Refine(make([]float64, p.N), make([]float64, p.N), a, shift); e != 0 {
		t.Errorf("refining an exact solution moves it by %g", e)
	}
}

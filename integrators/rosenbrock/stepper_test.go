package rosenbrock

import (
	"math"
	"testing"

	"workheat/integrators/ode"
	"workheat/integrators/problems"
)

// TestGeneralForm takes the same steps with Rodas5P and with a copy of it that hides its stiffly accurate
// structure from the stepper: the short cuts must change nothing beyond round-off.
func TestGeneralForm(t *testing.T) {
	hidden := *Rodas5P
	hidden.Err = append([]float64(nil), hidden.Err...)
	hidden.Err[0] = 1e-300
	hidden.A = append([][]float64(nil), hidden.A...)
	for i, row := range hidden.A {
		hidden.A[i] = append([]float64(nil), row...)
		if i > 5 {
			hidden.A[i][0] = math.Nextafter(row[0], 0)
		}
	}
	c := problems.ChemicalAkzoNobel()
	p := c.Bind(c.Relative(), true)
	a, b := Rodas5P.Bind(p).(*stepper), hidden.Bind(p).(*stepper)
	if !a.stiff || b.stiff || !a.extends[6] || b.extends[6] {
		t.Fatal("the copy is not hidden")
	}
	for _, st := range []*stepper{a, b} {
		if !st.Start(0, c.Start) || !st.Try(0.1) {
			t.Fatal("a step failed")
		}
	}
	for i := range c.Start {
		for _, pair := range [][2]float64{
			{a.step.Y1[i], b.step.Y1[i]}, {a.step.Err[i], b.step.Err[i]}, {a.step.Quad[i], b.step.Quad[i]},
		} {
			if math.Abs(pair[0]-pair[1]) > 1e-13 {
				t.Errorf("state %d: %.17g, hidden %.17g", i, pair[0], pair[1])
			}
		}
	}
}

// TestOtherMethod runs a method of order 3 with a general error row through the same stepper.
func TestOtherMethod(t *testing.T) {
	c := problems.ChemicalAkzoNobel()
	g := ode.New(c.Bind(c.Relative(), false), ros34pw2, ode.Tolerance{Abs: 1e-5})
	if f := g.Restart(0, c.Start); f != nil {
		t.Fatal(f)
	}
	if stop := g.Run(t.Context(), 180, 0, nil, nil); stop.Reason != ode.Reached {
		t.Fatal(stop.Failure)
	}
	for i, want := range c.Answers[0].Y {
		if got := g.State()[i]; math.Abs(got-want) > 1e-3*(math.Abs(want)+c.FloorOf(i)) {
			t.Errorf("y%d is %.8g, want %.8g", i+1, got, want)
		}
	}
}

// TestAlgebraicNewton checks that Newton's change solves the algebraic rows exactly where they are linear,
// and leaves the other states where they are.
func TestAlgebraicNewton(t *testing.T) {
	c := problems.ChemicalAkzoNobel()
	st := Rodas5P.Bind(c.Bind(c.Relative(), false))
	y := append([]float64(nil), c.Start...)
	y[5] = 7
	st.Start(0, y)
	v := make([]float64, 6)
	if !st.Newton(v) {
		t.Fatal("a singular matrix")
	}
	for i, x := range v {
		want := 0.0
		if i == 5 {
			want = 115.83*y[0]*y[3] - 7
		}
		if got := x * st.Step().D[i]; math.Abs(got-want) > 1e-12 {
			t.Errorf("the change of y%d is %g, want %g", i+1, got, want)
		}
	}
}

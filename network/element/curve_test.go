package element

import (
	"math"
	"testing"

	"workheat/network/unit"
)

func TestCurve(t *testing.T) {
	c := MustCurve([]float64{0, 10, 10, 20}, []float64{1, 3, 5, 5}) // a jump at 10
	cases := []struct{ x, y, slope, integral float64 }{
		{-2, 1, 0, -2},
		{0, 1, 0.2, 0},
		{5, 2, 0.2, 7.5},
		{10, 5, 0, 20}, // on the right of the jump
		{15, 5, 0, 45},
		{20, 5, 0, 70},
		{30, 5, 0, 120},
	}
	for _, k := range cases {
		if c.At(k.x) != k.y || c.Slope(k.x) != k.slope || math.Abs(c.Integral(k.x)-k.integral) > 1e-12 {
			t.Errorf("at %g: y %g, slope %g, integral %g; want %g, %g, %g", k.x, c.At(k.x), c.Slope(k.x), c.Integral(k.x), k.y, k.slope, k.integral)
		}
	}
	if d := c.Scaled(2); d.At(5) != 4 || d.Integral(5) != 15 || c.At(5) != 2 {
		t.Errorf("scaled: %g and %g", d.At(5), d.Integral(5))
	}
	if c.IsConstant() || !Constant(4).IsConstant() || Constant(4).Integral(3) != 12 {
		t.Error("constant")
	}
}

func TestBadCurves(t *testing.T) {
	for name, xy := range map[string][2][]float64{
		"empty":        {{}, {}},
		"unequal":      {{1, 2}, {1}},
		"falling":      {{1, 0}, {1, 1}},
		"three at one": {{1, 1, 1}, {1, 2, 3}},
		"not a number": {{1, 2}, {1, math.NaN()}},
		"infinite":     {{1, math.Inf(1)}, {1, 1}},
	} {
		if _, err := NewCurve(xy[0], xy[1]); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}

// Sample must keep its promise between its corners, and place few of them.
func TestSample(t *testing.T) {
	f := func(x float64) float64 { return 1 + 1/(1.01-x) } // steep towards 1
	x, y := Sample(f, 0, 1, 1e-4)
	c := MustCurve(x, y)
	for i := range 5000 {
		at := float64(i) / 5000
		if off := math.Abs(c.At(at)/f(at) - 1); off > 2e-4 {
			t.Fatalf("off by %g at %g", off, at)
		}
	}
	if len(x) > 400 {
		t.Errorf("%d corners", len(x))
	}
}

func TestFieldRange(t *testing.T) {
	f := Field{Key: "x", Want: unit.Number}.From(0, 1)
	g := Field{Key: "x", Want: unit.Number}.Positive()
	for _, k := range []struct {
		f  Field
		x  float64
		ok bool
	}{{f, 0, true}, {f, 1, true}, {f, -1e-9, false}, {f, 1.1, false}, {g, 0, false}, {g, 1e300, true}, {Field{}, -5, true}, {f, math.NaN(), false}} {
		if got := k.f.Outside(k.x) == ""; got != k.ok {
			t.Errorf("%+v at %g: %q", k.f, k.x, k.f.Outside(k.x))
		}
	}
}

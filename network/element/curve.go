package element

import (
	"fmt"
	"math"
	"sort"
)

// A Curve is a piecewise-linear function y(x) given by its corners. Two corners at one x make a jump.
// Outside its corners a curve keeps its end values. The zero value is not usable; make one with NewCurve.
type Curve struct {
	X, Y []float64 // corners, X never falling; read only
	sum  []float64 // integral of y from X[0] to each corner
}

// NewCurve returns the curve through the corners (x[i], y[i]). There must be at least one corner, x must
// not fall, all values must be finite, and no more than two corners may share an x. The slices are kept.
func NewCurve(x, y []float64) (*Curve, error) {
	if len(x) == 0 || len(x) != len(y) {
		return nil, fmt.Errorf("a curve needs as many y as x, and at least one: got %d and %d", len(x), len(y))
	}
	for i := range x {
		if math.IsNaN(x[i]-x[i]) || math.IsNaN(y[i]-y[i]) {
			return nil, fmt.Errorf("row %d is not finite", i+1)
		}
		if i > 0 && x[i] < x[i-1] {
			return nil, fmt.Errorf("row %d goes back from %g to %g", i+1, x[i-1], x[i])
		}
		if i > 1 && x[i] == x[i-2] {
			return nil, fmt.Errorf("row %d is the third at %g", i+1, x[i])
		}
	}
	c := &Curve{X: x, Y: y, sum: make([]float64, len(x))}
	for i := 1; i < len(x); i++ {
		c.sum[i] = c.sum[i-1] + 0.5*(y[i]+y[i-1])*(x[i]-x[i-1])
	}
	return c, nil
}

// MustCurve is NewCurve for tables written in the program; it panics on a bad one.
func MustCurve(x, y []float64) *Curve {
	c, err := NewCurve(x, y)
	if err != nil {
		panic("element: " + err.Error())
	}
	return c
}

// Constant returns the curve that is y everywhere.
func Constant(y float64) *Curve { return MustCurve([]float64{0}, []float64{y}) }

// piece returns i such that x lies in [X[i], X[i+1]), or -1 before the first corner, or len(X)-1 from the
// last corner on.
func (c *Curve) piece(x float64) int {
	return sort.Search(len(c.X), func(i int) bool { return c.X[i] > x }) - 1
}

// At returns y(x); at a jump the value on the right.
func (c *Curve) At(x float64) float64 {
	i := c.piece(x)
	switch {
	case i < 0:
		return c.Y[0]
	case i == len(c.X)-1:
		return c.Y[i]
	}
	return c.Y[i] + c.Slope(x)*(x-c.X[i])
}

// Slope returns dy/dx at x; at a corner the slope on the right.
func (c *Curve) Slope(x float64) float64 {
	i := c.piece(x)
	if i < 0 || i == len(c.X)-1 {
		return 0
	}
	return (c.Y[i+1] - c.Y[i]) / (c.X[i+1] - c.X[i])
}

// Integral returns the integral of y from the first corner to x, which may lie outside the corners.
func (c *Curve) Integral(x float64) float64 {
	i := c.piece(x)
	switch last := len(c.X) - 1; {
	case i < 0:
		return c.Y[0] * (x - c.X[0])
	case i == last:
		return c.sum[last] + c.Y[last]*(x-c.X[last])
	}
	return c.sum[i] + 0.5*(c.Y[i]+c.At(x))*(x-c.X[i])
}

// IsConstant reports whether y is the same everywhere.
func (c *Curve) IsConstant() bool {
	for _, y := range c.Y {
		if y != c.Y[0] {
			return false
		}
	}
	return true
}

// Scaled returns the curve whose y is k times this one's; x is shared.
func (c *Curve) Scaled(k float64) *Curve {
	y := make([]float64, len(c.Y))
	for i := range y {
		y[i] = k * c.Y[i]
	}
	return MustCurve(c.X, y)
}

// Sample returns corners of a curve through f on [low, high], placed by halving until the chord of each piece
// keeps within tol (relative to f) of f at three points inside it, or the piece is a two-millionth of the
// interval. It serves to turn a published formula into a table once; f must be finite and not zero there.
func Sample(f func(float64) float64, low, high, tol float64) (x, y []float64) {
	x, y = []float64{low}, []float64{f(low)}
	var split func(a, b, fa, fb float64, depth int)
	split = func(a, b, fa, fb float64, depth int) {
		good := depth > 0
		for _, s := range [3]float64{0.25, 0.5, 0.75} {
			at := f(a + s*(b-a))
			if math.Abs(fa+s*(fb-fa)-at) > tol*math.Abs(at) {
				good = false
			}
		}
		if good || depth > 20 {
			x, y = append(x, b), append(y, fb)
			return
		}
		m := 0.5 * (a + b)
		fm := f(m)
		split(a, m, fa, fm, depth+1)
		split(m, b, fm, fb, depth+1)
	}
	split(low, high, f(low), f(high), 0)
	return x, y
}

package problems

import (
	"math"
	"math/rand/v2"
	"testing"

	"workheat/integrators/ode"
)

// TestSlopes checks every Jacobian and time derivative against central differences of the rates, at the
// start and at a point beside it.
func TestSlopes(t *testing.T) {
	for _, c := range All() {
		rng := rand.New(rand.NewPCG(1, 2))
		y := append([]float64(nil), c.Start...)
		for i := range y {
			y[i] = y[i]*(1+0.1*rng.Float64()) + 0.3*c.FloorOf(i)
		}
		if c.Enter != nil {
			c.Enter(0)
		}
		checkSlopes(t, c, 3e-4, y)
	}
}

func checkSlopes(t *testing.T, c *Case, at float64, y []float64) {
	n := c.N()
	jac := make([][]float64, n)
	for i := range jac {
		jac[i] = make([]float64, n)
	}
	ft := make([]float64, n)
	c.Slopes(func(i, j int, v float64) { jac[i][j] += v }, ft, at, y)
	up, down, size := make([]float64, n), make([]float64, n), make([]float64, n)
	c.Rates(size, at, y)
	compare := func(name string, i int, got, want, h float64) {
		// the differences' own error: curvature, and round-off of terms as large as the Jacobian makes them
		noise := 1e-16 / h * (math.Abs(size[i]) + rowSize(jac[i], y))
		if math.Abs(got-want) > 1e-6*math.Abs(want)+30*noise+1e-9 {
			t.Errorf("%s: %s of f%d is %.9g, differences give %.9g", c.Name, name, i+1, got, want)
		}
	}
	for j := range n {
		h := 1e-5 * (math.Abs(y[j]) + c.FloorOf(j))
		old := y[j]
		y[j] = old + h
		c.Rates(up, at, y)
		y[j] = old - h
		c.Rates(down, at, y)
		y[j] = old
		for i := range n {
			compare("a slope", i, jac[i][j], (up[i]-down[i])/(2*h), h)
		}
	}
	const h = 1e-9
	c.Rates(up, at+h, y)
	c.Rates(down, at-h, y)
	for i := range n {
		compare("the slope by time", i, ft[i], (up[i]-down[i])/(2*h), h)
	}
}

func rowSize(row, y []float64) float64 {
	sum := 0.0
	for j, v := range row {
		sum += math.Abs(v * y[j])
	}
	return sum
}

// TestSums checks that the linear relations hold for the rates and for the answers.
func TestSums(t *testing.T) {
	for _, c := range All() {
		for _, w := range c.Sums {
			f := make([]float64, c.N())
			c.Rates(f, 0, c.Start)
			if got, size := weigh(w, f); math.Abs(got) > 1e-14*size {
				t.Errorf("%s: the relation's rate is %g of %g", c.Name, got, size)
			}
			want, _ := weigh(w, c.Start)
			for _, a := range c.Answers {
				if got, size := weigh(w, a.Y); math.Abs(got-want) > 1e-13*size {
					t.Errorf("%s, t = %g: the relation is %.16g, was %.16g", c.Name, a.T, got, want)
				}
			}
		}
	}
}

func weigh(w, y []float64) (sum, size float64) {
	for i, x := range w {
		sum += x * y[i]
		size += math.Abs(x * y[i])
	}
	return sum, size
}

// TestBind checks that the bound system gives the case's rates and, with a scale, A = J·D.
func TestBind(t *testing.T) {
	c := Hires()
	y := []float64{1, 2, 3, 4, 5, 6, 7, 8}
	plain, scaled := c.Bind(nil, false), c.Bind(c.Relative(), true)
	f, q := make([]float64, 8), make([]float64, 8)
	scaled.System.Rates(f, q, 0, y)
	for i := range f {
		if f[i] != q[i] {
			t.Errorf("quadrature rate %d is %g, want f = %g", i, q[i], f[i])
		}
	}
	a, b := slopesOf(plain, y), slopesOf(scaled, y)
	for i := range plain.N {
		for k, j := range plain.Pattern.Row(i) {
			s := int(plain.Pattern.RowStart[i]) + k
			if want := a[s] * (y[j] + 1e-6); math.Abs(b[s]-want) > 1e-12*math.Abs(want) {
				t.Errorf("A(%d,%d) is %g, want %g", i, j, b[s], want)
			}
		}
	}
}

func slopesOf(p *ode.Problem, y []float64) []float64 {
	a, d, ft := make([]float64, p.Pattern.NNZ()), make([]float64, p.N), make([]float64, p.N)
	p.System.Jacobian(a, d, ft, 0, y)
	return a
}

package assembly_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"workheat/network/assembly"
	"workheat/network/element"
)

// lump is a system of one node, which stores by a table.
func lump(c *element.Curve, start float64) *assembly.System {
	return assembly.New([]element.Node{{Name: "lump", Capacity: c, Start: start}}, nil, 2, drive{})
}

// tables of capacity, with kinks, jumps, one piece, equal rows, rise and fall.
var tables = map[string]*element.Curve{
	"constant":                       element.MustCurve([]float64{300}, []float64{300}),
	"constant by rows":               element.MustCurve([]float64{300, 400, 500}, []float64{300, 300, 300}),
	"one ramp":                       element.MustCurve([]float64{300, 400}, []float64{200, 500}),
	"falling":                        element.MustCurve([]float64{300, 400}, []float64{500, 5}),
	"bent":                           bent,
	"latent heat":                    element.MustCurve([]float64{300, 350, 350, 350.5, 350.5, 500}, []float64{400, 420, 1e6, 1e6, 600, 650}),
	"steel peak":                     element.MustCurve([]float64{873, 1008, 1008.001, 1173}, []float64{760, 5000, 4990, 650}),
	"jump at the start of the table": element.MustCurve([]float64{300, 300, 400}, []float64{100, 700, 800}),
	"jump at the end":                element.MustCurve([]float64{300, 400, 400}, []float64{100, 700, 250}),
}

// Temperatures and energies are exact inverses of each other from far below the table to far above it, on
// corners and jumps too; what the equations use is what is reported.
func TestTemperatureAndEnergyAreInverse(t *testing.T) {
	for name, c := range tables {
		low, high := c.X[0], c.X[len(c.X)-1]
		for _, start := range []float64{low - 40, low, 0.5 * (low + high), high, high + 70} {
			s := lump(c, start)
			for _, temp := range places(c) {
				u := s.Energy(0, temp)
				tol := 1e-12*temp + 1e-15*math.Abs(c.Integral(temp))/slices.Min(c.Y)
				if d := s.Temperature(0, u) - temp; math.Abs(d) > tol {
					t.Errorf("%s from %g K: temperature of the energy at %.17g K is off by %g K", name, start, temp, d)
				}
				if d := s.State(0, []float64{u}, nil).T[0] - s.Temperature(0, u); math.Abs(d) > tol {
					t.Errorf("%s from %g K: the equations and the report differ by %g K at %g K", name, start, d, temp)
				}
			}
			if u := s.Energy(0, start); u != 0 {
				t.Errorf("%s: energy %g J at the start temperature %g K", name, u, start)
			}
		}
	}
}

// places are temperatures on, about, between and beyond the corners of a curve.
func places(c *element.Curve) []float64 {
	low, high := c.X[0], c.X[len(c.X)-1]
	list := []float64{low - 150, low - 1e-9, high + 1e-9, high + 300}
	for i, x := range c.X {
		list = append(list, x, math.Nextafter(x, 0), math.Nextafter(x, 1e4))
		if i > 0 {
			list = append(list, 0.5*(x+c.X[i-1]), x-1e-7, c.X[i-1]+1e-7)
		}
	}
	return list
}

// The stored energy is the area under the capacity, summed here by the midpoints of narrow strips.
func TestEnergyIsTheAreaUnderTheCapacity(t *testing.T) {
	for name, c := range tables {
		s := lump(c, c.X[0]-20)
		from, to := c.X[0]-20, c.X[len(c.X)-1]+30
		corners := append(append([]float64{from}, c.X...), to)
		sum := 0.0
		for i := 1; i < len(corners); i++ {
			a, b := corners[i-1], corners[i]
			sum += (b - a) * c.At(0.5*(a+b)) // exact: the capacity is straight between corners
		}
		near(t, name, s.Energy(0, to), sum, 1e-12*sum)
	}
}

// D of the Jacobian is the capacity at the temperature of the state, on the piece in use.
func TestScaleIsTheCapacity(t *testing.T) {
	for name, c := range tables {
		s := lump(c, c.X[0]+1)
		a, d, ft, f := make([]float64, 1), make([]float64, 1), make([]float64, 1), make([]float64, 1)
		for _, temp := range places(c) {
			jump := false
			for i := 1; i < len(c.X); i++ {
				jump = jump || math.Abs(temp-c.X[i]) < 1e-6 && c.X[i] == c.X[i-1]
			}
			if jump {
				continue // either side may be meant
			}
			y := []float64{s.Energy(0, temp)}
			s.Rates(f, nil, 0, y)
			s.Jacobian(a, d, ft, 0, y)
			near(t, fmt.Sprintf("%s at %g K", name, temp), d[0], s.CapacityAt(0, temp), 1e-7*(c.At(temp)+10))
		}
	}
}

// The piece that was last in use does not matter: a walk in any order gives the temperatures of a fresh system;
// on a corner either piece may serve.
func TestPieceInUseDoesNotMatter(t *testing.T) {
	for name, c := range tables {
		s := lump(c, c.X[0]+5)
		random := rand.New(rand.NewPCG(7, 11))
		list := places(c)
		for range 300 {
			u := s.Energy(0, list[random.IntN(len(list))]) * (1 + 1e-3*random.Float64())
			got := s.State(0, []float64{u}, nil).T[0]
			want := lump(c, c.X[0]+5).State(0, []float64{u}, nil).T[0]
			if math.Abs(got-want) > 1e-14*want {
				t.Fatalf("%s: %.17g K after a walk, %.17g K afresh", name, got, want)
			}
		}
	}
}

// A run that starts again forgets where the last one was.
func TestStart(t *testing.T) {
	s := system()
	y := []float64{9, 9, 9, 9}
	s.Start(y)
	for i, want := range []float64{0, 0, 340, 0} {
		if y[i] != want {
			t.Errorf("state of %s at the start: %g, want %g", s.Nodes[i].Name, y[i], want)
		}
	}
	temps := s.State(0, y, nil).T
	for i, want := range []float64{310, 330, 340, 350, 300} {
		near(t, "start of "+s.Nodes[i].Name, temps[i], want, 1e-12)
	}
}

package rosenbrock

import (
	"fmt"
	"math"
	"testing"
)

// tables are all methods, and one of another make that only the tests know: ROS34PW2 of Rang and Angermann,
// BIT 45 (2005) 761, order 3 with an error row that is not the last stage alone.
var tables = []*Table{Rodas5P, ros34pw2}

var ros34pw2 = &Table{
	Label: "ROS34PW2", P: 3, Embedded: 2, Gamma: 0.435866521508459,
	A:     [][]float64{{}, {2}, {1.4192173174557647, -0.2592322116729697}, {4.18476048231916, -0.28519201735549593, 2.294280360279042}},
	C:     [][]float64{{}, {-4.588560720558084}, {-4.18476048231916, 0.28519201735549593}, {-6.368179200128359, -6.795620944466837, 2.8700986043310563}},
	Nodes: []float64{0, 0.871733043016918, 0.7315799577888524, 1},
	Times: []float64{0.435866521508459, -0.435866521508459, -0.4133333762338865, 0},
	B:     []float64{4.1847604823191595, -0.28519201735549565, 2.2942803602790414, 1},
	Err:   []float64{0.2777499476479681, -1.4032398951759992, 1.7726301276675507, 0.5},
	Dense: [][]float64{{0, 0, 0, 0}}, // linear, for the tests' sake
}

// plain are the coefficients in plain form: kᵢ h = Σ γᵢⱼ ... with α, β = α + γ and weights b (Hairer and
// Wanner II, section IV.7): Γ = (diag(1/γ) − C)⁻¹, α = A Γ, b = B Γ.
type plain struct {
	alpha, beta, gamma [][]float64
}

func newPlain(m *Table) plain {
	s := len(m.B)
	var p plain
	p.gamma = make([][]float64, s)
	for i := range s { // rows of the inverse by substitution
		p.gamma[i] = make([]float64, s)
		p.gamma[i][i] = m.Gamma
		for k, c := range m.C[i] {
			for j := range s {
				p.gamma[i][j] += m.Gamma * c * p.gamma[k][j]
			}
		}
	}
	for i := range s {
		p.alpha = append(p.alpha, p.weights(m.A[i]))
		row := make([]float64, s)
		for j := range s {
			row[j] = p.alpha[i][j] + p.gamma[i][j]
		}
		p.beta = append(p.beta, row)
	}
	return p
}

// weights returns row·Γ.
func (p plain) weights(row []float64) []float64 {
	out := make([]float64, len(p.gamma))
	for k, x := range row {
		for j, g := range p.gamma[k] {
			out[j] += x * g
		}
	}
	return out
}

// A tree is a rooted tree: its branches.
type tree []tree

// size returns the number of vertices and the density.
func (t tree) size() (n int, density float64) {
	n, density = 1, 1
	for _, b := range t {
		k, d := b.size()
		n += k
		density *= d
	}
	return n, density * float64(n)
}

// elementary returns the stages' elementary weights of a tree: a vertex with one branch brings β, one with
// more brings α for each.
func (p plain) elementary(t tree) []float64 {
	out := make([]float64, len(p.alpha))
	by := p.alpha
	if len(t) == 1 {
		by = p.beta
	}
	for i := range out {
		out[i] = 1
	}
	for _, b := range t {
		inner := p.elementary(b)
		for i := range out {
			out[i] *= dot(by[i], inner)
		}
	}
	return out
}

func dot(a, b []float64) float64 {
	sum := 0.0
	for i, x := range a {
		sum += x * b[i]
	}
	return sum
}

// trees returns all rooted trees of n vertices: a root with a multiset of branches.
func trees(n int) []tree {
	var out []tree
	var grow func(left int, most, index int, t tree)
	grow = func(left, most, index int, t tree) {
		if left == 0 {
			out = append(out, append(tree(nil), t...))
			return
		}
		for k := min(left, most); k >= 1; k-- {
			for i, b := range trees(k) {
				if k == most && i > index {
					break
				}
				grow(left-k, k, i, append(t, b))
			}
		}
	}
	grow(n-1, n-1, math.MaxInt, nil)
	return out
}

// TestTrees checks the generator by the known numbers of rooted trees.
func TestTrees(t *testing.T) {
	for i, want := range []int{1, 1, 2, 4, 9, 20} {
		if got := len(trees(i + 1)); got != want {
			t.Errorf("%d rooted trees of %d vertices, want %d", got, i+1, want)
		}
	}
}

// residuals returns the largest error of the order conditions of weights b for trees of n vertices, at the
// part theta of the step.
func (p plain) residuals(b []float64, n int, theta float64) float64 {
	worst := 0.0
	for _, t := range trees(n) {
		_, density := t.size()
		worst = math.Max(worst, math.Abs(dot(b, p.elementary(t))-math.Pow(theta, float64(n))/density))
	}
	return worst
}

// TestOrderConditions checks every condition up to the order of each method, of its embedded one and of its
// dense output, and that the next order is missed.
func TestOrderConditions(t *testing.T) {
	const round = 2e-13 // coefficients have 16 digits and sizes to 150
	for _, m := range tables {
		p := newPlain(m)
		embedded := make([]float64, len(m.B))
		for i := range m.B {
			embedded[i] = m.B[i] - m.Err[i]
		}
		check := func(what string, row []float64, order int, theta float64) {
			b := p.weights(row)
			for n := 1; n <= order; n++ {
				if r := p.residuals(b, n, theta); r > round {
					t.Errorf("%s, %s: conditions of order %d missed by %g", m.Label, what, n, r)
				}
			}
			if r := p.residuals(b, order+1, theta); r < 1e-6 {
				t.Errorf("%s, %s: conditions of order %d hold to %g, order is said to be %d", m.Label, what, order+1, r, order)
			}
		}
		check("solution", m.B, m.P, 1)
		check("embedded", embedded, m.Embedded, 1)
		if m == ros34pw2 {
			continue
		}
		for _, theta := range []float64{0.1, 0.3, 0.5, 0.8} {
			check(fmt.Sprintf("dense output at %g", theta), m.denseRow(theta), m.Degree(), theta)
		}
	}
}

// denseRow returns the weights of the stages in the dense output at θ.
func (m *Table) denseRow(theta float64) []float64 {
	row := make([]float64, len(m.B))
	for i := range row {
		k := 0.0
		for r := len(m.Dense) - 1; r >= 0; r-- {
			k = k*theta + m.Dense[r][i]
		}
		row[i] = theta * (m.B[i] + (1-theta)*k)
	}
	return row
}

// TestRows checks that the nodes and time weights are the row sums, that the method is stiffly accurate, that
// it damps infinitely fast states fully, and that the quadrature weights are those of the plain form.
func TestRows(t *testing.T) {
	near := func(m *Table, what string, got, want, tol float64) {
		if !(math.Abs(got-want) <= tol) {
			t.Errorf("%s: %s is %.16g, want %.16g", m.Label, what, got, want)
		}
	}
	for _, m := range tables {
		p := newPlain(m)
		s := len(m.B)
		ones := make([]float64, s)
		for i := range ones {
			ones[i] = 1
		}
		b := p.weights(m.B)
		w := m.quadrature()
		total := 0.0
		for i := range s {
			near(m, fmt.Sprintf("node %d", i), m.Nodes[i], dot(p.alpha[i], ones), 1e-13)
			near(m, fmt.Sprintf("time weight %d", i), m.Times[i], dot(p.gamma[i], ones), 1e-13)
			near(m, fmt.Sprintf("weight %d", i), p.beta[s-1][i], b[i], 1e-13)
			near(m, fmt.Sprintf("quadrature weight %d", i), w[i], b[i], 1e-13)
			total += w[i]
		}
		near(m, "the last node", m.Nodes[s-1], 1, 0)
		near(m, "the sum of the quadrature weights", total, 1, 1e-13)
		near(m, "R(infinity)", p.atInfinity(b), 0, 1e-10)
	}
}

// atInfinity returns 1 − bᵀ β⁻¹ 1, the damping of a state of infinite rate.
func (p plain) atInfinity(b []float64) float64 {
	s := len(b)
	x := make([]float64, s)
	r := 1.0
	for i := range s { // β x = 1 by substitution
		x[i] = 1
		for j := range i {
			x[i] -= p.beta[i][j] * x[j]
		}
		x[i] /= p.beta[i][i]
		r -= b[i] * x[i]
	}
	return r
}

// Package rosenbrock is the family of linearly implicit one-step methods of Rosenbrock and Wanner: one
// factorisation and one solve a stage for each step, no iteration.
package rosenbrock

import (
	"math"

	"workheat/integrators/ode"
	"workheat/integrators/sparse"
)

// A Table holds the coefficients of one method in transformed form (Hairer and Wanner, Solving Ordinary
// Differential Equations II, section IV.7): for i = 1..s
//
//	(M/(hγ) − J) Uᵢ = f(t+cᵢh, y0 + Σ aᵢⱼUⱼ) + (M/h) Σ CᵢⱼUⱼ + h dᵢ ∂f/∂t,  y1 = y0 + Σ bᵢUᵢ
//
// with the error estimate Σ errᵢUᵢ and the dense output
//
//	y(θ) = (1−θ) y0 + θ (y1 + (1−θ)(k₁ + θ k₂ + θ² k₃ ...)),  kᵣ = Σ HᵣᵢUᵢ.
type Table struct {
	Label       string
	P, Embedded int
	Gamma       float64
	A, C        [][]float64 // row i has i entries
	Nodes       []float64   // cᵢ
	Times       []float64   // dᵢ
	B, Err      []float64
	Dense       [][]float64 // rows of H
}

// Name returns the method's name.
func (m *Table) Name() string { return m.Label }

// Order returns the order of the solution.
func (m *Table) Order() int { return m.P }

// Estimate returns the order of the embedded solution.
func (m *Table) Estimate() int { return m.Embedded }

// Degree returns the degree of the dense output.
func (m *Table) Degree() int { return len(m.Dense) + 1 }

// quadrature returns the weights w with which a quadrature of rate q grows over a step,
//
//	ΔQ = h Σ wᵢ q(tᵢ, Yᵢ) + h (∂q/∂y) Σ wᵢUᵢ + h² (∂q/∂t) Σ wᵢdᵢ,  wᵀ = γ bᵀ (I − γC)⁻¹.
//
// It is what the stages would give if Q were one more state: their recursion is linear in q, so it
// collapses. C is strictly lower triangular, hence the back substitution.
func (m *Table) quadrature() []float64 {
	s := len(m.B)
	w := make([]float64, s)
	for i := s - 1; i >= 0; i-- {
		w[i] = m.B[i]
		for j := i + 1; j < s; j++ {
			w[i] += m.C[j][i] * w[j]
		}
		w[i] *= m.Gamma
	}
	return w
}

// A stepper is a method bound to a problem.
type stepper struct {
	*Table
	problem *ode.Problem
	solver  *sparse.Solver
	stats   ode.Stats
	step    ode.Step

	w         []float64 // quadrature weights, and Σ wᵢdᵢ
	wd        float64
	extends   []bool      // row i of A is row i−1 with a one behind it
	u         [][]float64 // stages, in units of y
	a, ft     []float64
	hasFt     bool
	hasMass   bool
	d, shift  []float64
	yi, g, v  []float64
	q0, q, wu []float64
	f         []float64 // rates at the stages
	cOverH    []float64
	k         [][]float64 // dense output rows
}

// Bind returns a stepper for the problem. Everything is allocated here.
func (m *Table) Bind(p *ode.Problem) ode.Stepper {
	n, s := p.N, len(m.B)
	vec := func() []float64 { return make([]float64, n) }
	st := &stepper{
		Table: m, problem: p, solver: sparse.NewSolver(p.Pattern, p.Symmetric),
		w: m.quadrature(), extends: make([]bool, s+1), u: make([][]float64, s),
		a: make([]float64, p.Pattern.NNZ()), ft: vec(), d: vec(), shift: vec(),
		yi: vec(), g: vec(), v: vec(), f: vec(), wu: vec(),
		q0: make([]float64, p.NQ), q: make([]float64, p.NQ),
		cOverH: make([]float64, s), k: make([][]float64, len(m.Dense)),
	}
	for i := range st.u {
		st.u[i] = vec()
	}
	for r := range st.k {
		st.k[r] = vec()
	}
	for i, w := range st.w {
		st.wd += w * m.Times[i]
	}
	for i := 2; i <= s; i++ {
		row := m.B
		if i < s {
			row = m.A[i]
		}
		st.extends[i] = row[i-1] == 1 && equal(row[:i-1], m.A[i-1])
	}
	for _, mass := range p.Mass {
		st.hasMass = st.hasMass || mass != 1
	}
	st.step = ode.Step{Y0: vec(), Y1: vec(), Err: vec(), D: st.d, F: vec(), Quad: make([]float64, p.NQ)}
	return st
}

func equal(a, b []float64) bool {
	for i := range a {
		if a[i] != b[i] {
			return false
		}
	}
	return len(a) == len(b)
}

func (st *stepper) Stats() *ode.Stats { return &st.stats }
func (st *stepper) Step() *ode.Step   { return &st.step }

// Start places the stepper at (t, y).
func (st *stepper) Start(t float64, y []float64) bool {
	copy(st.step.Y0, y)
	st.step.T = t
	return st.evaluate()
}

// Accept moves to the end of the step.
func (st *stepper) Accept() bool {
	st.step.Y0, st.step.Y1 = st.step.Y1, st.step.Y0
	st.step.T += st.step.H
	return st.evaluate()
}

// evaluate computes rates and slopes at the current point.
func (st *stepper) evaluate() bool {
	sys := st.problem.System
	sys.Rates(st.step.F, st.q0, st.step.T, st.step.Y0)
	sys.Jacobian(st.a, st.d, st.ft, st.step.T, st.step.Y0)
	st.stats.Rates++
	st.stats.Jacobians++
	st.hasFt = false
	sum := 0.0
	for i, f := range st.step.F {
		sum += f + st.d[i]
		st.hasFt = st.hasFt || st.ft[i] != 0
	}
	return !math.IsNaN(sum - sum)
}

// Try attempts a step of length h.
func (st *stepper) Try(h float64) bool {
	st.step.H = h
	if !st.factor(h) {
		return false
	}
	for i := range st.u {
		st.solveStage(i, h)
	}
	st.finish(h)
	return true
}

// factor forms and factors M D/(hγ) − A.
func (st *stepper) factor(h float64) bool {
	r := 1 / (h * st.Gamma)
	shift, d := st.shift, st.d
	d = d[:len(shift)]
	if st.hasMass {
		for i, m := range st.problem.Mass {
			shift[i] = m * d[i] * r
		}
	} else {
		for i := range shift {
			shift[i] = d[i] * r
		}
	}
	st.stats.Factorizations++
	return st.solver.Factor(st.a, shift) == nil
}

// solveStage computes U of stage i, and adds what it brings to the quadratures.
func (st *stepper) solveStage(i int, h float64) {
	yi, g := st.yi, st.g
	f, q := st.f, st.q
	if i == 0 {
		f, q = st.step.F, st.q0
		copy(g, f)
	} else {
		r := 1 / h
		for j, c := range st.C[i] {
			st.cOverH[j] = c * r
		}
		if st.extends[i] {
			combineOne(yi, g, st.u[:i], st.cOverH)
		} else {
			combine(yi, g, st.step.Y0, st.u[:i], st.A[i], st.cOverH)
		}
		st.problem.System.Rates(f, q, st.step.T+st.Nodes[i]*h, yi)
		st.stats.Rates++
		if st.hasMass {
			for k, m := range st.problem.Mass {
				g[k] = f[k] + m*g[k]
			}
		} else {
			add(g, f)
		}
	}
	if st.hasFt && st.Times[i] != 0 {
		axpy(g, h*st.Times[i], st.ft)
	}
	st.solver.Solve(st.v, g)
	st.stats.Solves++
	scale(st.u[i], st.d, st.v)
	weigh(st.step.Quad, h*st.w[i], q, i == 0)
	weigh(st.wu, st.w[i], st.v, i == 0)
}

// finish forms the new state, the error estimate and the quadratures' increments.
func (st *stepper) finish(h float64) {
	s := len(st.u)
	if st.extends[s] {
		y1, last := st.step.Y1, st.u[s-1]
		yi := st.yi
		yi, last = yi[:len(y1)], last[:len(y1)]
		for k := range y1 {
			y1[k] = yi[k] + last[k]
		}
	} else {
		sum(st.step.Y1, st.step.Y0, st.u, st.B)
	}
	sum(st.step.Err, nil, st.u, st.Err)
	st.problem.System.AddSlopes(st.step.Quad, h, st.wu, h*h*st.wd)
}

// Dense writes the coefficients of the dense output by powers of θ.
func (st *stepper) Dense(dst []float64) {
	n, rows := st.problem.N, len(st.Table.Dense)
	for r, h := range st.Table.Dense {
		sum(st.k[r], nil, st.u, h)
	}
	y0, y1 := st.step.Y0, st.step.Y1
	for i := 0; i < n; i++ {
		dst[i] = y0[i]
		dst[n+i] = y1[i] - y0[i] + st.k[0][i]
		for r := 1; r < rows; r++ {
			dst[(r+1)*n+i] = st.k[r][i] - st.k[r-1][i]
		}
		dst[(rows+1)*n+i] = -st.k[rows-1][i]
	}
}

// frozen makes the differential states stay where they are while the algebraic ones are solved for.
const frozen = 1e12

// Newton writes into v the change of the algebraic states that drives their rows to zero.
func (st *stepper) Newton(v []float64) bool {
	for i := range st.shift {
		st.shift[i] = 0
		if !st.problem.Algebraic(i) {
			st.shift[i] = frozen * st.d[i]
		}
	}
	st.stats.Factorizations++
	if st.solver.Factor(st.a, st.shift) != nil {
		return false
	}
	for i, f := range st.step.F {
		st.g[i] = 0
		if st.problem.Algebraic(i) {
			st.g[i] = f
		}
	}
	st.solver.Solve(v, st.g)
	st.stats.Solves++
	return true
}

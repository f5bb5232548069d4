package rosenbrock

import (
	"errors"
	"math"

	"workheat/integrators/ode"
	"workheat/integrators/sparse"
)

// A stepper is a method bound to a problem. With the Jacobian as A·D⁻¹ and Uᵢ = D·vᵢ it solves
//
//	(M·D/(hγ) − A) vᵢ = f(t+cᵢh, y0 + D Σ aᵢⱼvⱼ) + (M·D/h) Σ Cᵢⱼvⱼ + h dᵢ ∂f/∂t.
type stepper struct {
	*Table
	problem *ode.Problem
	solver  *sparse.Solver
	stats   ode.Stats
	step    ode.Step

	w         []float64 // quadrature weights, Σ wᵢdᵢ, and h·w
	wd        float64
	hw        []float64
	stiff     bool   // y1 is the last stage's point with its U added, and the error estimate is that U
	extends   []bool // row i of A is row i−1 with a one behind it
	slopesOld bool   // slopes are those of a point left behind
	hasFt     bool

	a, ft     []float64
	d, dh     []float64 // D and M·D/h
	shift     []float64
	yi, g, wv []float64
	f, end    []float64   // rates at a stage and at the end of the step
	v         [][]float64 // stages
	q         [][]float64 // quadrature rates at each stage, and behind them at the end of the step
	k         [][]float64 // dense output rows

	held    []float64 // a without the couplings of differential states, for Newton
	suspect int       // row that could not be factored, or -1
}

// Bind returns a stepper for the problem. Everything is allocated here.
func (m *Table) Bind(p *ode.Problem) ode.Stepper {
	n, s := p.N, len(m.B)
	vec := func() []float64 { return make([]float64, n) }
	vecs := func(rows, n int) [][]float64 {
		out := make([][]float64, rows)
		for i := range out {
			out[i] = make([]float64, n)
		}
		return out
	}
	st := &stepper{
		Table: m, problem: p, solver: sparse.NewSolver(p.Pattern, p.Symmetric),
		w: m.quadrature(), hw: make([]float64, s), extends: make([]bool, s),
		a: make([]float64, p.Pattern.NNZ()), ft: vec(), d: vec(), dh: vec(), shift: vec(),
		yi: vec(), g: vec(), wv: vec(), f: vec(), end: vec(),
		v: vecs(s, n), q: vecs(s+1, p.NQ), k: vecs(len(m.Dense), n), suspect: -1,
	}
	for i, w := range st.w {
		st.wd += w * m.Times[i]
	}
	for i := 1; i < s; i++ {
		st.extends[i] = extends(m.A[i], m.A[i-1])
	}
	st.stiff = extends(m.B, m.A[s-1]) && lastOnly(m.Err)
	st.step = ode.Step{Y0: vec(), Y1: vec(), Err: vec(), D: st.d, F: vec(), Quad: make([]float64, p.NQ)}
	return st
}

// Stats returns the counters.
func (st *stepper) Stats() *ode.Stats { return &st.stats }

// Step returns the latest tried step.
func (st *stepper) Step() *ode.Step { return &st.step }

// Start places the stepper at (t, y).
func (st *stepper) Start(t float64, y []float64) bool {
	copy(st.step.Y0, y)
	st.step.T, st.step.End, st.step.H = t, t, 0
	st.suspect = -1
	st.problem.System.Rates(st.step.F, st.q[0], t, st.step.Y0)
	st.stats.Rates++
	return st.evaluateSlopes() && finite(st.step.F)
}

// evaluateSlopes computes the slopes at the start of the step, where the rates have been evaluated last. It
// reports false if a scale or a slope by time is not finite; what else is not shows when factoring.
func (st *stepper) evaluateSlopes() bool {
	st.problem.System.Jacobian(st.a, st.d, st.ft, st.step.T, st.step.Y0)
	st.stats.Jacobians++
	st.slopesOld = false
	st.hasFt = false
	for _, x := range st.ft {
		if x != 0 {
			st.hasFt = true
			break
		}
	}
	return finite(st.d) && (!st.hasFt || finite(st.ft))
}

// Try attempts a step to the time to.
func (st *stepper) Try(to float64) bool {
	h := to - st.step.T
	st.step.End, st.step.H = to, h
	st.suspect = -1
	if st.slopesOld && !st.evaluateSlopes() || !st.factor(h) {
		return false
	}
	for i := range st.v {
		st.solveStage(i, h)
	}
	st.combineStages(h)
	return true
}

// factor forms and factors M·D/(hγ) − A.
func (st *stepper) factor(h float64) bool {
	shift, d := st.shift, st.d
	dh := st.dh[:len(shift)]
	d = d[:len(shift)]
	r, rg := 1/h, 1/(h*st.Gamma)
	if mass := st.problem.Mass; mass != nil {
		mass = mass[:len(shift)]
		for i := range shift {
			md := mass[i] * d[i]
			dh[i], shift[i] = md*r, md*rg
		}
	} else {
		for i := range shift {
			dh[i], shift[i] = d[i]*r, d[i]*rg
		}
	}
	return st.refactor(st.a, shift)
}

// refactor factors diag(shift) − a and keeps the row that could not be.
func (st *stepper) refactor(a, shift []float64) bool {
	st.stats.Factorizations++
	err := st.solver.Factor(a, shift)
	if err == nil {
		return true
	}
	var where *sparse.FactorError
	if errors.As(err, &where) {
		st.suspect = where.Row
	}
	return false
}

// solveStage computes v of stage i.
func (st *stepper) solveStage(i int, h float64) {
	g, drive := st.g, 0.0
	if st.hasFt {
		drive = h * st.Times[i]
	}
	if i == 0 {
		copy(g, st.step.F)
		if drive != 0 {
			axpy(g, drive, st.ft)
		}
	} else {
		if st.extends[i] {
			extend(st.yi, g, st.d, st.v[:i], st.C[i])
		} else {
			combine(st.yi, g, st.step.Y0, st.d, st.v[:i], st.A[i], st.C[i])
		}
		st.problem.System.Rates(st.f, st.q[i], st.stageTime(i), st.yi)
		st.stats.Rates++
		if drive != 0 {
			addDriven(g, st.f, st.dh, drive, st.ft)
		} else {
			addScaled(g, st.f, st.dh)
		}
	}
	st.solver.Solve(st.v[i], g)
	st.stats.Solves++
}

// stageTime returns the time of stage i: within the step, and at its end exactly.
func (st *stepper) stageTime(i int) float64 {
	if st.Nodes[i] == 1 {
		return st.step.End
	}
	return st.step.T + st.Nodes[i]*st.step.H
}

// combineStages forms the new state, the error estimate and the quadratures' increments.
func (st *stepper) combineStages(h float64) {
	s := len(st.v)
	if st.stiff {
		finishStiff(st.step.Y1, st.step.Err, st.yi, st.d, st.v[s-1])
	} else {
		sum(st.step.Y1, st.v, st.B)
		sum(st.step.Err, st.v, st.Err)
		for k, y := range st.step.Y0 {
			st.step.Y1[k] = y + st.d[k]*st.step.Y1[k]
			st.step.Err[k] *= st.d[k]
		}
	}
	if st.problem.NQ == 0 {
		return
	}
	for i, w := range st.w {
		st.hw[i] = h * w
	}
	sum(st.step.Quad, st.q[:s], st.hw)
	sum(st.wv, st.v, st.w)
	st.problem.System.AddSlopes(st.step.Quad, h, st.wv, h*h*st.wd)
}

// Finish evaluates the rates at the end of the step.
func (st *stepper) Finish() bool {
	st.problem.System.Rates(st.end, st.q[len(st.v)], st.step.End, st.step.Y1)
	st.stats.Rates++
	return finite(st.end) && finite(st.step.Quad)
}

// Accept moves to the end of the step.
func (st *stepper) Accept() {
	s := len(st.v)
	st.step.Y0, st.step.Y1 = st.step.Y1, st.step.Y0
	st.step.F, st.end = st.end, st.step.F
	st.q[0], st.q[s] = st.q[s], st.q[0]
	st.step.T = st.step.End
	st.slopesOld = true
}

// Suspect returns the first state whose rate is not finite at a stage or the end of the step, or the row
// that could not be factored; -1 if there is neither.
func (st *stepper) Suspect() int {
	if st.suspect >= 0 {
		return st.suspect
	}
	for _, x := range [][]float64{st.step.F, st.d, st.ft} {
		if i := notFinite(x); i >= 0 {
			return i
		}
	}
	if st.step.H == 0 || st.slopesOld {
		return -1
	}
	for i := range st.v {
		st.solveStage(i, st.step.H)
		if k := notFinite(st.f); i > 0 && k >= 0 {
			return k
		}
	}
	if !st.Finish() {
		return notFinite(st.end)
	}
	return -1
}

// Dense writes the coefficients of the dense output by powers of θ.
func (st *stepper) Dense(dst []float64) {
	n, rows := st.problem.N, len(st.Table.Dense)
	for r, h := range st.Table.Dense {
		sum(st.k[r], st.v, h)
	}
	y0, y1, d := st.step.Y0[:n], st.step.Y1[:n], st.d[:n]
	first, prev := dst[n:2*n], st.k[0][:n]
	copy(dst, y0)
	for i := range first {
		first[i] = y1[i] - y0[i] + d[i]*prev[i]
	}
	for r := 1; r < rows; r++ {
		k, out := st.k[r][:n], dst[(r+1)*n:][:n]
		for i := range out {
			out[i] = d[i] * (k[i] - prev[i])
		}
		prev = k
	}
	out := dst[(rows+1)*n:][:n]
	for i := range out {
		out[i] = -d[i] * prev[i]
	}
}

// Newton writes into v the change of the algebraic states that drives their rows to zero. The other states
// are held: their couplings are left out of the matrix.
func (st *stepper) Newton(v []float64) bool {
	p := st.problem
	if st.held == nil {
		st.held = make([]float64, len(st.a))
	}
	for i := range st.shift {
		row := p.Pattern.RowStart[i]
		for k, j := range p.Pattern.Row(i) {
			s := int(row) + k
			st.held[s] = 0
			if p.Algebraic(i) && p.Algebraic(int(j)) {
				st.held[s] = st.a[s]
			}
		}
		st.shift[i], st.g[i] = 0, st.step.F[i]
		if !p.Algebraic(i) {
			st.shift[i], st.g[i] = st.d[i], 0
		}
	}
	if !st.refactor(st.held, st.shift) {
		return false
	}
	st.solver.Solve(v, st.g)
	st.stats.Solves++
	return true
}

// finite reports whether all of x are.
func finite(x []float64) bool {
	sum := 0.0
	for _, v := range x {
		sum += v - v
	}
	return sum == 0
}

// notFinite returns the first of x that is not finite, or -1.
func notFinite(x []float64) int {
	for i, v := range x {
		if math.IsNaN(v - v) {
			return i
		}
	}
	return -1
}

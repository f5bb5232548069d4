// Package ode is the contract between a system of equations, the methods that step it, and the driver that
// controls their steps: error control, breakpoints, events, dense output, quadratures, statistics.
//
// The system is
//
//	diag(m) dy/dt = f(t, y),   dQ/dt = q(t, y)
//
// with m ≥ 0 constant (zero: an algebraic row, index 1) and quadratures Q that are carried along with the
// method's own weights, so that every linear relation between y and Q that holds for f and q holds for the
// numbers to round-off.
package ode

import (
	"workheat/integrators/sparse"
)

// A System evaluates the equations. Its methods write into their first arguments, must not allocate and
// must return the same bits for the same arguments.
type System interface {
	// Rates writes f(t, y) into f and q(t, y) into q.
	Rates(f, q []float64, t float64, y []float64)

	// Jacobian describes df/dy at the point of the latest Rates call, which had the same t and y, as
	// A·D⁻¹ with D diagonal and positive: the entries of A go to their slots of the pattern, D into d, and
	// the partial derivative of f by t into ft. D is also the natural scale of y: errors are judged as
	// e/D. A system without such a scale writes ones.
	Jacobian(a, d, ft []float64, t float64, y []float64)

	// AddSlopes adds h·(dq/dy)·D·v + c·(dq/dt) to dq, with the derivatives at the point of the latest
	// Jacobian call.
	AddSlopes(dq []float64, h float64, v []float64, c float64)
}

// A Problem is a system with what a method must know to bind to it.
type Problem struct {
	System    System
	N, NQ     int             // number of states and of quadratures
	Pattern   *sparse.Pattern // structure of A
	Symmetric bool            // A is symmetric in value
	Mass      []float64       // m, N entries; nil: all ones
	Name      func(i int) string
}

// Algebraic reports whether row i has no derivative.
func (p *Problem) Algebraic(i int) bool { return p.Mass != nil && p.Mass[i] == 0 }

// A Tolerance says which error of a step may pass: Abs + Rel·r for each state, in units of y/D, where r is
// the largest distance that the state has had from its start so far.
type Tolerance struct{ Rel, Abs float64 }

// A Method makes steppers. There is one for each row in the list of methods.
type Method interface {
	Name() string
	Order() int    // of the solution
	Estimate() int // order of the embedded solution that the error estimate compares with
	Degree() int   // degree in θ of the dense output
	Bind(p *Problem) Stepper
}

// A Stepper takes one step at a time. All slices it hands out are its own and change with its next call.
type Stepper interface {
	// Start places the stepper at (t, y) and evaluates there. It reports false if a value is not finite.
	Start(t float64, y []float64) bool
	// Try attempts a step of length h from the current point and reports false if it met a value that is
	// not finite or a matrix that it could not factor.
	Try(h float64) bool
	// Step returns the latest tried step.
	Step() *Step
	// Accept moves to the end of the tried step and evaluates there; false as for Start.
	Accept() bool
	// Dense writes the polynomial of the latest tried step into dst: (Degree+1)·N coefficients, the N
	// constant ones first; y(T+θH) = Σ dst[k·N+i] θᵏ, 0 ≤ θ ≤ 1.
	Dense(dst []float64)
	// Newton writes into v the change that drives the algebraic rows' residual at the current point to
	// zero while the others keep their values, in units of y/D; false if the matrix is singular.
	Newton(v []float64) bool
	// Stats returns the counters.
	Stats() *Stats
}

// A Step is what a tried step came to.
type Step struct {
	T, H   float64
	Y0, Y1 []float64
	Err    []float64 // estimated error of Y1
	D      []float64 // natural scale of y at the start of the step
	F      []float64 // f(T, Y0)
	Quad   []float64 // increments of the quadratures
}

// Stats counts the work of a run. Every method fills the same one.
type Stats struct {
	Steps, Rejected int // accepted and rejected steps
	Rates           int // evaluations of f
	Jacobians       int
	Factorizations  int
	Solves          int
	Restarts        int // starts after a jump, a break or an event
	Events          int
}

// Eval returns the dense polynomial of state i at θ.
func Eval(coef []float64, n, i int, theta float64) float64 {
	k := len(coef)/n - 1
	v := coef[k*n+i]
	for k--; k >= 0; k-- {
		v = v*theta + coef[k*n+i]
	}
	return v
}

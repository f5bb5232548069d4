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
	"fmt"

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
	N, NQ     int                // number of states and of quadratures
	Pattern   *sparse.Pattern    // structure of A
	Symmetric bool               // A is symmetric in value
	Mass      []float64          // m, N entries; nil: all ones
	Name      func(i int) string // nil: states are called by their number
}

// Algebraic reports whether row i has no derivative.
func (p *Problem) Algebraic(i int) bool { return p.Mass != nil && p.Mass[i] == 0 }

// name returns the name of state i.
func (p *Problem) name(i int) string {
	if p.Name == nil {
		return fmt.Sprintf("state %d", i)
	}
	return p.Name(i)
}

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

// A Stepper takes one step at a time: Try, then Finish and Accept if the step pleases. All slices it hands
// out are its own and change with its next call.
type Stepper interface {
	// Start places the stepper at (t, y) and evaluates there. It reports false if a value is not finite.
	Start(t float64, y []float64) bool
	// Try attempts a step from the current point to the time to and reports false if it could not factor a
	// matrix or met a slope that is not finite. Values that are not finite else show in Step().Err.
	Try(to float64) bool
	// Step returns the latest tried step.
	Step() *Step
	// Finish evaluates f at the end of the tried step. It reports false if a value there or an increment of
	// a quadrature is not finite; the step must not be accepted then.
	Finish() bool
	// Accept moves to the end of the tried and finished step. Nobody may call the system between Finish and
	// the next Try.
	Accept()
	// Dense writes the polynomial of the latest tried step into dst: (Degree+1)·N coefficients, the N
	// constant ones first; y(T+θH) = Σ dst[k·N+i] θᵏ, 0 ≤ θ ≤ 1. It serves until Accept.
	Dense(dst []float64)
	// Newton writes into v the change that drives the algebraic rows' residual at the point of the latest
	// Start to zero while the others keep their values, in units of y/D; false if the matrix is singular.
	Newton(v []float64) bool
	// Suspect returns the first state at which the latest Try or Finish met a value that is not finite or a
	// row without a pivot, or -1. It may repeat the work.
	Suspect() int
	// Stats returns the counters.
	Stats() *Stats
}

// A Step is what a tried step came to. D and F belong to its start.
type Step struct {
	T, H   float64
	End    float64 // the time it was tried to; H is End − T rounded
	Y0, Y1 []float64
	Err    []float64 // estimated error of Y1
	D      []float64 // natural scale of y
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

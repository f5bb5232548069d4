// Package integrators is the front door of the integrators: it lists the methods that solve ordinary
// differential equations and index-1 differential-algebraic ones, and knows nothing of heat.
//
// A method goes, with an ode.Problem and an ode.Tolerance, into ode.New, which runs it.
package integrators

import (
	"workheat/integrators/ode"
	"workheat/integrators/rosenbrock"
)

// Methods lists every method. A new one is one row here; the tests run over the whole list.
var Methods = []ode.Method{
	rosenbrock.Rodas5P,
}

// Default is the method for those who do not choose.
var Default = Methods[0]

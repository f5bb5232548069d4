// Package integrators is the front door of the integrators: it lists the methods that solve ordinary
// differential equations and index-1 differential-algebraic ones, and knows nothing of heat.
//
// A method goes, with an ode.Problem and an ode.Tolerance, into ode.New, which runs it.
package integrators

import (
	"strings"

	"workheat/integrators/ode"
	"workheat/integrators/rosenbrock"
)

// Methods lists every method. A new one is one row here; the tests run over the whole list.
var Methods = []ode.Method{
	rosenbrock.Rodas5P,
}

// Default is the method for those who do not choose.
var Default = Methods[0]

// Find returns the method of that name, in whatever case, and whether there is one.
func Find(name string) (ode.Method, bool) {
	for _, m := range Methods {
		if strings.EqualFold(m.Name(), name) {
			return m, true
		}
	}
	return nil, false
}

// Names returns the names of all methods, in the order of the list.
func Names() []string {
	names := make([]string, len(Methods))
	for i, m := range Methods {
		names[i] = m.Name()
	}
	return names
}

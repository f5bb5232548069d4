package element

// A Form says what a node's temperature follows from.
type Form int

// The forms of a node.
const (
	Stored   Form = iota // its stored energy, through its heat capacity
	Massless             // the balance of its heat flows
	Held                 // a given temperature
)

// A Node is one lump, or a place that is held at a temperature.
type Node struct {
	Name     string
	Form     Form
	Capacity *Curve  // J/K over K, when Stored
	Start    float64 // K, when Stored; first guess when Massless
	Signal   int     // the signal that gives its temperature [K], when Held
}

// A Group is all the elements of one kind.
type Group struct {
	Kind     *Kind
	Elements []*Declaration
}

package element

// A Path is one way that heat takes: from node A to node B, either of which may be Outside. Its flow may
// depend on the temperatures of the nodes in Deps (usually A and B).
type Path struct {
	A, B int    // node indices, or Outside
	Deps []int  // node indices; the same number for all paths of a batch
	Name string // what distinguishes the path within its element, or empty

	// Balanced says that Deps are A and B and that the slopes by the two are always equal and opposite, so
	// that the path keeps the matrix symmetric whichever of its ends carry a state.
	Balanced bool
}

// State is what flows depend on: the temperatures of all nodes and the signals of the duty, with the rates
// at which the signals change.
type State struct {
	T      []float64 // K, by node index
	Signal []float64 // SI, by signal index
	Rate   []float64 // SI per second, by signal index
}

// A Batch computes the flows of all elements of one kind in bulk. Flows and Slopes run in the inner loop
// of the integrators: they must not allocate, and the same state must give the same bits. All flows of a
// path must be smooth functions of the state while no signal jumps or breaks its slope.
type Batch interface {
	// Add takes in one element and returns its paths, in the order in which Flows writes them.
	Add(d *Declaration) []Path

	// Flows writes the heat flow [W] of each path, positive from A to B.
	Flows(q []float64, s *State)

	// Slopes writes the derivative of each flow: by the temperature of each of its Deps [W/K], path by
	// path, into dep; and by time through the signals [W/s] into rate.
	Slopes(dep, rate []float64, s *State)

	// Recount returns the flow [W] of one path once more, straight from the element's law, for the audit.
	// It must share no code with Flows and Slopes.
	Recount(path int, s *State) float64
}

// A Ranger is a batch whose law has a valid range.
type Ranger interface {
	// Range calls report once for each path that is outside the range at a state. The text says what is outside,
	// without place or time, so that equal faults are equal texts.
	Range(s *State, report func(path int, text string))
}

// A Vehicle is a body that moves along a road: what the duty needs to know of it.
type Vehicle struct {
	Mass     float64 // kg
	Rotating float64 // factor on the mass for the inertia of what turns with it, at least 1
	Rolling  float64 // rolling resistance coefficient
	DragArea float64 // m^2, drag coefficient times frontal area
	Air      float64 // kg/m^3, density of the air
	Grade    float64 // slope of the road when a phase gives none: rise over run, positive uphill
	Wheel    float64 // m, rolling radius of the wheel; 0: not given
}

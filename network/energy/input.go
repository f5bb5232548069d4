package energy

import (
	"workheat/network/element"
	"workheat/network/record"
)

// A Node is what the book must know of a node.
type Node struct {
	Name     string
	State    int            // its column in the tape; held nodes have none and say -1
	Capacity *element.Curve // J/K over K; nil for a massless or held node
	Start    float64        // K
	Signal   int            // of a held node
	EndState float64        // the state at the end of the run: stored energy gained [J], or temperature

	// Reported is how the run turns a state value into the temperature [K] that it reports; nil if held.
	Reported func(y float64) float64
	// Highest is the highest temperature [K] that the run reports, and When its time [s].
	Highest, When float64
}

// A Path is what the book must know of a path.
type Path struct {
	Element, Path, Kind string
	Section             element.Section
	From, To            int // node indices or element.Outside
	Deps                []int
	Total               float64 // J carried over the run by the quadratures
	Meter               bool    // it measures a dissipator's work and carries nothing
}

// A Leg is a stretch of the duty as it was run.
type Leg struct {
	Label      string
	Start, End float64
	Node       int     // of the until, or -1
	Falls      bool    // the until waits for a fall
	Target     float64 // K
	Ended      bool    // the until ended the leg
	// Seen is the temperature [K] of a node without mass past its mark where the leg ended, or was left out, before
	// a step could show it: at a jump of the drive. It is not a number otherwise.
	Seen    float64
	Corners []float64
}

// A Given is a source of known power over time: what it gives comes to Factor times the area of Power.
type Given struct {
	Element string
	Power   *element.Curve // W over s
	Factor  float64
}

// A Run is what the book is made from. The functions give it the laws, one flow at a time, and nothing of
// how the run was computed.
type Run struct {
	Nodes  []Node // those with a state first
	Paths  []Path
	Tape   *record.Tape
	Legs   []Leg
	Given  []Given
	Rel    float64 // relative tolerance of the run
	Abs    float64 // K
	Tables []*element.Curve
	// FirstTable is the signal that Tables[0] gives; the others follow it.
	FirstTable int
	// NumSignals is how many signals there are.
	NumSignals int

	// Flow returns the flow of a path by its law.
	Flow func(path int, s *element.State) float64
	// Signals writes the signals at a time within a segment. The book reads the tables itself and takes
	// only the signals before FirstTable from it.
	Signals func(segment int, t float64, value, rate []float64)
	// Temperatures returns what the run's own equations take for the temperatures of all nodes. The slice
	// may be reused by the next call, as may those of Slopes.
	Temperatures func(segment int, t float64, y []float64) []float64
	// Slopes returns, for the run's own equations at a time and state, the slopes of each path by its deps
	// and by time.
	Slopes func(segment int, t float64, y []float64) (dep [][]float64, rate []float64)
	// Matrix returns, at the place of the latest call of Slopes, what the integrator takes for the change of
	// all balances: along a change v of the temperatures of the nodes with a state, and by time.
	Matrix func(v []float64) (av, rate []float64)

	Vehicle  *VehicleLine       // by the closed forms of its motion; nil when nothing moves
	Road     Road               // what the vehicle's account is counted again from
	Expected map[string]float64 // J of work by dissipator, from the vehicle's account
	Torqued  float64            // share of the braking work that was taken under a constant torque
}

// A Road is a vehicle on its way.
type Road struct {
	element.Vehicle
	Speed int                       // the signal of its speed
	Brake int                       // the signal of its braking power
	Grade func(segment int) float64 // rise over run
}

// Make makes the book of a run: layers 1 and 2.
func Make(r *Run) *Book {
	b := &Book{Vehicle: r.Vehicle}
	w := newWitness(r)
	s := w.survey()
	c := w.recount()
	b.ledger(r, c, s)
	b.takeRecount(r, c, s)
	b.Checks = append(b.Checks, s.checkTemperatures(w), c.checkPeaks(w), checkGiven(r), checkWork(r, b))
	if r.Vehicle != nil {
		b.Checks = append(b.Checks, w.checkVehicle())
	}
	b.Checks = append(b.Checks, s.checkSlopes(w, c), s.checkMatrix(w), checkBreaks(w), checkEnds(r))
	b.verdict()
	return b
}

func (b *Book) verdict() {
	b.Closed = true
	for _, c := range b.Checks {
		b.Closed = b.Closed && c.Passed
	}
}

// AddTolerance adds layer 3: the change of the highest temperature of each node in a run at a tenth of the
// tolerance. The change may be allowed [K] at the most.
func (b *Book) AddTolerance(names []string, highest, finer []float64, allowed float64) {
	c := Check{Layer: 3, Name: "tolerance", Unit: "K", Allowed: allowed,
		About: "the highest temperatures of a second run at a tenth of the tolerance"}
	for i, name := range names {
		c.worst(abs(highest[i]-finer[i]), name)
	}
	c.close()
	b.Checks = append(b.Checks, c)
	b.verdict()
}

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
	EndTemp  float64        // K at the end, as the run reports it
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
	Corners    []float64
}

// A Run is what the book is made from. The functions give it the laws, one flow at a time, and nothing of
// how the run was computed.
type Run struct {
	Nodes  []Node // those with a state first
	Paths  []Path
	Tape   *record.Tape
	Legs   []Leg
	Tables []*element.Curve // every table in time
	Rel    float64          // relative tolerance of the run
	Abs    float64          // K

	// Flow returns the flow of a path by its law.
	Flow func(path int, s *element.State) float64
	// Signals writes the signals at a time within a segment.
	Signals func(segment int, t float64, value, rate []float64)
	// NumSignals is how many signals there are.
	NumSignals int
	// Slopes returns, for the run's own equations at a time and state, the slopes of each path by its deps
	// and by time. The slices may be reused by the next call.
	Slopes func(segment int, t float64, y []float64) (dep [][]float64, rate []float64)

	Vehicle  *VehicleLine
	Expected map[string]float64 // J of work by dissipator, from the vehicle's account
}

// Make makes the book of a run: layers 1 and 2.
func Make(r *Run) *Book {
	b := &Book{Vehicle: r.Vehicle}
	b.ledger(r)
	gaps := recount(r)
	b.takeRecount(r, gaps)
	b.Checks = append(b.Checks, checkWork(r, b), checkSlopes(r), checkBreaks(r), checkEnds(r))
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
// tolerance.
func (b *Book) AddTolerance(names []string, highest, finer []float64, allowed float64) {
	c := Check{Layer: 3, Name: "tolerance", Unit: "K", Allowed: allowed,
		About: "the highest temperatures of a second run at a tenth of the tolerance"}
	for i, name := range names {
		if d := abs(highest[i] - finer[i]); !(d <= c.Gap) {
			c.Gap, c.Where = d, name
		}
	}
	c.Passed = c.Gap <= c.Allowed
	b.Checks = append(b.Checks, c)
	b.verdict()
}

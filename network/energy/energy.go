// Package energy is the energy book: what came in as work and heat, what is stored, what went out, and
// what is missing, in three layers of which each can fail on its own.
//
// Layer 1, the ledger, adds up the quadratures that were carried with the method; it closes to round-off
// whatever the tolerance, if the program is right. Layer 2 takes the recorded solution alone and does the
// energies again with other code: the recount, whose gap measures the error of the integration, and beside it
// checks of what the recount rests on and of what it cannot see (temperatures, peaks, given heat, work, the
// vehicle's account, slopes and matrix, breaks, ends of phases). Layer 3, the tolerance check, is a second run
// at a tenth of the tolerance.
//
// What layer 2 takes from the program are the recorded polynomials, each element's law said once more, the speed
// and braking power of the duty, and which nodes a path joins. Temperatures from energies, tables in time,
// stored energies, the vehicle's account and all sums are its own.
package energy

// A Book is the account of one run, in joules.
type Book struct {
	WorkIn     float64 // work turned into heat by the dissipators
	HeatIn     float64 // heat given, and taken in through the border where it came in on balance
	HeatOut    float64 // heat that went out through the border on balance
	Stored     float64 // gain of stored energy of all nodes
	Throughput float64 // energies through the border without sign, never the net of a flow that turned
	LedgerGap  float64 // what the ledger misses, summed over nodes and dissipators without sign
	// IndependentGap is what the recount misses, summed over nodes without sign. It bounds the gap of every
	// part of the network, of one node as of the whole; an error in a flow between two nodes counts on both
	// sides and cannot cancel, as it would in the balance of the whole.
	IndependentGap float64
	Nodes          []NodeLine
	Paths          []PathLine
	Dissipators    []DissipatorLine
	Vehicle        *VehicleLine // nil when nothing moves
	Checks         []Check
	Closed         bool // every check has passed
}

// A NodeLine is the account of one node: Stored = Net + Gap.
type NodeLine struct {
	Name    string
	Net     float64 // heat that came to it on balance
	Stored  float64 // gain of stored energy; zero for a massless node
	Held    bool    // the border: Net is what it took up
	Gap     float64
	Recount float64 // the gap by the recount
}

// A PathLine is the heat that one path carried on balance, positive in its direction. From or To is empty
// for the world outside.
type PathLine struct {
	Element, Path  string
	Kind           string
	From, To       string
	Net            float64
	Border, Inside bool    // it crosses the border; it links two nodes inside
	In             float64 // what it brought in through the border; zero unless it crosses it
	Work           bool    // it is a dissipator's: work turned into heat
}

// A DissipatorLine compares the work that a dissipator took with the heat that it gave.
type DissipatorLine struct {
	Name       string
	Work, Heat float64
	Expected   float64 // work by the vehicle's own account
	Gap        float64
}

// A VehicleLine is the mechanical account of the vehicle: Drive = Kinetic + Climb + Rolling + Air + Brake.
type VehicleLine struct {
	Name                                       string
	Distance                                   float64 // m
	Drive, Kinetic, Climb, Rolling, Air, Brake float64
	Modelled                                   float64 // part of Brake that the netlist's dissipators took
}

// A Check is one thing that the book looks at.
type Check struct {
	Layer   int // 1, 2 or 3
	Name    string
	About   string  // what it compares, one sentence
	Gap     float64 // in Unit
	Allowed float64
	Unit    string // "J", "K" or empty for a count
	Passed  bool
	Where   string // where the worst gap is
	largest float64
}

// Package record is what is kept of a run: the dense output of every step, and what is read from it:
// peaks, times above limits, uniform samples.
package record

import (
	"sort"

	"workheat/network/element"
	"workheat/network/unit"
)

// A Node is a place whose temperature is recorded.
type Node struct {
	Name   string
	State  int             // its column in the tape, or -1 when it is held
	Limits []element.Limit // in the order of the netlist
	Start  float64         // K, all that is known of a run without steps

	// Temperature turns a state value into a temperature [K], Value the other way; both are rising.
	// They are nil when the node is held.
	Temperature func(y float64) float64
	Value       func(t float64) float64
	// Given is the temperature [K] of a held node over time [s].
	Given *element.Curve
}

// A Segment is a stretch of the run between two breaks.
type Segment struct {
	Start, End float64 // s
	Label      string  // of the phase
	Round      int     // which time the innermost repeat was at, from one; zero: no repeat
	First      bool    // it is the first of its leg
}

// A Tape holds the dense output of every accepted step. Memory grows with the number of steps; adding a
// step allocates only when a block is full.
type Tape struct {
	n, degree int
	perBlock  int
	blocks    [][]float64
	start     []float64
	length    []float64
	segment   []int32
}

const blockSize = 1 << 15 // numbers in a block, about 256 kB

// NewTape returns a tape for n states and dense output of the given degree in θ.
func NewTape(n, degree int) *Tape {
	size := n * (degree + 1)
	return &Tape{n: n, degree: degree, perBlock: max(1, blockSize/max(1, size))}
}

// Add takes in a step that begins at t and is h long, within the given segment, and returns where its
// coefficients go: those of θ⁰ first, n for each power.
func (t *Tape) Add(start, h float64, segment int) []float64 {
	size := t.n * (t.degree + 1)
	k := len(t.start)
	if k == len(t.blocks)*t.perBlock {
		t.blocks = append(t.blocks, make([]float64, size*t.perBlock))
	}
	t.start, t.length, t.segment = append(t.start, start), append(t.length, h), append(t.segment, int32(segment))
	return t.coefficients(k)
}

func (t *Tape) coefficients(k int) []float64 {
	size := t.n * (t.degree + 1)
	at := (k % t.perBlock) * size
	return t.blocks[k/t.perBlock][at : at+size]
}

// Steps returns the number of steps.
func (t *Tape) Steps() int { return len(t.start) }

// States returns the number of states of a step.
func (t *Tape) States() int { return t.n }

// Step returns the start, length, segment and coefficients of step k.
func (t *Tape) Step(k int) (start, h float64, segment int, coef []float64) {
	return t.start[k], t.length[k], int(t.segment[k]), t.coefficients(k)
}

// Value returns state i at θ of a step's coefficients.
func (t *Tape) Value(coef []float64, i int, theta float64) float64 {
	k := t.degree
	v := coef[k*t.n+i]
	for k--; k >= 0; k-- {
		v = v*theta + coef[k*t.n+i]
	}
	return v
}

// Bound returns a value that state i does not exceed within the step.
func (t *Tape) Bound(coef []float64, i int) float64 {
	v := coef[i]
	for k := 1; k <= t.degree; k++ {
		v += max(0, coef[k*t.n+i])
	}
	return v
}

// Slope returns the derivative by θ of state i.
func (t *Tape) Slope(coef []float64, i int, theta float64) float64 {
	k := t.degree
	v := float64(k) * coef[k*t.n+i]
	for k--; k >= 1; k-- {
		v = v*theta + float64(k)*coef[k*t.n+i]
	}
	return v
}

// Find returns the step that holds time x, the earlier one at a shared end, and θ within it. The tape must
// not be empty; times outside give its ends.
func (t *Tape) Find(x float64) (k int, theta float64) {
	k = sort.Search(len(t.start), func(k int) bool { return t.start[k]+t.length[k] >= x })
	k = min(k, len(t.start)-1)
	theta = (x - t.start[k]) / t.length[k]
	return k, min(1, max(0, theta))
}

// End returns the time at which the tape ends, or zero if it is empty.
func (t *Tape) End() float64 {
	if k := len(t.start) - 1; k >= 0 {
		return t.start[k] + t.length[k]
	}
	return 0
}

// A Group tells the columns of a series apart.
type Group int

// The groups of columns.
const (
	Temperatures Group = iota
	Flows              // heat flow of a path
	Vehicle            // speed, braking power
)

// A Column is one quantity of a series, in SI.
type Column struct {
	Name   string
	Group  Group
	Want   unit.Want       // the unit it is shown in
	Limits []element.Limit // of a temperature
	Values []float64
}

// A Series is a run sampled at uniform times, ends of the run included.
type Series struct {
	Time     []float64 // s
	Columns  []Column
	Segments []Segment
}

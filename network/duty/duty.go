// Package duty is what the network has to live through: phases that move the vehicle and pass the time,
// their end conditions, and the signals that they give to the elements.
package duty

import (
	"math"

	"workheat/network/element"
)

// Gravity is the standard acceleration of free fall, m/s^2 (exact by convention).
const Gravity = 9.80665

// None marks a number that was not given.
var None = math.NaN()

// Given reports whether a number was given.
func Given(x float64) bool { return !math.IsNaN(x) }

// A Verb says what a phase does.
type Verb int

// The verbs.
const (
	Repeat  Verb = iota // go through the inner phases again and again
	Brake               // slow down from the present speed
	SpeedUp             // gain speed
	Hold                // keep the speed
	Rest                // stand still
	Follow              // follow a speed trace
)

// A Phase is one entry of a duty. Numbers that were not given are None.
type Phase struct {
	Verb  Verb
	Label string // where it stands: "2.1 brake" is the first phase inside the second entry
	Place int    // for the reader: which place in the file it came from
	Told  bool   // for the reader: a fault of it was reported; its numbers may be missing

	From, To     float64 // m/s
	Deceleration float64 // m/s^2, positive
	Torque       float64 // N m, of all brakes together
	Acceleration float64 // m/s^2
	In           float64 // s, time in which the speed is gained
	Speed        float64 // m/s
	Grade        float64 // rise over run
	For          float64 // s
	Over         float64 // m
	AtMost       float64 // s, longest time when Until is given
	Until        *Until
	Trace        *element.Curve // m/s over s, from zero

	Count  int     // of a repeat
	Every  float64 // s, from the start of a round to that of the next
	Phases []Phase
}

// Blank returns a phase in which nothing is given.
func Blank(verb Verb, label string) Phase {
	return Phase{
		Verb: verb, Label: label, From: None, To: None, Deceleration: None, Torque: None, Acceleration: None, In: None,
		Speed: None, Grade: None, For: None, Over: None, AtMost: None, Every: None,
	}
}

// An Until ends a phase when a node's temperature passes a value.
type Until struct {
	Node        int
	Falls       bool    // from above; else it rises
	Temperature float64 // K
}

// A Program is a whole duty. The vehicle is nil when nothing moves.
type Program struct {
	Phases  []Phase
	Vehicle *element.Vehicle
}

// A Leg is a stretch of the duty with one motion plan: a phase, or the rest of a repeat's interval.
type Leg struct {
	Label   string
	Start   float64 // s
	End     float64 // s, at the latest
	Until   *Until
	Brakes  bool     // it is a brake phase
	Longest bool     // End is the longest time that the until may wait
	Motions []Motion // cover Start to End; empty when nothing moves
	Late    float64  // s by which a repeat's interval had to be lengthened before this leg
	phase   *Phase
}

// Speed returns the vehicle's speed at a time within the leg.
func (l *Leg) Speed(t float64) float64 {
	for i := range l.Motions {
		if m := &l.Motions[i]; t <= m.T1 || i == len(l.Motions)-1 {
			return m.Speed(t)
		}
	}
	return 0
}

// begins returns the speed at which a phase says that it begins, or None.
func (p *Phase) begins() float64 {
	switch p.Verb {
	case Brake, SpeedUp:
		return p.From
	case Hold:
		return p.Speed
	case Follow:
		if p.Trace != nil {
			return p.Trace.Y[0]
		}
	}
	return None
}

// length returns how long [s] a phase takes at most from a speed. It is infinite when nothing ends the phase, and
// None when that cannot be told.
func (p *Phase) length(v *element.Vehicle, from float64) float64 {
	switch {
	case p.Verb == Brake && Given(p.Torque):
		return p.coasting(v, from)
	case p.Verb == Brake:
		return (from - p.To) / p.Deceleration
	case p.Verb == SpeedUp && Given(p.In):
		return p.In
	case p.Verb == SpeedUp:
		return (p.To - from) / p.Acceleration
	case p.Verb == Follow:
		return p.Trace.X[len(p.Trace.X)-1] - p.Trace.X[0]
	}
	least := math.Inf(1)
	for _, t := range [...]float64{p.For, p.AtMost, p.Over / from} {
		if Given(t) {
			least = math.Min(least, t)
		}
	}
	return least
}

// coasting returns how long [s] a braking by torque takes, or None when it cannot be told or never ends.
func (p *Phase) coasting(v *element.Vehicle, from float64) float64 {
	if !Given(from) || !(v.Wheel > 0) {
		return None
	}
	m := road(v, p.Grade)
	t, ok := newCoast(&m, p.Torque/v.Wheel, from).time(p.To)
	if !ok {
		return None
	}
	return t
}

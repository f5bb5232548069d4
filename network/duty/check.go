package duty

import (
	"fmt"
	"math"

	"workheat/network/unit"
)

// Check reports phases that cannot begin, that do nothing, or that can never end, each with its place.
// The speeds are walked through twice in a repeat, since its second round begins where the first ended.
func (p *Program) Check(report func(place int, text, help string)) {
	c := checker{program: p, report: report, told: map[int]bool{}}
	c.speed = startSpeed(p.Phases)
	c.walk(p.Phases)
}

type checker struct {
	program *Program
	report  func(place int, text, help string)
	told    map[int]bool // places already reported
	speed   float64
	timeOut bool
}

// tell reports the first fault of a place.
func (c *checker) tell(p *Phase, text, help string) {
	if !c.told[p.Place] {
		c.told[p.Place] = true
		c.report(p.Place, text, help)
	}
}

func (c *checker) walk(phases []Phase) {
	for i := range phases {
		p := &phases[i]
		if p.Verb == Repeat {
			c.walk(p.Phases)
			if p.Count > 1 {
				c.walk(p.Phases)
			}
			continue
		}
		c.phase(p)
	}
}

// same reports whether two speeds are one but for the digits of their text.
func same(a, b float64) bool { return math.Abs(a-b) <= 1e-6*math.Max(1, math.Max(a, b)) }

func show(v float64) string {
	return unit.NewWant("speed", "km/h").Format(v, 5)
}

// phase checks one phase and sets the speed at its end.
func (c *checker) phase(p *Phase) {
	if c.program.Vehicle == nil && p.Verb != Rest {
		c.tell(p, "nothing can move: the netlist declares no body", `declare a road vehicle under "bodies", or use "rest"`)
		return
	}
	switch p.Verb {
	case Brake:
		c.join(p, p.From, "braking starts from")
		c.brake(p)
	case SpeedUp:
		c.join(p, p.From, "speeding up starts from")
		c.speedUp(p)
	case Hold:
		c.join(p, p.Speed, "the speed to hold is")
		c.ends(p, "hold")
	case Rest:
		if c.speed != 0 {
			c.tell(p, "the vehicle cannot rest: it still goes at "+show(c.speed), "brake to 0 km/h first")
			c.speed = 0
		}
		c.ends(p, "rest")
	case Follow:
		c.join(p, p.Trace.Y[0], "the trace starts at")
		c.speed = p.Trace.Y[len(p.Trace.Y)-1]
	}
}

// join checks that a phase begins at the speed at which the one before ended.
func (c *checker) join(p *Phase, v float64, what string) {
	if !Given(v) {
		return
	}
	if !same(v, c.speed) {
		c.tell(p, fmt.Sprintf("%s %s, but the vehicle comes with %s", what, show(v), show(c.speed)),
			`put a "speed up" or "brake" between, or correct the speed`)
	}
	c.speed = v
}

func (c *checker) brake(p *Phase) {
	switch {
	case !Given(p.To):
		c.tell(p, `braking needs "to", the speed at which it ends`, `write "to": "0 km/h" for a full stop`)
		return
	case Given(p.Deceleration) == Given(p.Torque):
		c.tell(p, `braking needs either "deceleration" or "torque"`, "exactly one of them")
	case p.To >= c.speed:
		c.tell(p, fmt.Sprintf("there is nothing to brake: from %s to %s", show(c.speed), show(p.To)), "")
	case Given(p.Torque) && !(c.program.Vehicle.Wheel > 0):
		c.tell(p, "a braking torque needs the wheel radius of the vehicle", `give the body a "wheel radius"`)
	case Given(p.Torque):
		m := road(c.program.Vehicle, p.Grade)
		if _, ok := newCoast(&m, p.Torque/c.program.Vehicle.Wheel, c.speed).time(p.To); !ok {
			c.tell(p, fmt.Sprintf("the phase can never end: this torque does not slow the vehicle to %s on this grade", show(p.To)), "raise the torque, or end the braking at a higher speed")
		}
	}
	c.speed = p.To
}

func (c *checker) speedUp(p *Phase) {
	switch {
	case !Given(p.To):
		c.tell(p, `speeding up needs "to", the speed at which it ends`, "")
		return
	case Given(p.Acceleration) == Given(p.In):
		c.tell(p, `speeding up needs either "acceleration" or "in", the time it takes`, "exactly one of them")
	case p.To <= c.speed:
		c.tell(p, fmt.Sprintf("there is no speed to gain: from %s to %s", show(c.speed), show(p.To)), "")
	}
	c.speed = p.To
}

// ends checks that a phase that only passes time comes to an end.
func (c *checker) ends(p *Phase, what string) {
	timed := Given(p.For) || Given(p.Over)
	switch {
	case Given(p.Over) && c.speed == 0:
		c.tell(p, "a distance can never be covered at standstill", `give "for", a time`)
	case p.Until != nil && !Given(p.AtMost) && !timed:
		c.tell(p, `the phase may never end: "until" has no longest time`, `add "at most", the longest time to wait`)
	case p.Until == nil && !timed && Given(p.AtMost):
		c.tell(p, `"at most" goes with "until"`, `give "for" for a fixed time`)
	case p.Until == nil && !timed:
		c.tell(p, "the phase can never end: "+what+` has neither "for" nor "until"`, `add "for", a time, or "until", a temperature with "at most"`)
	}
}

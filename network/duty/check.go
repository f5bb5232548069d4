package duty

import (
	"fmt"
	"math"

	"workheat/network/unit"
)

// A Reporter takes a fault: the place of its phase, the key it concerns (empty: the whole phase), what is
// wrong, what to do.
type Reporter func(place int, key, text, help string)

// Check reports phases that cannot begin, that do nothing, or that can never end, each with its place.
// The speeds are walked through twice in a repeat, since its second round begins where the first ended.
// Phases that are told already are only passed over; where one leaves its speed open, what follows is
// taken as it says.
func (p *Program) Check(report Reporter) {
	c := checker{program: p, report: report, told: map[told]bool{}, lasts: map[int]float64{}, known: map[visit]float64{}}
	c.speed = startSpeed(p.Phases)
	if first := firstPhase(p.Phases); first != nil && first.Told && c.speed == 0 {
		c.speed = None
	}
	c.walk(p.Phases)
	c.extent(p.Phases)
}

type checker struct {
	program *Program
	report  Reporter
	told    map[told]bool     // what was reported
	lasts   map[int]float64   // s, the longest that a phase takes, by place
	known   map[visit]float64 // speed after a repeat that has been walked through
	speed   float64           // None: not known
	again   int               // how many repeats are in their second round
	still   bool              // that nothing can move has been told
}

// A visit is a repeat entered at a speed.
type visit struct {
	repeat *Phase
	speed  uint64
}

// firstPhase returns the phase with which a duty begins, repeats opened, or nil.
func firstPhase(phases []Phase) *Phase {
	if len(phases) == 0 {
		return nil
	}
	if p := &phases[0]; p.Verb != Repeat {
		return p
	}
	return firstPhase(phases[0].Phases)
}

// A told is a key of a phase of which a fault was reported.
type told struct {
	place int
	key   string
}

// tell reports the first fault of a phase's key.
func (c *checker) tell(p *Phase, key, text, help string) {
	if t := (told{p.Place, key}); !c.told[t] {
		c.told[t] = true
		c.report(p.Place, key, text, help)
	}
}

func (c *checker) walk(phases []Phase) {
	for i := range phases {
		if p := &phases[i]; p.Verb == Repeat {
			c.rounds(p)
		} else {
			c.phase(p)
		}
	}
}

// rounds walks through a repeat, twice if its second round begins at another speed.
func (c *checker) rounds(p *Phase) {
	v := visit{p, math.Float64bits(c.speed)}
	if end, ok := c.known[v]; ok {
		c.speed = end
		return
	}
	begin := c.speed
	if c.walk(p.Phases); len(p.Phases) == 0 {
		c.speed = None
	}
	if p.Count > 1 && !same(begin, c.speed) {
		c.again++
		c.walk(p.Phases)
		c.again--
	}
	c.known[v] = c.speed
}

// same reports whether two speeds are one but for the digits of their text.
func same(a, b float64) bool { return math.Abs(a-b) <= 1e-6*math.Max(1, math.Max(a, b)) }

func show(v float64) string { return unit.RoadSpeed.Format(v, 5) }

// phase checks one phase and sets the speed at its end.
func (c *checker) phase(p *Phase) {
	from := c.speed
	switch {
	case p.Told:
		c.pass(p)
		return
	case c.program.Vehicle == nil && p.Verb != Rest:
		if !c.still {
			c.tell(p, "", "nothing can move: the netlist declares no body", `declare a road vehicle under "bodies", or use "rest"`)
		}
		c.still = true
		return
	}
	if v := p.begins(); Given(v) {
		from = v
	}
	switch p.Verb {
	case Brake:
		c.join(p, "from", p.From, "braking starts from")
		c.brake(p)
	case SpeedUp:
		c.join(p, "from", p.From, "speeding up starts from")
		c.speedUp(p)
	case Hold:
		c.join(p, "speed", p.Speed, "the speed to hold is")
		c.ends(p, `neither "for", "over" nor "until"`)
	case Rest:
		if c.speed > 0 && !c.still {
			c.tell(p, "", "the vehicle cannot rest: it still goes at "+show(c.speed)+c.round(), "brake to 0 km/h first")
		}
		c.speed = 0
		c.ends(p, `neither "for" nor "until"`)
	case Follow:
		c.join(p, "", p.Trace.Y[0], "the trace starts at")
		c.speed = p.Trace.Y[len(p.Trace.Y)-1]
	}
	c.time(p, from)
}

// pass goes over a phase with a fault of its own.
func (c *checker) pass(p *Phase) {
	switch {
	case p.Verb == Rest:
		c.speed = 0
	case p.Verb == Hold && Given(p.Speed):
		c.speed = p.Speed
	default:
		c.speed = p.To // None where it is not known
	}
}

// round says that a fault shows only in a later round of a repeat.
func (c *checker) round() string {
	if c.again > 0 {
		return " when the repeat begins again"
	}
	return ""
}

// join checks that a phase begins at the speed at which the one before ended.
func (c *checker) join(p *Phase, key string, v float64, what string) {
	if !Given(v) {
		return
	}
	if Given(c.speed) && !same(v, c.speed) {
		help := `put a "speed up" or "brake" between, or correct the speed`
		if c.again > 0 {
			help = `end the repeat at the speed at which it begins, by "speed up" or "brake"`
		}
		c.tell(p, key, fmt.Sprintf("%s %s, but the vehicle comes with %s%s", what, show(v), show(c.speed), c.round()), help)
	}
	c.speed = v
}

func (c *checker) brake(p *Phase) {
	from := c.speed
	c.speed = p.To
	switch {
	case !Given(p.To):
		c.tell(p, "", `braking needs "to", the speed at which it ends`, `write "to": "0 km/h" for a full stop`)
	case Given(p.Deceleration) == Given(p.Torque):
		c.tell(p, "torque", `braking needs either "deceleration" or "torque"`, "exactly one of them")
	case p.To >= from:
		help := "speed up before"
		if !Given(p.From) && from == 0 && c.again == 0 {
			help = `speed up before; the first phase of a duty can give its speed with "from"`
		}
		c.tell(p, "to", fmt.Sprintf("there is nothing to brake: from %s to %s%s", show(from), show(p.To), c.round()), help)
	case Given(p.Torque) && c.program.Vehicle.Wheel <= 0:
		c.tell(p, "torque", "a braking torque needs the wheel radius of the vehicle", `give the body a "wheel radius"`)
	case Given(p.Torque) && c.tooWeak(p, from):
		c.tell(p, "torque", fmt.Sprintf("the phase can never end: this torque does not slow the vehicle to %s on this grade", show(p.To)), "raise the torque, or end the braking at a higher speed")
	}
}

// tooWeak reports whether a braking torque cannot slow the vehicle down from a speed.
func (c *checker) tooWeak(p *Phase, from float64) bool {
	known := Given(from) && Given(c.program.Vehicle.Wheel)
	return known && !Given(p.coasting(c.program.Vehicle, from))
}

func (c *checker) speedUp(p *Phase) {
	from := c.speed
	c.speed = p.To
	switch {
	case !Given(p.To):
		c.tell(p, "", `speeding up needs "to", the speed at which it ends`, "")
	case Given(p.Acceleration) == Given(p.In):
		c.tell(p, "in", `speeding up needs either "acceleration" or "in", the time it takes`, "exactly one of them")
	case p.To <= from:
		c.tell(p, "to", fmt.Sprintf("there is no speed to gain: from %s to %s%s", show(from), show(p.To), c.round()), "brake before, or correct the speed")
	}
}

// ends checks that a phase that only passes time comes to an end.
func (c *checker) ends(p *Phase, lacks string) {
	timed := Given(p.For) || Given(p.Over)
	switch {
	case Given(p.Over) && c.speed == 0:
		c.tell(p, "over", "a distance can never be covered at standstill", `give "for", a time, or "speed"`)
	case p.Until != nil && !Given(p.AtMost) && !timed:
		c.tell(p, "until", `the phase may never end: "until" has no longest time`, `add "at most", the longest time to wait`)
	case p.Until == nil && Given(p.AtMost):
		c.tell(p, "at most", `"at most" goes with "until"`, `give "for" for a fixed time`)
	case p.Until == nil && !timed:
		c.tell(p, "for", "the phase can never end: it has "+lacks, `add "for", a time, or "until", a temperature with "at most"`)
	}
}

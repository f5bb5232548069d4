package duty

// A Cursor walks through a program leg by leg; since a leg may end early at a temperature, each next leg
// is planned from where the last one really ended.
type Cursor struct {
	program *Program
	time    float64
	speed   float64
	stack   []frame
	leg     Leg
	late    float64
}

// A frame is a list of phases being gone through.
type frame struct {
	phases []Phase
	next   int
	repeat *Phase
	round  int     // which time through, from zero
	start  float64 // of this round
}

// NewCursor returns a cursor at the start of a program.
func NewCursor(p *Program) *Cursor {
	c := &Cursor{program: p}
	c.stack = []frame{{phases: p.Phases}}
	c.speed = startSpeed(p.Phases)
	return c
}

// startSpeed returns the speed [m/s] at which a duty begins: what its first phase says, or else standstill.
func startSpeed(phases []Phase) float64 {
	if p := firstPhase(phases); p != nil && Given(p.begins()) {
		return p.begins()
	}
	return 0
}

// Next plans the next leg. It returns false at the end of the program. The leg is valid until the call
// after the next; Done must be called before.
func (c *Cursor) Next() (*Leg, bool) {
	for len(c.stack) > 0 {
		f := &c.stack[len(c.stack)-1]
		if f.next < len(f.phases) {
			p := &f.phases[f.next]
			f.next++
			if p.Verb == Repeat {
				c.stack = append(c.stack, frame{phases: p.Phases, repeat: p, start: c.time})
				continue
			}
			c.plan(p)
			return &c.leg, true
		}
		if f.repeat == nil {
			c.stack = c.stack[:len(c.stack)-1]
			continue
		}
		if c.closeRound(f) {
			return &c.leg, true
		}
	}
	return nil, false
}

// closeRound ends a round of a repeat: what remains of its interval becomes a leg at the present speed.
// It reports whether there is such a leg.
func (c *Cursor) closeRound(f *frame) bool {
	next := c.time
	if Given(f.repeat.Every) {
		next = f.start + f.repeat.Every
		slack := 1e-9 * f.repeat.Every
		if c.time < next-slack {
			c.fill(f.repeat, next)
			return true
		}
		if c.time > next+slack {
			c.late += c.time - next
			next = c.time
		}
	}
	f.round++
	f.next, f.start = 0, next
	if f.round >= f.repeat.Count {
		c.stack = c.stack[:len(c.stack)-1]
	}
	return false
}

// Done tells the cursor when the leg has ended.
func (c *Cursor) Done(t float64) {
	if len(c.leg.Motions) > 0 {
		c.speed = c.leg.Speed(t)
		if p := c.leg.phase; p != nil && t == c.leg.End && (p.Verb == Brake || p.Verb == SpeedUp) {
			c.speed = p.To // free of rounding
		}
	}
	c.time = t
}

// Round returns how often the innermost repeat has been begun, from one; zero outside of repeats.
func (c *Cursor) Round() int {
	for i := len(c.stack) - 1; i >= 0; i-- {
		if c.stack[i].repeat != nil {
			return c.stack[i].round + 1
		}
	}
	return 0
}

// begin starts a leg at the present time.
func (c *Cursor) begin(label string) *Leg {
	c.leg = Leg{Label: label, Start: c.time, Late: c.late, Motions: c.leg.Motions[:0]}
	c.late = 0
	return &c.leg
}

// fill plans what remains of a repeat's interval.
func (c *Cursor) fill(p *Phase, end float64) {
	l := c.begin(p.Label + ", rest of the interval")
	l.End = end
	if c.program.Vehicle != nil {
		l.Motions = ramp(l.Motions, road(c.program.Vehicle, None), c.time, end, c.speed, 0)
	}
}

// plan lays out the leg of a phase from the present time and speed.
func (c *Cursor) plan(p *Phase) {
	l := c.begin(p.Label)
	l.Until, l.phase, l.Brakes = p.Until, p, p.Verb == Brake
	length := p.length(c.program.Vehicle, c.speed)
	l.End, l.Longest = c.time+length, p.Until != nil && length == p.AtMost
	if c.program.Vehicle == nil {
		return
	}
	base := road(c.program.Vehicle, p.Grade)
	switch {
	case p.Verb == Follow:
		l.Motions = c.follow(l.Motions, base, p)
	case p.Verb == Brake && Given(p.Torque):
		base.T0, base.T1, base.v0 = c.time, l.End, c.speed
		base.coast = newCoast(&base, p.Torque/c.program.Vehicle.Wheel, c.speed)
		base.braked = true
		l.Motions = append(l.Motions, base)
	default:
		l.Motions = ramp(l.Motions, base, c.time, l.End, c.speed, c.acceleration(p))
	}
}

// acceleration returns the acceleration [m/s^2] of a phase from the present speed.
func (c *Cursor) acceleration(p *Phase) float64 {
	switch {
	case p.Verb == Brake:
		return -p.Deceleration
	case p.Verb == SpeedUp && Given(p.In):
		return (p.To - c.speed) / p.In
	case p.Verb == SpeedUp:
		return p.Acceleration
	}
	return 0
}

// follow appends the ramps of a trace.
func (c *Cursor) follow(list []Motion, base Motion, p *Phase) []Motion {
	x, y := p.Trace.X, p.Trace.Y
	for i := 1; i < len(x); i++ {
		if x[i] > x[i-1] {
			t0, t1 := c.time+(x[i-1]-x[0]), c.time+(x[i]-x[0])
			list = ramp(list, base, t0, t1, y[i-1], (y[i]-y[i-1])/(t1-t0))
		}
	}
	return list
}

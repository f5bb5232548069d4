package duty

import (
	"fmt"
	"math"
)

// Bounds of a duty. A phase takes at least a tenth of a millisecond to compute, so maxPhases are a quarter
// of an hour. Between shortest and longest the clock of a run keeps its digits.
const (
	maxPhases = 1e7
	longest   = 1e9  // s, 30 years
	shortest  = 1e-6 // s
)

// time notes how long a phase takes that begins at a speed, and reports one that is out of bounds.
func (c *checker) time(p *Phase, from float64) {
	seconds := p.length(c.program.Vehicle, from)
	switch {
	case math.IsInf(seconds, 0): // it never ends, which is reported
	case seconds > longest:
		c.tell(p, "for", "the phase lasts more than 30 years", "check its numbers and their units")
	case seconds < shortest && seconds > 0:
		c.tell(p, "for", "the phase is over within a microsecond", "check its numbers and their units")
	case seconds > c.lasts[p.Place]:
		c.lasts[p.Place] = seconds
	}
}

// extent reports where a duty runs through too many phases or takes too long.
func (c *checker) extent(phases []Phase) (count, seconds float64) {
	for i := range phases {
		p, n, s := &phases[i], 1.0, c.lasts[phases[i].Place]
		if p.Verb == Repeat {
			n, s = c.extent(p.Phases)
			if Given(p.Every) {
				s = math.Max(s, p.Every)
			}
			n, s = n*float64(p.Count), s*float64(p.Count)
		}
		if count += n; count > maxPhases {
			c.tell(p, "repeat", fmt.Sprintf("the duty runs through more than %.0f million phases", maxPhases/1e6), "repeat less often")
			return 0, 0
		}
		if seconds += s; seconds > longest {
			c.tell(p, "repeat", "up to the end of this the duty lasts more than 30 years", "check the times and their units")
			return 0, 0
		}
	}
	return count, seconds
}

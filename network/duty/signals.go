package duty

import (
	"math"
	"sort"

	"workheat/network/element"
)

// The signals of the vehicle come first, then the tables.
const (
	SpeedSignal = 0 // speed of the vehicle, m/s
	BrakeSignal = 1 // power taken by all its brakes, W
	FirstTable  = 2
)

// Signals gives the value and rate of every signal within the current segment. It meets the assembly's
// Drive.
type Signals struct {
	tables []*element.Curve // over time from the start of the run
	breaks []float64        // corners of all tables after zero, rising
	lines  []line
	motion *Motion
}

// A line is a table within a segment: no corner of it lies inside.
type line struct{ t, y, slope float64 }

// NewSignals returns the signals of the vehicle and of the given tables, which get the indices from
// FirstTable on.
func NewSignals(tables []*element.Curve) *Signals {
	s := &Signals{tables: tables, lines: make([]line, len(tables))}
	for _, c := range tables {
		for _, x := range c.X {
			if x > 0 && len(c.X) > 1 {
				s.breaks = append(s.breaks, x)
			}
		}
	}
	sort.Float64s(s.breaks)
	return s
}

// Count returns the number of signals.
func (s *Signals) Count() int { return FirstTable + len(s.tables) }

// NextBreak returns the first corner of a table after t, or end if there is none before it.
func (s *Signals) NextBreak(t, end float64) float64 {
	i := sort.SearchFloat64s(s.breaks, t)
	for i < len(s.breaks) && s.breaks[i] <= t {
		i++
	}
	if i < len(s.breaks) && s.breaks[i] < end {
		return s.breaks[i]
	}
	return end
}

// Enter makes [t0, t1] the current segment, under a motion (nil: nothing moves). No corner of a table and
// no end of the motion may lie inside.
func (s *Signals) Enter(t0, t1 float64, m *Motion) {
	s.motion = m
	mid := t0 + 0.5*(t1-t0)
	for i, c := range s.tables {
		s.lines[i] = line{mid, c.At(mid), c.Slope(mid)}
	}
}

// At writes values and rates at time t of the current segment.
func (s *Signals) At(t float64, value, rate []float64) {
	value[SpeedSignal], rate[SpeedSignal], value[BrakeSignal], rate[BrakeSignal] = 0, 0, 0, 0
	if s.motion != nil {
		value[SpeedSignal], rate[SpeedSignal], value[BrakeSignal], rate[BrakeSignal] = s.motion.Signals(t)
	}
	for i, l := range s.lines {
		value[FirstTable+i] = l.y + l.slope*(t-l.t)
		rate[FirstTable+i] = l.slope
	}
}

// Fingerprint returns a number that is the same, but for rare accidents of rounding, for segments that
// begin under the same drive: same values and rates of all signals. What worked as a first step in one of
// them is a good guess in the others.
func (s *Signals) Fingerprint(t float64) uint64 {
	h := uint64(14695981039346656037) // FNV-1a, Fowler, Noll and Vo
	mix := func(x float64) { h = (h ^ uint64(math.Float32bits(float32(x)))) * 1099511628211 }
	if s.motion != nil {
		v, dv, power, dpower := s.motion.Signals(t)
		mix(v)
		mix(dv)
		mix(power)
		mix(dpower)
	}
	for _, l := range s.lines {
		mix(l.y + l.slope*(t-l.t))
		mix(l.slope)
	}
	return h
}

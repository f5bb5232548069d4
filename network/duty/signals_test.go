package duty

import (
	"math"
	"testing"

	"workheat/network/element"
)

// tables are a ramp with a jump, a constant, and a table that begins before zero.
var tables = []*element.Curve{
	element.MustCurve([]float64{0, 10, 10, 20}, []float64{1, 3, 7, 5}),
	element.Constant(4),
	element.MustCurve([]float64{-5, 15}, []float64{0, 40}),
}

// Within a segment every table is the straight line that it is between its corners, right up to the ends
// and past them; a constant and a corner before the start make no break.
func TestTablesWithinSegments(t *testing.T) {
	s := NewSignals(tables)
	if s.Count() != FirstTable+3 {
		t.Errorf("%d signals", s.Count())
	}
	var breaks []float64
	for at := 0.0; at < 100; {
		at = s.NextBreak(at, 100)
		breaks = append(breaks, at)
	}
	for i, want := range []float64{10, 15, 20, 100} {
		if i >= len(breaks) || breaks[i] != want {
			t.Fatalf("breaks at %v, want 10, 15, 20, 100", breaks)
		}
	}
	if x := s.NextBreak(11, 14); x != 14 {
		t.Errorf("next break %g, want the end", x)
	}
	value, rate := make([]float64, s.Count()), make([]float64, s.Count())
	for _, c := range []struct{ from, to, at, value, rate float64 }{
		{0, 10, 0, 1, 0.2}, {0, 10, 10, 3, 0.2}, {10, 15, 10, 7, -0.2}, {15, 20, 20, 5, -0.2}, {20, 100, 20, 5, 0}, {20, 100, 60, 5, 0},
	} {
		s.Enter(c.from, c.to, nil)
		s.At(c.at, value, rate)
		near(t, "value", value[FirstTable], c.value, 1e-12)
		near(t, "rate", rate[FirstTable], c.rate, 1e-12)
		near(t, "constant", value[FirstTable+1], 4, 0)
		near(t, "third", value[FirstTable+2], math.Min(40, 2*(c.at+5)), 1e-12)
		if value[SpeedSignal] != 0 || value[BrakeSignal] != 0 || rate[SpeedSignal] != 0 || rate[BrakeSignal] != 0 {
			t.Error("something moves")
		}
	}
}

// The signals of a motion are those of the vehicle.
func TestMotionSignals(t *testing.T) {
	s := NewSignals(nil)
	m := ramp(nil, road(&car, 0), 5, 10, 30, -3)[0]
	s.Enter(5, 10, &m)
	value, rate := make([]float64, 2), make([]float64, 2)
	s.At(7, value, rate)
	force := car.Mass*(car.Rotating*3-0.011*Gravity) - 0.5*1.2*0.7*24*24
	near(t, "speed", value[SpeedSignal], 24, 1e-12)
	near(t, "acceleration", rate[SpeedSignal], -3, 0)
	near(t, "braking power", value[BrakeSignal], force*24, 1e-7)
}

// Segments that begin under the same drive have the same fingerprint wherever they lie in time, and others
// have not.
func TestFingerprint(t *testing.T) {
	s := NewSignals(tables[:2])
	at := func(t0, v0, a float64) uint64 {
		m := ramp(nil, road(&car, 0), t0, t0+4, v0, a)[0]
		s.Enter(t0, t0+4, &m)
		return s.Fingerprint(t0)
	}
	if at(30, 30, -3) != at(75, 30, -3) {
		t.Error("equal drives at different times differ")
	}
	seen := map[uint64]string{}
	note := func(name string, f uint64) {
		if old, ok := seen[f]; ok {
			t.Errorf("%s and %s have one fingerprint", name, old)
		}
		seen[f] = name
	}
	note("braking", at(30, 30, -3))
	note("braking harder", at(30, 30, -4))
	note("from another speed", at(30, 29, -3))
	note("driving", at(30, 30, 1))
	note("on the ramp of a table", at(2, 30, -3))
	s.Enter(30, 34, nil)
	note("parked", s.Fingerprint(30))
	s.Enter(12, 14, nil)
	note("parked, table falling", s.Fingerprint(12))
	note("parked, table falling, later", s.Fingerprint(13))
}

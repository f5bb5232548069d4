package netlist

import (
	"fmt"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/unit"
)

// trace reads a speed trace.
func (r *reader) trace(p *duty.Phase, o object) bool {
	t, ok := r.tableOf(o, r.phases[p.Place].verb, "the trace", column{"time", unit.Time}, column{"speed", unit.Speed})
	if !ok || !r.usableTrace(t, r.phases[p.Place].verb) {
		return false
	}
	p.Trace = t.curve
	return true
}

// closest is how near the times of two rows of a trace may be: nearer ones drown in the digits of a run's
// clock.
const closest = 1e-6 // s

// usableTrace checks that a trace has a length and that the speed neither jumps nor turns negative.
func (r *reader) usableTrace(t table, at diag.Span) bool {
	x, y := t.curve.X, t.curve.Y
	if len(x) < 2 || x[0] == x[len(x)-1] {
		r.list.At(at, "a trace needs at least two rows at different times", "")
		return false
	}
	for i := range x {
		switch {
		case y[i] < 0:
			r.list.Add(diag.Problem{At: t.place(i), Text: fmt.Sprintf("the trace has a negative speed at %g s", x[i]),
				Help: "the vehicle only goes forward", See: t.see})
			return false
		case i > 0 && x[i] > x[i-1] && x[i] < x[i-1]+closest:
			r.list.Add(diag.Problem{At: t.place(i), Text: "this row and the one before are less than a microsecond apart",
				Help: "check the unit of the times", See: t.see})
			return false
		case i > 0 && x[i] == x[i-1] && y[i] != y[i-1]:
			r.list.Add(diag.Problem{At: t.place(i), Text: fmt.Sprintf("the speed jumps at %g s", x[i]),
				Help: "a vehicle's speed cannot jump: give the rows different times", See: t.see})
			return false
		}
	}
	return true
}

package duty

import (
	"fmt"
	"strings"

	"workheat/network/unit"
)

// Words says what a phase does, in one line; name gives the name of a node.
func (p *Phase) Words(name func(node int) string) string {
	var parts []string
	add := func(x float64, format string, value func(float64) string) {
		if Given(x) {
			parts = append(parts, fmt.Sprintf(format, value(x)))
		}
	}
	in := func(w unit.Want) func(float64) string { return func(x float64) string { return w.Format(x, 5) } }
	if p.Verb == Repeat {
		parts = append(parts, fmt.Sprintf("%d times", p.Count))
		add(p.Every, "every %s", in(unit.Time))
		return strings.Join(parts, ", ")
	}
	add(p.Speed, "at %s", show)
	add(p.From, "from %s", show)
	add(p.To, "to %s", show)
	add(p.Deceleration, "at %s", in(unit.Acceleration))
	add(p.Torque, "with %s at all brakes together", in(unit.Torque))
	add(p.Acceleration, "at %s", in(unit.Acceleration))
	add(p.In, "in %s", in(unit.Time))
	add(p.For, "for %s", in(unit.Time))
	add(p.Over, "over %s", in(unit.Length))
	if u := p.Until; u != nil {
		verb := "rises"
		if u.Falls {
			verb = "falls"
		}
		parts = append(parts, fmt.Sprintf("until %s %s to %s", name(u.Node), verb, unit.Temperature.Format(u.Temperature, 5)))
	}
	add(p.AtMost, "at most %s", in(unit.Time))
	add(p.Grade, "on a grade of %s %%", func(x float64) string { return fmt.Sprintf("%.4g", 100*x) })
	if p.Trace != nil {
		parts = append(parts, fmt.Sprintf("a trace of %d rows over %s", len(p.Trace.X), unit.Time.Format(p.Trace.X[len(p.Trace.X)-1]-p.Trace.X[0], 5)))
	}
	return strings.Join(parts, ", ")
}

package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/unit"
)

// A verb is one kind of phase with its keys.
type verb struct {
	name string
	verb duty.Verb
	keys []string
}

// verbs lists the phases but for the repeat.
var verbs = []verb{
	{"brake", duty.Brake, []string{"from", "to", "deceleration", "torque", "grade"}},
	{"speed up", duty.SpeedUp, []string{"from", "to", "acceleration", "in", "grade"}},
	{"hold", duty.Hold, []string{"speed", "for", "over", "until", "at most", "grade"}},
	{"rest", duty.Rest, []string{"for", "until", "at most"}},
	{"follow", duty.Follow, []string{"file", "time", "speed", "grade", "table"}},
}

var phaseKeys = []string{"brake", "speed up", "hold", "rest", "follow", "repeat"}

// duty reads the phases and checks that the speeds join up and that each phase ends.
func (r *reader) duty(v, root *value) {
	if v == nil {
		r.list.At(r.src.Span(root.start, root.start+1), `the key "duty" is missing`, `say what happens, such as "duty": [ { "rest": { "for": "10 min" } } ]`)
		return
	}
	if v.kind != '[' || len(v.items) == 0 {
		r.list.At(r.span(v), "the duty must be a list of phases with at least one entry", "known phases: "+list(phaseKeys))
		return
	}
	phases, ok := r.phases(v, "")
	if !ok {
		return
	}
	r.net.Duty.Phases = phases
	if r.net.Body != "" && r.vehicle == nil {
		return
	}
	r.net.Duty.Check(func(place int, text, help string) { r.list.At(r.places[place], text, help) })
}

// phases reads a list of phases.
func (r *reader) phases(v *value, label string) ([]duty.Phase, bool) {
	var phases []duty.Phase
	good := true
	for i := range v.items {
		p, ok := r.phase(&v.items[i], fmt.Sprintf("%s%d", label, i+1))
		phases = append(phases, p)
		good = good && ok
	}
	return phases, good
}

// phase reads one phase.
func (r *reader) phase(v *value, label string) (duty.Phase, bool) {
	none := duty.None
	p := duty.Phase{
		Label: label, From: none, To: none, Deceleration: none, Torque: none, Acceleration: none, In: none,
		Speed: none, Grade: none, For: none, Over: none, AtMost: none, Every: none, Place: len(r.places),
	}
	r.places = append(r.places, r.span(v))
	if v.kind == '{' && (object{v}).get("repeat") != nil {
		return p, r.repeat(v, &p)
	}
	o, ok := r.object(v, "a phase", phaseKeys)
	if !ok {
		return p, false
	}
	found := -1
	for i := range verbs {
		if x := o.get(verbs[i].name); x != nil {
			if found >= 0 {
				r.list.At(r.span(v), "a phase holds both "+verbs[found].name+" and "+verbs[i].name, "make them two phases, each in its own braces")
				return p, false
			}
			found = i
		}
	}
	if found < 0 {
		if len(v.members) == 0 {
			r.list.At(r.span(v), "the phase is empty", "known phases: "+list(phaseKeys))
		}
		return p, false
	}
	k := verbs[found]
	p.Verb, p.Label = k.verb, label+" "+k.name
	body := o.get(k.name)
	inner, ok := r.object(body, k.name, k.keys)
	if !ok {
		return p, false
	}
	r.places[p.Place] = r.src.Span(keySpan(v, k.name))
	return p, r.fill(&p, inner)
}

// keySpan returns the place of a key of an object.
func keySpan(v *value, key string) (start, end int) {
	for i := range v.members {
		if v.members[i].key == key {
			return v.members[i].start, v.members[i].end
		}
	}
	return v.start, v.end
}

// repeat reads a repeated list of phases.
func (r *reader) repeat(v *value, p *duty.Phase) bool {
	o, ok := r.object(v, "a repeat", []string{"repeat", "every", "phases"})
	if !ok {
		return false
	}
	p.Verb = duty.Repeat
	count := o.get("repeat")
	n, okCount := r.quantity(count, unit.Number)
	if okCount && (n < 1 || n != math.Floor(n) || n > 1e6) {
		r.list.At(r.span(count), "a repeat needs a whole number of rounds, from 1 to 1000000", "")
		okCount = false
	}
	p.Count = int(n)
	if every := o.get("every"); every != nil {
		x, ok := r.quantity(every, unit.Time)
		okCount = ok && r.positive(every, x, "the interval") && okCount
		p.Every = x
	}
	phases := o.get("phases")
	if phases == nil || phases.kind != '[' || len(phases.items) == 0 {
		at := r.span(v)
		if phases != nil {
			at = r.span(phases)
		}
		r.list.At(at, `a repeat needs "phases", a list with at least one entry`, "")
		return false
	}
	r.places[p.Place] = r.src.Span(keySpan(v, "repeat"))
	label := p.Label
	p.Label = label + " repeat"
	inner, ok := r.phases(phases, label+".")
	p.Phases = inner
	return ok && okCount
}

// A slot is one number of a phase: its key, what it is, where it goes, and whether it must be above zero.
type slot struct {
	key      string
	want     unit.Want
	to       *float64
	positive bool
}

// fill reads the numbers of a phase.
func (r *reader) fill(p *duty.Phase, o object) bool {
	slots := []slot{
		{"from", unit.Speed, &p.From, false}, {"to", unit.Speed, &p.To, false},
		{"deceleration", unit.Acceleration, &p.Deceleration, true}, {"torque", unit.Torque, &p.Torque, true},
		{"acceleration", unit.Acceleration, &p.Acceleration, true}, {"in", unit.Time, &p.In, true},
		{"for", unit.Time, &p.For, true}, {"over", unit.Length, &p.Over, true}, {"at most", unit.Time, &p.AtMost, true},
	}
	if p.Verb == duty.Follow {
		slots = nil
	} else {
		slots = append(slots, slot{"speed", unit.Speed, &p.Speed, false})
	}
	good := true
	for _, s := range slots {
		v := o.get(s.key)
		if v == nil {
			continue
		}
		x, ok := r.quantity(v, s.want)
		switch {
		case !ok:
		case s.positive && !(x > 0):
			ok = r.positive(v, x, quote(s.key))
		case x < 0:
			r.list.At(r.span(v), quote(s.key)+" must not be below zero", "the vehicle only goes forward")
			ok = false
		}
		if ok {
			*s.to = x
		}
		good = good && ok
	}
	good = r.grade(p, o.get("grade")) && good
	good = r.until(p, o.get("until")) && good
	if p.Verb == duty.Follow {
		good = r.trace(p, o) && good
	}
	return good
}

// grade reads the slope of the road: a pure number (rise over run, percent) or an angle.
func (r *reader) grade(p *duty.Phase, v *value) bool {
	if v == nil {
		return true
	}
	if v.kind == '"' {
		if q, fault := unit.Parse(v.text, r.params); fault == nil && q.Dim == unit.Angle.Dim() {
			p.Grade = math.Tan(q.Value)
			return r.gradeRange(p, v)
		}
	}
	x, ok := r.quantity(v, unit.Number)
	p.Grade = x
	return ok && r.gradeRange(p, v)
}

func (r *reader) gradeRange(p *duty.Phase, v *value) bool {
	if math.Abs(p.Grade) <= 1 {
		return true
	}
	r.list.At(r.span(v), "a grade beyond 100 % is no road", `write it as rise over run: "6 %" uphill, "-6 %" downhill, or as an angle: "-3.4 deg"`)
	return false
}

// until reads the temperature that ends a phase.
func (r *reader) until(p *duty.Phase, v *value) bool {
	if v == nil {
		return true
	}
	o, ok := r.object(v, "until", []string{"node", "falls to", "rises to"})
	if !ok {
		return false
	}
	node, falls, rises := o.get("node"), o.get("falls to"), o.get("rises to")
	if node == nil {
		r.list.At(r.span(v), `the key "node" is missing`, "it names the node whose temperature ends the phase")
		return false
	}
	i, ok := r.findNode(node, "until")
	if (falls == nil) == (rises == nil) {
		r.list.At(r.span(v), `exactly one of "falls to" and "rises to" is due`, "")
		return false
	}
	mark := falls
	if mark == nil {
		mark = rises
	}
	t, okT := r.quantity(mark, unit.Temperature)
	p.Until = &duty.Until{Node: i, Falls: falls != nil, Temperature: t}
	return ok && okT
}

// trace reads a speed trace.
func (r *reader) trace(p *duty.Phase, o object) bool {
	file, rows := o.get("file"), o.get("table")
	at := r.places[p.Place]
	switch {
	case (file == nil) == (rows == nil):
		r.list.At(at, `a trace needs a "file" with columns of time and speed, or a "table"`, "exactly one of them")
		return false
	case file != nil:
		c, ok := r.columns(o, "the trace", "time", "speed", unit.Time, unit.Speed)
		if !ok {
			return false
		}
		p.Trace = c
	default:
		c, ok := r.rows(rows, "the trace", unit.Time, unit.Speed)
		if !ok {
			return false
		}
		p.Trace = c
	}
	return r.usableTrace(p, at)
}

// usableTrace checks that a trace has a length and that the speed neither jumps nor turns negative.
func (r *reader) usableTrace(p *duty.Phase, at diag.Span) bool {
	x, y := p.Trace.X, p.Trace.Y
	if len(x) < 2 || x[0] == x[len(x)-1] {
		r.list.At(at, "a trace needs at least two rows at different times", "")
		return false
	}
	for i := range x {
		if y[i] < 0 {
			r.list.At(at, fmt.Sprintf("the trace has a negative speed at %g s", x[i]), "the vehicle only goes forward")
			return false
		}
		if i > 0 && x[i] == x[i-1] && y[i] != y[i-1] {
			r.list.At(at, fmt.Sprintf("the speed jumps at %g s", x[i]), "a vehicle's speed cannot jump: give the rows different times")
			return false
		}
	}
	return true
}
